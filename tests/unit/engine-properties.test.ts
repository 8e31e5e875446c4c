import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Cage } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import type { MeasuredComponent, Six, Three } from '@/lib/engine/measured';
import { buildTopology, validateTopology } from '@/lib/engine/mesh/topology';
import { cageSize, CATMULL_CLARK, facesOf, momentError, moved, totalMoments, type TotalMoments } from '../support/engine-cages';
import { randomCage, refinedLabels, refinedOnce, reversed } from '../support/random-cages';

const RUNS = { numRuns: 6 };

function only(cage: Cage): MeasuredComponent {
  return measureCage(cage, CATMULL_CLARK).parts[0].components[0];
}

function total(cage: Cage): TotalMoments {
  return totalMoments(measureCage(cage, CATMULL_CLARK).parts);
}

/** Second moments about the centroid as a matrix, turned by R. */
function turned(second: Six, r: number[][]): number[] {
  const [xx, yy, zz, xy, xz, yz] = second;
  const m = [[xx, xy, xz], [xy, yy, yz], [xz, yz, zz]];
  const at = (i: number, j: number): number => [0, 1, 2].reduce((sum, a) => sum + [0, 1, 2].reduce((inner, b) => inner + r[i][a] * m[a][b] * r[j][b], 0), 0);
  return [at(0, 0), at(1, 1), at(2, 2), at(0, 1), at(0, 2), at(1, 2)];
}

describe('the limit solid of a random cage', () => {
  it('does not change when the cage is refined once', () => {
    fc.assert(fc.property(randomCage, ({ cage }) => {
      expect(momentError(total(refinedOnce(cage, CATMULL_CLARK)), total(cage), cageSize(cage))).toBeLessThan(1e-13);
      const [a, b] = [only(cage), only(refinedOnce(cage, CATMULL_CLARK))];
      expect(Math.abs(b.surface.area / a.surface.area - 1)).toBeLessThanOrEqual(a.surfaceErrorEstimate + b.surfaceErrorEstimate);
    }), RUNS);
  });

  it('does not change under Chaikin creasing either, whose sharpness spreads from edge to edge', () => {
    const chaikin = { ...CATMULL_CLARK, creasing: 'chaikin' as const };
    fc.assert(fc.property(randomCage, ({ cage }) => {
      const [coarse, fine] = [measureCage(cage, chaikin), measureCage(refinedOnce(cage, chaikin), chaikin)];
      expect(momentError(totalMoments(fine.parts), totalMoments(coarse.parts), cageSize(cage))).toBeLessThan(1e-13);
    }), RUNS);
  });

  it('follows rigid motion and scaling: V s³, second moments s⁵ and R S Rᵀ', () => {
    const [c, s] = [Math.cos(1.1), Math.sin(1.1)];
    const r = [[c, -s, 0], [s * 0.6, c * 0.6, -0.8], [s * 0.8, c * 0.8, 0.6]];
    fc.assert(fc.property(randomCage, ({ cage }) => {
      const before = only(cage);
      const scale = 3;
      const shift = [11, -7, 5];
      const after = only(moved(cage, (x, y, z) => r.map((row, i) => scale * (row[0] * x + row[1] * y + row[2] * z) + shift[i]) as unknown as Three));
      expect(Math.abs(after.solid.volume / before.solid.volume / scale ** 3 - 1)).toBeLessThan(1e-13);
      r.forEach((row, i) => expect(after.solid.centroid[i]).toBeCloseTo(scale * row.reduce((sum, x, k) => sum + x * before.solid.centroid[k], 0) + shift[i], 12));
      const size = Math.max(...after.solid.centralSecond);
      turned(before.solid.centralSecond, r).forEach((value, i) => expect(Math.abs(after.solid.centralSecond[i] - value * scale ** 5) / size).toBeLessThan(1e-13));
    }), RUNS);
  });

  it('keeps its digits far from the origin', () => {
    fc.assert(fc.property(randomCage, ({ cage }) => {
      // Moved by a power of two and back on the same grid, so that the far coordinates are the near ones exactly.
      const far = 2 ** 20;
      const grid = moved(cage, (x, y, z) => [x + far - far, y + far - far, z + far - far]);
      const [near, away] = [only(grid), only(moved(grid, (x, y, z) => [x + far, y + far, z + far]))];
      expect(Math.abs(away.solid.volume / near.solid.volume - 1)).toBeLessThan(1e-13);
      near.solid.centralSecond.forEach((value, i) => expect(Math.abs(away.solid.centralSecond[i] - value)).toBeLessThan(1e-12 * Math.max(...near.solid.centralSecond)));
    }), RUNS);
  });

  it('mirrors: products with x change sign, the rest stays; reversal negates all', () => {
    fc.assert(fc.property(randomCage, ({ cage }) => {
      const before = only(cage).solid;
      const mirrored = only(reversed(moved(cage, (x, y, z) => [-x, y, z]))).solid;
      expect(mirrored.volume).toBeCloseTo(before.volume, 12);
      [1, 1, 1, -1, -1, 1].forEach((sign, i) => expect(mirrored.centralSecond[i]).toBeCloseTo(sign * before.centralSecond[i], 12));
      const inward = only(reversed(cage)).solid;
      expect(inward.volume).toBeCloseTo(-before.volume, 12);
      inward.centralSecond.forEach((value, i) => expect(value).toBeCloseTo(-before.centralSecond[i], 12));
      expect(measureCage(reversed(cage), CATMULL_CLARK).findings.map((finding) => finding.code)).toContain('inside_out');
    }), RUNS);
  });

  it('does not depend on the order of faces and vertices', () => {
    fc.assert(fc.property(randomCage, fc.integer({ min: 1, max: 1000 }), ({ cage }, seed) => {
      const count = cage.positions.length / 3;
      const order = Array.from({ length: count }, (_, v) => v).sort((a, b) => ((a * seed) % 101) - ((b * seed) % 101) || a - b);
      const place = new Map(order.map((old, now) => [old, now]));
      const at = (v: number): number => place.get(v) ?? 0;
      const shuffled: Cage = {
        ...cage,
        positions: Float64Array.from(order.flatMap((v) => Array.from(cage.positions.subarray(3 * v, 3 * v + 3)))),
        ...flatFaces(facesOf(cage).reverse().map((face) => [...face.slice(1), face[0]].map(at))),
        creaseVertices: cage.creaseVertices.map(at),
        cornerVertices: cage.cornerVertices.map(at),
      };
      expect(momentError(total(shuffled), total(cage), cageSize(cage))).toBeLessThan(1e-13);
    }), RUNS);
  });

  it('parts sum to the whole, and each part survives refinement of the whole', () => {
    fc.assert(fc.property(randomCage, fc.integer({ min: 2, max: 5 }), fc.nat(1000), ({ cage }, parts, seed) => {
      const names = Array.from({ length: parts }, (_, i) => `part ${i}`);
      const labels = Int32Array.from({ length: cage.faceStarts.length - 1 }, (_, f) => Math.floor((f * (seed + 1)) / 7) % parts);
      const split: Cage = { ...cage, groups: { names, labels } };
      const measured = measureCage(split, { ...CATMULL_CLARK, partsBy: 'group' });
      expect(momentError(totalMoments(measured.parts), total(cage), cageSize(cage))).toBeLessThan(1e-13);
      for (const part of measured.parts) expect(part.openEdges).toBe(0);
    }), RUNS);
  });

  it('two cages side by side add', () => {
    fc.assert(fc.property(randomCage, randomCage, ({ cage: a }, { cage: b }) => {
      const count = a.positions.length / 3;
      const both: Cage = {
        ...a,
        positions: Float64Array.from([...a.positions, ...b.positions.map((value, i) => value + (i % 3 === 0 ? 20 : 0))]),
        ...flatFaces([...facesOf(a), ...facesOf(b).map((face) => face.map((v) => v + count))]),
        creaseVertices: Uint32Array.from([...a.creaseVertices, ...b.creaseVertices.map((v) => v + count)]),
        creaseSharpness: Float32Array.from([...a.creaseSharpness, ...b.creaseSharpness]),
        cornerVertices: Uint32Array.from([...a.cornerVertices, ...b.cornerVertices.map((v) => v + count)]),
        cornerSharpness: Float32Array.from([...a.cornerSharpness, ...b.cornerSharpness]),
      };
      const [one, two] = measureCage(both, CATMULL_CLARK).parts[0].components;
      expect(one.solid.volume).toBeCloseTo(only(a).solid.volume, 12);
      expect(two.solid.volume).toBeCloseTo(only(b).solid.volume, 12);
      expect(two.solid.centroid[0] - 20).toBeCloseTo(only(b).solid.centroid[0], 12);
    }), RUNS);
  });

  it('builds half-edge tables that agree with themselves', () => {
    fc.assert(fc.property(randomCage, ({ cage }) => validateTopology(buildTopology(cage).mesh)), RUNS);
  });
});

describe('borders through refinement', () => {
  it('a part of two colours keeps its capped moments when the whole is refined', () => {
    fc.assert(fc.property(randomCage, fc.integer({ min: 1, max: 4 }), ({ cage }, first) => {
      const names = ['a', 'b'];
      const labels = Int32Array.from({ length: cage.faceStarts.length - 1 }, (_, f) => (f < first ? 0 : 1));
      const fine = { ...refinedOnce(cage, CATMULL_CLARK), groups: { names, labels: refinedLabels(cage, labels) } };
      const options = { ...CATMULL_CLARK, partsBy: 'group' as const };
      const [coarse, refined] = [measureCage({ ...cage, groups: { names, labels } }, options), measureCage(fine, options)];
      const size = cageSize(cage);
      coarse.parts.forEach((part, i) => {
        const [a, b] = [totalMoments([part]), totalMoments([refined.parts[i]])];
        expect(Math.abs(a.volume - b.volume) / size ** 3).toBeLessThan(1e-13);
        a.first.forEach((value, k) => expect(Math.abs(value - b.first[k]) / size ** 4).toBeLessThan(1e-13));
        a.second.forEach((value, k) => expect(Math.abs(value - b.second[k]) / size ** 5).toBeLessThan(1e-13));
      });
    }), RUNS);
  });
});

function flatFaces(faces: number[][]): Pick<Cage, 'faceStarts' | 'faceVertices'> {
  const starts = [0];
  for (const face of faces) starts.push(starts[starts.length - 1] + face.length);
  return { faceStarts: Uint32Array.from(starts), faceVertices: Uint32Array.from(faces.flat()) };
}
