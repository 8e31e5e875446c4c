import { triangleToPowers } from '../patches/box-spline';

const POINTS = 12;
const MONOMIALS = 15;

/** Place of s^i t^j among the monomials by degree, descending in s. */
function placeOf(i: number, j: number): number {
  return ((i + j) * (i + j + 1)) / 2 + j;
}

function binomial(n: number, k: number): number {
  let result = 1;
  for (let i = 0; i < k; i++) result = (result * (n - i)) / (i + 1);
  return result;
}

/**
 * Weights [12 monomial + point] of a box-spline triangle's points in its coefficients of u^i v^j, u = s − ½ and v = t − (1 − s)/2: about the middle of
 * each line s = const, where the nodes lie in pairs. Whole multiples of 1/(24 · 4^4), each rounded once.
 */
export const TRIANGLE_POWERS: Float64Array = (() => {
  const table = new Float64Array(MONOMIALS * POINTS);
  const net = new Float64Array(3 * POINTS);
  const powers = new Float64Array(3 * MONOMIALS);
  for (let point = 0; point < POINTS; point++) {
    net.fill(0);
    net[3 * point] = 1;
    triangleToPowers(net, powers);
    // s = ½ + u and t = ¼ − u/2 + v, so that each monomial spreads over those of its degree and below.
    for (let i = 0; i <= 4; i++) {
      for (let j = 0; i + j <= 4; j++) {
        const numerator = Math.round(24 * powers[3 * placeOf(i, j)]);
        for (let a = 0; a <= i; a++) {
          const ofS = binomial(i, a) * 0.5 ** (i - a);
          for (let b = 0; b <= j; b++) {
            for (let c = 0; b + c <= j; c++) {
              const ofT = binomial(j, b) * binomial(j - b, c) * 0.25 ** (j - b - c) * (-0.5) ** c;
              table[POINTS * placeOf(a + c, b) + point] += numerator * ofS * ofT;
            }
          }
        }
      }
    }
  }
  return table.map((numerator) => numerator / 24);
})();

/** Coefficients [3 monomial + axis] of a triangle by TRIANGLE_POWERS, as the vector kernel adds them up. */
export function triangleNetToPowers(net: Float64Array, powers: Float64Array): void {
  for (let monomial = 0; monomial < MONOMIALS; monomial++) {
    let x = 0, y = 0, z = 0;
    for (let point = 0; point < POINTS; point++) {
      const weight = TRIANGLE_POWERS[POINTS * monomial + point];
      x += weight * net[3 * point];
      y += weight * net[3 * point + 1];
      z += weight * net[3 * point + 2];
    }
    powers[3 * monomial] = x;
    powers[3 * monomial + 1] = y;
    powers[3 * monomial + 2] = z;
  }
}
