import type { CreasingRule } from '../cage';
import { nextHalfEdge, previousHalfEdge } from '../mesh/topology';
import { INNER, QUAD_COUNTS, TIP, type RegularCounts } from './classify-vertices';
import type { LevelMesh } from './level-mesh';
import { childEdgeSharpness, type SemiSharpAround } from './sharpness-decay';

/** Numbers of a 4 × 4 net, and of the 4 × 5 points that one step across makes of it. */
const NET = 48;
const COLUMNS = 5;

function isSemiSharp(mesh: LevelMesh, h: number): boolean {
  return mesh.twin[h] >= 0 && mesh.edgeSharpness[h] > 0 && mesh.edgeSharpness[h] < Infinity;
}

/** Whether a crease runs straight on, equally sharp, through the start of its half-edge `h`: a vertex among regular faces that nothing else touches. */
function runsThrough(mesh: LevelMesh, counts: RegularCounts, h: number): boolean {
  if (mesh.vertexSharpness[mesh.vertexOf[h]] !== 0) return false;
  let spoke = h;
  for (let j = 0; j < counts.inner; j++) {
    // A border, or a vertex of half the valence, round which the walk would go twice.
    if (spoke < 0 || (j > 0 && spoke === h)) return false;
    const face = mesh.faceOf[spoke];
    if (mesh.starts[face + 1] - mesh.starts[face] !== counts.corners) return false;
    if (mesh.edgeSharpness[spoke] !== (j % counts.rim === 0 ? mesh.edgeSharpness[h] : 0)) return false;
    spoke = mesh.twin[previousHalfEdge(mesh, spoke)];
  }
  return spoke === h;
}

/** Whether the half-edge's edge is a piece of a crease of one sharpness that goes straight on at both its ends. */
export function isConstantCrease(mesh: LevelMesh, counts: RegularCounts, h: number): boolean {
  return isSemiSharp(mesh, h) && runsThrough(mesh, counts, h) && runsThrough(mesh, counts, mesh.twin[h]);
}

/** Whether a corner's kind says that its vertex changes its rule no more and is regular on the corner's side. */
export function isSettled(kind: number): boolean {
  return kind >= INNER && kind <= TIP;
}

/**
 * The half-edge of a quad along which a semi-sharp crease of one sharpness runs, where nothing but that crease, and another one or a plain edge, a border
 * or an infinitely sharp crease along the opposite side, has a say in the face's surface: a strip. -1 for all other faces.
 *
 * On such a face every rule of refinement is the product of the cubic B-spline's (1, 6, 1)/8 and (1, 1)/2 along the crease and a rule across it:
 * the vertex rules crease and smooth are (1, 6, 1)/8 times (0, 1, 0) and times (1, 6, 1)/8, the edge rules (1, 1)/2 times the same two, and both are
 * blended by the same sharpness.
 */
export function stripSide(mesh: LevelMesh, kinds: Uint8Array, face: number): number {
  const start = mesh.starts[face];
  if (mesh.starts[face + 1] - start !== 4) return -1;
  for (let h = start; h < start + 4; h++) {
    if (!isConstantCrease(mesh, QUAD_COUNTS, h)) continue;
    const far = nextHalfEdge(mesh, nextHalfEdge(mesh, h));
    return isConstantCrease(mesh, QUAD_COUNTS, far) || (isSettled(kinds[far]) && isSettled(kinds[nextHalfEdge(mesh, far)])) ? h : -1;
  }
  return -1;
}

/** Takes a strip's next piece: its 4 × 4 net, and the share of the face across the crease, from 0 on the crease to 1, at which it starts and that it covers. */
export type TakePiece = (net: Float64Array, from: number, share: number) => void;

const points = new Float64Array(3 * 4 * COLUMNS);
const around: SemiSharpAround = { counts: new Int32Array([2]), sums: new Float64Array(1) };

/**
 * Refines a strip across its creases alone and hands out the bicubic pieces. `net` is the face's, rows along the crease, column 1 on it and column 2 on the
 * opposite side, whose sharpnesses are `near` and `far` (0 where that side is no semi-sharp crease). About ⌈near⌉ + ⌈far⌉ pieces.
 */
export function refineStrip(net: Float64Array, near: number, far: number, creasing: CreasingRule, take: TakePiece, from = 0, share = 1): void {
  if (near === 0 && far === 0) {
    take(net, from, share);
    return;
  }
  refineAcross(net, Math.min(1, near), Math.min(1, far));
  const nearHalf = net.slice();
  const farHalf = new Float64Array(NET);
  for (let row = 0; row < 4; row++) {
    nearHalf.set(points.subarray(15 * row, 15 * row + 12), 12 * row);
    farHalf.set(points.subarray(15 * row + 3, 15 * row + 15), 12 * row);
  }
  refineStrip(nearHalf, childSharpness(near, creasing), 0, creasing, take, from, share / 2);
  refineStrip(farHalf, 0, childSharpness(far, creasing), creasing, take, from + share / 2, share / 2);
}

/** Sharpness after one step of a crease that is equally sharp all along. */
export function childSharpness(sharpness: number, creasing: CreasingRule): number {
  around.sums[0] = 2 * sharpness;
  return childEdgeSharpness(creasing, sharpness, 0, around);
}

/** One step across, to `points`; `near` and `far` are the weights of the crease rule in columns 1 and 2. */
function refineAcross(net: Float64Array, near: number, far: number): void {
  for (let row = 0; row < 4; row++) {
    for (let axis = 0; axis < 3; axis++) {
      const at = 12 * row + axis;
      const to = 15 * row + axis;
      const a = net[at], b = net[at + 3], c = net[at + 6], d = net[at + 9];
      points[to] = (a + b) / 2;
      points[to + 3] = near * b + (1 - near) * ((a + 6 * b + c) / 8);
      points[to + 6] = (b + c) / 2;
      points[to + 9] = far * c + (1 - far) * ((b + 6 * c + d) / 8);
      points[to + 12] = (c + d) / 2;
    }
  }
}
