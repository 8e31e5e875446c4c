/**
 * Weights that close the sum of a level sequence M_0, M_1, … whose terms are combinations of r^k with 0 ≤ r ≤ `largest` < 1:
 * Σ M_k ≈ Σ_{k<L} w_k M_k. With q(r) = Π (r − r_i)/(1 − r_i) over Chebyshev nodes r_i on [0, largest] and q_j its coefficients,
 * w_k = 1 − Σ_{j≤k} q_j; each mode's error is q(r)/(1 − r), so repeated and defective eigenvalues do no harm. `known` is a further r, which the first of the
 * nodes is spent on: `largest` is then that of all others.
 */
export function tailWeights(largest: number, levels: number, known?: number): Float64Array {
  // Elementary symmetric polynomials of positive nodes: sums without cancellation, so every coefficient keeps its digits.
  const symmetric = new Float64Array(levels + 1);
  symmetric[0] = 1;
  let scale = 1;
  const spent = known === undefined ? 0 : 1;
  const others = levels - spent;
  for (let i = 0; i < levels; i++) {
    const node = known !== undefined && i === 0 ? known : (largest / 2) * (1 + Math.cos((Math.PI * (2 * (i - spent) + 1)) / (2 * others)));
    for (let k = i + 1; k > 0; k--) symmetric[k] += node * symmetric[k - 1];
    scale *= 1 - node;
  }
  const weights = new Float64Array(levels);
  let sum = 0;
  for (let k = 0; k < levels; k++) {
    const sign = (levels - k) % 2 === 0 ? 1 : -1;
    sum += (sign * symmetric[levels - k]) / scale;
    weights[k] = 1 - sum;
  }
  return weights;
}

/** Levels after which the closing errs by less than 10^−digits: L = ⌈digits / log10 ρ⌉, ρ = z + √(z² − 1), z = 2/largest − 1. */
export function tailLevels(largest: number, digits: number): number {
  const z = 2 / largest - 1;
  return Math.max(2, Math.ceil(digits / Math.log10(z + Math.sqrt(z * z - 1))));
}
