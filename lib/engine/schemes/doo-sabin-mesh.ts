import type { Boundary } from '../cage';
import { levelMesh, type LevelMesh } from './level-mesh';

/**
 * A mesh of Doo-Sabin refinement. At level 0 it is the cage: `live`, `bodyOf` and `borderOf` belong to faces and their half-edges. From level 1 on
 * a patch belongs to a vertex and so do `live` and `bodyOf`; the half-edge from x to y then stands for the side that the patches of x and y share.
 * Seen with x on the left that side runs from the middle of the face on the half-edge's right (or from the border) to the middle of the one on its left,
 * and `borderOf` and `borderFrom` tell which border curve it is a piece of.
 */
export interface DooSabinMesh extends LevelMesh {
  /** Whether a border vertex with one face is kept: the rule `edge-and-corner`. */
  keepsCorners: boolean;
  /** The cage's half-edge along which the patch of a border vertex ends (a kept corner: the one that leaves it), else -1; from where and how much of its range (0 … 1). */
  rimOf: Int32Array;
  rimFrom: Float32Array;
  rimShare: Float32Array;
  /**
   * Where bodies meet at a border vertex of the cage, the side from the border to the middle of that vertex' face is a curve of its own, a spoke. Its number
   * is `firstSpoke` + h where it runs inwards, `firstSpoke` + `spokes` + h where outwards; h is the border half-edge that leaves the vertex.
   */
  firstSpoke: number;
  spokes: number;
  /** At level 0 the cage's half-edge that each half-edge is; null: itself. */
  edgeOf: Int32Array | null;
}

/** The same, with its fields in one order at all levels (see `levelMesh`). */
export function dooSabinMesh(mesh: DooSabinMesh): DooSabinMesh {
  const { keepsCorners, rimOf, rimFrom, rimShare, firstSpoke, spokes, edgeOf } = mesh;
  return { ...levelMesh(mesh), keepsCorners, rimOf, rimFrom, rimShare, firstSpoke, spokes, edgeOf };
}

/** The cage as level 0 of Doo-Sabin refinement; corners tagged in the file do not count. */
export function dooSabinCage(cage: LevelMesh, boundary: Boundary): DooSabinMesh {
  return dooSabinMesh({
    ...cage, keepsCorners: boundary === 'edge-and-corner', rimOf: new Int32Array(0), rimFrom: new Float32Array(0), rimShare: new Float32Array(0),
    firstSpoke: cage.vertexOf.length, spokes: cage.vertexOf.length, edgeOf: null,
  });
}

/** The cage's half-edge that a half-edge of level 0 is. */
export function cageEdge(mesh: DooSabinMesh, h: number): number {
  return mesh.edgeOf === null ? h : mesh.edgeOf[h];
}

/** Whether a spoke's curve, given by its number, runs outwards. */
export function runsOutwards(mesh: DooSabinMesh, curve: number): boolean {
  return curve >= mesh.firstSpoke + mesh.spokes;
}
