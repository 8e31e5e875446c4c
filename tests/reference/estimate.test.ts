import { afterEach, describe, expect, it } from 'vitest';
import { measureCage } from '@/lib/engine/measure';
import type { Six, Three } from '@/lib/engine/measured';
import { gaussRule } from '@/lib/engine/patches/gauss-rule';
import { SMOOTH_CENTRE } from '@/lib/engine/schemes/classify-vertices';
import { CATMULL_CLARK_KIT } from '@/lib/engine/schemes/catmull-clark-kit';
import { makeFanState } from '@/lib/engine/schemes/fan-state';
import { fanTable } from '@/lib/engine/schemes/fan-tables';
import { cageSize, CATMULL_CLARK, momentError, referenceCage, totalEstimate, totalMoments } from '../support/engine-cages';
import limits from './limits.json';

/** True error, against limits.json, and the engine's own estimate of it. */
function judge(name: string): { error: number; estimate: number } {
  const row = limits.cases.find((c) => c.name === name && c.scheme === 'catmull-clark');
  if (row === undefined) throw new Error(`${name} is not in the table`);
  const cage = referenceCage(row.cage);
  const { parts } = measureCage(cage, CATMULL_CLARK);
  const wanted = { volume: row.volume, first: row.first as Three, second: row.second as Six };
  return { error: momentError(totalMoments(parts), wanted, cageSize(cage)), estimate: totalEstimate(parts) };
}

describe('the engine’s own error estimate follows', () => {
  const undo: (() => void)[] = [];
  afterEach(() => {
    while (undo.length > 0) undo.pop()?.();
  });

  function spoil(values: Float64Array, at: number, value: number): void {
    const before = values[at];
    values[at] = value;
    undo.push(() => (values[at] = before));
  }

  it.each([1e-4, 1e-7, 1e-10])('a node moved by %s', (by) => {
    const { nodes } = gaussRule(7);
    spoil(nodes, 2, nodes[2] + by);
    const { error, estimate } = judge('torus_reg_quad');
    expect(error).toBeGreaterThan(1e-14);
    expect(estimate).toBeGreaterThanOrEqual(error);
  });

  it.each([1e-5, 1e-9])('a weight off by %s', (by) => {
    const { weights } = gaussRule(7);
    spoil(weights, 0, weights[0] * (1 + by));
    const { error, estimate } = judge('torus_reg_quad');
    expect(estimate).toBeGreaterThanOrEqual(error);
  });

  it.each([2, 4, 6])('a tail cut after %i levels', (levels) => {
    const { weights } = fanTable(CATMULL_CLARK_KIT, makeFanState(3, true, false, SMOOTH_CENTRE));
    for (let k = levels; k < weights.length; k++) spoil(weights, k, 0);
    const { error, estimate } = judge('cube');
    expect(error).toBeGreaterThan(1e-10);
    expect(estimate).toBeGreaterThanOrEqual(error);
  });
});
