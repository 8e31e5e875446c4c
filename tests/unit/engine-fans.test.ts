import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ownKernel, PatchBlock } from '@/lib/engine/kernel/patch-block';
import { NET_VALUES, PATCH_KINDS } from '@/lib/engine/kernel/patch-kinds';
import { SUMMED_RESULTS } from '@/lib/engine/kernel/scalar-fans';
import { scalarKernel } from '@/lib/engine/kernel/scalar-kernel';
import { newVectorKernel } from '@/lib/engine/kernel/vector-kernel';
import { tailLevels, tailWeights } from '@/lib/engine/moments/tail-weights';
import { splitMatrix } from '@/lib/engine/patches/split-net';
import { CATMULL_CLARK_KIT } from '@/lib/engine/schemes/catmull-clark-kit';
import { CORNER_CENTRE, CREASE_CENTRE, SMOOTH_CENTRE } from '@/lib/engine/schemes/classify-vertices';
import { DOO_SABIN_KIT } from '@/lib/engine/schemes/doo-sabin-fan';
import { makeFanOperator } from '@/lib/engine/schemes/fan-operator';
import { packPoints, pointArray } from '@/lib/engine/schemes/fan-points';
import { makeFanState } from '@/lib/engine/schemes/fan-state';
import { LOOP_KIT } from '@/lib/engine/schemes/loop-kit';
import { addRimChain, moveMoments } from '@/lib/engine/schemes/rim-chain';
import { applyRows } from '@/lib/engine/schemes/sparse-rows';

const KITS = { 'catmull-clark': CATMULL_CLARK_KIT, loop: LOOP_KIT, 'doo-sabin': DOO_SABIN_KIT };
const number = fc.double({ min: -10, max: 10, noNaN: true });

describe('fans in the kernels’ memory', () => {
  it.each(PATCH_KINDS)('%s: the vector routines and those in JavaScript agree to the last bit', (kind) => {
    const points = NET_VALUES[kind] / 3;
    fc.assert(fc.property(fc.integer({ min: 1, max: 3 }), fc.array(number, { minLength: 90, maxLength: 90 }), fc.nat(1000), (fans, values, seed) => {
      const results = [newVectorKernel(kind), scalarKernel(kind)].map((kernel) => {
        if (kernel === null) throw new Error('no vector kernel');
        const { fans: routines } = kernel;
        const rows = 10, stride = 30, perFan = 3;
        const [starts, columns, factors, nets, source, target, sums] = [0, 10, 40, 100, 200, 400, 600];
        for (let row = 0; row <= rows; row++) routines.integers[2 * starts + row] = 4 * row;
        for (let i = 0; i < 40; i++) {
          routines.integers[2 * columns + i] = 3 * ((7 * i + seed) % 10);
          routines.memory[factors + i] = values[(11 * i + seed) % 90];
        }
        for (let i = 0; i < perFan * points; i++) routines.integers[2 * nets + i] = 3 * ((5 * i + seed) % 10);
        for (let i = 0; i < 90; i++) routines.memory[source + i] = values[i];
        routines.memory.fill(0, sums, sums + 3 * SUMMED_RESULTS);
        routines.refine(fans, stride, rows, starts, columns, factors, source, target);
        routines.gather(1, fans * perFan - 1, perFan, points, nets, target, stride);
        kernel.run((fans * perFan) >> 1, 4, 0);
        routines.sum(1, fans * perFan - 1, perFan, sums);
        return [...routines.memory.slice(target, target + fans * stride), ...routines.memory.slice(sums, sums + fans * SUMMED_RESULTS)];
      });
      expect(results[0].every((value, i) => Object.is(value, results[1][i]))).toBe(true);
    }), { numRuns: 60 });
  });

  const kinds = [[3, true, false, SMOOTH_CENTRE], [5, true, true, SMOOTH_CENTRE], [2, false, true, CREASE_CENTRE], [4, false, true, CORNER_CENTRE], [7, true, true, CORNER_CENTRE]] as const;
  it.each(Object.entries(KITS).flatMap(([scheme, kit]) => kinds.filter((kind) => kit.hasSpokes || kind[2] === false).map((kind) => [scheme, ...kind] as const)))(
    '%s, %i sectors, closed %s, sharp %s, centre %i: the matrix does as the rules say', (scheme, n, closed, sharp, centre) => {
      const kit = KITS[scheme as keyof typeof KITS];
      const operator = makeFanOperator(kit, makeFanState(n, closed, sharp, centre));
      const from = makeFanState(n, closed, sharp, centre), to = makeFanState(n, closed, sharp, centre);
      for (let i = 0; i < operator.points.count; i++) for (let axis = 0; axis < 3; axis++) pointArray(operator.points, from, i)[operator.points.offsets[i] + axis] = Math.sin(3 * i * i + axis);
      const packed = new Float64Array(3 * operator.points.count), finer = new Float64Array(3 * operator.matrix.rows);
      packPoints(operator.points, from, new Float64Array(3), packed, 0);
      applyRows(operator.matrix, packed, 0, finer, 0);
      kit.refine(from, to);
      const points = NET_VALUES[kit.rule.kind] / 3;
      const net = new Float64Array(3 * points);
      for (let patch = 0; patch < 3 * n; patch++) {
        kit.fillPoints(to, Math.floor(patch / 3), patch % 3, net);
        for (let i = 0; i < 3 * points; i++) expect(Math.abs(finer[3 * operator.nets[points * patch + Math.floor(i / 3)] + (i % 3)] - net[i])).toBeLessThan(1e-14);
      }
    });
});

it('a cone moved from one point to another by the chain along its edge is the pyramid over a square', () => {
  // The square (±1, ±1, 0) seen from the origin is flat; from (0, 0, −h) it is a pyramid: V = 4h/3, ∫z dV = V · 3h/4, ∫z² dV = V · 3h²/5, ∫x² dV = V/5.
  const h = 2;
  const corners = [[-1, -1], [1, -1], [1, 1], [-1, 1]];
  const powers = new Float64Array(60);
  corners.forEach(([x, y], i) => {
    const [u, v] = corners[(i + 1) % 4];
    powers.set([(x + u) / 2, (y + v) / 2, 0, u - x, v - y, 0], 15 * i);
  });
  const solid = new Float64Array(10);
  addRimChain(powers, 4, 0, 0, -h, 6, solid);
  const volume = (4 * h) / 3;
  const expected = [volume, 0, 0, (volume * 3 * h) / 4, volume / 5, volume / 5, (volume * 3 * h * h) / 5, 0, 0, 0];
  expected.forEach((value, i) => expect(Math.abs(solid[i] - value)).toBeLessThan(1e-14 * 10));
  // And about the origin again, by the rule of parallel axes.
  moveMoments(solid, 0, 0, 0, h);
  [volume, 0, 0, -volume * h / 4, volume / 5, volume / 5, volume * h * h / 10].forEach((value, i) => expect(Math.abs(solid[i] - value)).toBeLessThan(1e-14 * 10));
});

it.each(PATCH_KINDS)('%s: the quarters of a patch hold its moments', (kind) => {
  const block = new PatchBlock(ownKernel(kind));
  const exact = { bicubic: 7, biquadratic: 5, triangle: 9 }[kind];
  fc.assert(fc.property(fc.array(fc.integer({ min: -160, max: 160 }), { minLength: 48, maxLength: 48 }), (values) => {
    const net = Float64Array.from(values.slice(0, block.values));
    const quarters = new Float64Array(4 * block.values);
    applyRows(splitMatrix(kind), net, 0, quarters, 0);
    const solid = new Float64Array(10), surface = new Float64Array(10), sum = new Float64Array(10);
    for (let i = 0; i < 4; i++) block.put(i, quarters, 0, 0, 0, i * block.values);
    block.put(4, net, 0, 0, 0);
    block.run(5, exact, 0);
    const size = Math.max(...values.map(Math.abs));
    for (let i = 0; i < 4; i++) {
      block.read(i, solid, surface);
      for (let m = 0; m < 10; m++) sum[m] += solid[m];
    }
    block.read(4, solid, surface);
    for (let m = 0; m < 10; m++) expect(Math.abs(sum[m] - solid[m])).toBeLessThanOrEqual(1e-12 * size ** (m === 0 ? 3 : m < 4 ? 4 : 5));
  }), { numRuns: 100 });
});

it('weights with a known power close it exactly and all below the largest to the digits asked for', () => {
  for (const [largest, known] of [[0.2, 0.3], [0.1, 0.17], [0.3, 0.55]]) {
    const levels = 1 + tailLevels(largest, 11);
    const weights = tailWeights(largest, levels, known);
    const closed = (r: number): number => weights.reduce((sum, w, k) => sum + w * r ** k, 0);
    expect(Math.abs(closed(known) * (1 - known) - 1)).toBeLessThan(1e-14);
    for (let r = 0; r <= largest; r += largest / 40) expect(Math.abs(closed(r) * (1 - r) - 1)).toBeLessThan(1e-10);
  }
});
