import { expect, it } from 'vitest';
import type { Scheme } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import { cageOf, CATMULL_CLARK } from '../support/engine-cages';

/**
 * A 4 × 4 torus cage: point (i, j) = ((R + r c_j) c_i, (R + r c_j) s_i, r s_j) with c = 1, 0, −1, 0 and s = 0, 1, 0, −1. All faces and vertices are regular,
 * so the limit is a tensor product of periodic B-splines: x = ρ(v) C(u), y = ρ(v) S(u), z = r S(v), ρ = R + r C(v), and its moments fall into
 * integrals over one curve (Pappus): with A = ∮ C dS and A₂ = ∮ C³/3 dS, V = A ∮ ρ² dz, ∫x² = ∫y² = A₂ ∮ ρ⁴ dz, ∫z² = A ∮ ρ² z² dz.
 * The values below are these integrals of polynomials, worked in rational numbers outside this project: A = 61/45, A₂ = 27371/187110 for
 * the cubic spline, A = 5/3, A₂ = 31/140 for the quadratic one; V = 2 A² R r².
 */
const TORI: [Scheme, { volume: number; across: number; along: number }][] = [
  ['catmull-clark', { volume: 7442 / 675, across: 4315229747 / 194500845, along: 1669631 / 1403325 }],
  ['doo-sabin', { volume: 50 / 3, across: 203949 / 4900, along: 31 / 14 }],
];

it.each(TORI)('%s: the torus of B-splines with R = 3, r = 1', (scheme, wanted) => {
  const c = [1, 0, -1, 0];
  const s = [0, 1, 0, -1];
  const points = c.flatMap((_, i) => c.map((__, j) => [(3 + c[j]) * c[i], (3 + c[j]) * s[i], s[j]]));
  const at = (i: number, j: number): number => 4 * (i % 4) + (j % 4);
  const faces = c.flatMap((_, i) => c.map((__, j) => [at(i, j), at(i + 1, j), at(i + 1, j + 1), at(i, j + 1)]));
  const { solid } = measureCage(cageOf(points, faces), { ...CATMULL_CLARK, scheme }).parts[0].components[0];
  expect(Math.abs(solid.volume / wanted.volume - 1)).toBeLessThan(4e-15);
  for (const value of solid.centroid) expect(Math.abs(value)).toBeLessThan(1e-15);
  [wanted.across, wanted.across, wanted.along, 0, 0, 0].forEach((value, i) => expect(Math.abs(solid.centralSecond[i] - value)).toBeLessThan(4e-15 * wanted.across));
});
