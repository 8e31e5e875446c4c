import type { Cage } from '../cage';
import { rebuildFaces } from './rebuild-faces';
import { buildTopology, nextHalfEdge, type Topology } from './topology';

/** Share of the borders' box diagonal within which two vertices are taken for one. */
const WELD_SHARE = 1e-5;

/** Vertices on open borders, ascending. */
export function borderVertices(mesh: Topology): Int32Array {
  const onBorder = new Uint8Array(mesh.vertices);
  let found = 0;
  const mark = (vertex: number): void => {
    if (onBorder[vertex] === 0) found++;
    onBorder[vertex] = 1;
  };
  for (let h = 0; h < mesh.twin.length; h++) {
    if (mesh.twin[h] >= 0) continue;
    mark(mesh.vertexOf[h]);
    mark(mesh.vertexOf[nextHalfEdge(mesh, h)]);
  }
  const vertices = new Int32Array(found);
  for (let vertex = mesh.vertices - 1; found > 0; vertex--) if (onBorder[vertex] === 1) vertices[--found] = vertex;
  return vertices;
}

/** Distance in file units within which vertices on borders count as one: a share of the diagonal of the borders' box. */
export function weldTolerance(positions: Float64Array, vertices: Int32Array): number {
  const low = [Infinity, Infinity, Infinity];
  const high = [-Infinity, -Infinity, -Infinity];
  for (const v of vertices) {
    for (let axis = 0; axis < 3; axis++) {
      low[axis] = Math.min(low[axis], positions[3 * v + axis]);
      high[axis] = Math.max(high[axis], positions[3 * v + axis]);
    }
  }
  return vertices.length === 0 ? 0 : WELD_SHARE * Math.hypot(high[0] - low[0], high[1] - low[1], high[2] - low[2]);
}

/**
 * What a weld joins: for each of the vertices (ascending) that lies within `tolerance` of a lower one that stays, the lowest such. Nothing where the tolerance
 * is no finite number. Found through a hash of cells twice as wide as the tolerance.
 */
export function weldPairs(positions: Float64Array, vertices: Int32Array, tolerance: number): Map<number, number> {
  const into = new Map<number, number>();
  if (!Number.isFinite(tolerance) || vertices.length === 0) return into;
  const width = 2 * tolerance || 1;
  const slots = 2 ** Math.ceil(Math.log2(2 * vertices.length));
  const heads = new Int32Array(slots).fill(-1);
  const next = new Int32Array(vertices.length);
  const slotOf = (x: number, y: number, z: number): number => (Math.imul(x, 73856093) ^ Math.imul(y, 19349663) ^ Math.imul(z, 83492791)) & (slots - 1);
  const cellOf = (v: number, axis: number): number => Math.floor(positions[3 * v + axis] / width);
  // Within half a cell of a point lie at most two cells an axis: its own and the one on its side of the middle.
  const beside = (v: number, axis: number): number => (positions[3 * v + axis] / width - cellOf(v, axis) < 0.5 ? -1 : 1);
  for (let i = 0; i < vertices.length; i++) {
    const v = vertices[i];
    let found = Infinity;
    for (let way = 0; way < 8; way++) {
      const [x, y, z] = [0, 1, 2].map((axis) => cellOf(v, axis) + ((way >> axis) & 1) * beside(v, axis));
      for (let j = heads[slotOf(x, y, z)]; j >= 0; j = next[j]) {
        const other = vertices[j];
        const dx = positions[3 * v] - positions[3 * other], dy = positions[3 * v + 1] - positions[3 * other + 1], dz = positions[3 * v + 2] - positions[3 * other + 2];
        if (other < found && Math.sqrt(dx * dx + dy * dy + dz * dz) <= tolerance) found = other;
      }
    }
    if (found < Infinity) {
      into.set(v, found);
      continue;
    }
    const slot = slotOf(cellOf(v, 0), cellOf(v, 1), cellOf(v, 2));
    next[i] = heads[slot];
    heads[slot] = i;
  }
  return into;
}

/**
 * The cage with vertices on its open borders joined that lie within `tolerance` (file units; by default what the diagnosis names) of one another: each takes the
 * place of the lowest one. Corners that fall together become one, faces with fewer than three left are dropped; tags go along. `joined` holds the vertices
 * that gave way, ascending; they belong to no face any more and keep their place. A pure function. Closed surfaces that touch are not joined.
 */
export function weldVertices(cage: Cage, tolerance?: number): { cage: Cage; joined: Int32Array } {
  const border = borderVertices(buildTopology(cage).mesh);
  const into = weldPairs(cage.positions, border, tolerance ?? weldTolerance(cage.positions, border));
  if (into.size === 0) return { cage, joined: new Int32Array(0) };
  const at = (vertex: number): number => into.get(vertex) ?? vertex;
  const cornersOf = (face: number): number[] => {
    const corners = Array.from(cage.faceVertices.subarray(cage.faceStarts[face], cage.faceStarts[face + 1]), at);
    return corners.filter((vertex, i) => vertex !== corners[(i + 1) % corners.length]);
  };
  const faces = Array.from({ length: cage.faceStarts.length - 1 }, (_, face) => face).filter((face) => cornersOf(face).length > 2);
  const welded = rebuildFaces(cage, faces, cornersOf);
  return {
    cage: { ...welded, creaseVertices: cage.creaseVertices.map(at), cornerVertices: cage.cornerVertices.map(at) },
    joined: Int32Array.from(into.keys()),
  };
}
