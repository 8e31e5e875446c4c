import type { MeasureOptions } from '../measured';
import { elementHulls, limitTriangles, refineLimit, startLimit, type LimitLevel } from '../schemes/limit-triangles';
import { boxesMeet, eachMeetingPair, growBox, type BoxTree } from './box-tree';
import { cageVolumes } from './cage-volumes';
import { crossPieces, sizeOf, TOUCHING_SHARE, treesOf } from './cross-pieces';
import { emptyBoxes, growToPoint } from './face-hulls';
import type { Bodies } from './partition';
import type { Topology } from './topology';

/** Bounds of the work, far above what production cages need; beyond them some pairs go unchecked. */
const MOST_COMPARED = 10_000_000;
const MOST_PAIRS = 20_000;
const MOST_MET = 3_000_000;

/** The surface is refined where pieces may meet, until it is this fine or has so many elements there. */
const MOST_LEVELS = 5;
const ENOUGH_ELEMENTS = 2_000;
/** Above this many faces that may meet, the cage's own triangles stand in: so dense a cage lies on its limit, but for parts in 1e4. */
const MOST_REFINED = 100_000;

/** A connected piece of the cage whose surface passes through another's. */
export interface Crossing {
  pieces: [number, number];
  /** Faces of either piece that pass through the other, ascending. */
  faces: [number[], number[]];
}

/** A piece that lies inside another without touching it. */
export interface Inside {
  inner: number;
  outer: number;
  /** How often the outer surface winds about the inner piece: 1, or −1 where it is turned inwards. */
  winding: number;
  /** A face of the outer piece seen from the inner one. */
  outerFace: number;
}

/** How the connected pieces of a cage lie to each other. */
export interface PieceRelations {
  pieceOf: Int32Array;
  /** First face of each piece. */
  firstFaces: Int32Array;
  crossings: Crossing[];
  insides: Inside[];
  /** False where a bound of the work was met. */
  complete: boolean;
}

/**
 * Finds which connected pieces of a cage pass through or lie inside one another, on the limit surface of the scheme. Boxes of control points hold the limit,
 * so what may meet is narrowed down refinement by refinement, and the exact test is left with the triangles of the little that remains.
 * Faces of one piece are one skin and are not tested against each other. `skipped` marks faces (1) whose pieces are left out; under Loop
 * these must include all pieces that hold other than triangles. `holes` marks faces (1) that shape the surface and are none of it. Positions in any frame.
 */
export function relatePieces(
  mesh: Topology, filePositions: Float64Array, { pieceOf, pieces: count }: Bodies, skipped: Uint8Array, options: MeasureOptions, holes: Uint8Array | null = null,
): PieceRelations {
  const relations: PieceRelations = { pieceOf, firstFaces: new Int32Array(count), crossings: [], insides: [], complete: true };
  const left = new Uint8Array(count).fill(1);
  for (let face = mesh.faces - 1; face >= 0; face--) {
    if (holes?.[face] === 1) continue;
    relations.firstFaces[pieceOf[face]] = face;
    left[pieceOf[face]] = 0;
  }
  if (count < 2) return relations;
  for (let face = 0; face < mesh.faces; face++) if (skipped[face] === 1) left[pieceOf[face]] = 1;
  // Each piece's limit lies in the box of its own vertices: where no two of these meet, nothing else need be made.
  if (meetingPieces(vertexBoxes(mesh, filePositions, pieceOf, count), left, relations).length === 0) return relations;
  const positions = nearOrigin(filePositions);
  let level = startLimit(mesh, positions, options);
  if (holes !== null) level.live = holes.map((hole) => 1 - hole);
  let hulls = elementHulls(level, options);
  const boxes = emptyBoxes(count);
  for (let face = 0; face < mesh.faces; face++) if (holes?.[face] !== 1) growBox(boxes, 6 * pieceOf[face], hulls, 6 * face);
  const pairs = meetingPieces(boxes, left, relations);
  if (pairs.length === 0) return relations;
  const involved = new Uint8Array(count);
  for (const piece of pairs) involved[piece] = 1;
  for (;;) {
    const kept = keepWhatMayMeet(level, hulls, pairs, involved, boxes, relations);
    if (kept === 0) return relations;
    const most = level.level === 0 ? MOST_REFINED : ENOUGH_ELEMENTS;
    if (options.scheme === 'polyhedral' || level.level === MOST_LEVELS || kept > most) break;
    level = refineLimit(level, options);
    hulls = elementHulls(level, options);
  }
  const pieces = { boxes, closed: piecesClosed(mesh, pieceOf, count, holes), volumes: cageVolumes(mesh, positions, pieceOf, count) };
  crossPieces(pairs, pieces, limitTriangles(level, options), relations);
  return relations;
}

/** Boxes of the vertices of each piece. */
function vertexBoxes({ starts, vertexOf, faces }: Topology, positions: Float64Array, pieceOf: Int32Array, count: number): Float64Array {
  const boxes = emptyBoxes(count);
  for (let face = 0; face < faces; face++) {
    const at = 6 * pieceOf[face];
    for (let h = starts[face]; h < starts[face + 1]; h++) growToPoint(boxes, at, positions, 3 * vertexOf[h]);
  }
  return boxes;
}

/** Positions about the first vertex: a common frame for all pieces in which a far origin costs no digits. */
function nearOrigin(positions: Float64Array): Float64Array {
  return positions.map((value, i) => value - positions[i % 3]);
}

/** Pairs of pieces whose boxes meet, one after the other: swept along x. */
function meetingPieces(boxes: Float64Array, left: Uint8Array, relations: PieceRelations): number[] {
  const order = Array.from(left.keys()).filter((piece) => left[piece] === 0).sort((a, b) => boxes[6 * a] - boxes[6 * b]);
  const pairs: number[] = [];
  let compared = 0;
  for (let i = 0; i < order.length; i++) {
    for (let j = i + 1; j < order.length && boxes[6 * order[j]] <= boxes[6 * order[i] + 3]; j++) {
      if (++compared > MOST_COMPARED || pairs.length >= 2 * MOST_PAIRS) {
        relations.complete = false;
        return pairs;
      }
      if (boxesMeet(boxes, 6 * order[i], boxes, 6 * order[j])) pairs.push(Math.min(order[i], order[j]), Math.max(order[i], order[j]));
    }
  }
  return pairs;
}

/** Leaves alive only the elements that the tests of the pairs may need; answers how many. */
function keepWhatMayMeet(level: LimitLevel, hulls: Float64Array, pairs: readonly number[], involved: Uint8Array, boxes: Float64Array, relations: PieceRelations): number {
  const { live, bodyOf } = level;
  const { pieceOf, firstFaces } = relations;
  const reach = reachOf(pairs, boxes);
  const near: number[] = [];
  // Elements of each piece's first face, where the ray starts that tells whether the piece lies inside another.
  const starts: number[][] = Array.from(involved, () => []);
  for (let element = 0; element < live.length; element++) {
    const piece = pieceOf[bodyOf[element]];
    if (live[element] === 0 || involved[piece] === 0) continue;
    if (firstFaces[piece] === bodyOf[element]) starts[piece].push(element);
    if (boxesMeet(reach, 6 * piece, hulls, 6 * element)) near.push(element);
  }
  const trees = treesOf((element) => pieceOf[bodyOf[element]], near, involved, hulls);
  const kept = new Uint8Array(live.length);
  let budget = MOST_MET;
  for (let i = 0; i < pairs.length; i += 2) {
    const [a, b] = [pairs[i], pairs[i + 1]];
    const [treeA, treeB] = [trees[a], trees[b]];
    if (treeA === undefined || treeB === undefined) continue;
    const done = eachMeetingPair(treeA, treeB, (elementA, elementB) => {
      kept[elementA] = kept[elementB] = 1;
      return --budget > 0;
    });
    if (!done) relations.complete = false;
    keepRay(starts[a], a, b, treeB, hulls, boxes, kept);
    keepRay(starts[b], b, a, treeA, hulls, boxes, kept);
  }
  level.live = kept;
  return kept.reduce((sum, one) => sum + one, 0);
}

/** Per piece the box of all that its partners in the pairs may ask of it: what meets their boxes, and what rays from there along +x pass through. */
function reachOf(pairs: readonly number[], boxes: Float64Array): Float64Array {
  const reach = emptyBoxes(boxes.length / 6);
  for (let i = 0; i < pairs.length; i++) {
    const piece = pairs[i];
    const partner = pairs[i ^ 1];
    const margin = rayMargin(boxes, partner);
    for (let axis = 0; axis < 3; axis++) {
      reach[6 * piece + axis] = Math.min(reach[6 * piece + axis], boxes[6 * partner + axis] - margin);
      reach[6 * piece + 3 + axis] = axis === 0 ? Infinity : Math.max(reach[6 * piece + 3 + axis], boxes[6 * partner + 3 + axis] + margin);
    }
  }
  return reach;
}

/** How far a ray's start may lie beside the surface: it is moved inwards, and lies deeper than touching. */
function rayMargin(boxes: Float64Array, piece: number): number {
  return 2 * TOUCHING_SHARE * sizeOf(boxes, piece);
}

/** Keeps the first element of the inner piece and what a ray along +x from there may pass through of the outer one. */
function keepRay(starts: readonly number[], inner: number, outer: number, tree: BoxTree, hulls: Float64Array, boxes: Float64Array, kept: Uint8Array): void {
  if (starts.length === 0) return;
  const way = emptyBoxes(1);
  for (const element of starts) growBox(way, 0, hulls, 6 * element);
  const margin = rayMargin(boxes, inner);
  for (let axis = 0; axis < 3; axis++) {
    way[axis] -= margin;
    way[3 + axis] += margin;
  }
  if (!boxesMeet(boxes, 6 * outer, way, 0)) return;
  kept[starts[0]] = 1;
  way[3] = Infinity;
  tree.eachMeeting(way, (element) => {
    kept[element] = 1;
  });
}

function piecesClosed(mesh: Topology, pieceOf: Int32Array, count: number, holes: Uint8Array | null): Uint8Array {
  const closed = new Uint8Array(count).fill(1);
  for (let h = 0; h < mesh.twin.length; h++) if (mesh.twin[h] < 0 || holes?.[mesh.faceOf[h]] === 1) closed[pieceOf[mesh.faceOf[h]]] = 0;
  return closed;
}
