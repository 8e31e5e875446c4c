import fc from 'fast-check';
import { expect, test } from 'vitest';
import { ALONG_EXTRA, inputStride, NET_VALUES, PATCH_KINDS } from '@/lib/engine/kernel/patch-kinds';
import { BENDS_STRIDE, scalarShellKernel, TOTALS_STRIDE, type ShellKernel } from '@/lib/engine/shell/shell-kernel';
import { MOST_SHELL_NODES } from '@/lib/engine/shell/shell-nodes';
import { vectorShellKernel } from '@/lib/engine/shell/shell-vector';

type Kind = (typeof PATCH_KINDS)[number];

/** Bends and totals of pairs of patches, nets and origins as they come in `values`. */
function results(kernel: ShellKernel, kind: Kind, pairs: readonly Float64Array[], counts: readonly number[]): { bends: number[]; totals: number[] } {
  const stride = inputStride(kind);
  pairs.forEach((values, k) => {
    for (let i = 0; i < stride; i++) kernel.input[k * stride + i] = values[i];
    kernel.counts[k] = counts[k % counts.length];
  });
  kernel.bend(pairs.length);
  kernel.terms(pairs.length);
  return { bends: [...kernel.bends.subarray(0, pairs.length * BENDS_STRIDE)], totals: [...kernel.output.subarray(0, pairs.length * TOTALS_STRIDE)] };
}

const pair = fc.array(fc.double({ min: -1e3, max: 1e3, noNaN: true }), { minLength: 102, maxLength: 102 }).map((values) => Float64Array.from(values));

test.each(PATCH_KINDS)('walls: the vector kernel of %s patches and the one in JavaScript agree to the last bit', (kind) => {
  const vector = vectorShellKernel(kind);
  expect(vector).not.toBeNull();
  const most = MOST_SHELL_NODES;
  fc.assert(fc.property(fc.array(pair, { minLength: 1, maxLength: 3 }), fc.array(fc.integer({ min: 2, max: most }), { minLength: 1, maxLength: 3 }), (pairs, counts) => {
    const ours = results(vector ?? scalarShellKernel(kind), kind, pairs, counts);
    const theirs = results(scalarShellKernel(kind), kind, pairs, counts);
    const used = kind === 'triangle' ? [0, 1, 2, 3] : [0, 1, 2, 3, 4, 5];
    pairs.forEach((_, k) => used.forEach((i) => [0, 1].forEach((lane) => {
      const at = k * BENDS_STRIDE + 2 * i + lane;
      expect(Object.is(ours.bends[at], theirs.bends[at])).toBe(true);
    })));
    ours.totals.forEach((value, i) => expect(Object.is(value, theirs.totals[i])).toBe(true));
  }), { numRuns: 100 });
});

test.each(PATCH_KINDS)('walls: a %s patch whose points all lie in one place adds nothing', (kind) => {
  const values = new Float64Array(102).fill(3);
  for (const kernel of [vectorShellKernel(kind) ?? scalarShellKernel(kind), scalarShellKernel(kind)]) {
    const { totals } = results(kernel, kind, [values], [5]);
    expect(totals.every((value) => Math.abs(value) === 0)).toBe(true);
  }
});

test('the rules that the kernels hold reach as far as the nodes that are chosen', () => {
  // Rules stand 2 (most + 1) doubles apart below the triangle's table of 15 × 12 weights, nets from double 640 on.
  const stride = 2 * (MOST_SHELL_NODES + 1);
  for (const kind of PATCH_KINDS) {
    expect(2 * (MOST_SHELL_NODES + ALONG_EXTRA[kind])).toBeLessThanOrEqual(stride);
    expect(NET_VALUES[kind]).toBeLessThanOrEqual(48);
  }
  expect(stride * (MOST_SHELL_NODES + 2) + 180).toBeLessThanOrEqual(640);
});
