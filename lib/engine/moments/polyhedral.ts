import type { Topology } from '../mesh/topology';
import { MOMENTS, type MomentSums } from './sums';

const moments = new Float64Array(MOMENTS);

/** Faces whose moments are added plainly before they join the compensated sums. */
const BLOCK = 8;

/**
 * Adds the moments of the cones from each body's origin to the cage's own faces, polygons as fans from their vertex mean. `positions` and `origins`
 * (x, y, z per body) share one frame. A tetrahedron (0, a, b, c), signed by det(a, b, c), has V; V/4 · Σv; V/20 · (Σ v vᵀ + (Σv)(Σv)ᵀ) [Mirtich 1996];
 * the products a aᵀ of a corner serve the two tetrahedra beside it.
 */
export function addPolyhedralMoments(mesh: Topology, positions: Float64Array, bodyOf: Int32Array, origins: Float64Array, solid: MomentSums): void {
  const { starts, vertexOf, faces } = mesh;
  const p = positions;
  let body = -1;
  let ox = 0, oy = 0, oz = 0;
  let v = 0, vx = 0, vy = 0, vz = 0, vxx = 0, vyy = 0, vzz = 0, vxy = 0, vxz = 0, vyz = 0, magnitude = 0;
  let inBlock = 0;
  for (let face = 0; face <= faces; face++) {
    if (inBlock === BLOCK || face === faces || bodyOf[face] !== body) {
      if (inBlock > 0) {
        solid.magnitudes[body] += magnitude / 6;
        put(v / 6, vx / 24, vy / 24, vz / 24, vxx / 120, vyy / 120, vzz / 120, vxy / 120, vxz / 120, vyz / 120);
        solid.add(body, moments, 0);
        v = vx = vy = vz = vxx = vyy = vzz = vxy = vxz = vyz = magnitude = inBlock = 0;
      }
      if (face === faces) break;
      body = bodyOf[face];
      ox = origins[3 * body];
      oy = origins[3 * body + 1];
      oz = origins[3 * body + 2];
    }
    inBlock++;
    const start = starts[face];
    const end = starts[face + 1];
    const n = end - start;
    if (n < 3) continue;
    let mx = 0, my = 0, mz = 0;
    for (let h = start; h < (n === 3 ? start + 1 : end); h++) {
      const at = 3 * vertexOf[h];
      mx += p[at] - ox;
      my += p[at + 1] - oy;
      mz += p[at + 2] - oz;
    }
    if (n !== 3) {
      mx /= n;
      my /= n;
      mz /= n;
    }
    // Triangles are their own fan, from the first corner.
    let at = 3 * vertexOf[n === 3 ? start + 1 : end - 1];
    let ax = p[at] - ox, ay = p[at + 1] - oy, az = p[at + 2] - oz;
    let axx = ax * ax, ayy = ay * ay, azz = az * az, axy = ax * ay, axz = ax * az, ayz = ay * az;
    let whole = 0;
    for (let h = n === 3 ? start + 2 : start; h < end; h++) {
      at = 3 * vertexOf[h];
      const bx = p[at] - ox, by = p[at + 1] - oy, bz = p[at + 2] - oz;
      const px = mx * (ay * bz - az * by), py = my * (az * bx - ax * bz), pz = mz * (ax * by - ay * bx);
      const d = px + py + pz;
      magnitude += Math.abs(px) + Math.abs(py) + Math.abs(pz);
      const sx = mx + ax + bx, sy = my + ay + by, sz = mz + az + bz;
      const bxx = bx * bx, byy = by * by, bzz = bz * bz, bxy = bx * by, bxz = bx * bz, byz = by * bz;
      const dx = d * sx, dy = d * sy, dz = d * sz;
      whole += d;
      vx += dx;
      vy += dy;
      vz += dz;
      vxx += d * (axx + bxx) + dx * sx;
      vyy += d * (ayy + byy) + dy * sy;
      vzz += d * (azz + bzz) + dz * sz;
      vxy += d * (axy + bxy) + dx * sy;
      vxz += d * (axz + bxz) + dx * sz;
      vyz += d * (ayz + byz) + dy * sz;
      ax = bx;
      ay = by;
      az = bz;
      axx = bxx;
      ayy = byy;
      azz = bzz;
      axy = bxy;
      axz = bxz;
      ayz = byz;
    }
    v += whole;
    vxx += whole * mx * mx;
    vyy += whole * my * my;
    vzz += whole * mz * mz;
    vxy += whole * mx * my;
    vxz += whole * mx * mz;
    vyz += whole * my * mz;
  }
}

/** Adds the surface moments of the same triangles about the bodies' origins: A; A/3 · Σv; A/12 · (Σ v vᵀ + (Σv)(Σv)ᵀ). */
export function addPolyhedralSurface(mesh: Topology, positions: Float64Array, bodyOf: Int32Array, origins: Float64Array, surface: MomentSums): void {
  const { starts, vertexOf } = mesh;
  const p = positions;
  const apex = new Float64Array(3);
  for (let face = 0; face < mesh.faces; face++) {
    const start = starts[face];
    const end = starts[face + 1];
    const n = end - start;
    const body = bodyOf[face];
    const ox = origins[3 * body], oy = origins[3 * body + 1], oz = origins[3 * body + 2];
    fanApex(mesh, p, face, ox, oy, oz, apex);
    const mx = apex[0], my = apex[1], mz = apex[2];
    let s = 0, x = 0, y = 0, z = 0, xx = 0, yy = 0, zz = 0, xy = 0, xz = 0, yz = 0;
    let last = 3 * vertexOf[n === 3 ? start + 1 : end - 1];
    let ax = p[last] - ox, ay = p[last + 1] - oy, az = p[last + 2] - oz;
    for (let h = n === 3 ? start + 2 : start; h < end; h++) {
      last = 3 * vertexOf[h];
      const bx = p[last] - ox, by = p[last + 1] - oy, bz = p[last + 2] - oz;
      const ux = ax - mx, uy = ay - my, uz = az - mz;
      const wx = bx - mx, wy = by - my, wz = bz - mz;
      const nx = uy * wz - uz * wy, ny = uz * wx - ux * wz, nz = ux * wy - uy * wx;
      const area = Math.sqrt(nx * nx + ny * ny + nz * nz);
      const sx = mx + ax + bx, sy = my + ay + by, sz = mz + az + bz;
      s += area;
      x += area * sx;
      y += area * sy;
      z += area * sz;
      xx += area * (mx * mx + ax * ax + bx * bx + sx * sx);
      yy += area * (my * my + ay * ay + by * by + sy * sy);
      zz += area * (mz * mz + az * az + bz * bz + sz * sz);
      xy += area * (mx * my + ax * ay + bx * by + sx * sy);
      xz += area * (mx * mz + ax * az + bx * bz + sx * sz);
      yz += area * (my * mz + ay * az + by * bz + sy * sz);
      ax = bx;
      ay = by;
      az = bz;
    }
    put(s / 2, x / 6, y / 6, z / 6, xx / 24, yy / 24, zz / 24, xy / 24, xz / 24, yz / 24);
    surface.add(body, moments, 0);
  }
}

/** Where a face's fan starts, about the origin (ox, oy, oz): a triangle's first corner, else the mean of its vertices. */
function fanApex({ starts, vertexOf }: Topology, p: Float64Array, face: number, ox: number, oy: number, oz: number, apex: Float64Array): void {
  const start = starts[face];
  const end = starts[face + 1];
  const n = end - start;
  let x = 0, y = 0, z = 0;
  for (let h = start; h < (n === 3 ? start + 1 : end); h++) {
    const v = 3 * vertexOf[h];
    x += p[v] - ox;
    y += p[v + 1] - oy;
    z += p[v + 2] - oz;
  }
  const count = n === 3 ? 1 : n;
  apex[0] = x / count;
  apex[1] = y / count;
  apex[2] = z / count;
}

function put(v: number, x: number, y: number, z: number, xx: number, yy: number, zz: number, xy: number, xz: number, yz: number): void {
  moments[0] = v;
  moments[1] = x;
  moments[2] = y;
  moments[3] = z;
  moments[4] = xx;
  moments[5] = yy;
  moments[6] = zz;
  moments[7] = xy;
  moments[8] = xz;
  moments[9] = yz;
}
