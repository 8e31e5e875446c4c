import { movedInwards, type FaceTriangles } from '../schemes/limit-triangles';
import { boxesMeet, BoxTree, eachMeetingPair } from './box-tree';
import { emptyBoxes } from './face-hulls';
import type { PieceRelations } from './relate-pieces';
import { rayCrossing, trianglesCross } from './triangle-crossing';

/** Pieces must pass into each other deeper than this share of the smaller one's size: surfaces that touch as far as files tell are no overlap. */
export const TOUCHING_SHARE = 1e-6;

/** Bound of the work, far above what production cages need; beyond it some pairs go unchecked. */
const MOST_TESTED = 2_000_000;

/** What the test of pairs knows of each piece. */
export interface TestedPieces {
  /** Box of each piece's control points: min x, y, z, max x, y, z. */
  boxes: Float64Array;
  /** 1 where the piece has no border. */
  closed: Uint8Array;
  /** A number of the sign of each piece's volume. */
  volumes: Float64Array;
}

/** A tree per involved group over the items that belong to it; undefined for the others and for groups without items. */
export function treesOf(groupOf: (item: number) => number, items: Iterable<number>, involved: Uint8Array, itemBoxes: Float64Array): (BoxTree | undefined)[] {
  const lists: number[][] = Array.from(involved, () => []);
  for (const item of items) if (involved[groupOf(item)] === 1) lists[groupOf(item)].push(item);
  return lists.map((list) => (list.length === 0 ? undefined : new BoxTree(itemBoxes, Int32Array.from(list))));
}

/** Tests the pairs of pieces (one after the other in `pairs`) on their triangles, and adds what crosses or lies inside to `relations`. */
export function crossPieces(pairs: readonly number[], pieces: TestedPieces, triangles: FaceTriangles, relations: PieceRelations): void {
  const { boxes, volumes } = pieces;
  const count = volumes.length;
  const pieceOfTriangle = triangles.faceOf.map((face) => relations.pieceOf[face]);
  const trees = treesOf((t) => pieceOfTriangle[t], pieceOfTriangle.keys(), new Uint8Array(count).fill(1), boxesOfTriangles(triangles.points));
  const firstTriangles = new Int32Array(count).fill(-1);
  for (let t = pieceOfTriangle.length - 1; t >= 0; t--) if (triangles.faceOf[t] === relations.firstFaces[pieceOfTriangle[t]]) firstTriangles[pieceOfTriangle[t]] = t;
  const inwards = movedInwards(triangles, 1);
  const small = triangles.points.slice();
  for (let t = 0; t < pieceOfTriangle.length; t++) {
    const piece = pieceOfTriangle[t];
    const depth = TOUCHING_SHARE * sizeOf(boxes, piece) * (volumes[piece] < 0 ? -1 : 1);
    for (let i = 9 * t; i < 9 * t + 9; i++) small[i] = triangles.points[i] + depth * (inwards[i] - triangles.points[i]);
  }
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
      addInside(a, b, treeB, small, triangles, firstTriangles[a], pieces, relations);
      addInside(b, a, treeA, small, triangles, firstTriangles[b], pieces, relations);
    }
  }
}

/** Adds the relation where the middle of the first triangle of `inner` lies inside the closed surface of `outer`. */
function addInside(
  inner: number, outer: number, tree: BoxTree, small: Float64Array, triangles: FaceTriangles, first: number, { boxes, closed }: TestedPieces, relations: PieceRelations,
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

/** Diagonal of a piece's box. */
export function sizeOf(boxes: Float64Array, piece: number): number {
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
