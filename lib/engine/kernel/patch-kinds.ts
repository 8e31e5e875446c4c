import type { FanRoutines } from './scalar-fans';

/** Shapes of regular patches that have a kernel: bicubic and biquadratic B-splines over a square, quartic box splines over a triangle. */
export const PATCH_KINDS = ['bicubic', 'biquadratic', 'triangle'] as const;
export type PatchKind = (typeof PATCH_KINDS)[number];

/** Control values of a patch, x, y, z per point: 4 × 4 and 3 × 3 points row by row, and the twelve of TRIANGLE_NET. */
export const NET_VALUES: Readonly<Record<PatchKind, number>> = { bicubic: 48, biquadratic: 27, triangle: 36 };

/** Rules of the triangle have one node more along its first side: the factor 1 − s of the weight costs a degree. */
export const ALONG_EXTRA: Readonly<Record<PatchKind, number>> = { bicubic: 0, biquadratic: 0, triangle: 1 };

/** Pairs of patches that a kernel holds. */
export const MOST_PAIRS = 256;

/** Doubles per pair and two lanes: the net's values and x, y, z of the point that moments are about. */
export function inputStride(kind: PatchKind): number {
  return 2 * (NET_VALUES[kind] + 3);
}

/** Doubles per pair and two lanes: ten solid and ten surface moments, magnitude, coarse area, what a second and a first moment may err by, nodes taken, variation of the normal. */
export const OUTPUT_STRIDE = 52;

/** A kernel of patches in pairs with its memory. */
export interface PatchKernel {
  kind: PatchKind;
  /** Pairs that the memory holds. */
  pairs: number;
  /** Nets and origins of the pairs, `inputStride` apart. */
  input: Float64Array;
  /** Results of the pairs, OUTPUT_STRIDE apart. */
  output: Float64Array;
  /** Computes the first `pairs` pairs with `count` Gauss nodes a direction, the coarse area with `coarseCount` (0: not at all). Counts up to MOST_NODES. */
  run(pairs: number, count: number, coarseCount: number): void;
  /**
   * Computes the first `pairs` pairs, each with as few nodes from `fewest` on as do for both its patches: what is left out of second moments stays below
   * `tolerance`, relative to the patch's magnitude about its origin or to that of its area `reach` away from it (0: that is seen to elsewhere), and the area
   * is as good as AREA_TOLERANCE, or has been tried with all that its range has.
   */
  choose(pairs: number, fewest: number, tolerance: number, reach: number): void;
}

/** A kernel of one thread, in whose memory fans are computed too. */
export interface FanKernel extends PatchKernel {
  fans: FanRoutines;
}

/** Gauss nodes a direction at most. */
export const MOST_NODES = 9;
