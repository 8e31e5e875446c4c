import { tailLevels, tailWeights } from '../moments/tail-weights';
import { SMOOTH_CENTRE } from './classify-vertices';
import type { FanKit } from './fan-kit';
import { makeFanState, type FanState } from './fan-state';

/** Digits to which a fan's tail is closed. */
const TAIL_DIGITS = 15;

/** Digits to which the surface moments of a fan with a crease or corner are summed. */
const SURFACE_DIGITS = 12;

/** Closing weights of one kind of fan. `check` are those of one level less, whose difference bounds the closing's error. */
export interface FanTable {
  weights: Float64Array;
  check: Float64Array;
  /** The same for the surface moments, whose terms are no finite sum of powers. */
  surfaceWeights: Float64Array;
  surfaceCheck: Float64Array;
  /** For curves through the centre, whose terms shrink more slowly: levels are closed in pairs, or the weights would grow to 1e7 and their rounding with them. */
  curveWeights: Float64Array;
}

const tables = new WeakMap<FanKit, Map<number, FanTable>>();

/** The table of a scheme's fans of one valence and kind, made on first need. */
export function fanTable(kit: FanKit, fan: FanState): FanTable {
  let known = tables.get(kit);
  if (known === undefined) {
    known = new Map();
    tables.set(kit, known);
  }
  const key = ((fan.sectors * 2 + (fan.closed ? 1 : 0)) * 2 + (fan.sharpFirst ? 1 : 0)) * 3 + fan.centreRule;
  const made = known.get(key);
  if (made !== undefined) return made;
  // Iteration falls short where eigenvalues crowd; the closing does no worse for a little more.
  const lambda = Math.min(isPlain(fan) ? kit.smoothShrinkage(fan.sectors) : 1.002 * dominantShrinkage(kit, fan), kit.largestShrinkage);
  const largest = lambda * lambda;
  const levels = tailLevels(largest, TAIL_DIGITS);
  const curve = Math.max(lambda, 0.5) ** 2;
  const pairs = tailWeights(curve, tailLevels(curve, TAIL_DIGITS));
  const weights = tailWeights(largest, levels);
  const check = tailWeights(largest, levels - 1);
  // Around a smooth point the area's terms are as good as powers. Along creases and at corners two eigenvalues lie close together and the root
  // mixes them without end: there the levels are summed until the rest, a geometric one by then, no longer counts.
  const surfaceLevels = Math.ceil(-SURFACE_DIGITS / Math.log10(largest));
  const table = {
    weights,
    check,
    surfaceWeights: isPlain(fan) ? weights : geometricWeights(largest, surfaceLevels),
    surfaceCheck: isPlain(fan) ? check : geometricWeights(largest, surfaceLevels - 1),
    curveWeights: Float64Array.from({ length: 2 * pairs.length }, (_, k) => pairs[k >> 1]),
  };
  known.set(key, table);
  return table;
}

function geometricWeights(ratio: number, levels: number): Float64Array {
  const weights = new Float64Array(levels).fill(1);
  weights[levels - 1] = 1 / (1 - ratio);
  return weights;
}

function isPlain(fan: FanState): boolean {
  return fan.closed && !fan.sharpFirst && fan.centreRule === SMOOTH_CENTRE;
}

/**
 * Largest modulus of the refinement's eigenvalues but the 1 of constants: power iteration on the rings less their centre,
 * three independent starts at once (one a coordinate). Only the modulus is needed, so repeated and complex eigenvalues do no harm.
 */
function dominantShrinkage(kit: FanKit, kind: FanState): number {
  let state = makeFanState(kind.sectors, kind.closed, kind.sharpFirst, kind.centreRule);
  let finer = makeFanState(kind.sectors, kind.closed, kind.sharpFirst, kind.centreRule);
  let seed = 1;
  const noise = (): number => {
    seed = (seed * 48271) % 2147483647;
    return seed / 2147483647 - 0.5;
  };
  for (const values of [state.centre, state.spokes, state.inner]) for (let i = 0; i < values.length; i++) values[i] = noise();
  const steps = 400;
  const settle = 320;
  let growth = 0;
  for (let step = 0; step < steps; step++) {
    kit.refine(state, finer);
    [state, finer] = [finer, state];
    let size = 0;
    for (const values of [state.spokes, state.inner]) {
      for (let i = 0; i < values.length; i++) {
        values[i] -= state.centre[i % 3];
        size = Math.max(size, Math.abs(values[i]));
      }
    }
    state.centre.fill(0);
    for (const values of [state.spokes, state.inner]) for (let i = 0; i < values.length; i++) values[i] /= size;
    if (step >= settle) growth += Math.log(size);
  }
  return Math.exp(growth / (steps - settle));
}
