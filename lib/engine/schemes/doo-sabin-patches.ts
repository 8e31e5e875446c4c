import type { RegularPatches } from '../kernel/regular-patches';
import { nextHalfEdge, previousHalfEdge } from '../mesh/topology';
import type { BorderCurves } from '../moments/border-curves';
import { runsOutwards, type DooSabinMesh } from './doo-sabin-mesh';

/** What stands around each vertex of a Doo-Sabin mesh. */
export interface DooSabinRings {
  /** Faces around the vertex. */
  faces: Int32Array;
  /** Of those, the ones with other than four corners. */
  odd: Int32Array;
  /** Some corner of the vertex; for border vertices the one whose half-edge runs along the border. */
  corner: Int32Array;
  /** 1 at the border. */
  border: Uint8Array;
}

/** Counts what stands around each vertex. */
export function readRings(mesh: DooSabinMesh): DooSabinRings {
  const { vertexOf, starts, twin } = mesh;
  const rings: DooSabinRings = {
    faces: new Int32Array(mesh.vertices), odd: new Int32Array(mesh.vertices), corner: new Int32Array(mesh.vertices), border: new Uint8Array(mesh.vertices),
  };
  for (let face = 0; face < mesh.faces; face++) {
    const end = starts[face + 1];
    const isOdd = end - starts[face] === 4 ? 0 : 1;
    for (let h = starts[face]; h < end; h++) {
      const vertex = vertexOf[h];
      rings.faces[vertex]++;
      rings.odd[vertex] += isOdd;
      if (twin[h] < 0) {
        rings.border[vertex] = 1;
        rings.corner[vertex] = h;
      } else if (rings.border[vertex] === 0) rings.corner[vertex] = h;
    }
  }
  return rings;
}

const NO_SHIFT = new Float64Array(3);
const small = new Float64Array(27);

/** Net entries (3 row + column) of the neighbours and diagonals, counter-clockwise. */
const NEIGHBOURS = [7, 5, 1, 3];
const DIAGONALS = [8, 2, 0, 6];

function put(mesh: DooSabinMesh, entry: number, vertex: number): void {
  small[3 * entry] = mesh.positions[3 * vertex];
  small[3 * entry + 1] = mesh.positions[3 * vertex + 1];
  small[3 * entry + 2] = mesh.positions[3 * vertex + 2];
}

/**
 * Hands a vertex among quads to `patches`: one inside with four, at the border with two, or a kept corner with one. Returns false where it is none of these.
 * `body` is that of the patch; at level 0 the caller sees to it that all four faces are of one body.
 */
export function addPatch(mesh: DooSabinMesh, rings: DooSabinRings, vertex: number, body: number, patches: RegularPatches, curves: BorderCurves): boolean {
  if (rings.odd[vertex] > 0) return false;
  if (rings.border[vertex] === 1) return mesh.level > 0 && addBorderPatch(mesh, rings, vertex, body, patches, curves);
  if (rings.faces[vertex] !== 4) return false;
  const first = rings.corner[vertex];
  let h = first;
  put(mesh, 4, vertex);
  for (let i = 0; i < 4; i++) {
    // Two pairs of faces that touch in the vertex only come round too early.
    if (i > 0 && h === first) return false;
    const next = nextHalfEdge(mesh, h);
    put(mesh, NEIGHBOURS[i], mesh.vertexOf[next]);
    put(mesh, DIAGONALS[i], mesh.vertexOf[nextHalfEdge(mesh, next)]);
    h = mesh.twin[previousHalfEdge(mesh, h)];
  }
  patches.add(body, small);
  if (mesh.level === 0) return true;
    for (let i = 0; i < 4; i++) {
    addSide(mesh, h, (i + 1) % 4, curves);
    h = mesh.twin[previousHalfEdge(mesh, h)];
  }
  return true;
}

/** At the border the row outside equals that of the border itself. */
function addBorderPatch(mesh: DooSabinMesh, rings: DooSabinRings, vertex: number, body: number, patches: RegularPatches, curves: BorderCurves): boolean {
  const count = rings.faces[vertex];
  const out = rings.corner[vertex];
  const before = previousHalfEdge(mesh, out);
  const ahead = mesh.vertexOf[nextHalfEdge(mesh, out)];
  const diagonal = mesh.vertexOf[nextHalfEdge(mesh, nextHalfEdge(mesh, out))];
  if (count === 1 && mesh.keepsCorners) {
    const behind = mesh.vertexOf[before];
    for (const entry of [0, 1, 3, 4]) put(mesh, entry, vertex);
    for (const entry of [6, 7]) put(mesh, entry, ahead);
    for (const entry of [2, 5]) put(mesh, entry, behind);
    put(mesh, 8, diagonal);
    patches.add(body, small);
        addRim(mesh, vertex, curves);
    const share = mesh.rimShare[vertex];
    curves.addQuadraticSide(small, 3, mesh.rimOf[behind], 1, 1 - share, share, NO_SHIFT);
    return true;
  }
  if (count !== 2) return false;
  const across = mesh.twin[before];
  const arriving = previousHalfEdge(mesh, across);
  const behind = mesh.vertexOf[arriving];
  for (const entry of [3, 4]) put(mesh, entry, vertex);
  for (const entry of [6, 7]) put(mesh, entry, ahead);
  for (const entry of [0, 1]) put(mesh, entry, behind);
  put(mesh, 8, diagonal);
  put(mesh, 5, mesh.vertexOf[before]);
  put(mesh, 2, mesh.vertexOf[previousHalfEdge(mesh, arriving)]);
  patches.add(body, small);
    addRim(mesh, vertex, curves);
  if (mesh.borderOf[out] >= 0 && !runsOutwards(mesh, mesh.borderOf[out])) addSide(mesh, out, 1, curves);
  addSide(mesh, across, 2, curves);
  // The spoke that runs outwards is the next vertex' side towards this one.
  if (mesh.borderOf[arriving] >= 0 && runsOutwards(mesh, mesh.borderOf[arriving])) addSide(mesh, arriving, 3, curves);
  return true;
}

/** The border's own curve along a border vertex' patch. */
function addRim(mesh: DooSabinMesh, vertex: number, curves: BorderCurves): void {
  curves.addQuadraticSide(small, 0, mesh.rimOf[vertex], 1, mesh.rimFrom[vertex], mesh.rimShare[vertex], NO_SHIFT);
}

/** The side of the patch in `small` that half-edge `h` stands for, where it is a piece of a border curve. */
function addSide(mesh: DooSabinMesh, h: number, side: number, curves: BorderCurves): void {
  if (mesh.borderOf[h] >= 0) curves.addQuadraticSide(small, side, mesh.borderOf[h], 1, mesh.borderFrom[h], 2 ** -mesh.level, NO_SHIFT);
}
