import { ALONG_EXTRA, type PatchKind } from './patch-kinds';

/** Gauss nodes a direction. */
export interface NodeRange {
  /** The fewest that are taken, which leave a patch's volume exact, and those that are exact for all ten solid moments. */
  fewest: number;
  exact: number;
  /** Those that a patch's area is tried with before it is quartered, and those of its quarters; the most, which it is tried with where they promise to do. */
  forArea: number;
  most: number;
}

/** Degree 7 a direction with the volume and 13 with second moments; 4 and 8; 9 and 17 in all. Three nodes would leave biquadratics no second rule to compare with. */
export const NODE_RANGES: Readonly<Record<PatchKind, NodeRange>> = {
  bicubic: { fewest: 4, exact: 7, forArea: 7, most: 8 },
  biquadratic: { fewest: 4, exact: 5, forArea: 7, most: 8 },
  triangle: { fewest: 5, exact: 9, forArea: 9, most: 9 },
};

/** What second moments may lose to a rule with fewer nodes than are exact, relative to the magnitude of what is added up for them: no more than what is counted for its rounding. */
export const CHOICE_TOLERANCE = 2 ** -49;

/** Part of a patch's area that its error may be. */
export const AREA_TOLERANCE = 1e-11;

/** Relative difference of a patch's areas by two rules that means so much; a little less, so that `areaError` never sees it otherwise. */
export const AREA_CUTOFF = 0.999 * AREA_TOLERANCE ** (2 / 3);

/** Relative difference up to which a rule whose area is compared with that of one node more promises to do; by far more than that, only all for areas may. */
export const AREA_NEAR = AREA_TOLERANCE ** (8 / 15);

/** Relative difference by the finer rules from which on the next patches are not tried with the coarser ones, which would have failed: neighbours are alike. */
export const AREA_CALM = AREA_CUTOFF ** (4 / 3);

/** Nodes of the rule whose area that of `nodes` is compared with. A rule is exact up to degree 2n − 1, on a triangle to 2n: what it leaves begins 8/5 as late as with those. */
export function coarseOf(kind: PatchKind, nodes: number): number {
  const extra = ALONG_EXTRA[kind];
  return Math.trunc((5 * (nodes + extra)) / 8) - extra;
}

/** The next rule that is compared with a better one, as far as the range goes. */
export function nodesAfter(kind: PatchKind, nodes: number): number {
  let next = nodes;
  while (next < NODE_RANGES[kind].most && coarseOf(kind, next) === coarseOf(kind, nodes)) next++;
  return next;
}

/**
 * Estimated error of a patch's area `fine` by `nodes` nodes a direction, that by the coarser rule being `coarse` (areas). `variation` is the square of the most that X_u × X_v
 * differs at a corner from the middle, relative to its length there. For an analytic integrand what a rule leaves falls geometrically with its degree, so that of
 * the finer rule is that of the coarser to the power 8/5; 3/2 is counted. That supposes that the series falls from its beginning: where |X_u × X_v| nearly
 * vanishes in a corner or beyond, its kink weighs little there and falls slowly none the less. Hence never less than what `ruleGain` leaves of the difference.
 */
export function areaError(kind: PatchKind, nodes: number, fine: number, coarse: number, variation: number): number {
  if (!(fine > 0)) return 0;
  const change = Math.min(1, Math.abs(fine - coarse) / fine);
  return fine * change * Math.max(Math.sqrt(change), ruleGain(nodes - coarseOf(kind, nodes), variation));
}

/**
 * What so many nodes a direction more leave of a rule's error, for an integrand √(n · n) whose zeros are no nearer than where a vector n that varies linearly by √`variation` of its
 * length over half an interval may vanish: z = 1/√variation, and ρ^−2 a node for the ellipse through it, ρ = z + √(z² − 1).
 */
function ruleGain(more: number, variation: number): number {
  if (!(variation < 1)) return 1;
  const far = 1 + Math.sqrt(1 - variation);
  const square = variation / (far * far);
  let gain = square;
  for (let i = 1; i < more; i++) gain *= square;
  return gain;
}
