import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { BOUNDARIES, type Cage } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import type { MeasuredComponent, MeasuredPart, MeasureOptions } from '@/lib/engine/measured';
import { cageOf, cageSize, CATMULL_CLARK, facesOf, momentError, referenceCage, totalEstimate, totalMoments } from '../support/engine-cages';
import { randomCage, randomTriangles, refinedLabels, refinedOnce } from '../support/random-cages';

const DOO_SABIN: MeasureOptions = { ...CATMULL_CLARK, scheme: 'doo-sabin' };
const RUNS = { numRuns: 6 };

function grouped(cage: Cage, labels: Int32Array): Cage {
  return { ...cage, groups: { names: Array.from({ length: Math.max(...labels) + 1 }, (_, i) => `part ${i}`), labels } };
}

/** Labels for faces, drawn from a seed. */
function drawn(faces: number, parts: number, seed: number): Int32Array {
  let state = seed;
  return Int32Array.from({ length: faces }, () => {
    state = (state * 48271) % 2147483647;
    return state % parts;
  });
}

function pierced(cage: Cage, holes: readonly number[]): Cage {
  const faces = facesOf(cage);
  const points = Array.from({ length: cage.positions.length / 3 }, (_, v) => Array.from(cage.positions.subarray(3 * v, 3 * v + 3)));
  return cageOf(points, faces.filter((_, f) => !holes.some((hole) => hole % faces.length === f)));
}

const area = (component: MeasuredComponent): number => component.surface.area;
const areaError = (component: MeasuredComponent): number => component.surface.area * component.surfaceErrorEstimate;
const total = (parts: readonly MeasuredPart[], read: (component: MeasuredComponent) => number): number =>
  parts.flatMap((part) => part.components).reduce((sum, one) => sum + read(one), 0);

/** What splitting an open cage changes its area by, and what both measurements say they may be off by. */
function splitting(open: Cage, labels: Int32Array, options: MeasureOptions): { change: number; stated: number; area: number } {
  const whole = measureCage(open, options).parts;
  const split = measureCage(grouped(open, labels), { ...options, partsBy: 'group' }).parts;
  return { change: Math.abs(total(whole, area) - total(split, area)), stated: total(whole, areaError) + total(split, areaError), area: total(whole, area) };
}

describe('the stated error of areas', () => {
  it('holds where the normal nearly vanishes beside a hole: one and all parts of a torus with two faces left out', () => {
    const open = pierced(referenceCage('torus_reg_quad.obj'), [33, 0]);
    const faces = open.faceStarts.length - 1;
    for (const labels of [drawn(faces, 2, 1), Int32Array.from({ length: faces }, (_, f) => f)]) {
      const { change, stated, area: all } = splitting(open, labels, DOO_SABIN);
      expect(change).toBeLessThanOrEqual(stated);
      expect(change).toBeLessThan(1e-9 * all);
      expect(stated).toBeLessThan(1e-8 * all);
    }
  });

  it.each(BOUNDARIES)('holds on open Doo-Sabin cages, wherever the borders of parts reach the rim (%s)', (boundary) => {
    const holes = fc.array(fc.nat(50), { minLength: 1, maxLength: 2 });
    fc.assert(fc.property(randomCage, holes, fc.integer({ min: 2, max: 5 }), fc.integer({ min: 1, max: 1e6 }), ({ cage }, which, parts, seed) => {
      const open = pierced(cage, which);
      const { findings } = measureCage(open, DOO_SABIN);
      fc.pre(!findings.some((finding) => finding.code === 'non_manifold_vertex'));
      const { change, stated, area: all } = splitting(open, drawn(open.faceStarts.length - 1, parts, seed), { ...DOO_SABIN, boundary });
      expect(change).toBeLessThanOrEqual(stated);
      expect(stated).toBeLessThan(1e-5 * all);
    }), RUNS);
  });
});

/** Each triangle's four children take its label. */
const fourfold = (_: Cage, labels: Int32Array): Int32Array => Int32Array.from({ length: 4 * labels.length }, (__, f) => labels[f >> 2]);

describe.each([
  ['Catmull-Clark', CATMULL_CLARK, randomCage, refinedLabels],
  ['Loop', { ...CATMULL_CLARK, scheme: 'loop' as const }, randomTriangles, fourfold],
])('the stated error of parts under %s', (_, options, anyCage, labelsOf) => {
  it('covers what refining the cage once changes, borders, caps and all', () => {
    fc.assert(fc.property(anyCage, fc.integer({ min: 2, max: 4 }), fc.integer({ min: 1, max: 1e6 }), ({ cage }, parts, seed) => {
      const labels = drawn(cage.faceStarts.length - 1, parts, seed);
      const by = { ...options, partsBy: 'group' as const };
      const coarse = measureCage(grouped(cage, labels), by).parts;
      const fine = measureCage(grouped(refinedOnce(cage, options), labelsOf(cage, labels)), by).parts;
      for (let p = 0; p < coarse.length; p++) {
        const [before, after] = [[coarse[p]], [fine[p]]];
        if (before[0].components.length === 0) continue;
        const stated = totalEstimate(before) + totalEstimate(after);
        expect(momentError(totalMoments(after), totalMoments(before), cageSize(cage))).toBeLessThanOrEqual(stated);
      }
    }), RUNS);
  });
});
