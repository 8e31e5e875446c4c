import { execFile } from 'node:child_process';
import { promisify } from 'node:util';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { PatchBlock, scalarKernel } from '@/lib/engine/kernel/patch-block';
import { vectorKernel } from '@/lib/engine/kernel/vector-kernel';

/** All 22 results of each patch, computed together. */
function results(kernel: ReturnType<typeof scalarKernel>, patches: readonly Float64Array[], nodes: number, coarse: number): number[][] {
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

const patch = fc.array(fc.double({ min: -1e3, max: 1e3, noNaN: true }), { minLength: 51, maxLength: 51 }).map((values) => Float64Array.from(values));

test('the vector kernel is there, so that the next test compares two things', () => {
  expect(vectorKernel()).not.toBeNull();
});

test('the vector kernel and the one in JavaScript agree to the last bit', () => {
  const vector = vectorKernel() ?? scalarKernel();
  const scalar = scalarKernel();
  fc.assert(fc.property(fc.array(patch, { minLength: 1, maxLength: 5 }), fc.integer({ min: 2, max: 8 }), (patches, nodes) => {
    const ours = results(vector, patches, nodes, 4);
    const theirs = results(scalar, patches, nodes, 4);
    for (let i = 0; i < patches.length; i++) for (let k = 0; k < 22; k++) expect(Object.is(ours[i][k], theirs[i][k])).toBe(true);
  }), { numRuns: 200 });
});

test('a flat patch at height h over a unit square is the pyramid to its apex and the square itself', () => {
  // Uniform B-splines reproduce linear functions: the net's points i − 1 give the parameter itself.
  const net = new Float64Array(51);
  for (let row = 0; row < 4; row++) for (let column = 0; column < 4; column++) net.set([row - 1, column - 1, 3], 3 * (4 * row + column));
  for (const kernel of [vectorKernel() ?? scalarKernel(), scalarKernel()]) {
    const [values] = results(kernel, [net], 7, 4);
    // Volume h/3, ∫z dV = h²/4, ∫x dA = ½, ∫x² dA = ⅓, ∫z² dA = h².
    for (const [index, expected] of [[0, 1], [3, 9 / 4], [10, 1], [11, 1 / 2], [14, 1 / 3], [16, 9], [20, 1], [21, 1]] as const) expect(Math.abs(values[index] - expected)).toBeLessThan(1e-14 * 9);
  }
});

test('the committed kernels are what their generator writes', async () => {
  const { stdout } = await promisify(execFile)(process.execPath, ['lib/run/build-kernel.mjs', '--check']);
  expect(stdout).toBe('');
}, 300_000);
