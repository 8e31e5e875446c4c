import { expect, it } from 'vitest';
import { measureCage } from '@/lib/engine/measure';
import type { MeasuredPart } from '@/lib/engine/measured';
import { diagnoseSize, extentOf } from '@/lib/engine/size-habit';
import { boxPart, cageOf } from '../support/put-cage';

function parts(scale: number): MeasuredPart[] {
  const cage = cageOf([boxPart('shaft', [0, 0, 0], [0.1 * scale, 0.1 * scale, 1.8 * scale]), boxPart('head', [0.2 * scale, 0, 0], [0.4 * scale, 0.1 * scale, 0.1 * scale])]);
  return measureCage(cage, { scheme: 'polyhedral', boundary: 'edge-and-corner', triangles: 'catmark', creasing: 'uniform', partsBy: 'group' }).parts;
}

it('takes the box of all parts', () => expect(extentOf(parts(10))).toEqual([4, 1, 18]));

it.each([[100, 'smaller'], [0.001, 'larger'], [2.54, 'smaller'], [1 / 39.3701, 'larger'], [12, 'smaller']])('doubts a version that is %s times the one before', (scale, word) => {
  const found = diagnoseSize(parts(scale), { usual: 1.8, spread: 2, onlyUnits: true });
  expect(found).toMatchObject({ code: 'size_unusual', severity: 'warning', part: 'shaft', places: [{ position: [0.05 * scale, 0.05 * scale, 0.9 * scale].map((value) => expect.closeTo(value, 9)) }] });
  expect(found?.message).toMatch(new RegExp(`${word}; check the unit.*\\.$`));
});

it.each([0.5, 0.9, 1, 1.7, 4, 7])('takes a version that is %s times the one before as made so', (scale) => {
  expect(diagnoseSize(parts(scale), { usual: 1.8, spread: 2.1, onlyUnits: true })).toBeNull();
});

it('doubts what is far from a show’s habit, whatever the ratio, and nothing within it', () => {
  const habit = { usual: 1.8, spread: 50, onlyUnits: false };
  expect(diagnoseSize(parts(70), habit)?.message).toContain('70 times more than usual;');
  expect(diagnoseSize(parts(1 / 70), habit)?.message).toContain('70 times less than usual;');
  expect(diagnoseSize(parts(40), habit)).toBeNull();
  expect(diagnoseSize([], habit)).toBeNull();
});
