/** Gauss-Legendre rule on [−½, ½], nodes ascending; exact for polynomials of degree 2n − 1. */
export interface GaussRule {
  nodes: Float64Array;
  weights: Float64Array;
  /** Largest error of the rule on the powers it should integrate exactly, relative to ∫|t|^k: what a corrupted node or weight would show as. */
  defect: number;
}

const rules: (GaussRule | undefined)[] = [];

/** The rule with `count` nodes, made on first need by Newton's method on the Legendre recurrence. */
export function gaussRule(count: number): GaussRule {
  const known = rules[count];
  if (known !== undefined) return known;
  const nodes = new Float64Array(count);
  const weights = new Float64Array(count);
  for (let i = 0; i < (count + 1) >> 1; i++) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (count + 0.5));
    if (2 * i + 1 === count) x = 0;
    let slope = legendre(count, x).slope;
    for (let step = 0; step < 60; step++) {
      const { value, slope: derivative } = legendre(count, x);
      slope = derivative;
      const move = value / derivative;
      if (x === 0 || Math.abs(move) < 2 ** -54) break;
      x -= move;
    }
    slope = legendre(count, x).slope;
    const weight = 1 / ((1 - x * x) * slope * slope);
    nodes[i] = -x / 2;
    nodes[count - 1 - i] = x / 2;
    weights[i] = weights[count - 1 - i] = weight;
  }
  const rule = { nodes, weights, defect: ruleDefect(nodes, weights) };
  rules[count] = rule;
  return rule;
}

function legendre(degree: number, x: number): { value: number; slope: number } {
  let before = 1;
  let value = x;
  for (let k = 2; k <= degree; k++) [before, value] = [value, ((2 * k - 1) * x * value - (k - 1) * before) / k];
  if (degree === 0) return { value: 1, slope: 0 };
  return { value, slope: (degree * (x * value - before)) / (x * x - 1) };
}

/** Compares the rule with ∫ t^k over [−½, ½] for k = 0 … 2n − 1, each relative to ∫|t|^k. */
export function ruleDefect(nodes: Float64Array, weights: Float64Array): number {
  let worst = 0;
  for (let k = 0; k < 2 * nodes.length; k++) {
    let sum = 0;
    for (let i = 0; i < nodes.length; i++) sum += weights[i] * nodes[i] ** k;
    const size = 0.5 ** k / (k + 1);
    worst = Math.max(worst, Math.abs(sum - (k % 2 === 0 ? size : 0)) / size);
  }
  return worst;
}
