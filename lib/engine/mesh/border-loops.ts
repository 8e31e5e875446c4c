import type { Bodies } from './partition';
import { isOpenEdge } from './holes';
import { nextHalfEdge, previousHalfEdge, type Topology } from './topology';

/** Loop number of the far side where nothing lies there is never this; used before loops are numbered. */
const NO_LOOP = -1;

/** One border edge: `edge` is the half-edge whose curve stands for both sides, with its own body on the left. */
export interface BorderSegment {
  edge: number;
  left: number;
  right: number;
}

/** A closed walk along a body's (or the outside's) border with it on the left; entries are segment · 2 + (1 where walked backwards). */
export interface BorderLoop {
  /** Body on the left; -1 for the outside along a hole, be it left open or a face that the file marks as one. */
  body: number;
  steps: number[];
}

/** Borders of bodies as segments and the loops that they make. */
export interface Borders {
  segments: BorderSegment[];
  loops: BorderLoop[];
}

/** The half-edge that stands for an edge: the one whose body is measured, the lower one where both are. */
export function borderEdgeOf(mesh: Topology, bodyOf: Int32Array, blocked: Uint8Array, h: number): number {
  const twin = mesh.twin[h];
  if (twin < 0) return h;
  const own = blocked[bodyOf[mesh.faceOf[h]]];
  const other = blocked[bodyOf[mesh.faceOf[twin]]];
  if (own !== other) return own === 0 ? h : twin;
  return Math.min(h, twin);
}

/** Whether another body, or nothing, lies across the half-edge's edge. */
export function isBorder(mesh: Topology, bodyOf: Int32Array, h: number): boolean {
  const twin = mesh.twin[h];
  return twin < 0 || bodyOf[mesh.faceOf[twin]] !== bodyOf[mesh.faceOf[h]];
}

/**
 * Finds all borders of bodies and walks them loop by loop. Where bodies touch in a vertex, the body's own fan of faces says which edge comes next. Faces that are
 * holes have no borders of their own: they are the outside.
 */
export function findBorders(mesh: Topology, bodies: Bodies, blocked: Uint8Array): Borders {
  const { bodyOf, borders, partOf, holePart } = bodies;
  const segmentOf = new Map<number, number>();
  const segments: BorderSegment[] = [];
  const loops: BorderLoop[] = [];
  for (const h of borders) {
    if (partOf[mesh.faceOf[h]] === holePart) continue;
    const isOpen = isOpenEdge(mesh, bodies, h);
    if (!isOpen && borderEdgeOf(mesh, bodyOf, blocked, h) !== h) continue;
    segmentOf.set(h, segments.length);
    if (!isOpen) segmentOf.set(mesh.twin[h], segments.length);
    segments.push({ edge: h, left: NO_LOOP, right: NO_LOOP });
  }
  const walked = new Set<number>();
  for (const start of segmentOf.keys()) {
    if (walked.has(start)) continue;
    const loop: BorderLoop = { body: bodyOf[mesh.faceOf[start]], steps: [] };
    let h = start;
    do {
      walked.add(h);
      const segment = segmentOf.get(h) ?? 0;
      const backwards = segments[segment].edge !== h;
      if (backwards) segments[segment].right = loops.length;
      else segments[segment].left = loops.length;
      loop.steps.push(2 * segment + (backwards ? 1 : 0));
      h = nextHalfEdge(mesh, h);
      while (!isBorder(mesh, bodyOf, h)) h = nextHalfEdge(mesh, mesh.twin[h]);
    } while (h !== start);
    loops.push(loop);
  }
  addOutsideLoops(mesh, bodies, segments, segmentOf, loops);
  return { segments, loops };
}

/** The outside along holes: it walks the edges without a second face, or with a hole across, backwards. */
function addOutsideLoops(mesh: Topology, bodies: Bodies, segments: BorderSegment[], segmentOf: Map<number, number>, loops: BorderLoop[]): void {
  for (const { edge: start, right } of segments) {
    if (right !== NO_LOOP || !isOpenEdge(mesh, bodies, start)) continue;
    const loop: BorderLoop = { body: -1, steps: [] };
    let h = start;
    do {
      const segment = segmentOf.get(h) ?? 0;
      if (segments[segment].right !== NO_LOOP) break;
      segments[segment].right = loops.length;
      loop.steps.push(2 * segment + 1);
      h = outsideBefore(mesh, bodies, h);
    } while (h !== start);
    loops.push(loop);
  }
}

/**
 * The open half-edge that the outside comes by after `first`, walking it backwards: around the vertex where `first` starts, clockwise through holes and across
 * the rim of the cage, the next one that a face which is no hole ends with. Such a face there is at the latest the one of `first`.
 */
function outsideBefore(mesh: Topology, { partOf, holePart }: Bodies, first: number): number {
  let h = first;
  for (;;) {
    let across = mesh.twin[h];
    if (across < 0) {
      // Beyond the rim the turn goes on from its other end.
      across = previousHalfEdge(mesh, h);
      while (mesh.twin[across] >= 0) across = previousHalfEdge(mesh, mesh.twin[across]);
    }
    if (partOf[mesh.faceOf[across]] !== holePart) return across;
    h = nextHalfEdge(mesh, across);
  }
}
