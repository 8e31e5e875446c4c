import { coarseOf, NODE_RANGES } from '../kernel/node-choice';
import type { PatchKind } from '../kernel/patch-kinds';
import type { BorderCurves } from '../moments/border-curves';
import type { FanState } from './fan-state';
import type { LevelMesh } from './level-mesh';

/** Kind of a fan's patches; Gauss nodes to begin with and of the coarse area beside them. */
export interface FanRule {
  kind: PatchKind;
  nodes: number;
  coarseNodes: number;
}

/** The rule for fans of a kind of patches: as many nodes as the area needs, the solid moments are exact then. */
export function fanRule(kind: PatchKind): FanRule {
  const { exact, forArea } = NODE_RANGES[kind];
  const nodes = Math.max(exact, forArea);
  return { kind, nodes, coarseNodes: coarseOf(kind, nodes) };
}

/** What the level sequence of a fan needs to know of a scheme. Each sector has three regular children: 0 beside its first spoke, 1, and 2 beside its second. */
export interface FanKit {
  /** Corners of a face; side 0 of a face leaves the centre, side `arriving` runs back to it. */
  sides: number;
  arriving: number;
  /** Gauss nodes a direction, the fewest that are worth trying. */
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
  /** Fills the net of a child as `addSide` wants it. */
  fillChild(fan: FanState, sector: number, child: number, net: Float64Array): void;
  /** Adds a side of a net that `fillChild` filled as a curve. */
  addSide(curves: BorderCurves, net: Float64Array, side: number, edge: number, weight: number, from: number, share: number, shift: ArrayLike<number>): void;
  /** Which sides of the children lie on sides of the sector's face away from the centre, and on which half of those. */
  outerSides: readonly (readonly [child: number, side: number, faceSide: number, half: number])[];
  /** How the kernel computes child patches: nodes to begin with and those of the coarse area beside them. */
  rule: FanRule;
  /** Fills the net of a child as that kernel wants it. */
  fillPoints(fan: FanState, sector: number, child: number, points: Float64Array): void;
  /** Which points refinement reads: the centre and rings 1 and 2 of the spokes, or none of those; and offsets of a sector's inner points. */
  hasSpokes: boolean;
  innerPoints: readonly number[];
  /** Gauss nodes that are exact for second moments of chains along sides: degree 11 for cubics, 14 for quartics. */
  rimNodes: number;
}
