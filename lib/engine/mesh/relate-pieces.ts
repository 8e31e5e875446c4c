import type { MeasureOptions } from '../measured';
import { limitTriangles, movedInwards, type FaceTriangles } from '../schemes/limit-triangles';
import { BoxTree, boxesMeet, eachMeetingPair, growBox } from './box-tree';
import { emptyBoxes, faceHulls } from './face-hulls';
import type { Bodies } from './partition';
import type { Topology } from './topology';
import { rayCrossing, trianglesCross } from './triangle-crossing';

/** Pieces must pass into each other deeper than this share of the smaller one's size: surfaces that touch as far as files tell are no overlap. */
const TOUCHING_SHARE = 1e-6;

/** Bounds of the work, far above what production cages need; beyond them some pairs go unchecked. */
const MOST_COMPARED = 10_000_000;
const MOST_PAIRS = 20_000;
const MOST_MET = 3_000_000;
const MOST_TESTED = 2_000_000;

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
 * Finds which connected pieces of a cage pass through or lie inside one another, on the limit surface: boxes of control points first (they hold
 * the limit), then the exact test on limit triangles of the faces that may meet. Faces of one piece are one skin and are not tested against each other.
 * `skipped` marks faces (1) whose pieces are left out.
 */
export function relatePieces(mesh: Topology, filePositions: Float64Array, { pieceOf, pieces: count }: Bodies, skipped: Uint8Array, options: MeasureOptions): PieceRelations {
  const relations: PieceRelations = { pieceOf, firstFaces: new Int32Array(count), crossings: [], insides: [], complete: true };
  for (let face = mesh.faces - 1; face >= 0; face--) relations.firstFaces[pieceOf[face]] = face;
  if (count < 2) return relations;
  const positions = nearOrigin(filePositions);
  const hulls = faceHulls(mesh, positions, options.scheme !== 'polyhedral');
  const boxes = emptyBoxes(count);
  const left = new Uint8Array(count);
  for (let face = 0; face < mesh.faces; face++) {
    growBox(boxes, 6 * pieceOf[face], hulls, 6 * face);
    if (skipped[face] === 1) left[pieceOf[face]] = 1;
  }
  const pairs = meetingPieces(boxes, left, relations);
  if (pairs.length === 0) return relations;
  const involved = new Uint8Array(count);
  for (const piece of pairs) involved[piece] = 1;
  const trees = treesOf(pieceOf, involved, hulls);
  const chosen = new Uint8Array(mesh.faces);
  const budget = { met: MOST_MET };
  for (let i = 0; i < pairs.length; i += 2) chooseFaces(trees, boxes, hulls, pairs[i], pairs[i + 1], relations, chosen, budget);
  testPairs(pairs, boxes, limitTriangles(mesh, positions, chosen, options), relations, piecesClosed(mesh, pieceOf, count), pieceVolumes(mesh, positions, pieceOf, involved));
  return relations;
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

/** A tree per involved group over the items that belong to it; undefined for the others and for groups without items. */
function treesOf(groupOf: Int32Array, involved: Uint8Array, itemBoxes: Float64Array): (BoxTree | undefined)[] {
  const items: number[][] = Array.from(involved, () => []);
  for (let item = 0; item < groupOf.length; item++) if (involved[groupOf[item]] === 1) items[groupOf[item]].push(item);
  return items.map((list) => (list.length === 0 ? undefined : new BoxTree(itemBoxes, Int32Array.from(list))));
}

/** Marks the faces that the tests of a pair may need: those whose hulls meet, and those on the way of a ray from either piece's first face. */
function chooseFaces(
  trees: (BoxTree | undefined)[], boxes: Float64Array, hulls: Float64Array, a: number, b: number, relations: PieceRelations, chosen: Uint8Array, budget: { met: number },
): void {
  const treeA = trees[a];
  const treeB = trees[b];
  if (treeA === undefined || treeB === undefined) return;
  const done = eachMeetingPair(treeA, treeB, (faceA, faceB) => {
    chosen[faceA] = 1;
    chosen[faceB] = 1;
    return --budget.met > 0;
  });
  for (const [inner, outer, tree] of [[a, b, treeB], [b, a, treeA]] as const) {
    const first = relations.firstFaces[inner];
    chosen[first] = 1;
    if (!boxesMeet(boxes, 6 * outer, hulls, 6 * first)) continue;
    const margin = 2 * TOUCHING_SHARE * sizeOf(boxes, inner);
    const way = hulls.slice(6 * first, 6 * first + 6).map((value, i) => (i < 3 ? value - margin : value + margin));
    way[3] = Infinity;
    tree.eachMeeting(way, (face) => {
      chosen[face] = 1;
    });
  }
  if (!done) relations.complete = false;
}

function testPairs(pairs: number[], boxes: Float64Array, triangles: FaceTriangles, relations: PieceRelations, closed: Uint8Array, volumes: Float64Array): void {
  const count = volumes.length;
  const pieceOfTriangle = triangles.faceOf.map((face) => relations.pieceOf[face]);
  const triangleBoxes = boxesOfTriangles(triangles.points);
  const trees = treesOf(pieceOfTriangle, new Uint8Array(count).fill(1), triangleBoxes);
  const firstTriangles = new Int32Array(count).fill(-1);
  for (let t = pieceOfTriangle.length - 1; t >= 0; t--) if (triangles.faceOf[t] === relations.firstFaces[pieceOfTriangle[t]]) firstTriangles[pieceOfTriangle[t]] = t;
  const inwards = movedInwards(triangles, 1);
  const small = triangles.points.slice();
  const shrink = (piece: number): void => {
    const depth = TOUCHING_SHARE * sizeOf(boxes, piece) * (volumes[piece] < 0 ? -1 : 1);
    for (const t of trees[piece]?.items ?? []) for (let i = 9 * t; i < 9 * t + 9; i++) small[i] = triangles.points[i] + depth * (inwards[i] - triangles.points[i]);
  };
  for (let piece = 0; piece < count; piece++) shrink(piece);
  let tested = 0;
  for (let i = 0; i < pairs.length; i += 2) {
    const [a, b] = sizeOf(boxes, pairs[i]) <= sizeOf(boxes, pairs[i + 1]) ? [pairs[i], pairs[i + 1]] : [pairs[i + 1], pairs[i]];
    const treeA = trees[a];
    const treeB = trees[b];
    if (treeA === undefined || treeB === undefined) continue;
    const facesA = new Set<number>();
    const facesB = new Set<number>();
    const done = eachMeetingPair(treeA, treeB, (s, t) => {
      const faceA = triangles.faceOf[s];
      const faceB = triangles.faceOf[t];
      if (facesA.has(faceA) && facesB.has(faceB)) return true;
      if (++tested > MOST_TESTED) return false;
      if (trianglesCross(small, 9 * s, triangles.points, 9 * t)) {
        facesA.add(faceA);
        facesB.add(faceB);
      }
      return true;
    });
    if (!done) relations.complete = false;
    const sorted = (faces: Set<number>): number[] => [...faces].sort((x, y) => x - y);
    if (facesA.size > 0) relations.crossings.push({ pieces: [a, b], faces: [sorted(facesA), sorted(facesB)] });
    else {
      addInside(a, b, treeB, small, triangles, firstTriangles[a], boxes, closed, relations);
      addInside(b, a, treeA, small, triangles, firstTriangles[b], boxes, closed, relations);
    }
  }
}

/** Adds the relation where the middle of the first triangle of `inner` lies inside the closed surface of `outer`. */
function addInside(
  inner: number, outer: number, tree: BoxTree, small: Float64Array, triangles: FaceTriangles, first: number, boxes: Float64Array, closed: Uint8Array, relations: PieceRelations,
): void {
  if (first < 0 || closed[outer] === 0) return;
  const [x, y, z] = [0, 1, 2].map((axis) => (small[9 * first + axis] + small[9 * first + 3 + axis] + small[9 * first + 6 + axis]) / 3);
  if (!boxesMeet(boxes, 6 * outer, Float64Array.of(x, y, z, x, y, z), 0)) return;
  let winding = 0;
  let outerFace = -1;
  let nearest = Infinity;
  tree.eachMeeting(Float64Array.of(x, y, z, Infinity, y, z), (t) => {
    const crossing = rayCrossing(triangles.points, 9 * t, x, y, z);
    winding += crossing;
    if (crossing !== 0 && triangles.points[9 * t] < nearest) {
      nearest = triangles.points[9 * t];
      outerFace = triangles.faceOf[t];
    }
  });
  if (winding !== 0) relations.insides.push({ inner, outer, winding, outerFace });
}

function sizeOf(boxes: Float64Array, piece: number): number {
  const at = 6 * piece;
  return Math.hypot(boxes[at + 3] - boxes[at], boxes[at + 4] - boxes[at + 1], boxes[at + 5] - boxes[at + 2]);
}

function boxesOfTriangles(points: Float64Array): Float64Array {
  const boxes = emptyBoxes(points.length / 9);
  for (let t = 0; 9 * t < points.length; t++) {
    for (let i = 0; i < 9; i++) {
      const axis = i % 3;
      if (points[9 * t + i] < boxes[6 * t + axis]) boxes[6 * t + axis] = points[9 * t + i];
      if (points[9 * t + i] > boxes[6 * t + 3 + axis]) boxes[6 * t + 3 + axis] = points[9 * t + i];
    }
  }
  return boxes;
}

function piecesClosed(mesh: Topology, pieceOf: Int32Array, count: number): Uint8Array {
  const closed = new Uint8Array(count).fill(1);
  for (let h = 0; h < mesh.twin.length; h++) if (mesh.twin[h] < 0) closed[pieceOf[mesh.faceOf[h]]] = 0;
  return closed;
}

/** Six times the signed volume of the involved pieces' cages: only its sign is of use. */
function pieceVolumes(mesh: Topology, p: Float64Array, pieceOf: Int32Array, involved: Uint8Array): Float64Array {
  const volumes = new Float64Array(involved.length);
  for (let face = 0; face < mesh.faces; face++) {
    if (involved[pieceOf[face]] === 0) continue;
    const a = 3 * mesh.vertexOf[mesh.starts[face]];
    for (let h = mesh.starts[face] + 1; h + 1 < mesh.starts[face + 1]; h++) {
      const b = 3 * mesh.vertexOf[h];
      const c = 3 * mesh.vertexOf[h + 1];
      volumes[pieceOf[face]] += p[a] * (p[b + 1] * p[c + 2] - p[b + 2] * p[c + 1]) + p[a + 1] * (p[b + 2] * p[c] - p[b] * p[c + 2]) + p[a + 2] * (p[b] * p[c + 1] - p[b + 1] * p[c]);
    }
  }
  return volumes;
}
