import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { equalEllipsoid } from '@/lib/rules/equal-ellipsoid';

describe('equalEllipsoid', () => {
  it('brings back the semi-axes of a solid ellipsoid, whose moments are m(b² + c²)/5 by the handbooks', () => {
    const length = fc.double({ min: 0.01, max: 100, noNaN: true });
    fc.assert(
      fc.property(length, length, length, fc.double({ min: 1e-3, max: 1e6, noNaN: true }), (a, b, c, mass) => {
        const moments = [b * b + c * c, c * c + a * a, a * a + b * b].map((sum) => (mass * sum) / 5);
        const found = equalEllipsoid(mass, [moments[0], moments[1], moments[2]]);
        const largest = Math.max(a, b, c);
        [a, b, c].forEach((axis, i) => expect(Math.abs(found[i] ** 2 - axis ** 2)).toBeLessThan(1e-12 * largest ** 2));
      }),
    );
  });

  it('of a flat sheet is flat, not imaginary', () => {
    expect(equalEllipsoid(1, [1, 1, 2.0000000001])[2]).toBe(0);
  });
});
