import { tailLevels, tailWeights } from '../moments/tail-weights';
import { makeFanState, refineFan, type FanState } from './catmull-clark-fan';

/** Digits to which a fan's tail is closed. */
const TAIL_DIGITS = 15;

/** Closing weights of one kind of fan. `check` are those of one level less, whose difference bounds the closing's error. */
export interface FanTable {
  weights: Float64Array;
  check: Float64Array;
  /** For curves through the centre, whose terms shrink more slowly. */
  curveWeights: Float64Array;
}

const tables = new Map<number, FanTable>();

/** The table of a valence and kind, made on first need. */
export function fanTable(fan: FanState): FanTable {
  const key = ((fan.sectors * 2 + (fan.closed ? 1 : 0)) * 2 + (fan.sharpFirst ? 1 : 0)) * 3 + fan.centreRule;
  const known = tables.get(key);
  if (known !== undefined) return known;
  const lambda = dominantShrinkage(fan);
  const largest = lambda * lambda;
  const levels = tailLevels(largest, TAIL_DIGITS);
  const curve = Math.max(lambda, 0.5);
  const table = {
    weights: tailWeights(largest, levels),
    check: tailWeights(largest, levels - 1),
    curveWeights: tailWeights(curve, tailLevels(curve, TAIL_DIGITS)),
  };
  tables.set(key, table);
  return table;
}

/**
 * Largest modulus of the refinement's eigenvalues but the 1 of constants: power iteration on the rings less their centre,
 * three independent starts at once (one a coordinate). Only the modulus is needed, so repeated and complex eigenvalues do no harm.
 */
function dominantShrinkage(kind: FanState): number {
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
    refineFan(state, finer);
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
