/** Gauss nodes a direction beyond which a patch is quartered instead. */
export const MOST_SHELL_NODES = 12;
/** Nodes where none are trusted. */
export const UNTRUSTED_NODES = 7;
const FEWEST_SHELL_NODES = 2;

/** Relative variation of the normal vector X_u × X_v beyond which no rule is trusted. */
const MOST_VARIATION = 0.8;

/** Error of n nodes on [−½, ½] for t^2n: (n!)⁴ / ((2n + 1) ((2n)!)²), times 4^n since the variation is that over half the interval. */
const RULE_ERRORS: readonly number[] = Array.from({ length: MOST_SHELL_NODES + 1 }, (_, n) => {
  let ratio = 1;
  for (let i = 1; i <= n; i++) ratio *= (i * i) / ((2 * i - 1) * 2 * i);
  return (ratio * ratio * 4 ** n) / (2 * n + 1);
});

/** Both directions, and room for series whose coefficients grow before they fall. */
const SAFETY = 8;

/** Relative error of n nodes a direction where the normal vector varies by `variation` of its length over half the patch: the series' first power that the rule misses. */
export function ruleError(nodes: number, variation: number): number {
  const square = variation * variation;
  let error = SAFETY * RULE_ERRORS[nodes];
  for (let i = 0; i < nodes; i++) error *= square;
  return error;
}

/** How much more ∫ 2H errs than areas do by so many nodes: the integrand has the second power of |X_u × X_v| below, whose series' coefficients grow so. */
export function meanShare(nodes: number): number {
  return 2 * nodes + 1;
}

/** The same for ∫ K, with the third power. */
export function gaussShare(nodes: number): number {
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
