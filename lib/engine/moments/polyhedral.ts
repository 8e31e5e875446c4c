import type { Topology } from '../mesh/topology';
import { MOMENTS, type MomentSums } from './sums';

const moments = new Float64Array(MOMENTS);

/**
 * Adds the moments of the cones from each body's origin to the cage's own faces, polygons as fans from their vertex mean. `positions` and `origins`
 * (x, y, z per body) share one frame. A tetrahedron (0, a, b, c), signed by det(a, b, c), has V; V/4 · Σv; V/20 · (Σ v vᵀ + (Σv)(Σv)ᵀ) [Mirtich 1996].
 */
export function addPolyhedralMoments(mesh: Topology, positions: Float64Array, bodyOf: Int32Array, origins: Float64Array, solid: MomentSums): void {
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
    let v = 0, vx = 0, vy = 0, vz = 0, vxx = 0, vyy = 0, vzz = 0, vxy = 0, vxz = 0, vyz = 0, magnitude = 0;
    // Triangles are their own fan, from the first corner.
    let last = 3 * vertexOf[n === 3 ? start + 1 : end - 1];
    let ax = p[last] - ox, ay = p[last + 1] - oy, az = p[last + 2] - oz;
    for (let h = n === 3 ? start + 2 : start; h < end; h++) {
      last = 3 * vertexOf[h];
      const bx = p[last] - ox, by = p[last + 1] - oy, bz = p[last + 2] - oz;
      const px = mx * (ay * bz - az * by), py = my * (az * bx - ax * bz), pz = mz * (ax * by - ay * bx);
      const d = px + py + pz;
      magnitude += Math.abs(px) + Math.abs(py) + Math.abs(pz);
      const sx = mx + ax + bx, sy = my + ay + by, sz = mz + az + bz;
      v += d;
      vx += d * sx;
      vy += d * sy;
      vz += d * sz;
      vxx += d * (mx * mx + ax * ax + bx * bx + sx * sx);
      vyy += d * (my * my + ay * ay + by * by + sy * sy);
      vzz += d * (mz * mz + az * az + bz * bz + sz * sz);
      vxy += d * (mx * my + ax * ay + bx * by + sx * sy);
      vxz += d * (mx * mz + ax * az + bx * bz + sx * sz);
      vyz += d * (my * mz + ay * az + by * bz + sy * sz);
      ax = bx;
      ay = by;
      az = bz;
    }
    solid.magnitudes[body] += magnitude / 6;
    put(v / 6, vx / 24, vy / 24, vz / 24, vxx / 120, vyy / 120, vzz / 120, vxy / 120, vxz / 120, vyz / 120);
    solid.add(body, moments, 0);
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
