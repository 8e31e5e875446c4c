import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Cage } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import type { MeasureOptions, Six, SolidMoments, Three } from '@/lib/engine/measured';
import { cageSize, CATMULL_CLARK, facesOf, momentError, moved, totalMoments, type TotalMoments } from '../support/engine-cages';
import { randomCage, randomTriangles, refinedOnce, reversed, type RandomCage } from '../support/random-cages';

const RUNS = { numRuns: 6 };
const LOOP: MeasureOptions = { ...CATMULL_CLARK, scheme: 'loop' };
const DOO_SABIN: MeasureOptions = { ...CATMULL_CLARK, scheme: 'doo-sabin' };

/** Products of the axes as a matrix under R: R S Rᵀ. */
function turned([xx, yy, zz, xy, xz, yz]: Six, r: readonly (readonly number[])[]): number[] {
  const m = [[xx, xy, xz], [xy, yy, yz], [xz, yz, zz]];
  const at = (i: number, j: number): number => m.reduce((sum, row, a) => sum + row.reduce((inner, value, b) => inner + r[i][a] * value * r[j][b], 0), 0);
  return [at(0, 0), at(1, 1), at(2, 2), at(0, 1), at(0, 2), at(1, 2)];
}

function withFaces(cage: Cage, faces: readonly (readonly number[])[]): Cage {
  const starts = [0];
  for (const face of faces) starts.push(starts[starts.length - 1] + face.length);
  return { ...cage, faceStarts: Uint32Array.from(starts), faceVertices: Uint32Array.from(faces.flat()) };
}

describe.each<[string, MeasureOptions, fc.Arbitrary<RandomCage>]>([
  ['Loop', LOOP, randomTriangles],
  ['Loop, Chaikin creasing', { ...LOOP, creasing: 'chaikin' }, randomTriangles],
  ['Doo-Sabin', DOO_SABIN, randomCage],
])('%s: the limit solid of a random cage with random creases', (_, options, anyCage) => {
  const total = (cage: Cage): TotalMoments => totalMoments(measureCage(cage, options).parts);
  const only = (cage: Cage): SolidMoments => {
    const { parts, findings } = measureCage(cage, options);
    if (parts[0].components.length !== 1) throw new Error(findings.map((finding) => finding.message).join(' '));
    return parts[0].components[0].solid;
  };

  it('does not change when the cage is refined once', () => {
    fc.assert(fc.property(anyCage, ({ cage }) => {
      expect(momentError(total(refinedOnce(cage, options)), total(cage), cageSize(cage))).toBeLessThan(1e-13);
    }), RUNS);
  });

  it('follows rigid motion and scaling: V s³, second moments s⁵ and R S Rᵀ', () => {
    const r = [[0.36, 0.48, -0.8], [-0.8, 0.6, 0], [0.48, 0.64, 0.6]];
    const shift = [11, -7, 5];
    const scale = 3;
    const place = (p: readonly number[]): Three => r.map((row, i) => scale * (row[0] * p[0] + row[1] * p[1] + row[2] * p[2]) + shift[i]) as unknown as Three;
    fc.assert(fc.property(anyCage, ({ cage }) => {
      const before = only(cage);
      const after = only(moved(cage, (x, y, z) => place([x, y, z])));
      expect(Math.abs(after.volume / before.volume / scale ** 3 - 1)).toBeLessThan(1e-13);
      place(before.centroid).forEach((value, i) => expect(Math.abs(after.centroid[i] - value)).toBeLessThan(1e-13 * 20));
      const size = Math.max(...after.centralSecond);
      turned(before.centralSecond, r).forEach((value, i) => expect(Math.abs(after.centralSecond[i] - value * scale ** 5)).toBeLessThan(1e-13 * size));
    }), RUNS);
  });

  it('mirrors: products with x change sign, the rest stays; reversal negates all', () => {
    fc.assert(fc.property(anyCage, ({ cage }) => {
      const before = only(cage);
      const size = Math.max(...before.centralSecond);
      const mirrored = only(reversed(moved(cage, (x, y, z) => [-x, y, z])));
      expect(Math.abs(mirrored.volume / before.volume - 1)).toBeLessThan(1e-13);
      [1, 1, 1, -1, -1, 1].forEach((sign, i) => expect(Math.abs(mirrored.centralSecond[i] - sign * before.centralSecond[i])).toBeLessThan(1e-13 * size));
      const inward = only(reversed(cage));
      expect(Math.abs(inward.volume / before.volume + 1)).toBeLessThan(1e-13);
      inward.centralSecond.forEach((value, i) => expect(Math.abs(value + before.centralSecond[i])).toBeLessThan(1e-13 * size));
    }), RUNS);
  });

  it('does not depend on the order of faces and vertices', () => {
    fc.assert(fc.property(anyCage, fc.integer({ min: 1, max: 1000 }), ({ cage }, seed) => {
      const count = cage.positions.length / 3;
      const order = Array.from({ length: count }, (__, v) => v).sort((a, b) => ((a * seed) % 101) - ((b * seed) % 101) || a - b);
      const place = new Map(order.map((old, now) => [old, now]));
      const at = (v: number): number => place.get(v) ?? 0;
      const shuffled: Cage = {
        ...withFaces(cage, facesOf(cage).reverse().map((face) => [...face.slice(1), face[0]].map(at))),
        positions: Float64Array.from(order.flatMap((v) => Array.from(cage.positions.subarray(3 * v, 3 * v + 3)))),
        creaseVertices: cage.creaseVertices.map(at),
        cornerVertices: cage.cornerVertices.map(at),
      };
      expect(momentError(total(shuffled), total(cage), cageSize(cage))).toBeLessThan(1e-13);
    }), RUNS);
  });

  it('two cages side by side add', () => {
    fc.assert(fc.property(anyCage, anyCage, ({ cage: a }, { cage: b }) => {
      const count = a.positions.length / 3;
      const both: Cage = {
        ...withFaces(a, [...facesOf(a), ...facesOf(b).map((face) => face.map((v) => v + count))]),
        positions: Float64Array.from([...a.positions, ...b.positions.map((value, i) => value + (i % 3 === 0 ? 20 : 0))]),
        creaseVertices: Uint32Array.from([...a.creaseVertices, ...b.creaseVertices.map((v) => v + count)]),
        creaseSharpness: Float32Array.from([...a.creaseSharpness, ...b.creaseSharpness]),
        cornerVertices: Uint32Array.from([...a.cornerVertices, ...b.cornerVertices.map((v) => v + count)]),
        cornerSharpness: Float32Array.from([...a.cornerSharpness, ...b.cornerSharpness]),
      };
      const [one, two] = measureCage(both, options).parts[0].components;
      expect(Math.abs(one.solid.volume / only(a).volume - 1)).toBeLessThan(1e-13);
      expect(Math.abs(two.solid.volume / only(b).volume - 1)).toBeLessThan(1e-13);
      expect(Math.abs(two.solid.centroid[0] - 20 - only(b).centroid[0])).toBeLessThan(1e-13 * 20);
    }), RUNS);
  });

  it('parts sum to the whole', () => {
    fc.assert(fc.property(anyCage, fc.integer({ min: 2, max: 5 }), fc.nat(1000), ({ cage }, parts, seed) => {
      const names = Array.from({ length: parts }, (__, i) => `part ${i}`);
      const labels = Int32Array.from({ length: cage.faceStarts.length - 1 }, (__, f) => Math.floor((f * (seed + 1)) / 7) % parts);
      const measured = measureCage({ ...cage, groups: { names, labels } }, { ...options, partsBy: 'group' });
      for (const part of measured.parts) expect([part.openEdges, part.components.length > 0]).toEqual([0, true]);
      expect(momentError(totalMoments(measured.parts), total(cage), cageSize(cage))).toBeLessThan(1e-13);
    }), RUNS);
  });
});
