import type { PatchKind } from '../kernel/patch-kinds';

/** How fast the series of a patch's integrands fall, and how much it may bend at most by its coefficients. */
export interface SeriesRate {
  /** Ratio from one power of t to the next at most, t in −1 … 1 along the lines that rules go by; Infinity where the patch has no normal in its middle. */
  rate: number;
  /** `rate` over the patch's smaller half width, 1/length: what its curvatures are at most, but for a factor. */
  bend: number;
}

/** Powers of t that X_u × X_v may have along a line and that count; its products' higher ones follow from them. */
const DEGREES = 3;

function binomial(n: number, k: number): number {
  let value = 1;
  for (let i = 1; i <= k; i++) value = (value * (n - k + i)) / i;
  return value;
}

/** Numbers by place: what |e_ij| adds to the powers 1, 2, 3 of X_u (own, 0) and X_v (side, 1) along a line of u, and then of X_v (own) and X_u (side) along one of v. */
const ROW = 4 * DEGREES;

/** Adds what factor · t^power · ((1 + t)/2)^rest holds; that is what the other parameter is at most along a triangle's first lines. */
function spread(weights: Float64Array, at: number, power: number, rest: number, factor: number): void {
  for (let k = 0; k <= rest; k++) {
    const degree = power + k;
    if (degree >= 1 && degree <= DEGREES) weights[at + degree - 1] += (factor * binomial(rest, k)) / 2 ** rest;
  }
}

/** Rows of weights for coefficients with these exponents; those of X, X_u and X_v in the middle have none. */
function weightsOf(exponents: readonly (readonly [number, number])[], triangle: boolean): Float64Array {
  const weights = new Float64Array(ROW * exponents.length);
  exponents.forEach(([i, j], place) => {
    if (i + j < 2) return;
    // Over half widths, so that lines run over −1 … 1.
    const scale = 0.5 ** (i + j), at = ROW * place;
    if (i > 0) spread(weights, at, i - 1, triangle ? j : 0, i * scale);
    if (j > 0) spread(weights, at + DEGREES, i, triangle ? j - 1 : 0, j * scale);
    if (j > 0) spread(weights, at + 2 * DEGREES, j - 1, 0, j * scale);
    if (i > 0) spread(weights, at + 3 * DEGREES, j, 0, i * scale);
  });
  return weights;
}

const square = (order: number): [number, number][] => Array.from({ length: order * order }, (_, place) => [Math.floor(place / order), place % order]);

const WEIGHTS: Readonly<Record<PatchKind, Float64Array>> = {
  bicubic: weightsOf(square(4), false),
  biquadratic: weightsOf(square(3), false),
  triangle: weightsOf([0, 1, 2, 3, 4].flatMap((degree) => Array.from({ length: degree + 1 }, (_, j): [number, number] => [degree - j, j])), true),
};

/** Places of X_u and X_v in the middle. */
const FIRST: Readonly<Record<PatchKind, readonly [u: number, v: number]>> = { bicubic: [4, 1], biquadratic: [3, 1], triangle: [1, 2] };

/**
 * The rate of a patch with the power coefficients `powers` [stride · (3 place + axis)] from `at` on, as the kernels have them: about its middle, a triangle's about
 * the middle of each line. Along a line X_u × X_v is its value in the middle and terms in t of at most q_k t^k, relatively; its inverse powers and roots are series that
 * converge as far as Σ q_k t^k < 1. So a quartic that is all but flat may fall by no more than the third root of how much its normal turns.
 */
export function seriesRate(kind: PatchKind, powers: Float64Array, at: number, stride: number, out: SeriesRate): void {
  const weights = WEIGHTS[kind];
  let a1 = 0, a2 = 0, a3 = 0, b1 = 0, b2 = 0, b3 = 0, c1 = 0, c2 = 0, c3 = 0, d1 = 0, d2 = 0, d3 = 0;
  for (let row = 0, from = at; row < weights.length; row += ROW, from += 3 * stride) {
    const size = lengthAt(powers, from, stride);
    a1 += weights[row] * size;
    a2 += weights[row + 1] * size;
    a3 += weights[row + 2] * size;
    b1 += weights[row + 3] * size;
    b2 += weights[row + 4] * size;
    b3 += weights[row + 5] * size;
    c1 += weights[row + 6] * size;
    c2 += weights[row + 7] * size;
    c3 += weights[row + 8] * size;
    d1 += weights[row + 9] * size;
    d2 += weights[row + 10] * size;
    d3 += weights[row + 11] * size;
  }
  const [placeU, placeV] = FIRST[kind];
  const a = at + 3 * stride * placeU, b = at + 3 * stride * placeV;
  const nx = powers[a + stride] * powers[b + 2 * stride] - powers[a + 2 * stride] * powers[b + stride];
  const ny = powers[a + 2 * stride] * powers[b] - powers[a] * powers[b + 2 * stride];
  const nz = powers[a] * powers[b + stride] - powers[a + stride] * powers[b];
  const area = Math.sqrt(nx * nx + ny * ny + nz * nz) / 4;
  if (!(area > 0)) {
    out.rate = out.bend = Infinity;
    return;
  }
  const u = lengthAt(powers, a, stride) / (2 * area), v = lengthAt(powers, b, stride) / (2 * area);
  out.rate = Math.max(largestRoot(v * a1 + u * b1, v * a2 + u * b2, v * a3 + u * b3), largestRoot(u * c1 + v * d1, u * c2 + v * d2, u * c3 + v * d3));
  out.bend = out.rate * Math.max(u, v);
}

function lengthAt(powers: Float64Array, at: number, stride: number): number {
  const x = powers[at], y = powers[at + stride], z = powers[at + 2 * stride];
  return Math.sqrt(x * x + y * y + z * z);
}

/** The root r of r³ = q₁ r² + q₂ r + q₃ or a little more. */
function largestRoot(q1: number, q2: number, q3: number): number {
  // Above the root, where Newton's steps come down to it: Σ q_k r^−k is 1 there at most.
  let r = q1 + Math.sqrt(q2) + Math.cbrt(q3);
  if (!(r > 0)) return r;
  for (let step = 0; step < 2; step++) {
    const slope = (3 * r - 2 * q1) * r - q2;
    r -= (((r - q1) * r - q2) * r - q3) / slope;
  }
  return r;
}
