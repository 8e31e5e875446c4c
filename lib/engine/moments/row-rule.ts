/** Gauss rule for sums: Σ f(i), i = 0 … count − 1, is Σ weights[j] f(nodes[j]) for polynomials f of degree 2n − 1. Nodes ascend between 0 and count − 1, weights are positive. */
export interface RowRule {
  count: number;
  nodes: Float64Array;
  weights: Float64Array;
}

/**
 * Nodes for the pieces in a row, and those of the rule that theirs is compared with where there are roots; 7 are exact for solid moments, of degree 13.
 * A pole of the integrand near the row lets errors fall but slowly from rule to rule, so that the whole difference counts.
 */
export const ROW_NODES = [9, 7] as const;

/** Rows of so many pieces cost as little one by one as by both rules, which two halvings are not unlikely to follow. */
export const SHORT_ROW = 32;

const rules = new Map<string, RowRule>();

/** The rule with so many nodes for a sum of `count` ≥ `nodes` terms, made on first need: the zeros of the polynomials that are orthogonal on the sum's points. */
export function rowRule(nodes: number, count: number): RowRule {
  const key = `${nodes} ${count}`;
  let rule = rules.get(key);
  if (rule === undefined) {
    rule = makeRule(nodes, count);
    rules.set(key, rule);
  }
  return rule;
}

/** Most that products of the orthogonal polynomials that the rule should sum exactly are off by: what a node or weight gone wrong shows as. */
export function rowRuleDefect({ count, nodes, weights }: RowRule): number {
  const n = nodes.length;
  const values = Array.from(nodes, (node) => orthonormals(n, count, node - (count - 1) / 2));
  let worst = 0;
  for (let k = 0; k < n; k++) {
    for (let l = k; l <= n; l++) {
      let sum = 0;
      for (let j = 0; j < n; j++) sum += weights[j] * values[j][k] * values[j][l];
      const off = Math.abs(sum - (k === l ? 1 : 0));
      if (!(off <= worst)) worst = off;
    }
  }
  return worst;
}

/** √b_k of the recurrence √b_{k+1} p_{k+1} = x p_k − √b_k p_{k−1} on the points −(N−1)/2 … (N−1)/2, b_k = k² (N² − k²) / (4 (4k² − 1)) [Szegő 1939]; they end at k = N, where 1 stands in. */
function step(k: number, count: number): number {
  return k < count ? (k / 2) * Math.sqrt((count * count - k * k) / (4 * k * k - 1)) : 1;
}

/** The orthonormal polynomials of degree 0 … `most` at x, which is measured from the middle. */
function orthonormals(most: number, count: number, x: number): Float64Array {
  const values = new Float64Array(most + 1);
  values[0] = 1 / Math.sqrt(count);
  for (let k = 0; k < most; k++) values[k + 1] = (x * values[k] - (k > 0 ? step(k, count) * values[k - 1] : 0)) / step(k + 1, count);
  return values;
}

/** Zeros of the last polynomial that are larger than x: as many as its row has changes of sign [Sturm 1835]. */
function zerosAbove(n: number, count: number, x: number): number {
  const values = orthonormals(n, count, x);
  let changes = 0;
  let sign = 1;
  for (let k = 1; k <= n; k++) {
    if (values[k] * sign >= 0) continue;
    sign = -sign;
    changes++;
  }
  return changes;
}

function makeRule(n: number, count: number): RowRule {
  const nodes = new Float64Array(n);
  const weights = new Float64Array(n);
  const middle = (count - 1) / 2;
  for (let j = 0; 2 * j < n; j++) {
    // The zero x > 0 with j larger ones; its mirror image is −x.
    let low = 0;
    let high = count / 2;
    for (let x = high / 2; 2 * j + 1 < n && x > low && x < high; x = (low + high) / 2) {
      if (zerosAbove(n, count, x) > j) low = x;
      else high = x;
    }
    let square = 0;
    for (const value of orthonormals(n - 1, count, low)) square += value * value;
    nodes[j] = middle - low;
    nodes[n - 1 - j] = middle + low;
    weights[j] = weights[n - 1 - j] = 1 / square;
  }
  return { count, nodes, weights };
}
