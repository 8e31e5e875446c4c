import type { Topology } from '../mesh/topology';
import { MOMENTS, type MomentSums } from './sums';

const values = new Float64Array(MOMENTS);

/**
 * The ten moments of the tetrahedron (0, a, b, c), signed by det(a, b, c) [Mirtich 1996]: V; V/4 · Σv; V/20 · (Σ v vᵀ + (Σv)(Σv)ᵀ).
 * Written to `out`; returns the magnitude that the volume's rounding error is relative to.
 */
export function tetrahedronMoments(
  ax: number, ay: number, az: number, bx: number, by: number, bz: number, cx: number, cy: number, cz: number, out: Float64Array,
): number {
  const volume = (ax * (by * cz - bz * cy) + ay * (bz * cx - bx * cz) + az * (bx * cy - by * cx)) / 6;
  const sx = ax + bx + cx;
  const sy = ay + by + cy;
  const sz = az + bz + cz;
  const first = volume / 4;
  const second = volume / 20;
  out[0] = volume;
  out[1] = first * sx;
  out[2] = first * sy;
  out[3] = first * sz;
  out[4] = second * (ax * ax + bx * bx + cx * cx + sx * sx);
  out[5] = second * (ay * ay + by * by + cy * cy + sy * sy);
  out[6] = second * (az * az + bz * bz + cz * cz + sz * sz);
  out[7] = second * (ax * ay + bx * by + cx * cy + sx * sy);
  out[8] = second * (ax * az + bx * bz + cx * cz + sx * sz);
  out[9] = second * (ay * az + by * bz + cy * cz + sy * sz);
  return (Math.abs(ax * (by * cz - bz * cy)) + Math.abs(ay * (bz * cx - bx * cz)) + Math.abs(az * (bx * cy - by * cx))) / 6;
}

/** Ten surface moments of the triangle a, b, c times its area: ∫ 1, x … yz dA, exact. Written to `out`. */
function triangleSurfaceMoments(
  ax: number, ay: number, az: number, bx: number, by: number, bz: number, cx: number, cy: number, cz: number, out: Float64Array,
): void {
  const ux = bx - ax, uy = by - ay, uz = bz - az;
  const vx = cx - ax, vy = cy - ay, vz = cz - az;
  const area = Math.sqrt((uy * vz - uz * vy) ** 2 + (uz * vx - ux * vz) ** 2 + (ux * vy - uy * vx) ** 2) / 2;
  const sx = ax + bx + cx, sy = ay + by + cy, sz = az + bz + cz;
  const second = area / 12;
  out[0] = area;
  out[1] = (area / 3) * sx;
  out[2] = (area / 3) * sy;
  out[3] = (area / 3) * sz;
  out[4] = second * (ax * ax + bx * bx + cx * cx + sx * sx);
  out[5] = second * (ay * ay + by * by + cy * cy + sy * sy);
  out[6] = second * (az * az + bz * bz + cz * cz + sz * sz);
  out[7] = second * (ax * ay + bx * by + cx * cy + sx * sy);
  out[8] = second * (ax * az + bx * bz + cx * cz + sx * sz);
  out[9] = second * (ay * az + by * bz + cy * cz + sy * sz);
}

/**
 * Adds the moments of the cones from each body's origin to the cage's own faces, polygons as fans from their vertex mean.
 * `positions` and `origins` (x, y, z per body) share one frame. `surface`, where given, receives the surface moments about the same origins.
 */
export function addPolyhedralMoments(
  mesh: Topology, positions: Float64Array, bodyOf: Int32Array, origins: Float64Array, solid: MomentSums, surface: MomentSums | null,
): void {
  const emit = (body: number, p: number[], a: number, b: number, m: readonly number[]): void => {
    const ox = origins[3 * body], oy = origins[3 * body + 1], oz = origins[3 * body + 2];
    const ax = p[a] - ox, ay = p[a + 1] - oy, az = p[a + 2] - oz;
    const bx = p[b] - ox, by = p[b + 1] - oy, bz = p[b + 2] - oz;
    const mx = m[0] - ox, my = m[1] - oy, mz = m[2] - oz;
    solid.magnitudes[body] += tetrahedronMoments(mx, my, mz, ax, ay, az, bx, by, bz, values);
    solid.add(body, values, 0);
    if (surface === null) return;
    triangleSurfaceMoments(mx, my, mz, ax, ay, az, bx, by, bz, values);
    surface.add(body, values, 0);
  };
  const p: number[] = [];
  for (let face = 0; face < mesh.faces; face++) {
    const start = mesh.starts[face];
    const n = mesh.starts[face + 1] - start;
    p.length = 0;
    const mean: [number, number, number] = [0, 0, 0];
    for (let i = 0; i < n; i++) {
      for (let axis = 0; axis < 3; axis++) {
        const value = positions[3 * mesh.vertexOf[start + i] + axis];
        p.push(value);
        mean[axis] += value / n;
      }
    }
    const body = bodyOf[face];
    if (n === 3) emit(body, p, 3, 6, [p[0], p[1], p[2]]);
    else for (let i = 0; i < n; i++) emit(body, p, 3 * i, 3 * ((i + 1) % n), mean);
  }
}
