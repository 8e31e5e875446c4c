import { describe, expect, it } from 'vitest';
import type { Cage } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import type { MeasuredComponent } from '@/lib/engine/measured';
import { cageOf, CATMULL_CLARK, facesOf } from '../support/engine-cages';

function allSharp(points: number[][], faces: number[][], sharpness: number): Cage {
  const edges = faces.flatMap((face) => face.map((a, i) => [a, face[(i + 1) % face.length], sharpness] as const)).filter(([a, b]) => a < b);
  return cageOf(points, faces, edges);
}

/** A box whose corners are rounded to doubles, and its sides as they then are: differences of near doubles are exact. */
function box(at: number, sides: readonly number[], sharpness: number): { cage: Cage; sides: number[] } {
  const far = sides.map((side) => at + side);
  const points = [0, 1, 2, 3, 4, 5, 6, 7].map((i) => sides.map((_, axis) => ((i >> axis) & 1 ? far[axis] : at)));
  return { cage: allSharp(points, [[0, 2, 3, 1], [4, 5, 7, 6], [0, 1, 5, 4], [2, 6, 7, 3], [0, 4, 6, 2], [1, 3, 7, 5]], sharpness), sides: far.map((value) => value - at) };
}

const only = (cage: Cage): MeasuredComponent => measureCage(cage, CATMULL_CLARK).parts[0].components[0];
const off = (found: number, wanted: number): number => Math.abs(found / wanted - 1);

/** Cuboid of the handbooks: V = abc, V a²/12 about the centre. */
describe.each([
  ['a plate of 4 × 4 × 0.001 at 1e6 from the origin', 1e6, [4, 4, 1e-3]],
  ['a plate of 4 × 4 × 0.001 at −3e7', -3e7, [4, 4, 1e-3]],
  ['a sliver of 1 × 1e-6 × 1e-9', 0, [1, 1e-6, 1e-9]],
  ['a needle of 1e-9 × 1e-9 × 1', 0, [1e-9, 1e-9, 1]],
])('%s', (_, at, wanted) => {
  it('is the cuboid that its rounded corners span', () => {
    const { cage, sides } = box(at, wanted, 10);
    const { solid, errorEstimate } = only(cage);
    const volume = sides[0] * sides[1] * sides[2];
    expect(off(solid.volume, volume)).toBeLessThan(4e-15);
    sides.forEach((side, i) => expect(off(solid.centralSecond[i], (volume * side * side) / 12)).toBeLessThan(4e-15));
    expect(off(solid.volume, volume)).toBeLessThanOrEqual(errorEstimate);
  });
});

it('a smooth plate 2²⁰ away has the bits of the one at the origin', () => {
  const [near, far] = [0, 2 ** 20].map((at) => only(box(at, [4, 4, 2 ** -10], 0).cage).solid);
  expect(far.volume).toBe(near.volume);
  expect(far.centralSecond).toEqual(near.centralSecond);
});

// The n-gonal double pyramid: V = n h sin(2π/n)/3 for apexes at ±h over a circumradius of 1.
it('a vertex of valence 200, all edges sharp', () => {
  const n = 200;
  const ring = Array.from({ length: n }, (_, i) => [Math.cos((2 * Math.PI * i) / n), Math.sin((2 * Math.PI * i) / n), 0]);
  const faces = ring.flatMap((_, i) => [[i, (i + 1) % n, n], [(i + 1) % n, i, n + 1]]);
  const cage = allSharp([...ring, [0, 0, 1], [0, 0, -1]], faces, 10);
  expect(facesOf(cage)).toHaveLength(2 * n);
  expect(off(only(cage).solid.volume, (n * Math.sin((2 * Math.PI) / n)) / 3)).toBeLessThan(4e-15);
});

it('a cube of sharpness 9.9 lies between that of 9 and the sharp one', () => {
  const [nine, most, sharp] = [9, 9.9, 10].map((sharpness) => only(box(0, [1, 1, 1], sharpness).cage).solid.volume);
  expect(nine).toBeLessThan(most);
  expect(most).toBeLessThan(sharp);
  // What rounding takes away falls by four for each step that the edges stay sharp: along an edge its section is similar, and half as wide.
  const eight = only(box(0, [1, 1, 1], 8).cage).solid.volume;
  expect((1 - eight) / (1 - nine)).toBeCloseTo(4, 1);
  expect(sharp).toBeCloseTo(1, 14);
});
