import { NET_VALUES } from '../kernel/patch-kinds';
import { MOMENTS } from '../moments/sums';
import { measureSurface } from '../patches/mend-surface';
import type { FanKit } from './fan-kit';
import type { FanTable } from './fan-tables';
import { applyRows } from './sparse-rows';

/** Part of a fan's area by which closings may differ before it is mended. */
export const UNSETTLED = 1e-9;

/** Levels after which a closing that has not settled is taken as it is, and doubted by all that it still moves. */
const MOST_STARTS = 32;

/** Part of a fan's area by which closings from one level later and two levels later may differ. */
const SETTLED = 1e-12;

/** Times the difference of two closings that the later one may err by. */
const DOUBT = 2;

/**
 * Surface moments of the sectors of a fan whose terms shrink like powers only after some levels, because its normal nearly vanishes somewhere around the
 * centre: the levels before are added as they are, and the closing begins where it no longer moves. `points` has the fan's points from `from` on, about its
 * limit point, as `packPoints` leaves them. Ten moments a sector about that point go to `surface`, the estimated error of each sector's area to `errors`.
 */
export function mendFanSurface(kit: FanKit, table: FanTable, sectors: number, points: Float64Array, from: number, surface: Float64Array, errors: Float64Array): void {
  const { operator, surfaceWeights: weights } = table;
  const { matrix } = operator;
  const values = MOMENTS * sectors;
  let state = new Float64Array(3 * matrix.rows);
  let finer = new Float64Array(3 * matrix.rows);
  state.set(points.subarray(from, from + 3 * operator.points.count));
  const levels: Float64Array[] = [];
  const doubts: Float64Array[] = [];
  let tolerance = 0;
  const measureLevel = (): void => {
    applyRows(matrix, state, 0, finer, 0);
    [state, finer] = [finer, state];
    const level = new Float64Array(values);
    const doubt = new Float64Array(sectors);
    measurePatches(kit, table, sectors, state, tolerance, level, doubt);
    levels.push(level);
    doubts.push(doubt);
    if (levels.length === 1) tolerance = (SETTLED * areaOf(level, sectors)) / sectors;
  };
  /** Levels before `start` as they are, those from there on closed. */
  const closeFrom = (start: number): Float64Array => {
    while (levels.length < start + weights.length) measureLevel();
    const closed = new Float64Array(values);
    for (let k = 0; k < start + weights.length; k++) for (let i = 0; i < values; i++) closed[i] += (k < start ? 1 : weights[k - start]) * levels[k][i];
    return closed;
  };
  let [before, last] = [closeFrom(0), closeFrom(1)];
  for (let start = 2; ; start++) {
    const next = closeFrom(start);
    const settled = Math.max(difference(next, last, sectors), difference(next, before, sectors)) <= SETTLED * areaOf(next, sectors);
    if (settled || start === MOST_STARTS) {
      surface.set(next);
      for (let j = 0; j < sectors; j++) {
        const at = MOMENTS * j;
        errors[j] = DOUBT * Math.max(Math.abs(next[at] - last[at]), Math.abs(next[at] - before[at]));
        for (let k = 0; k < start + weights.length; k++) errors[j] += (k < start ? 1 : Math.abs(weights[k - start])) * doubts[k][j];
      }
      return;
    }
    [before, last] = [last, next];
  }
}

/** Adds the patches of one level to their sectors. */
function measurePatches(
  kit: FanKit, table: FanTable, sectors: number, state: Float64Array, tolerance: number, level: Float64Array, doubt: Float64Array,
): void {
  const { kind } = kit.rule;
  const net = new Float64Array(NET_VALUES[kind]);
  const own = new Float64Array(MOMENTS);
  for (let patch = 0; patch < 3 * sectors; patch++) {
    for (let i = 0; i < net.length; i++) net[i] = state[3 * table.operator.nets[(patch * net.length) / 3 + Math.floor(i / 3)] + (i % 3)];
    const sector = Math.floor(patch / 3);
    doubt[sector] += measureSurface(kind, net, 0, 0, 0, own, tolerance > 0 ? tolerance : undefined);
    for (let m = 0; m < MOMENTS; m++) level[MOMENTS * sector + m] += own[m];
  }
}

function areaOf(moments: Float64Array, sectors: number): number {
  let area = 0;
  for (let j = 0; j < sectors; j++) area += moments[MOMENTS * j];
  return area;
}

function difference(a: Float64Array, b: Float64Array, sectors: number): number {
  let sum = 0;
  for (let j = 0; j < sectors; j++) sum += Math.abs(a[MOMENTS * j] - b[MOMENTS * j]);
  return sum;
}
