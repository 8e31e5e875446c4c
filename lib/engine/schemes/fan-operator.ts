import { NET_VALUES } from '../kernel/patch-kinds';
import type { FanKit } from './fan-kit';
import { fanPoints, forUnitVectors, pointArray, type FanPoints } from './fan-points';
import { makeFanState, type FanState } from './fan-state';
import { RowBuilder, type SparseRows } from './sparse-rows';

/**
 * One level of a kind of fan as a sparse matrix over its points (rings 0 to 2): the first rows are the same points one level finer, the others what the nets
 * of its 3n child patches need besides (ring 3, phantom points).
 */
export interface FanOperator {
  points: FanPoints;
  matrix: SparseRows;
  /** Rows of the net of child patch 3 · sector + child: [netPoints · patch + entry]. */
  nets: Int32Array;
}

/** Finds the operator of a kind of fan by refining unit vectors. */
export function makeFanOperator(kit: FanKit, kind: FanState): FanOperator {
  const n = kind.sectors;
  const points = fanPoints(kit, kind);
  const netPoints = NET_VALUES[kit.rule.kind] / 3;
  const entries = 3 * n * netPoints;
  const rows = new RowBuilder(points.count + entries);
  const net = new Float64Array(3 * netPoints);
  const from = makeFanState(n, kind.closed, kind.sharpFirst, kind.centreRule);
  const to = makeFanState(n, kind.closed, kind.sharpFirst, kind.centreRule);
  forUnitVectors(points, from, (first) => {
    kit.refine(from, to);
    for (let i = 0; i < points.count; i++) rows.note(i, first, pointArray(points, to, i), points.offsets[i]);
    for (let patch = 0; patch < 3 * n; patch++) {
      kit.fillPoints(to, Math.floor(patch / 3), patch % 3, net);
      for (let i = 0; i < netPoints; i++) rows.note(points.count + patch * netPoints + i, first, net, 3 * i);
    }
  });
  const known = new Map<string, number>();
  const kept: number[] = [];
  const nets = new Int32Array(entries);
  for (let row = 0; row < points.count + entries; row++) {
    const key = rows.key(row);
    let place = known.get(key);
    if (place === undefined || row < points.count) {
      place = kept.length;
      kept.push(row);
      known.set(key, place);
    }
    if (row >= points.count) nets[row - points.count] = place;
  }
  return { points, matrix: rows.finish(kept), nets };
}
