import type { Cage } from '../cage';
import { positionOf } from './diagnose';
import { counted, placeOf, type FindingList } from './findings';
import type { Bodies } from './partition';
import { nextHalfEdge, type Topology } from './topology';

/** Different vertices in almost one place, which a weld would join. */
export const NEAR_COINCIDENT_VERTICES = 'near_coincident_vertices';

/** Share of the border's box diagonal within which two vertices are taken for one. */
const WELD_SHARE = 1e-5;

/**
 * Warns of vertices on open borders that lie on another border's vertex, or nearly so: a weld would join them and may close the surface.
 * Only borders are looked at, since closed surfaces that touch are no fault.
 */
export function diagnoseNearCoincident(cage: Cage, mesh: Topology, bodies: Bodies, findings: FindingList): void {
  const faceAt = new Int32Array(mesh.vertices).fill(-1);
  let count = 0;
  for (let h = 0; h < mesh.twin.length; h++) {
    if (mesh.twin[h] >= 0) continue;
    for (const vertex of [mesh.vertexOf[h], mesh.vertexOf[nextHalfEdge(mesh, h)]]) {
      if (faceAt[vertex] < 0) count++;
      faceAt[vertex] = mesh.faceOf[h];
    }
  }
  if (count === 0) return;
  const vertices = new Int32Array(count);
  for (let v = mesh.vertices - 1; v >= 0; v--) if (faceAt[v] >= 0) vertices[--count] = v;
  const tolerance = WELD_SHARE * diagonalOf(cage.positions, vertices);
  if (!Number.isFinite(tolerance)) return;
  for (const vertex of nearOthers(cage.positions, vertices, tolerance)) {
    const face = faceAt[vertex];
    findings.add(NEAR_COINCIDENT_VERTICES, 'warning', bodies.partNames[bodies.partOf[face]],
      placeOf({ face, vertex, position: positionOf(cage, vertex), line: cage.faceLines?.[face] ?? null }),
      (n) => `${counted(n, 'vertex on an open border lies', 'vertices on open borders lie')} on another within ${tolerance.toPrecision(2)} file units; weld ${n === 1 ? 'it' : 'them'} if the surface is meant to be closed there.`);
  }
}

function diagonalOf(positions: Float64Array, vertices: Int32Array): number {
  const sides = [0, 1, 2].map((axis) => {
    let low = Infinity;
    let high = -Infinity;
    for (const v of vertices) {
      low = Math.min(low, positions[3 * v + axis]);
      high = Math.max(high, positions[3 * v + axis]);
    }
    return high - low;
  });
  return Math.hypot(sides[0], sides[1], sides[2]);
}

/** The vertices that have another one within `tolerance`, found through a hash of cells twice as wide. */
function nearOthers(positions: Float64Array, vertices: Int32Array, tolerance: number): number[] {
  const width = 2 * tolerance || 1;
  const slots = 2 ** Math.ceil(Math.log2(2 * vertices.length));
  const heads = new Int32Array(slots).fill(-1);
  const next = new Int32Array(vertices.length);
  const slotOf = (x: number, y: number, z: number): number => (Math.imul(x, 73856093) ^ Math.imul(y, 19349663) ^ Math.imul(z, 83492791)) & (slots - 1);
  const cellOf = (v: number, axis: number): number => Math.floor(positions[3 * v + axis] / width);
  for (let i = 0; i < vertices.length; i++) {
    const slot = slotOf(cellOf(vertices[i], 0), cellOf(vertices[i], 1), cellOf(vertices[i], 2));
    next[i] = heads[slot];
    heads[slot] = i;
  }
  const hasNear = (v: number, slot: number): boolean => {
    for (let i = heads[slot]; i >= 0; i = next[i]) {
      const other = vertices[i];
      const dx = positions[3 * v] - positions[3 * other], dy = positions[3 * v + 1] - positions[3 * other + 1], dz = positions[3 * v + 2] - positions[3 * other + 2];
      if (other !== v && Math.sqrt(dx * dx + dy * dy + dz * dz) <= tolerance) return true;
    }
    return false;
  };
  // Within half a cell of a point lie at most two cells an axis: its own and the one on its side of the middle.
  const beside = (v: number, axis: number): number => {
    const scaled = positions[3 * v + axis] / width;
    return scaled - Math.floor(scaled) < 0.5 ? -1 : 1;
  };
  const found: number[] = [];
  for (const v of vertices) {
    const steps = [beside(v, 0), beside(v, 1), beside(v, 2)];
    for (let way = 0; way < 8; way++) {
      const [x, y, z] = steps.map((step, axis) => cellOf(v, axis) + ((way >> axis) & 1) * step);
      if (!hasNear(v, slotOf(x, y, z))) continue;
      found.push(v);
      break;
    }
  }
  return found;
}
