import type { Topology } from '../mesh/topology';
import { MOMENTS, type MomentSums } from './sums';

/**
 * Adds the ten moments of the tetrahedron (0, a, b, c), signed by det(a, b, c), to `solid` [Mirtich 1996]: V; V/4 · Σv; V/20 · (Σ v vᵀ + (Σv)(Σv)ᵀ),
 * and the ten surface moments of the triangle a, b, c to `surface`: A; A/3 · Σv; A/12 · (the same). Returns the magnitude that the volume's rounding error is relative to.
 */
function addTriangle(
  ax: number, ay: number, az: number, bx: number, by: number, bz: number, cx: number, cy: number, cz: number, solid: Float64Array, surface: Float64Array,
): number {
  const px = ax * (by * cz - bz * cy), py = ay * (bz * cx - bx * cz), pz = az * (bx * cy - by * cx);
  const volume = (px + py + pz) / 6;
  const ux = bx - ax, uy = by - ay, uz = bz - az;
  const vx = cx - ax, vy = cy - ay, vz = cz - az;
  const nx = uy * vz - uz * vy, ny = uz * vx - ux * vz, nz = ux * vy - uy * vx;
  const area = Math.sqrt(nx * nx + ny * ny + nz * nz) / 2;
  const sx = ax + bx + cx, sy = ay + by + cy, sz = az + bz + cz;
  const xx = ax * ax + bx * bx + cx * cx + sx * sx, yy = ay * ay + by * by + cy * cy + sy * sy, zz = az * az + bz * bz + cz * cz + sz * sz;
  const xy = ax * ay + bx * by + cx * cy + sx * sy, xz = ax * az + bx * bz + cx * cz + sx * sz, yz = ay * az + by * bz + cy * cz + sy * sz;
  addTen(solid, volume, volume / 4, volume / 20, sx, sy, sz, xx, yy, zz, xy, xz, yz);
  addTen(surface, area, area / 3, area / 12, sx, sy, sz, xx, yy, zz, xy, xz, yz);
  return (Math.abs(px) + Math.abs(py) + Math.abs(pz)) / 6;
}

function addTen(
  out: Float64Array, zeroth: number, first: number, second: number, sx: number, sy: number, sz: number,
  xx: number, yy: number, zz: number, xy: number, xz: number, yz: number,
): void {
  out[0] += zeroth;
  out[1] += first * sx;
  out[2] += first * sy;
  out[3] += first * sz;
  out[4] += second * xx;
  out[5] += second * yy;
  out[6] += second * zz;
  out[7] += second * xy;
  out[8] += second * xz;
  out[9] += second * yz;
}

/**
 * Adds the moments of the cones from each body's origin to the cage's own faces, polygons as fans from their vertex mean.
 * `positions` and `origins` (x, y, z per body) share one frame. `surface` receives the surface moments about the same origins.
 */
export function addPolyhedralMoments(
  mesh: Topology, positions: Float64Array, bodyOf: Int32Array, origins: Float64Array, solid: MomentSums, surface: MomentSums,
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
      solid.magnitudes[body] += addTriangle(mx, my, mz, ax, ay, az, bx, by, bz, faceSolid, faceSurface);
    }
    solid.add(body, faceSolid, 0);
    surface.add(body, faceSurface, 0);
  }
}
