import fc from 'fast-check';
import { EigenvalueDecomposition, Matrix } from 'ml-matrix';
import { describe, expect, it } from 'vitest';
import { principalAxes } from '@/lib/engine/inertia/principal-axes';
import { symmetricEigen } from '@/lib/engine/inertia/symmetric-eigen';
import type { Six } from '@/lib/engine/measured';

/** The outside solver: EigenvalueDecomposition of the package ml-matrix (Householder tridiagonalisation and QL, after JAMA and EISPACK). */
function outside([xx, yy, zz, xy, xz, yz]: Six): { values: number[]; vectors: number[][] } {
  const solved = new EigenvalueDecomposition(new Matrix([[xx, xy, xz], [xy, yy, yz], [xz, yz, zz]]), { assumeSymmetric: true });
  const order = [0, 1, 2].sort((i, j) => solved.realEigenvalues[i] - solved.realEigenvalues[j]);
  return { values: order.map((i) => solved.realEigenvalues[i]), vectors: order.map((i) => solved.eigenvectorMatrix.getColumn(i)) };
}

const dot = (a: readonly number[], b: readonly number[]): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];

/** Sine of the angle between two directions. */
function sine(a: readonly number[], b: readonly number[]): number {
  return Math.hypot(a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]) / Math.hypot(...a) / Math.hypot(...b);
}

/** R diag(values) Rᵀ for the rotation of a unit quaternion. */
function turnedMatrix(values: readonly number[], q: readonly number[]): Six {
  const size = Math.hypot(...q);
  const [w, x, y, z] = q.map((value) => value / size);
  const r = [
    [1 - 2 * (y * y + z * z), 2 * (x * y - w * z), 2 * (x * z + w * y)],
    [2 * (x * y + w * z), 1 - 2 * (x * x + z * z), 2 * (y * z - w * x)],
    [2 * (x * z - w * y), 2 * (y * z + w * x), 1 - 2 * (x * x + y * y)],
  ];
  const entry = (i: number, j: number): number => values.reduce((sum, value, k) => sum + value * r[i][k] * r[j][k], 0);
  return [entry(0, 0), entry(1, 1), entry(2, 2), entry(0, 1), entry(0, 2), entry(1, 2)];
}

const anyTurn = fc.tuple(...[0, 1, 2, 3].map(() => fc.double({ min: -1, max: 1, noNaN: true }))).filter((q) => Math.hypot(...q) > 0.1);
/** Gaps from wide to none, across many sizes. */
const anyMoments = fc
  .record({ size: fc.constantFrom(1e-12, 1e-3, 1, 1e6), low: fc.double({ min: 0.1, max: 1, noNaN: true }), gaps: fc.tuple(...[0, 1].map(() => fc.constantFrom(0, 1e-15, 1e-12, 1e-8, 1e-5, 1e-2, 0.5))) })
  .map(({ size, low, gaps }) => [low * size, (low + gaps[0]) * size, (low + gaps[0] + gaps[1]) * size]);

describe('symmetric eigenvalues against ml-matrix', () => {
  it('values agree to rounding, also where they are nearly or quite equal', () => {
    fc.assert(fc.property(anyMoments, anyTurn, (moments, q) => {
      const matrix = turnedMatrix(moments, q);
      const theirs = outside(matrix).values;
      symmetricEigen(matrix).values.forEach((value, i) => expect(Math.abs(value - theirs[i])).toBeLessThan(1e-14 * moments[2]));
    }), { numRuns: 300 });
  });

  it('vectors agree as far as the gap of their values lets them be known', () => {
    fc.assert(fc.property(anyMoments, anyTurn, (moments, q) => {
      const matrix = turnedMatrix(moments, q);
      const { values, vectors } = symmetricEigen(matrix);
      const theirs = outside(matrix);
      for (let i = 0; i < 3; i++) {
        const gap = Math.min(...[0, 1, 2].filter((j) => j !== i).map((j) => Math.abs(values[j] - values[i]))) / values[2];
        if (gap < 1e-13) continue;
        // The sine of the angle is at most the perturbation over the gap (C. Davis, W. Kahan, SIAM J. Numer. Anal. 7, 1970; from memory). Measured as the length of the
        // vectors' product: 1 − cosine holds half the digits, so that three roundings of it would count as 4e-8.
        expect(sine(vectors[i], theirs.vectors[i])).toBeLessThan(2e-14 / gap);
      }
    }), { numRuns: 300 });
  });

  it('vectors agree to the last digits where gaps are wide', () => {
    const wide = fc.tuple(...[0, 1, 2].map(() => fc.double({ min: 0.1, max: 1, noNaN: true }))).map(([low, first, second]) => [low, low + first, low + first + second]);
    fc.assert(fc.property(wide, anyTurn, (moments, q) => {
      const matrix = turnedMatrix(moments, q);
      const [ours, theirs] = [symmetricEigen(matrix), outside(matrix)];
      for (let i = 0; i < 3; i++) expect(sine(ours.vectors[i], theirs.vectors[i])).toBeLessThan((2e-14 * moments[2]) / Math.min(moments[1] - moments[0], moments[2] - moments[1]));
    }), { numRuns: 300 });
  });

  it('the principal frame turns the matrix into theirs', () => {
    fc.assert(fc.property(anyMoments, anyTurn, (moments, q) => {
      const matrix = turnedMatrix(moments, q);
      const frame = principalAxes(matrix);
      outside(matrix).values.forEach((value, i) => expect(Math.abs(frame.principal[i] - value)).toBeLessThan(1e-14 * moments[2]));
      if (frame.freeAxes !== '') return;
      const [xx, yy, zz, xy, xz, yz] = matrix;
      frame.axes.forEach((axis, i) => {
        const image = [[xx, xy, xz], [xy, yy, yz], [xz, yz, zz]].map((row) => dot(row, axis));
        image.forEach((value, k) => expect(Math.abs(value - frame.principal[i] * axis[k])).toBeLessThan(2e-15 * 10 * moments[2]));
      });
    }), { numRuns: 300 });
  });
});
