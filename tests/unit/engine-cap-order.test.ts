import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Cage } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import type { MeasureOptions } from '@/lib/engine/measured';
import { cageOf, CATMULL_CLARK, facesOf, referenceCage, totalMoments } from '../support/engine-cages';

const LOOP: MeasureOptions = { ...CATMULL_CLARK, scheme: 'loop' };
const DOO_SABIN: MeasureOptions = { ...CATMULL_CLARK, scheme: 'doo-sabin' };

/** The cage with its faces in another order, each with the letter of its part. */
function inOrder(cage: Cage, letters: readonly string[], order: readonly number[]): Cage {
  const faces = facesOf(cage);
  const points = Array.from({ length: cage.positions.length / 3 }, (_, v) => Array.from(cage.positions.subarray(3 * v, 3 * v + 3)));
  const names = [...new Set(order.map((face) => letters[face]))];
  return { ...cageOf(points, order.map((face) => faces[face])), groups: { names, labels: Int32Array.from(order, (face) => names.indexOf(letters[face])) } };
}

function volumes(cage: Cage, options: MeasureOptions): Map<string, number> {
  return new Map(measureCage(cage, { ...options, partsBy: 'group' }).parts.map((part) => [part.name, totalMoments([part]).volume]));
}

describe('borders of the same length', () => {
  it.each([
    ['cube.obj', CATMULL_CLARK],
    ['cube.obj', DOO_SABIN],
    ['tetra.obj', LOOP],
    ['octa.obj', LOOP],
  ] as const)('on the symmetric %s are peeled in an order that the numbering of its faces does not choose (%#)', (file, options) => {
    const cage = referenceCage(file);
    const count = cage.faceStarts.length - 1;
    const letters = fc.array(fc.constantFrom('a', 'b', 'c', 'd'), { minLength: count, maxLength: count });
    const order = fc.shuffledSubarray(Array.from({ length: count }, (_, f) => f), { minLength: count });
    const size = totalMoments(measureCage(cage, options).parts).volume;
    fc.assert(fc.property(letters, order, (of, shuffled) => {
      const own = volumes(inOrder(cage, of, Array.from({ length: count }, (_, f) => f)), options);
      const other = volumes(inOrder(cage, of, shuffled), options);
      for (const [name, volume] of own) expect(Math.abs((other.get(name) ?? NaN) - volume)).toBeLessThanOrEqual(1e-13 * size);
    }), { numRuns: 60 });
  });
});
