import type { Boundary } from '../cage';
import { borderEdgeOf } from '../mesh/border-loops';
import { findBorderEdges } from '../mesh/partition';
import type { Topology } from '../mesh/topology';

/**
 * The cage or what is left of it after some local refinements. Faces that are not live are there for their vertices' rings only;
 * rules may be read at vertices of live faces only, since all others may lack faces.
 */
export interface LevelMesh extends Topology {
  /** x, y, z per vertex, about the file frame's local origin of the piece. */
  positions: Float64Array;
  bodyOf: Int32Array;
  /** 1 while the face still has to be measured; 2 or 3 while that is up to another block (see `finishLevels`). */
  live: Uint8Array;
  /** Refinements since the cage. */
  level: number;
  /** The cage's half-edge that this half-edge is a piece of where that is a border of a body; else -1. */
  borderOf: Int32Array;
  /** Where on that half-edge (0 … 1) the piece starts; it covers 2^−level of it. */
  borderFrom: Float32Array;
}

/** The same, with its fields in one order: readers in hot loops then meet one kind of object at all levels. */
export function levelMesh({
  faces, vertices, starts, vertexOf, faceOf, twin, edgeSharpness, vertexSharpness, positions, bodyOf, live, level, borderOf, borderFrom,
}: LevelMesh): LevelMesh {
  return { faces, vertices, starts, vertexOf, faceOf, twin, edgeSharpness, vertexSharpness, positions, bodyOf, live, level, borderOf, borderFrom };
}

/** Whether the surface is creased for good along this half-edge's edge: a border, or infinitely sharp. */
export function isSharpForGood(mesh: Topology, h: number): boolean {
  return mesh.twin[h] < 0 || mesh.edgeSharpness[h] === Infinity;
}

/** Half-edge of a face's side, counted from its corner `corner`. */
export function faceSideAt(mesh: Topology, corner: number, side: number): number {
  const face = mesh.faceOf[corner];
  const start = mesh.starts[face];
  return start + ((corner - start + side) % (mesh.starts[face + 1] - start));
}

/**
 * The cage as level 0. Blocked bodies are not live. The rule `edge-and-corner` makes a border vertex with one face a corner.
 * `borders` are the half-edges with another body, or nothing, across.
 */
export function levelZero(
  mesh: Topology, positions: Float64Array, bodyOf: Int32Array, blocked: Uint8Array, boundary: Boundary, borders = findBorderEdges(mesh, bodyOf),
): LevelMesh {
  const live = new Uint8Array(mesh.faces);
  for (let face = 0; face < mesh.faces; face++) live[face] = blocked[bodyOf[face]] === 1 ? 0 : 1;
  const borderOf = new Int32Array(mesh.twin.length).fill(-1);
  // One side's curve stands for both, so that what one body gains the other loses to the last bit.
  for (const h of borders) if (borderEdgeOf(mesh, bodyOf, blocked, h) === h) borderOf[h] = h;
  const vertexSharpness = boundary === 'edge-and-corner' ? withCorners(mesh, borders) : mesh.vertexSharpness;
  return levelMesh({ ...mesh, positions, bodyOf, live, level: 0, borderOf, borderFrom: new Float32Array(mesh.twin.length), vertexSharpness });
}

/** Vertex sharpness with the border vertices that have one face made corners. */
function withCorners(mesh: Topology, borders: Int32Array): Float32Array {
  const open = borders.filter((h) => mesh.twin[h] < 0);
  if (open.length === 0) return mesh.vertexSharpness;
  const faces = new Int32Array(mesh.vertices);
  for (let h = 0; h < mesh.vertexOf.length; h++) faces[mesh.vertexOf[h]]++;
  const sharpness = mesh.vertexSharpness.slice();
  for (const h of open) if (faces[mesh.vertexOf[h]] === 1) sharpness[mesh.vertexOf[h]] = Infinity;
  return sharpness;
}
