import { gaussRule, ruleDefect } from '../patches/gauss-rule';
import { MOMENTS } from './sums';

/** Unit roundoff of double precision. */
const UNIT_ROUNDOFF = 2 ** -53;

/** Roundings per product that count, from a body's frame over refinement and evaluation to the sum; all with the same sign would be the worst case. */
const ROUNDINGS = 16;

/** Largest defect of the rules in use, so that a node or weight gone wrong shows in every estimate. */
export function largestRuleDefect(): number {
  let worst = 0;
  for (const count of [2, 3, 4, 5, 6, 7, 8, 9, 10]) {
    const rule = gaussRule(count);
    worst = Math.max(worst, ruleDefect(rule.nodes, rule.weights));
  }
  return worst;
}

/**
 * Estimate of max |Δ| / (|V| L^k) of ten moments: what the closings and rules may be off by, plus rounding relative to the magnitudes of the products.
 * `size` is half the diagonal of the body's box. A body without volume gets 1: nothing about it is certain.
 */
export function solidErrorEstimate(volume: number, magnitude: number, closingErrors: Float64Array, offset: number, size: number, defect: number): number {
  const v = Math.abs(volume);
  if (!(v > 0)) return 1;
  let closing = 0;
  for (let i = 0; i < MOMENTS; i++) closing = Math.max(closing, closingErrors[offset + i] / size ** (i === 0 ? 0 : i < 4 ? 1 : 2));
  return Math.min(1, (closing + (ROUNDINGS * UNIT_ROUNDOFF + 2 * defect) * magnitude) / v);
}

/** The higher moments of a surface err by some times what its area does, relative to their size. */
const MOMENT_FACTOR = 8;

/** Relative error estimate of the surface moments: what rules and closings may be off by, plus rounding. */
export function surfaceErrorEstimate(area: number, error: number): number {
  return area > 0 ? Math.min(1, (MOMENT_FACTOR * error) / area + ROUNDINGS * UNIT_ROUNDOFF) : 1;
}
