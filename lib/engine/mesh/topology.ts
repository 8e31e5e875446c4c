import type { Cage } from '../cage';
import { matchEdges } from './match-edges';

/** Sharpness from which an edge or vertex never decays, as the scene-description standard sets it. */
export const INFINITE_SHARPNESS = 10;

/**
 * Half-edge tables of a polygon mesh. A half-edge is a corner of a face: half-edge h starts at `vertexOf[h]`,
 * belongs to `faceOf[h]` and ends where the next corner of that face starts. Face f owns the half-edges
 * `starts[f] .. starts[f + 1)`, counter-clockwise seen from outside.
 */
export interface Topology {
  faces: number;
  vertices: number;
  starts: Int32Array;
  vertexOf: Int32Array;
  faceOf: Int32Array;
  /** The half-edge on the other side of the edge; -1 on a border and on an edge that is not manifold. */
  twin: Int32Array;
  /** Sharpness of each half-edge's edge, equal on both sides; Infinity from INFINITE_SHARPNESS on. Borders carry 0 here: their rule follows from `twin`. */
  edgeSharpness: Float32Array;
  vertexSharpness: Float32Array;
}

/** What edge matching found that no half-edge table can hold. Half-edge numbers. */
export interface EdgeDefects {
  /** One half-edge of each edge with more than two faces. */
  nonManifold: number[];
  /** One half-edge of each edge that two faces run along in the same direction. */
  turned: number[];
  /** Crease tags on edges that do not exist: index into the cage's tags. */
  strayCreases: number[];
}

/** The half-edge after this one around the same face, counter-clockwise. */
export function nextHalfEdge(mesh: Topology, h: number): number {
  const face = mesh.faceOf[h];
  return h + 1 === mesh.starts[face + 1] ? mesh.starts[face] : h + 1;
}

/** The half-edge before this one around the same face. */
export function previousHalfEdge(mesh: Topology, h: number): number {
  const face = mesh.faceOf[h];
  return h === mesh.starts[face] ? mesh.starts[face + 1] - 1 : h - 1;
}

/** Sharpness as the refinement rules read it: below 0 is 0, from 10 on infinite. Not-a-number counts as 0. */
export function normalSharpness(sharpness: number): number {
  if (!(sharpness > 0)) return 0;
  return sharpness >= INFINITE_SHARPNESS ? Infinity : sharpness;
}

/** The same numbers, all below 2^31, without a copy: the tables are only ever read. */
function asSigned(numbers: Uint32Array): Int32Array {
  return new Int32Array(numbers.buffer, numbers.byteOffset, numbers.length);
}

/** Builds the half-edge tables of a cage, in part upon its own arrays. Faces may be anything the file held; defects are returned, not thrown. */
export function buildTopology(cage: Cage): { mesh: Topology; defects: EdgeDefects } {
  const faces = cage.faceStarts.length - 1;
  const vertices = cage.positions.length / 3;
  const starts = asSigned(cage.faceStarts);
  const vertexOf = asSigned(cage.faceVertices);
  const faceOf = new Int32Array(vertexOf.length);
  for (let face = 0; face < faces; face++) for (let h = starts[face]; h < starts[face + 1]; h++) faceOf[h] = face;
  const mesh: Topology = {
    faces,
    vertices,
    starts,
    vertexOf,
    faceOf,
    twin: new Int32Array(vertexOf.length).fill(-1),
    edgeSharpness: new Float32Array(vertexOf.length),
    vertexSharpness: new Float32Array(vertices),
  };
  const defects = matchEdges(mesh, cage.creaseVertices, cage.creaseSharpness);
  for (let i = 0; i < cage.cornerVertices.length; i++) {
    const vertex = cage.cornerVertices[i];
    if (vertex < vertices) mesh.vertexSharpness[vertex] = normalSharpness(cage.cornerSharpness[i]);
  }
  return { mesh, defects };
}

/** Throws with a sentence where the tables contradict each other: a check for tests and after a new way of building them. */
export function validateTopology(mesh: Topology): void {
  for (let h = 0; h < mesh.vertexOf.length; h++) {
    const twin = mesh.twin[h];
    if (mesh.vertexOf[h] < 0 || mesh.vertexOf[h] >= mesh.vertices) throw new Error(`half-edge ${h} starts at vertex ${mesh.vertexOf[h]}, which does not exist`);
    const face = mesh.faceOf[h];
    if (h < mesh.starts[face] || h >= mesh.starts[face + 1]) throw new Error(`half-edge ${h} says it belongs to face ${face}, which does not own it`);
    if (twin < 0) continue;
    if (mesh.twin[twin] !== h) throw new Error(`half-edge ${h} and its twin ${twin} disagree`);
    if (mesh.vertexOf[twin] !== mesh.vertexOf[nextHalfEdge(mesh, h)] || mesh.vertexOf[h] !== mesh.vertexOf[nextHalfEdge(mesh, twin)]) {
      throw new Error(`half-edge ${h} and its twin ${twin} do not run between the same vertices`);
    }
    if (mesh.edgeSharpness[twin] !== mesh.edgeSharpness[h]) throw new Error(`half-edge ${h} and its twin ${twin} differ in sharpness`);
  }
}
