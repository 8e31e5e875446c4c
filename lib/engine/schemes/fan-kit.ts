import type { PatchBlock } from '../kernel/patch-block';
import type { RegularRule } from '../kernel/regular-patches';
import type { BorderCurves } from '../moments/border-curves';
import type { FanState } from './fan-state';
import type { LevelMesh } from './level-mesh';

/** What the level sequence of a fan needs to know of a scheme. Each sector has three regular children: 0 beside its first spoke, 1, and 2 beside its second. */
export interface FanKit {
  /** Corners of a face; side 0 of a face leaves the centre, side `arriving` runs back to it. */
  sides: number;
  arriving: number;
  /** Gauss nodes a direction that are exact, and the fewest that are worth trying. */
  mostNodes: number;
  fewestNodes: number;
  /** Half-edge of side `side` of the sector at a fan's corner. */
  sideAt(mesh: LevelMesh, corner: number, side: number): number;
  /** Modulus of the subdominant eigenvalue of the smooth rule, by valence; and what no fan exceeds. */
  smoothShrinkage(valence: number): number;
  largestShrinkage: number;
  /** Body that a sector belongs to, by its corner. */
  body(mesh: LevelMesh, corner: number): number;
  /** Reads the rings 0 to 2 around the fan's corners into `fan`. */
  read(mesh: LevelMesh, corners: readonly number[], fan: FanState): void;
  /** Rings 0 to 2 of `from` give rings 0 to 3 of `to`. */
  refine(from: FanState, to: FanState): void;
  /** Limit point of the centre. */
  limit(fan: FanState): Float64Array;
  fillChild(fan: FanState, sector: number, child: number, net: Float64Array): void;
  /** Computes many patches at once as `moments` does, to the same bits; null where the scheme has no such kernel. */
  block: PatchBlock | null;
  /** Ten solid and ten surface moments of a child's patch about (ox, oy, oz); returns the magnitude that rounding is relative to. */
  moments(net: Float64Array, ox: number, oy: number, oz: number, nodes: number, solid: Float64Array, surface: Float64Array): number;
  /** Mends the surface moments found with `mostNodes`; returns the estimated error of the area. */
  mendSurface(net: Float64Array, ox: number, oy: number, oz: number, surface: Float64Array): number;
  addSide(curves: BorderCurves, net: Float64Array, side: number, edge: number, weight: number, from: number, share: number, shift: ArrayLike<number>): void;
  /** Which sides of the children lie on sides of the sector's face away from the centre, and on which half of those. */
  outerSides: readonly (readonly [child: number, side: number, faceSide: number, half: number])[];
  /** How the kernel computes child patches: nodes to begin with, those of the coarse area beside them, and how areas are mended. */
  rule: RegularRule;
  /** Fills the net of a child as that kernel wants it. */
  fillPoints(fan: FanState, sector: number, child: number, points: Float64Array): void;
  /** Which points refinement reads: the centre and rings 1 and 2 of the spokes, or none of those; and offsets of a sector's inner points. */
  hasSpokes: boolean;
  innerPoints: readonly number[];
  /** Gauss nodes that are exact for second moments of chains along sides: degree 11 for cubics, 14 for quartics. */
  rimNodes: number;
}
