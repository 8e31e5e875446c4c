import { nextHalfEdge, previousHalfEdge } from '../mesh/topology';
import { isSharpForGood, type LevelMesh } from './level-mesh';

/** What a vertex is to one of its faces. Kinds from INNER to TIP are regular: the face's patch is a plain bicubic there. */
export const INNER = 1;
export const RIM = 2;
export const TIP = 3;
export const EXTRAORDINARY = 4;

/** How the point in the middle of a fan moves under refinement. */
export const SMOOTH_CENTRE = 0;
export const CREASE_CENTRE = 1;
export const CORNER_CENTRE = 2;

/** Fans around extraordinary vertices, each bounded by creases or closed: n faces, counter-clockwise, by their corners at the centre. */
export interface Fans {
  /** Fan i has the corners `corners[starts[i] .. starts[i + 1])`. */
  starts: number[];
  corners: number[];
  closed: boolean[];
  /** For closed fans: the first spoke is infinitely sharp (a dart, or a corner with one sharp edge). Open fans are sharp at both ends. */
  sharpFirst: boolean[];
  centre: number[];
}

/** The corners of the live faces by their rules, and the fans around extraordinary vertices. */
export interface Classified {
  /** Kind of each corner; only set at vertices of live faces. */
  kinds: Uint8Array;
  fans: Fans;
}

/** What is regular to a scheme: corners of a face, faces around an inner vertex, faces on one side of a crease. A corner's sector has one face. */
export interface RegularCounts {
  corners: number;
  inner: number;
  rim: number;
}

export const QUAD_COUNTS: RegularCounts = { corners: 4, inner: 4, rim: 2 };
export const TRIANGLE_COUNTS: RegularCounts = { corners: 3, inner: 6, rim: 3 };

function hasRegularFace(mesh: LevelMesh, corner: number, counts: RegularCounts): boolean {
  const face = mesh.faceOf[corner];
  return mesh.starts[face + 1] - mesh.starts[face] === counts.corners;
}

/** Reads the rule at each vertex of the live faces [Biermann, Levin & Zorin 2000, sectors] and sorts its corners. */
export function classifyVertices(mesh: LevelMesh, counts: RegularCounts): Classified {
  const kinds = new Uint8Array(mesh.vertexOf.length);
  const fans: Fans = { starts: [0], corners: [], closed: [], sharpFirst: [], centre: [] };
  const seen = new Uint8Array(mesh.vertices);
  const ring: number[] = [];
  for (let face = 0; face < mesh.faces; face++) {
    if (mesh.live[face] === 0) continue;
    for (let h = mesh.starts[face]; h < mesh.starts[face + 1]; h++) {
      const vertex = mesh.vertexOf[h];
      if (seen[vertex] === 1) continue;
      seen[vertex] = 1;
      if (isPlainlyInner(mesh, counts, h, kinds)) continue;
      const closed = collectRing(mesh, h, ring);
      classifyRing(mesh, counts, vertex, ring, closed, kinds, fans);
    }
  }
  return { kinds, fans };
}

/** Whether `h` starts at a vertex as most are: inner, among the regular number of regular faces, nothing sharp. Then its corners are set; else nothing is said. */
function isPlainlyInner(mesh: LevelMesh, counts: RegularCounts, h: number, kinds: Uint8Array): boolean {
  const { starts, faceOf, twin, edgeSharpness } = mesh;
  if (mesh.vertexSharpness[mesh.vertexOf[h]] > 0) return false;
  let corner = h;
  for (let j = 0; j < counts.inner; j++) {
    if (corner < 0 || (j > 0 && corner === h)) return false;
    const start = starts[faceOf[corner]];
    if (edgeSharpness[corner] > 0 || starts[faceOf[corner] + 1] - start !== counts.corners) return false;
    corner = twin[corner === start ? start + counts.corners - 1 : corner - 1];
  }
  if (corner !== h) return false;
  for (let j = 0; j < counts.inner; j++) {
    kinds[corner] = INNER;
    const start = starts[faceOf[corner]];
    corner = twin[corner === start ? start + counts.corners - 1 : corner - 1];
  }
  return true;
}

/** The corners around the start of `h`, counter-clockwise; from the border on where there is one (then false). */
export function collectRing(mesh: LevelMesh, h: number, ring: number[]): boolean {
  let first = h;
  let closed = false;
  for (let t = mesh.twin[first]; t >= 0; t = mesh.twin[first]) {
    first = nextHalfEdge(mesh, t);
    if (first === h) {
      closed = true;
      break;
    }
  }
  ring.length = 0;
  let corner = first;
  do {
    ring.push(corner);
    corner = mesh.twin[previousHalfEdge(mesh, corner)];
  } while (corner >= 0 && corner !== first);
  return closed;
}

function classifyRing(mesh: LevelMesh, counts: RegularCounts, vertex: number, ring: number[], closed: boolean, kinds: Uint8Array, fans: Fans): void {
  const n = ring.length;
  const vertexSharpness = mesh.vertexSharpness[vertex];
  let sharp = closed ? 0 : 1;
  let firstSharp = -1;
  let settled = vertexSharpness === 0 || vertexSharpness === Infinity;
  let regularFaces = true;
  for (let j = 0; j < n; j++) {
    if (isSharpForGood(mesh, ring[j])) {
      sharp++;
      if (firstSharp < 0) firstSharp = j;
    } else if (mesh.edgeSharpness[ring[j]] > 0) settled = false;
    if (!hasRegularFace(mesh, ring[j], counts)) regularFaces = false;
  }
  if (!settled) return;
  const corner = vertexSharpness > 0 || sharp > 2;
  if (sharp < 2) {
    if (!regularFaces) return;
    if (sharp === 0 && !corner && n === counts.inner) {
      for (let j = 0; j < n; j++) kinds[ring[j]] = INNER;
      return;
    }
    pushFan(ring, Math.max(firstSharp, 0), n, true, sharp === 1, corner ? CORNER_CENTRE : SMOOTH_CENTRE, kinds, fans);
    return;
  }
  for (let from = 0; from < n; ) {
    const start = (firstSharp + from) % n;
    let size = 1;
    while (from + size < n && !isSharpForGood(mesh, ring[(firstSharp + from + size) % n])) size++;
    classifySector(mesh, counts, ring, start, size, corner, kinds, fans);
    from += size;
  }
}

/** A sector of `size` faces between two creases. */
function classifySector(mesh: LevelMesh, counts: RegularCounts, ring: number[], start: number, size: number, corner: boolean, kinds: Uint8Array, fans: Fans): void {
  for (let j = 0; j < size; j++) if (!hasRegularFace(mesh, ring[(start + j) % ring.length], counts)) return;
  if (size === (corner ? 1 : counts.rim)) {
    for (let j = 0; j < size; j++) kinds[ring[(start + j) % ring.length]] = corner ? TIP : RIM;
    return;
  }
  pushFan(ring, start, size, false, true, corner ? CORNER_CENTRE : CREASE_CENTRE, kinds, fans);
}

function pushFan(ring: number[], start: number, size: number, closed: boolean, sharpFirst: boolean, centre: number, kinds: Uint8Array, fans: Fans): void {
  for (let j = 0; j < size; j++) {
    const corner = ring[(start + j) % ring.length];
    kinds[corner] = EXTRAORDINARY;
    fans.corners.push(corner);
  }
  fans.starts.push(fans.corners.length);
  fans.closed.push(closed);
  fans.sharpFirst.push(sharpFirst);
  fans.centre.push(centre);
}

/** Whether a face is regular but for its corner `except` (pass -1 for none). */
export function isRegularFace(mesh: LevelMesh, counts: RegularCounts, kinds: Uint8Array, face: number, except: number): boolean {
  const start = mesh.starts[face];
  if (mesh.starts[face + 1] - start !== counts.corners) return false;
  for (let h = start; h < mesh.starts[face + 1]; h++) if (h !== except && (kinds[h] < INNER || kinds[h] > TIP)) return false;
  return true;
}

/** Whether all faces of a fan are live and regular but for its centre. */
export function isIsolated(mesh: LevelMesh, counts: RegularCounts, kinds: Uint8Array, fans: Fans, fan: number): boolean {
  for (let i = fans.starts[fan]; i < fans.starts[fan + 1]; i++) {
    const face = mesh.faceOf[fans.corners[i]];
    if (mesh.live[face] === 0 || !isRegularFace(mesh, counts, kinds, face, fans.corners[i])) return false;
  }
  return true;
}
