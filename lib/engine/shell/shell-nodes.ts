import type { SeriesRate } from './series-rate';

/** Gauss nodes a direction beyond which a patch is quartered instead. */
export const MOST_SHELL_NODES = 12;
/** Nodes where none are trusted. */
export const UNTRUSTED_NODES = 7;
const FEWEST_SHELL_NODES = 2;

/** Relative variation of the normal vector X_u × X_v beyond which no rule is trusted. */
const MOST_VARIATION = 0.95;

/** Error of n nodes on [−½, ½] for t^2n: (n!)⁴ / ((2n + 1) ((2n)!)²), times 4^n since the variation is that over half the interval. */
const RULE_ERRORS: readonly number[] = Array.from({ length: MOST_SHELL_NODES + 1 }, (_, n) => {
  let ratio = 1;
  for (let i = 1; i <= n; i++) ratio *= (i * i) / ((2 * i - 1) * 2 * i);
  return (ratio * ratio * 4 ** n) / (2 * n + 1);
});

/** Both directions, and room for series whose coefficients grow before they fall. */
const SAFETY = 1;

/** Relative error of n nodes a direction where the normal vector varies by `variation` of its length over half the patch: the series' first power that the rule misses. */
function ruleError(nodes: number, variation: number): number {
  const square = variation * variation;
  let error = SAFETY * RULE_ERRORS[nodes];
  for (let i = 0; i < nodes; i++) error *= square;
  return error;
}

/**
 * Adds to `errors` what ∫ N dA, ∫ 2H dA and ∫ K dA of a patch of about `area` may err by with so many nodes. `curvature` is the largest modulus met at the nodes.
 * 2H and K hold one and two second derivatives, each a polynomial of its own that takes three powers of the rate (a triangle's two) from what the rule leaves, or at most
 * the bend that the coefficients allow; and below them the second and third power of |X_u × X_v|, whose series' coefficients grow by the shares.
 */
export function addRuleErrors(errors: Float64Array | number[], at: number, nodes: number, { rate, bend }: SeriesRate, area: number, curvature: number, triangle: boolean): void {
  const error = area * ruleError(nodes, rate);
  const power = rate * rate * (triangle ? 1 : rate);
  const curved = power > 0 ? Math.min(bend, curvature / power) : curvature;
  errors[at] += error;
  errors[at + 1] += error * curved * meanShare(nodes);
  errors[at + 2] += error * curved * curved * gaussShare(nodes);
}

function meanShare(nodes: number): number {
  return 2 * nodes + 1;
}

function gaussShare(nodes: number): number {
  return (nodes + 1) * (2 * nodes + 1);
}

/** Fewest nodes a direction whose error stays below the tolerance; 0 where the patch bends too much for any. */
export function chooseNodes(variation: number, tolerance: number): number {
  if (!(variation < MOST_VARIATION)) return 0;
  const square = variation * variation;
  let power = SAFETY * square ** FEWEST_SHELL_NODES;
  for (let nodes = FEWEST_SHELL_NODES; nodes <= MOST_SHELL_NODES; nodes++, power *= square) if (RULE_ERRORS[nodes] * power <= tolerance) return nodes;
  return 0;
}

/**
 * Most that X_u × X_v varies over half the patch along either direction, relative to its length, from what the kernels leave at `bends[at]`, two doubles apart:
 * a triangle's squares of differences at the corners; a square's ratios along its sides and the square of what its corners' mean leaves the middle by.
 */
export function bendVariation(bends: Float64Array, at: number, triangle: boolean): number {
  const middle = bends[at];
  if (!(middle > 0)) return Infinity;
  let most = 0;
  for (let i = 1; i <= (triangle ? 3 : 4); i++) if (!(bends[at + 2 * i] <= most)) most = bends[at + 2 * i];
  return triangle ? Math.sqrt(most / middle) : Math.sqrt(most) + Math.sqrt(bends[at + 10] / middle);
}
