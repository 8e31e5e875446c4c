import { tailLevels, tailWeights } from '../moments/tail-weights';
import { SMOOTH_CENTRE } from './classify-vertices';
import type { FanKit } from './fan-kit';
import { makeFanOperator, type FanOperator } from './fan-operator';
import { makeFanRim, type FanRim } from './fan-rim';
import type { FanState } from './fan-state';
import { applyRows } from './sparse-rows';

/** Digits to which a fan's tail is closed: about its limit point, where the fan's own moments are small beside what its rim adds; and about any other point. */
const TAIL_DIGITS = 14;
const WIDE_DIGITS = 15;

/** Digits to which the surface moments are summed. */
const SURFACE_DIGITS = 11;

/** Closing weights of one kind of fan. `check` are those of one level less, whose difference bounds the closing's error. */
export interface FanTable {
  /** For solid moments about the fan's limit point, whose terms shrink by |λ1 λ2 λ3| a level at least. */
  weights: Float64Array;
  check: Float64Array;
  /** For solid moments about any other point: |λ1 λ2|. */
  wideWeights: Float64Array;
  wideCheck: Float64Array;
  /**
   * The same for the surface moments, whose terms are no finite sum of powers. `surfaceLate` closes from the second level on, by one weight less: where the terms
   * are like powers only later, because the normal nearly vanishes somewhere, the three closings do not agree.
   */
  surfaceWeights: Float64Array;
  surfaceCheck: Float64Array;
  surfaceLate: Float64Array;
  /** For curves through the centre, whose terms shrink more slowly: levels are closed in pairs, or the weights would grow to 1e7 and their rounding with them. */
  curveWeights: Float64Array;
  curveCheck: Float64Array;
  operator: FanOperator;
  rim: FanRim;
}

const tables = new WeakMap<FanKit, Map<number, FanTable>>();

/** Names a kind of fan among those of its scheme. */
export function fanKey(sectors: number, closed: boolean, sharpFirst: boolean, centreRule: number): number {
  return ((sectors * 2 + (closed ? 1 : 0)) * 2 + (sharpFirst ? 1 : 0)) * 3 + centreRule;
}

/** The table of a scheme's fans of one valence and kind, made on first need. */
export function fanTable(kit: FanKit, fan: FanState): FanTable {
  let known = tables.get(kit);
  if (known === undefined) {
    known = new Map();
    tables.set(kit, known);
  }
  const key = fanKey(fan.sectors, fan.closed, fan.sharpFirst, fan.centreRule);
  let table = known.get(key);
  if (table === undefined) {
    table = makeTable(kit, fan);
    known.set(key, table);
  }
  return table;
}

function makeTable(kit: FanKit, fan: FanState): FanTable {
  const operator = makeFanOperator(kit, fan);
  const found = shrinkages(operator);
  const lambda = Math.min(isPlain(fan) ? kit.smoothShrinkage(fan.sectors) : found[0], kit.largestShrinkage);
  const area = lambda * lambda;
  const volume = Math.min(area * lambda, found[2]);
  const levels = tailLevels(volume, TAIL_DIGITS);
  const wideLevels = tailLevels(area, WIDE_DIGITS);
  const curve = Math.max(lambda, 0.5) ** 2;
  const pairs = tailLevels(curve, WIDE_DIGITS);
  const surface: SurfaceClosing = isPlain(fan) ? smoothSurface(area, Math.min(area, lambda * (found[2] / found[1]))) : geometricSurface(area);
  return {
    weights: tailWeights(volume, levels),
    check: tailWeights(volume, levels - 1),
    wideWeights: tailWeights(area, wideLevels),
    wideCheck: tailWeights(area, wideLevels - 1),
    ...surface,
    curveWeights: inPairs(tailWeights(curve, pairs)),
    curveCheck: inPairs(tailWeights(curve, pairs - 1)),
    operator,
    rim: makeFanRim(kit, fan, operator.points),
  };
}

type SurfaceClosing = Pick<FanTable, 'surfaceWeights' | 'surfaceCheck' | 'surfaceLate'>;

/** Around a smooth point the area's terms are as good as powers: the tangent plane's, `area`, and others that fall by `next`. */
function smoothSurface(area: number, next: number): SurfaceClosing {
  const levels = 1 + tailLevels(next, SURFACE_DIGITS);
  const surfaceCheck = tailWeights(next, levels - 1, area);
  return { surfaceWeights: tailWeights(next, levels, area), surfaceCheck, surfaceLate: Float64Array.of(1, ...surfaceCheck) };
}

/**
 * Along creases and at corners two eigenvalues lie close together and the root mixes them without end: there the levels are summed until the rest,
 * a geometric one by then, no longer counts.
 */
function geometricSurface(area: number): SurfaceClosing {
  const levels = Math.ceil(-SURFACE_DIGITS / Math.log10(area));
  const surfaceWeights = geometricWeights(area, levels);
  return { surfaceWeights, surfaceCheck: geometricWeights(area, levels - 1), surfaceLate: surfaceWeights };
}

function geometricWeights(ratio: number, levels: number): Float64Array {
  const weights = new Float64Array(levels).fill(1);
  weights[levels - 1] = 1 / (1 - ratio);
  return weights;
}

function inPairs(weights: Float64Array): Float64Array {
  return Float64Array.from({ length: 2 * weights.length }, (_, k) => weights[k >> 1]);
}

function isPlain(fan: FanState): boolean {
  return fan.closed && !fan.sharpFirst && fan.centreRule === SMOOTH_CENTRE;
}

const STEPS = 200;
const SETTLED = 140;

/** Iteration falls short where eigenvalues crowd; the closing does no worse for a little more. */
const MARGIN = 1.004;

/**
 * |λ1|, |λ1 λ2|, |λ1 λ2 λ3| of the refinement's eigenvalues but the 1 of constants, with multiplicity: by how much lengths, areas and volumes in the space of
 * rings (less their first point) shrink a step. Only moduli are needed, so repeated and complex eigenvalues do no harm. Slightly too large on purpose.
 */
function shrinkages({ points, matrix }: FanOperator): [number, number, number] {
  const size = 3 * points.count;
  let state = new Float64Array(3 * matrix.rows);
  let finer = new Float64Array(3 * matrix.rows);
  let seed = 1;
  for (let i = 0; i < size; i++) {
    seed = (seed * 48271) % 2147483647;
    state[i] = seed / 2147483647 - 0.5;
  }
  const growth = [0, 0, 0];
  for (let step = 0; step < STEPS; step++) {
    applyRows(matrix, state, 0, finer, 0);
    [state, finer] = [finer, state];
    for (let axis = 0; axis < 3; axis++) for (let i = size - 3 + axis; i >= 0; i -= 3) state[i] -= state[axis];
    // Gram-Schmidt on the three coordinates, each a vector of the rings.
    for (let axis = 0; axis < 3; axis++) {
      for (let before = 0; before < axis; before++) {
        let product = 0;
        for (let i = 0; i < size; i += 3) product += state[i + axis] * state[i + before];
        for (let i = 0; i < size; i += 3) state[i + axis] -= product * state[i + before];
      }
      let square = 0;
      for (let i = axis; i < size; i += 3) square += state[i] * state[i];
      const length = Math.sqrt(square);
      for (let i = axis; i < size; i += 3) state[i] /= length;
      if (step >= SETTLED) growth[axis] += Math.log(length);
    }
  }
  const steps = STEPS - SETTLED;
  return [
    MARGIN * Math.exp(growth[0] / steps), MARGIN * Math.exp((growth[0] + growth[1]) / steps), MARGIN * Math.exp((growth[0] + growth[1] + growth[2]) / steps),
  ];
}
