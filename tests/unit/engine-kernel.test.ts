import { execFile } from 'node:child_process';
import { promisify } from 'node:util';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { PatchBlock } from '@/lib/engine/kernel/patch-block';
import { NODE_RANGES } from '@/lib/engine/kernel/node-choice';
import { PATCH_KINDS, type PatchKernel, type PatchKind } from '@/lib/engine/kernel/patch-kinds';
import { scalarKernel } from '@/lib/engine/kernel/scalar-kernel';
import { vectorKernel } from '@/lib/engine/kernel/vector-kernel';
import { TRIANGLE_NET } from '@/lib/engine/patches/box-spline';

/** All 22 results of each patch, computed together. */
function results(kernel: PatchKernel, patches: readonly Float64Array[], nodes: number, coarse: number): number[][] {
  const block = new PatchBlock(kernel);
  patches.forEach((values, i) => block.put(i, values, values[48], values[49], values[50]));
  block.run(patches.length, nodes, coarse);
  return patches.map((_, i) => {
    const solid = new Float64Array(10);
    const surface = new Float64Array(10);
    const magnitude = block.read(i, solid, surface);
    return [...solid, ...surface, magnitude, block.coarseArea(i)];
  });
}

/** The same with chosen nodes, then what second and first moments may lack and the nodes that were taken. */
function chosen(kernel: PatchKernel, patches: readonly Float64Array[], fewest: number, tolerance: number, reach: number): number[][] {
  const block = new PatchBlock(kernel);
  patches.forEach((values, i) => block.put(i, values, values[48], values[49], values[50]));
  block.choose(patches.length, fewest, tolerance, reach);
  return patches.map((_, i) => {
    const solid = new Float64Array(10);
    const surface = new Float64Array(10);
    const magnitude = block.read(i, solid, surface);
    return [...solid, ...surface, magnitude, block.coarseArea(i), block.secondError(i), block.firstError(i), block.nodes(i)];
  });
}

const patch = fc.array(fc.double({ min: -1e3, max: 1e3, noNaN: true }), { minLength: 51, maxLength: 51 }).map((values) => Float64Array.from(values));

test.each(PATCH_KINDS)('the vector kernel of %s patches is there, so that the next test compares two things', (kind) => {
  expect(vectorKernel(kind)).not.toBeNull();
});

test.each(PATCH_KINDS)('the vector kernel of %s patches and the one in JavaScript agree to the last bit', (kind) => {
  const vector = vectorKernel(kind) ?? scalarKernel(kind);
  const scalar = scalarKernel(kind);
  fc.assert(fc.property(fc.array(patch, { minLength: 1, maxLength: 5 }), fc.integer({ min: 2, max: 9 }), fc.integer({ min: 2, max: 6 }), (patches, nodes, coarse) => {
    const ours = results(vector, patches, nodes, coarse);
    const theirs = results(scalar, patches, nodes, coarse);
    for (let i = 0; i < patches.length; i++) for (let k = 0; k < 22; k++) expect(Object.is(ours[i][k], theirs[i][k])).toBe(true);
  }), { numRuns: 200 });
});

/** A net that bends by `bend` away from the flat one, seen from a point some way off: from nearly flat to crumpled. */
const bent = (kind: PatchKind): fc.Arbitrary<Float64Array> => fc.tuple(fc.constantFrom(0, 1e-3, 1e-2, 0.1, 0.5, 2), fc.integer({ min: 0, max: 40 }), patch).map(([bend, away, noise]) => {
  const net = new Float64Array(51);
  net.set(FLAT[kind]);
  for (let i = 0; i < 51; i++) net[i] += i < 48 ? (bend * noise[i]) / 1e3 : (away * noise[i]) / 1e3;
  return net;
});

test.each(PATCH_KINDS)('both kernels choose the same nodes for %s patches, and the numbers agree to the last bit', (kind) => {
  const vector = vectorKernel(kind) ?? scalarKernel(kind);
  const scalar = scalarKernel(kind);
  const { fewest } = NODE_RANGES[kind];
  const taken = new Set<number>();
  fc.assert(fc.property(fc.array(bent(kind), { minLength: 1, maxLength: 5 }), fc.integer({ min: 0, max: 2 }), fc.constantFrom(0, 1e-15, 1e-9), fc.constantFrom(0, 5), (patches, more, tolerance, reach) => {
    const ours = chosen(vector, patches, fewest + more, tolerance, reach);
    const theirs = chosen(scalar, patches, fewest + more, tolerance, reach);
    for (let i = 0; i < patches.length; i++) for (let k = 0; k < 25; k++) expect(Object.is(ours[i][k], theirs[i][k])).toBe(true);
    for (const values of ours) taken.add(values[24]);
  }), { numRuns: 300, seed: 1 });
  // Or the test would compare one rule alone.
  expect(taken.size).toBeGreaterThan(3);
});

test.each(PATCH_KINDS)('spared nodes cost %s patches no more than the kernel says, and no more than was allowed', (kind) => {
  const kernel = vectorKernel(kind) ?? scalarKernel(kind);
  const { fewest } = NODE_RANGES[kind];
  let spared = 0;
  fc.assert(fc.property(bent(kind), fc.constantFrom(1e-13, 1e-9, 1e-5), (net, tolerance) => {
    const [values] = chosen(kernel, [net], fewest, tolerance, 0);
    const [exact] = results(kernel, [net], 9, 4);
    const [second, first, nodes] = values.slice(22);
    if (second > 0 && nodes < 9) spared++;
    const size = Math.hypot(...exact.slice(0, 10)) + exact[20];
    for (let m = 0; m < 10; m++) expect(Math.abs(values[m] - exact[m])).toBeLessThanOrEqual((m === 0 ? 0 : m < 4 ? first : second) + 1e-14 * size * (1 + Math.hypot(net[48], net[49], net[50]) ** 2));
  }), { numRuns: 500, seed: 2 });
  expect(spared).toBeGreaterThan(50);
});

/** Nets of the plane z = 3 over the unit square or its lower left half: B-splines and box splines reproduce linear functions, so lattice points stand for themselves. */
const FLAT = {
  bicubic: [0, 1, 2, 3].flatMap((row) => [0, 1, 2, 3].flatMap((column) => [row - 1, column - 1, 3])),
  biquadratic: [0, 1, 2].flatMap((row) => [0, 1, 2].flatMap((column) => [row - 0.5, column - 0.5, 3])),
  triangle: TRIANGLE_NET.flatMap(([a, b]) => [a, b, 3]),
};

test.each(PATCH_KINDS)('a flat %s patch at height h is the pyramid to its apex and the square or triangle itself', (kind) => {
  const net = new Float64Array(51);
  net.set(FLAT[kind]);
  // Over an area A with first and second moments S, T: volume h A/3, ∫x dV = h S/4, ∫z dV = h² A/4, ∫x² dV = h T/5; ∫x dA = S, ∫x² dA = T, ∫z² dA = h² A.
  const [area, first, second] = kind === 'triangle' ? [1 / 2, 1 / 6, 1 / 12] : [1, 1 / 2, 1 / 3];
  for (const kernel of [vectorKernel(kind) ?? scalarKernel(kind), scalarKernel(kind)]) {
    const [values] = results(kernel, [net], 9, 4);
    const expected = [[0, area], [1, (3 * first) / 4], [3, (9 * area) / 4], [4, (3 * second) / 5], [10, area], [11, first], [14, second], [16, 9 * area], [20, area], [21, area]];
    for (const [index, value] of expected) expect(Math.abs(values[index] - value)).toBeLessThan(1e-14 * 9);
  }
});

test('the committed kernels are what their generator writes', async () => {
  const { stdout } = await promisify(execFile)(process.execPath, ['lib/run/build-kernel.mjs', '--check']);
  expect(stdout).toBe('');
}, 300_000);
