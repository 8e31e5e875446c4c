// What fewer Gauss nodes than the exact rule's may leave out of a patch's second moments, bounded from its power coefficients: one list of operations for both
// dialects. Along a line of the patch the integrand f(X) det(X, X_u, X_v) is a polynomial; its coefficients are at most those of C³ A B, where C, A and B
// have the norms of those of X and of its derivatives along and across the line, over all lines. A rule of n nodes leaves out degrees 2n and above alone.
import { pruned } from './kernel-dialects.mjs';
import { AXES } from './kernel-shapes.mjs';

/** Gauss-Legendre nodes and weights on [−½, ½], by Newton's method. */
function gauss(count) {
  return Array.from({ length: count }, (_, i) => {
    let x = Math.cos((Math.PI * (i + 0.75)) / (count + 0.5));
    let slope = 0;
    for (let step = 0; step < 50; step++) {
      let [before, value] = [1, x];
      for (let k = 2; k <= count; k++) [before, value] = [value, ((2 * k - 1) * x * value - (k - 1) * before) / k];
      slope = (count * (x * value - before)) / (x * x - 1);
      x -= value / slope;
    }
    return { node: x / 2, weight: 1 / ((1 - x * x) * slope * slope) };
  });
}

/** What a rule leaves of ∫ t^degree over [−½, ½], rounded up. */
function leftOut(count, degree) {
  const sum = gauss(count).reduce((total, { node, weight }) => total + weight * node ** degree, 0);
  return (1.001 * (2 * 0.5 ** (degree + 1) / (degree + 1) - sum)).toPrecision(6);
}

const binomial = (n, k) => (k < 0 || k > n ? 0 : k === 0 ? 1 : (binomial(n - 1, k - 1) * n) / k);

/**
 * Coefficients by what stands at u^i v^j, each as the norm |e_ij| 2^−(i+j), so that lines run over [−1, 1]; and the terms `[power, factor]` that these add to
 * the coefficients of X and of its derivative across, by direction.
 */
const square = (order) => ({
  order,
  across: order,
  coefficients: Array.from({ length: order * order }, (_, k) => ({ place: k, i: Math.floor(k / order), j: k % order })),
  directions: [
    { own: ({ i }) => [[i, 1]], side: ({ i, j }) => (j > 0 ? [[i, j]] : []) },
    { own: ({ j }) => [[j, 1]], side: ({ i, j }) => (i > 0 ? [[j, i]] : []) },
  ],
});

/** ((1 + t)/2)^j: what (½ − u)^j, by which v^j is measured, is at most. */
const rest = (j) => Array.from({ length: j + 1 }, (_, k) => [k, binomial(j, k) * 0.5 ** j]);

const triangle = {
  order: 5,
  across: 4,
  coefficients: [0, 1, 2, 3, 4].flatMap((degree) => Array.from({ length: degree + 1 }, (_, j) => ({ place: (degree * (degree + 1)) / 2 + j, i: degree - j, j }))),
  directions: [
    { own: ({ i, j }) => rest(j).map(([k, factor]) => [i + k, factor]), side: ({ i, j }) => (j > 0 ? rest(j - 1).map(([k, factor]) => [i + k, j * factor]) : []) },
    { own: ({ j }) => [[j, 1]], side: ({ i, j }) => (i > 0 ? [[j, i]] : []) },
  ],
};

/** Fewest nodes a direction that are taken, which leave the volume exact, those that are exact for second moments, the largest even degree of these along a line, and where X_u and X_v stand. */
const RULES = {
  bicubic: { ...square(4), fewest: 4, exact: 7, degree: 12, places: { u: 4, v: 1 } },
  biquadratic: { ...square(3), fewest: 4, exact: 5, degree: 8, places: { u: 3, v: 1 } },
  triangle: { ...triangle, fewest: 5, exact: 9, degree: 18, places: { u: 1, v: 2 }, weighted: true },
};

/** `factor · name`, the factor dyadic. */
function term(factor, name) {
  if (factor < 4 && factor % 1 === 0) return Array.from({ length: factor }, () => name).join(' + ');
  let [numerator, denominator] = [factor, 1];
  while (numerator % 1 !== 0) [numerator, denominator] = [2 * numerator, 2 * denominator];
  return `${numerator === 1 ? '' : `${numerator} * `}${name}${denominator === 1 ? '' : ` / ${denominator}`}`;
}

/** The coefficients of a product of two polynomials given by names. */
function product(left, right, name, list) {
  return Array.from({ length: left.length + right.length - 1 }, (_, k) => {
    const terms = left.flatMap((a, i) => (right[k - i] === undefined ? [] : [`${a} * ${right[k - i]}`]));
    list.push(`let ${name}${k} = ${terms.join(' + ')}`);
    return `${name}${k}`;
  });
}

/**
 * Operations from the coefficients `p`, `tolerance` and `reach` to `bounds`: what may be left out of ∮ f(X) det(X, X_u, X_v) for a second moment at most
 * (relative to the patch's own magnitude at its middle, or to that of its area `reach` away), the norm that a first moment's bound is smaller by, then the
 * bounds for each number of nodes from the fewest on, and the square of how much the normal varies at most.
 */
export function boundsOf(shape) {
  const { order, across, coefficients, directions, fewest, exact, degree, places, weighted } = RULES[shape];
  const list = [];
  for (const { place, i, j } of coefficients) {
    const [x, y, z] = AXES.map((_, k) => `p[${3 * place + k}]`);
    list.push(`let e${i}${j} = ${term(0.5 ** (i + j), `sqrt(${x} * ${x} + ${y} * ${y} + ${z} * ${z})`)}`);
  }
  /** The coefficients of either direction, the larger of the two. */
  const larger = (letter, count, what) => Array.from({ length: count }, (_, k) => {
    directions.forEach((direction, d) => {
      const terms = coefficients.flatMap((c) => direction[what](c).filter(([power]) => power === k).map(([, factor]) => term(factor, `e${c.i}${c.j}`)));
      list.push(`let ${letter}${k}${'uv'[d]} = ${terms.join(' + ')}`);
    });
    list.push(`let ${letter}${k} = larger(${letter}${k}u, ${letter}${k}v)`);
    return `${letter}${k}`;
  });
  const own = larger('own', order, 'own');
  const side = larger('side', across, 'side');
  const along = own.slice(1).map((name, k) => {
    list.push(`let along${k} = ${term(k + 1, name)}`);
    return `along${k}`;
  });
  let normal = product(along, side, 'normal', list);
  if (weighted) {
    // The weight ½ − u of the triangle's nodes is (1 + t)/2 at most along u and 1 along v.
    normal = Array.from({ length: normal.length + 1 }, (_, k) => {
      list.push(`let weighted${k} = ${[normal[k], k > 0 ? `${normal[k - 1]} / 2` : undefined].filter((name) => name !== undefined).join(' + ')}`);
      return `weighted${k}`;
    });
  }
  const cube = product(product(own, own, 'square', list), own, 'cube', list);
  for (let d = 2 * fewest; d <= degree; d += 2) {
    list.push(`let left${d} = ${cube.flatMap((name, k) => (normal[d - k] === undefined ? [] : [`${name} * ${normal[d - k]}`])).join(' + ')}`);
  }
  // The magnitude that rounding is relative to, in the middle of the patch.
  const at = (place) => AXES.map((_, k) => `p[${3 * place + k}]`);
  const [u, v, x] = [at(places.u), at(places.v), at(0)];
  AXES.forEach((axis, k) => list.push(`let n${axis} = ${u[(k + 1) % 3]} * ${v[(k + 2) % 3]} - ${u[(k + 2) % 3]} * ${v[(k + 1) % 3]}`));
  list.push(`let magnitude = ${AXES.map((axis, k) => `abs(${x[k]} * n${axis})`).join(' + ')} + reach * sqrt(nx * nx + ny * ny + nz * nz)`);
  list.push(`let size = ${own.join(' + ')}`, 'let far = larger(reach, size)');
  list.push('bounds[0] := tolerance * magnitude * far * far', 'bounds[1] := own0');
  for (let n = fewest; n < exact; n++) {
    const parts = [];
    // Twice for the two directions, 4 for derivatives along u and v instead of 2u and 2v.
    for (let d = 2 * n; d <= degree; d += 2) parts.push(`${(2 * 4 * 2 ** d * Number(leftOut(n, d))).toPrecision(6)} * left${d}`);
    list.push(`bounds[${2 + n - fewest}] := ${parts.join(' + ')}`);
  }
  // X_u × X_v less that in the middle is at most what the other coefficients add to either derivative; as the square of its part of that.
  for (const [name, power] of [['u', ({ i }) => i], ['v', ({ j }) => j]]) {
    list.push(`let rest${name} = ${coefficients.filter((c) => c.i + c.j > 1 && power(c) > 0).map((c) => term(power(c), `e${c.i}${c.j}`)).join(' + ')}`);
  }
  list.push('let turned = 4 * (e10 * restv + e01 * restu + restu * restv)', `bounds[${VARIATION_AT}] := turned * turned / (nx * nx + ny * ny + nz * nz)`);
  return pruned(list);
}

/** Where among the bounds that of the normal's variation stands, and up to which it does instead of looking at the corners. */
export const VARIATION_AT = 7;
export const CALM_VARIATION = 0.03;

/** Nodes that a shape's bounds are for. */
export const nodesOf = (shape) => ({ fewest: RULES[shape].fewest, exact: RULES[shape].exact });
