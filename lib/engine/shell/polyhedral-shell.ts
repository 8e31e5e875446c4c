import type { Topology } from '../mesh/topology';
import { Corners } from './corners';
import { FOLDED } from './mitre';
import { emptyShells, type ShellBody } from './shell-sums';

/** ∫ along a straight edge of 1, x and x xᵀ is exact by two Gauss nodes, at ½ ± this. */
const NODE = Math.sqrt(1 / 12);

/** Unit normals of the triangles that half-edges stand for, about whose apex each lies: a face's mean, or a triangle's own last corner. */
interface Flats {
  mesh: Topology;
  positions: Float64Array;
  means: Float64Array;
  normals: Float64Array;
}

/** Shells of a cage's own faces, polygons as triangles about their vertex mean: flat, so that curvature sits in edges (mitred) and corners (estimated) alone. */
export function integratePolyhedralShells(mesh: Topology, positions: Float64Array, bodyOf: Int32Array, origins: Float64Array, bodies: number): ShellBody[] {
  const shells = emptyShells(bodies);
  const flats: Flats = { mesh, positions, means: faceMeans(mesh, positions), normals: new Float64Array(3 * mesh.vertexOf.length) };
  for (let face = 0; face < mesh.faces; face++) addFace(flats, face, origins, 3 * bodyOf[face], shells[bodyOf[face]].terms);
  const corners = new Corners(mesh.vertices + mesh.faces);
  for (let h = 0; h < mesh.vertexOf.length; h++) countCorners(flats, corners, h);
  corners.solve();
  new FlatEdges(flats, corners, bodyOf, origins, shells).addAll();
  return shells;
}

function isTriangle(mesh: Topology, face: number): boolean {
  return mesh.starts[face + 1] - mesh.starts[face] === 3;
}

function faceMeans({ starts, vertexOf, faces }: Topology, p: Float64Array): Float64Array {
  const means = new Float64Array(3 * faces);
  for (let face = 0; face < faces; face++) {
    const count = starts[face + 1] - starts[face];
    for (let axis = 0; axis < 3; axis++) {
      let sum = 0;
      for (let h = starts[face]; h < starts[face + 1]; h++) sum += p[3 * vertexOf[h] + axis];
      means[3 * face + axis] = sum / count;
    }
  }
  return means;
}

/** Adds ∫ N dA and ∫ (X Nᵀ + N Xᵀ) dA of a face's triangles, all there is of flat ones, and notes their normals. X is linear, so the centroid alone is exact. */
function addFace({ mesh, positions: p, means, normals }: Flats, face: number, origins: Float64Array, origin: number, terms: Float64Array): void {
  const { starts, vertexOf } = mesh;
  const start = starts[face], end = starts[face + 1];
  const whole = isTriangle(mesh, face);
  const apexes = whole ? p : means;
  const apex = whole ? 3 * vertexOf[end - 1] : 3 * face;
  const px = apexes[apex], py = apexes[apex + 1], pz = apexes[apex + 2];
  for (let h = start; h < end; h++) {
    if (whole && h > start) {
      for (let axis = 0; axis < 3; axis++) normals[3 * h + axis] = normals[3 * start + axis];
      continue;
    }
    const a = 3 * vertexOf[h], b = 3 * vertexOf[h + 1 === end ? start : h + 1];
    const ux = p[a] - px, uy = p[a + 1] - py, uz = p[a + 2] - pz;
    const vx = p[b] - px, vy = p[b + 1] - py, vz = p[b + 2] - pz;
    const nx = uy * vz - uz * vy, ny = uz * vx - ux * vz, nz = ux * vy - uy * vx;
    const length = Math.sqrt(nx * nx + ny * ny + nz * nz);
    if (!(length > 0)) continue;
    normals[3 * h] = nx / length;
    normals[3 * h + 1] = ny / length;
    normals[3 * h + 2] = nz / length;
    const x = px + (ux + vx) / 3 - origins[origin], y = py + (uy + vy) / 3 - origins[origin + 1], z = pz + (uz + vz) / 3 - origins[origin + 2];
    terms[2] -= nx / 2;
    terms[3] -= ny / 2;
    terms[4] -= nz / 2;
    terms[11] -= nx * x;
    terms[12] -= ny * y;
    terms[13] -= nz * z;
    terms[14] -= (nx * y + ny * x) / 2;
    terms[15] -= (nx * z + nz * x) / 2;
    terms[16] -= (ny * z + nz * y) / 2;
    const area = length / 2;
    const X = nx / length, Y = ny / length, Z = nz / length;
    terms[17] += area * X * X;
    terms[18] += area * Y * Y;
    terms[19] += area * Z * Z;
    terms[20] += area * X * Y;
    terms[21] += area * X * Z;
    terms[22] += area * Y * Z;
  }
}

/** Counts the normal of the triangle that h stands for at its corners, once for both edges that meet there. */
function countCorners({ mesh, normals }: Flats, corners: Corners, h: number): void {
  const { starts, vertexOf, faceOf } = mesh;
  const face = faceOf[h];
  const x = normals[3 * h], y = normals[3 * h + 1], z = normals[3 * h + 2];
  corners.addNormal(vertexOf[h], x, y, z);
  if (isTriangle(mesh, face)) return;
  corners.addNormal(vertexOf[h + 1 === starts[face + 1] ? starts[face] : h + 1], x, y, z);
  corners.addNormal(mesh.vertices + face, x, y, z);
}

/** The edges between a cage's flat triangles: its own, and the spokes to the means of its polygons. */
class FlatEdges {
  constructor(
    private readonly flats: Flats, private readonly corners: Corners, private readonly bodyOf: Int32Array, private readonly origins: Float64Array,
    private readonly shells: ShellBody[],
  ) {}

  /** Adds each edge's mitre and, the corners being solved, its ends' estimates. */
  addAll(): void {
    const { mesh } = this.flats;
    const { starts, vertexOf, twin } = mesh;
    for (let face = 0; face < mesh.faces; face++) {
      const start = starts[face], end = starts[face + 1];
      const spokes = !isTriangle(mesh, face);
      for (let h = start; h < end; h++) {
        const next = h + 1 === end ? start : h + 1;
        const to = vertexOf[next];
        if (twin[h] > h) this.take(h, twin[h], vertexOf[h], to, this.bodyOf[mesh.faceOf[twin[h]]], face);
        // The spoke back from the triangle's second corner to the mean.
        if (spokes) this.take(h, next, to, mesh.vertices + face, this.bodyOf[face], face);
      }
    }
  }

  private take(h: number, other: number, from: number, to: number, acrossBody: number, face: number): void {
    const { flats, corners, shells } = this;
    const { normals, mesh, positions, means } = flats;
    const p = 3 * from, q = to < mesh.vertices ? 3 * to : 3 * (to - mesh.vertices);
    const ends = to < mesh.vertices ? positions : means;
    const sx = ends[q] - positions[p], sy = ends[q + 1] - positions[p + 1], sz = ends[q + 2] - positions[p + 2];
    const length = Math.sqrt(sx * sx + sy * sy + sz * sz);
    if (!(length > 0)) return;
    const own = shells[this.bodyOf[face]], across = shells[acrossBody];
    const a = 3 * h, b = 3 * other;
    const ax = normals[a], ay = normals[a + 1], az = normals[a + 2], bx = normals[b], by = normals[b + 1], bz = normals[b + 2];
    const folded = 1 + ax * bx + ay * by + az * bz;
    if (!(folded > FOLDED)) {
      own.errors[1] += length / FOLDED;
      across.errors[1] += length / FOLDED;
      return;
    }
    const turn = (ay * bz - az * by) * sx + (az * bx - ax * bz) * sy + (ax * by - ay * bx) * sz;
    const tangent = turn / (length * folded);
    if (tangent === 0) return;
    corners.estimate(to, tangent, sx / length, sy / length, sz / length, own, across);
    corners.estimate(from, tangent, -sx / length, -sy / length, -sz / length, own, across);
    const area = (-tangent / 2) * length;
    const mx = positions[p] + sx / 2, my = positions[p + 1] + sy / 2, mz = positions[p + 2] + sz / 2;
    if (own === across) {
      this.addKite(own, acrossBody, 2 * area, mx, my, mz, sx * NODE, sy * NODE, sz * NODE, a, b, folded, true);
      return;
    }
    this.addKite(own, this.bodyOf[face], area, mx, my, mz, sx * NODE, sy * NODE, sz * NODE, a, b, folded, false);
    this.addKite(across, acrossBody, area, mx, my, mz, sx * NODE, sy * NODE, sz * NODE, b, a, folded, false);
  }

  /**
   * One side's half of the mitre, or (`both`) the whole of it, as `addMitre` has it, for straight edges between flat faces: `area` over the whole edge, its middle
   * and half the nodes' distance. The triangles 0, p, q and 0, p′, q of both sides have Σ 2ppᵀ + 2qqᵀ + pqᵀ + qpᵀ in common.
   */
  private addKite(
    shell: ShellBody, body: number, area: number, mx: number, my: number, mz: number, dx: number, dy: number, dz: number, ownAt: number, acrossAt: number,
    folded: number, both: boolean,
  ): void {
    const { origins } = this;
    const { normals } = this.flats;
    const out = shell.mitres;
    const x = mx - origins[3 * body], y = my - origins[3 * body + 1], z = mz - origins[3 * body + 2];
    const px = normals[ownAt], py = normals[ownAt + 1], pz = normals[ownAt + 2];
    const rx = normals[acrossAt], ry = normals[acrossAt + 1], rz = normals[acrossAt + 2];
    const qx = (px + rx) / folded, qy = (py + ry) / folded, qz = (pz + rz) / folded;
    // Halves of both sides: the means of p and of p pᵀ; p alone stands for its own side.
    const hx = both ? (px + rx) / 2 : px, hy = both ? (py + ry) / 2 : py, hz = both ? (pz + rz) / 2 : pz;
    const ex = px - hx, ey = py - hy, ez = pz - hz;
    const fx = (area * (hx + qx)) / 3, fy = (area * (hy + qy)) / 3, fz = (area * (hz + qz)) / 3;
    out[1] += area;
    out[6] += area * x;
    out[7] -= fx;
    out[11] += area * y;
    out[12] -= fy;
    out[16] += area * z;
    out[17] -= fz;
    addSecond(out, 20, area, x * x + dx * dx, 2 * fx * x, 2 * (hx * hx + ex * ex + qx * qx + hx * qx));
    addSecond(out, 25, area, y * y + dy * dy, 2 * fy * y, 2 * (hy * hy + ey * ey + qy * qy + hy * qy));
    addSecond(out, 30, area, z * z + dz * dz, 2 * fz * z, 2 * (hz * hz + ez * ez + qz * qz + hz * qz));
    addSecond(out, 35, area, x * y + dx * dy, fx * y + fy * x, 2 * (hx * hy + ex * ey + qx * qy) + hx * qy + qx * hy);
    addSecond(out, 40, area, x * z + dx * dz, fx * z + fz * x, 2 * (hx * hz + ex * ez + qx * qz) + hx * qz + qx * hz);
    addSecond(out, 45, area, y * z + dy * dz, fy * z + fz * y, 2 * (hy * hz + ey * ez + qy * qz) + hy * qz + qy * hz);
  }
}

function addSecond(out: Float64Array, at: number, area: number, place: number, first: number, kite: number): void {
  out[at + 1] += area * place;
  out[at + 2] -= first;
  out[at + 3] += (area * kite) / 12;
}
