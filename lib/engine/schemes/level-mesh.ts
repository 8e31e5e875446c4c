import type { Boundary } from '../cage';
import { borderEdgeOf, isBorder } from '../mesh/border-loops';
import type { Topology } from '../mesh/topology';

/**
 * The cage or what is left of it after some local refinements. Faces that are not live are there for their vertices' rings only;
 * rules may be read at vertices of live faces only, since all others may lack faces.
 */
export interface LevelMesh extends Topology {
  /** x, y, z per vertex, about the file frame's local origin of the piece. */
  positions: Float64Array;
  bodyOf: Int32Array;
  /** 1 while the face still has to be measured. */
  live: Uint8Array;
  /** Refinements since the cage. */
  level: number;
  /** The cage's half-edge that this half-edge is a piece of where that is a border of a body; else -1. */
  borderOf: Int32Array;
  /** Where on that half-edge (0 … 1) the piece starts; it covers 2^−level of it. */
  borderFrom: Float32Array;
}

/** Whether the surface is creased for good along this half-edge's edge: a border, or infinitely sharp. */
export function isSharpForGood(mesh: Topology, h: number): boolean {
  return mesh.twin[h] < 0 || mesh.edgeSharpness[h] === Infinity;
}

/** The cage as level 0. Blocked bodies are not live. The rule `edge-and-corner` makes a border vertex with one face a corner. */
export function levelZero(mesh: Topology, positions: Float64Array, bodyOf: Int32Array, blocked: Uint8Array, boundary: Boundary): LevelMesh {
  const live = new Uint8Array(mesh.faces);
  for (let face = 0; face < mesh.faces; face++) live[face] = blocked[bodyOf[face]] === 1 ? 0 : 1;
  const borderOf = new Int32Array(mesh.twin.length).fill(-1);
  const cornersAt = new Uint8Array(mesh.vertices);
  for (let h = 0; h < mesh.twin.length; h++) {
    // One side's curve stands for both, so that what one body gains the other loses to the last bit.
    if (isBorder(mesh, bodyOf, h) && borderEdgeOf(mesh, bodyOf, blocked, h) === h) borderOf[h] = h;
    if (cornersAt[mesh.vertexOf[h]] < 2) cornersAt[mesh.vertexOf[h]]++;
  }
  let vertexSharpness = mesh.vertexSharpness;
  if (boundary === 'edge-and-corner') {
    vertexSharpness = vertexSharpness.slice();
    for (let h = 0; h < mesh.twin.length; h++) if (mesh.twin[h] < 0 && cornersAt[mesh.vertexOf[h]] === 1) vertexSharpness[mesh.vertexOf[h]] = Infinity;
  }
  return { ...mesh, positions, bodyOf, live, level: 0, borderOf, borderFrom: new Float32Array(mesh.twin.length), vertexSharpness };
}
