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
  const p = positions;
  const faceSolid = new Float64Array(MOMENTS);
  const faceSurface = new Float64Array(MOMENTS);
  for (let face = 0; face < mesh.faces; face++) {
    const start = mesh.starts[face];
    const end = mesh.starts[face + 1];
    const n = end - start;
    const body = bodyOf[face];
    const ox = origins[3 * body], oy = origins[3 * body + 1], oz = origins[3 * body + 2];
    // Triangles are their own fan, from the first corner.
    const first = 3 * mesh.vertexOf[start];
    let mx = p[first] - ox, my = p[first + 1] - oy, mz = p[first + 2] - oz;
    if (n !== 3) {
      mx = my = mz = 0;
      for (let h = start; h < end; h++) {
        const v = 3 * mesh.vertexOf[h];
        mx += (p[v] - ox) / n;
        my += (p[v + 1] - oy) / n;
        mz += (p[v + 2] - oz) / n;
      }
    }
    faceSolid.fill(0);
    faceSurface.fill(0);
    for (let h = n === 3 ? start + 1 : start; h < (n === 3 ? start + 2 : end); h++) {
      const a = 3 * mesh.vertexOf[h];
      const b = 3 * mesh.vertexOf[h + 1 === end ? start : h + 1];
      const ax = p[a] - ox, ay = p[a + 1] - oy, az = p[a + 2] - oz;
      const bx = p[b] - ox, by = p[b + 1] - oy, bz = p[b + 2] - oz;
      solid.magnitudes[body] += tetrahedronMoments(mx, my, mz, ax, ay, az, bx, by, bz, values);
      for (let i = 0; i < MOMENTS; i++) faceSolid[i] += values[i];
      if (surface === null) continue;
      triangleSurfaceMoments(mx, my, mz, ax, ay, az, bx, by, bz, values);
      for (let i = 0; i < MOMENTS; i++) faceSurface[i] += values[i];
    }
    solid.add(body, faceSolid, 0);
    surface?.add(body, faceSurface, 0);
  }
}
