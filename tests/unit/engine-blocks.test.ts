import fc from 'fast-check';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { BOUNDARIES, type Cage } from '@/lib/engine/cage';
import { AREA_TOLERANCE } from '@/lib/engine/kernel/node-choice';
import { measureCage } from '@/lib/engine/measure';
import type { MeasuredCage, MeasuredComponent, MeasureOptions } from '@/lib/engine/measured';
import { cutOut } from '@/lib/engine/schemes/cut-out';
import { cageOf, cageSize, CATMULL_CLARK, facesOf } from '../support/engine-cages';
import { randomCage, randomTriangles, type RandomCage } from '../support/random-cages';

const size = vi.hoisted(() => ({ faces: Infinity }));

vi.mock('@/lib/engine/schemes/block-size', () => ({
  get BLOCK_SIZE() {
    return size.faces;
  },
}));

// Every refinement cuts out what it reads, so that counting that counts refinements.
vi.mock('@/lib/engine/schemes/cut-out', async (original) => {
  const real = await original<{ cutOut: typeof cutOut }>();
  return { ...real, cutOut: vi.fn(real.cutOut) };
});

afterEach(() => {
  size.faces = Infinity;
});

function inBlocksOf(faces: number, cage: Cage, options: MeasureOptions): MeasuredCage {
  size.faces = faces;
  return measureCage(cage, options);
}

/** The walls of a component at a thickness, moment by moment; relative to length^degree. */
function wallsOf({ hollow }: MeasuredComponent, thickness: number, length: number): number[] {
  const at = (moment: number): number => [1, 2, 3, 4, 5].reduce((sum, power) => sum + (hollow?.[5 * moment + power - 1] ?? NaN) * thickness ** power, 0);
  return Array.from({ length: 10 }, (_, moment) => at(moment) / length ** (moment === 0 ? 0 : moment < 4 ? 1 : 2));
}

/**
 * Solids are the same but for the order of their sums. Areas and walls are measured by rules that are chosen for two patches together, and blocks pair others:
 * areas by what each patch is measured to, walls by no more than both ways say that they may be off.
 */
function expectSame(found: MeasuredCage, wanted: MeasuredCage, length: number): void {
  const components = ({ parts }: MeasuredCage): MeasuredComponent[] => parts.flatMap((part) => part.components);
  const outline = ({ parts }: MeasuredCage): unknown => parts.map(({ name, faces, openEdges, components: { length: count } }) => [name, faces, openEdges, count]);
  const wholeVolume = components(wanted).reduce((sum, { solid }) => sum + Math.abs(solid.volume), 0);
  const wholeArea = components(wanted).reduce((sum, { surface }) => sum + surface.area, 0);
  const thickness = 0.01 * length;
  expect(found.findings).toEqual(wanted.findings);
  expect(outline(found)).toEqual(outline(wanted));
  components(found).forEach((one, i) => {
    const other = components(wanted)[i];
    const near = (a: number, b: number, scale: number): void => expect(Math.abs(a - b) / scale).toBeLessThan(1e-14);
    near(one.solid.volume, other.solid.volume, wholeVolume);
    one.solid.centroid.forEach((value, axis) => near(value * one.solid.volume, other.solid.centroid[axis] * other.solid.volume, wholeVolume * length));
    one.solid.centralSecond.forEach((value, k) => near(value, other.solid.centralSecond[k], wholeVolume * length * length));
    expect(Math.abs(one.surface.area - other.surface.area) / wholeArea).toBeLessThan(10 * AREA_TOLERANCE);
    const wallDoubt = [one, other].flatMap(({ hollowLimits }) => hollowLimits?.error ?? [NaN]).reduce((sum, error, k) => sum + error * thickness ** ((k % 3) + 1), 0);
    const walls = wallsOf(other, thickness, length);
    wallsOf(one, thickness, length).forEach((value, moment) => expect(Math.abs(value - walls[moment])).toBeLessThanOrEqual(wallDoubt));
  });
}

/** A cage in some parts, less some of its faces. */
function cutUp(cage: Cage, parts: number, holes: readonly number[], seed: number): Cage {
  const all = facesOf(cage);
  const faces = all.filter((_, f) => !holes.some((hole) => hole % all.length === f));
  const points = Array.from({ length: cage.positions.length / 3 }, (_, v) => Array.from(cage.positions.subarray(3 * v, 3 * v + 3)));
  const names = Array.from({ length: parts }, (_, i) => `part ${i}`);
  const tags = { creaseVertices: cage.creaseVertices, creaseSharpness: cage.creaseSharpness, cornerVertices: cage.cornerVertices, cornerSharpness: cage.cornerSharpness };
  const labels = Int32Array.from(faces, (_, f) => Math.floor((f * (seed + 1)) / 7) % parts);
  return { ...cageOf(points, faces), ...tags, groups: { names, labels } };
}

/** A torus of n × n quads, some or all of them cut in two along diagonals that take turns, with two semi-sharp circles that cross. */
function torus(n: number, cut: (i: number, j: number) => boolean): Cage {
  const positions: number[][] = [];
  const faces: number[][] = [];
  const creases: [number, number, number][] = [];
  const at = (i: number, j: number): number => (i % n) * n + (j % n);
  for (let i = 0; i < n; i++) {
    creases.push([at(i, 0), at(i + 1, 0), 1.5], [at(0, i), at(0, i + 1), 2]);
    for (let j = 0; j < n; j++) {
      const [a, b] = [(2 * Math.PI * i) / n, (2 * Math.PI * j) / n];
      positions.push([(3 + Math.cos(b)) * Math.cos(a), (3 + Math.cos(b)) * Math.sin(a), Math.sin(b)]);
      const [p, q, r, s] = [at(i, j), at(i + 1, j), at(i + 1, j + 1), at(i, j + 1)];
      if (!cut(i, j)) faces.push([p, q, r, s]);
      else if ((i + j) % 2 === 0) faces.push([p, q, r], [p, r, s]);
      else faces.push([p, q, s], [q, r, s]);
    }
  }
  return cageOf(positions, faces, creases);
}

const LOOP: MeasureOptions = { ...CATMULL_CLARK, scheme: 'loop' };
const DOO_SABIN: MeasureOptions = { ...CATMULL_CLARK, scheme: 'doo-sabin' };

describe.each<[string, MeasureOptions, fc.Arbitrary<RandomCage>]>([
  ['Catmull-Clark', CATMULL_CLARK, randomCage],
  ['Catmull-Clark, Chaikin creasing', { ...CATMULL_CLARK, creasing: 'chaikin' }, randomCage],
  ['Loop', LOOP, randomTriangles],
  ['Loop, Chaikin creasing', { ...LOOP, creasing: 'chaikin' }, randomTriangles],
  ['Doo-Sabin', DOO_SABIN, randomCage],
])('%s: a cage refined in small blocks is measured as one refined at once', (_, plain, anyCage) => {
  const options: MeasureOptions = { ...plain, partsBy: 'group', shells: true };

  it('parts, borders, holes and walls of random cages with random creases', () => {
    const calls = { once: 0, blocks: 0 };
    fc.assert(fc.property(
      anyCage, fc.constantFrom(1, 7, 19), fc.constantFrom(...BOUNDARIES), fc.integer({ min: 1, max: 3 }), fc.array(fc.nat(200), { maxLength: 2 }), fc.nat(1000),
      ({ cage }, faces, boundary, parts, holes, seed) => {
        const whole = cutUp(cage, parts, holes, seed);
        vi.mocked(cutOut).mockClear();
        const once = inBlocksOf(Infinity, whole, { ...options, boundary });
        calls.once += vi.mocked(cutOut).mock.calls.length;
        vi.mocked(cutOut).mockClear();
        const blocks = inBlocksOf(faces, whole, { ...options, boundary });
        calls.blocks += vi.mocked(cutOut).mock.calls.length;
        expectSame(blocks, once, cageSize(cage));
      },
    ), { numRuns: 12 });
    // Or nothing would have been cut into blocks.
    expect(calls.blocks).toBeGreaterThan(2 * calls.once);
  });

  it('a larger one that is nowhere regular, in blocks within blocks', () => {
    const cage = torus(12, (i, j) => plain.scheme === 'loop' || (i + j) % 2 === 0 || j < 6);
    const once = inBlocksOf(Infinity, cage, options);
    for (const faces of [50, 120]) expectSame(inBlocksOf(faces, cage, options), once, cageSize(cage));
  });
});

it('blocks do not follow from anything but the cage: the same bits each time', () => {
  const cage = torus(10, () => true);
  expect(inBlocksOf(30, cage, CATMULL_CLARK)).toEqual(inBlocksOf(30, cage, CATMULL_CLARK));
});
