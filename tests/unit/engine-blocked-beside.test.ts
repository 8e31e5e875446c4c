import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Cage } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import type { MeasureOptions } from '@/lib/engine/measured';
import { cageSize, CATMULL_CLARK, momentError, totalMoments } from '../support/engine-cages';
import { randomCage, randomTriangles } from '../support/random-cages';

const LOOP: MeasureOptions = { ...CATMULL_CLARK, scheme: 'loop' };
const DOO_SABIN: MeasureOptions = { ...CATMULL_CLARK, scheme: 'doo-sabin' };

/** The cage in two groups; with `defect` a face that has one vertex twice, apart from everything, in the second. */
function inTwo(cage: Cage, share: number, defect: boolean): Cage {
  const faces = cage.faceStarts.length - 1;
  const first = Math.max(1, Math.floor(share * faces));
  const labels = Array.from({ length: faces }, (_, face) => (face < first ? 0 : 1));
  const names = ['sound', 'faulty'];
  if (!defect) return { ...cage, groups: { names, labels: Int32Array.from(labels) } };
  const vertices = cage.positions.length / 3;
  return {
    ...cage,
    positions: Float64Array.from([...cage.positions, 9, 9, 9, 9, 9, 10]),
    faceStarts: Uint32Array.from([...cage.faceStarts, cage.faceVertices.length + 3]),
    faceVertices: Uint32Array.from([...cage.faceVertices, vertices, vertices + 1, vertices]),
    groups: { names, labels: Int32Array.from([...labels, 1]) },
  };
}

describe('a part beside one that a problem blocks', () => {
  it.each([
    ['Catmull-Clark', CATMULL_CLARK, randomCage],
    ['Loop', LOOP, randomTriangles],
    ['Doo-Sabin', DOO_SABIN, randomCage],
  ] as const)('is measured as if the other were sound (%s)', (_, options, anyCage) => {
    fc.assert(fc.property(anyCage, fc.double({ min: 0, max: 0.8, noNaN: true }), ({ cage }, share) => {
      const by = { ...options, partsBy: 'group' as const };
      const [sound, beside] = [false, true].map((defect) => measureCage(inTwo(cage, share, defect), by));
      expect(beside.findings.filter(({ severity }) => severity === 'problem').map(({ code, part }) => [code, part])).toEqual([['degenerate_face', 'faulty']]);
      const [before, after] = [sound, beside].map(({ parts }) => parts.filter((part) => part.name === 'sound'));
      expect(after[0].components.length).toBeGreaterThan(0);
      expect(momentError(totalMoments(after), totalMoments(before), cageSize(cage))).toBeLessThanOrEqual(1e-14);
    }), { numRuns: 25 });
  });
});
