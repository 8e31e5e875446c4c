import TinyQueue from 'tinyqueue';
import type { Borders } from '../mesh/border-loops';
import { CURVE_POWERS } from './border-curves';
import { addPieceChain, noMoments, type CurveTable } from './curve-table';
import type { LimitSums } from './limit-sums';
import { MOMENTS } from './sums';

/** How much of each body its caps are: their area and the volume between them and the body's origin. */
export interface CapAmounts {
  area: Float64Array;
  volume: Float64Array;
}

/** A border edge's curve or a straight spoke of an earlier cap, with the loop on each side. */
interface Segment {
  /** Border edge, or -1 for a spoke. */
  edge: number;
  /** Power coefficients of a spoke. */
  line: Float64Array | null;
  left: number;
  right: number;
}

/** Lengths and places are compared in steps of this, relatively, so that rounding does not choose which loop is peeled first. */
const STEP = 1e-9;

/** A loop in the order of peeling: its length in steps, its body's rank, its apex in steps. */
interface Waiting {
  loop: number;
  order: number[];
}

/**
 * Closes all bodies by cones over their border loops and subtracts the chains [O, s, C] from the solid's sums, with what the closings of their curves may err by. The apex s of a loop is the mean over its
 * edges of ∫₀¹ C dt, which refinement does not change. Where borders branch, the shortest loop that bounds one body is coned from its own mean and
 * replaced in its neighbours' loops by spokes from its junctions to the apex, until none is left; so each cap bounds two bodies and parts stay additive.
 * Of loops of one length the first by `rankOf` (a number for each body) is peeled first, then the one whose apex lies lowest along x, y, z: the numbering of faces never chooses.
 */
export function addCaps(borders: Borders, curves: CurveTable, origins: Float64Array, sums: Pick<LimitSums, 'solid' | 'closingError'>, rankOf: Int32Array): CapAmounts {
  const bodies = rankOf.length;
  const amounts: CapAmounts = { area: new Float64Array(bodies), volume: new Float64Array(bodies) };
  const segments: Segment[] = borders.segments.map((s) => ({ edge: s.edge, line: null, left: s.left, right: s.right }));
  const loops = borders.loops.map((loop) => ({ body: loop.body, steps: loop.steps }));
  const lengthOf = (segment: Segment): number => (segment.line !== null ? Math.hypot(segment.line[3], segment.line[4], segment.line[5]) : curves.length(segment.edge));
  /** What waits; an entry whose loop has changed since is no longer its loop's latest. */
  const queue = new TinyQueue<Waiting>([], (one, other) => compare(one.order, other.order));
  const latest = new Map<number, Waiting>();
  const measureLoop = (loop: number): void => {
    const { steps, body } = loops[loop];
    const length = steps.reduce((sum, step) => sum + lengthOf(segments[step >> 1]), 0);
    const places = apexOf(steps, segments, curves).map((place) => (length > 0 ? Math.round(place / (STEP * length)) : 0));
    const waiting = { loop, order: [Math.round(Math.log(length) / STEP), body < 0 ? bodies : rankOf[body], ...places] };
    latest.set(loop, waiting);
    queue.push(waiting);
  };

  const close = (loop: number): void => {
    const { steps } = loops[loop];
    const apex = apexOf(steps, segments, curves);
    coneLoop(loop, apex);
    replaceBySpokes(loop, apex);
    latest.delete(loop);
  };

  /** Subtracts the cap's chains on both sides of the loop. */
  const coneLoop = (loop: number, apex: number[]): void => {
    const own = noMoments();
    const perSide = new Map<number, Float64Array>();
    for (const step of loops[loop].steps) {
      const segment = segments[step >> 1];
      const backwards = (step & 1) === 1;
      const other = backwards ? segment.left : segment.right;
      const body = loops[loop].body;
      if (body >= 0) amounts.area[body] += chain(segment, body, apex, backwards ? 1 : -1, own);
      const otherBody = loops[other].body;
      if (otherBody < 0) continue;
      const side = perSide.get(otherBody) ?? noMoments();
      perSide.set(otherBody, side);
      amounts.area[otherBody] += chain(segment, otherBody, apex, backwards ? -1 : 1, side);
    }
    if (loops[loop].body >= 0) addSide(loops[loop].body, own);
    for (const [body, side] of perSide) addSide(body, side);
  };
  const addSide = (body: number, moments: Float64Array): void => {
    sums.solid.add(body, moments, 0);
    sums.solid.magnitudes[body] += Math.abs(moments[0]);
    amounts.volume[body] += Math.abs(moments[0]);
  };
  /** Adds a segment's chain, as a body sees it, to `out`; returns the area of its cone. */
  const chain = (segment: Segment, body: number, apex: number[], sign: number, out: Float64Array): number => {
    const origin = origins.subarray(3 * body, 3 * body + 3);
    if (segment.line !== null) return addPieceChain(segment.line, 0, origin, apex, sign, out);
    return curves.addChain(segment.edge, origin, apex, sign, out, sums.closingError.subarray(MOMENTS * body, MOMENTS * (body + 1)));
  };

  /** Takes the loop out of its neighbours: runs of its segments along one neighbour become two spokes over the apex. */
  const replaceBySpokes = (loop: number, apex: number[]): void => {
    const runs = runsOf(loops[loop].steps, segments, loops);
    const touched = new Set<number>();
    const spokes = new Map<number, number>();
    if (runs.length > 1) {
      for (let i = 0; i < runs.length; i++) {
        const before = runs[(i + runs.length - 1) % runs.length];
        // Spoke from the junction where run i starts to the apex: the neighbour of run i lies to its right, that of the run before to its left.
        const start = startPoint(runs[i].steps[0], segments, curves);
        spokes.set(i, segments.length);
        segments.push({ edge: -1, line: straight(start, apex), left: before.other, right: runs[i].other });
      }
    }
    for (let i = 0; i < runs.length; i++) {
      const { other, steps } = runs[i];
      touched.add(other);
      // The neighbour walks the run the other way round: it comes from the run's end and leaves at its start.
      const reversed = steps.map((step) => step ^ 1).reverse();
      const into = spokes.get((i + 1) % runs.length);
      const outOf = spokes.get(i);
      const replacement = into === undefined || outOf === undefined ? [] : [2 * into, 2 * outOf + 1];
      splice(loops[other].steps, reversed, replacement);
    }
    loops[loop].steps = [];
    for (const other of touched) untangle(other);
  };

  /**
   * A loop that goes along a spoke and, at once or later, straight back encloses two regions joined by a slit: it falls apart into two loops
   * of the same body, since the slit's two chains cancel.
   */
  const untangle = (loop: number): void => {
    const { steps, body } = loops[loop];
    const at = new Map<number, number>();
    for (let j = 0; j < steps.length; j++) {
      const i = at.get(steps[j] ^ 1);
      at.set(steps[j], j);
      if (i === undefined) continue;
      const cutOff = steps.slice(i + 1, j);
      loops[loop].steps = steps.slice(0, i).concat(steps.slice(j + 1));
      if (cutOff.length > 0) {
        const split = loops.length;
        loops.push({ body, steps: cutOff });
        for (const step of cutOff) {
          if ((step & 1) === 1) segments[step >> 1].right = split;
          else segments[step >> 1].left = split;
        }
        untangle(split);
      }
      untangle(loop);
      return;
    }
    if (steps.length === 0) latest.delete(loop);
    else measureLoop(loop);
  };

  for (let loop = 0; loop < loops.length; loop++) measureLoop(loop);
  for (let next = queue.pop(); next !== undefined; next = queue.pop()) if (latest.get(next.loop) === next) close(next.loop);
  return amounts;
}

function compare(one: readonly number[], other: readonly number[]): number {
  const at = one.findIndex((value, i) => value !== other[i]);
  return at < 0 ? 0 : one[at] - other[at];
}

interface Run {
  other: number;
  steps: number[];
}

/**
 * Cuts a loop at its junctions: where the neighbour changes, and where the neighbour's own walk goes elsewhere because a third body touches there.
 * One run where there is no junction.
 */
function runsOf(steps: number[], segments: Segment[], loops: readonly { steps: number[] }[]): Run[] {
  const otherOf = (step: number): number => ((step & 1) === 1 ? segments[step >> 1].left : segments[step >> 1].right);
  const after = new Map<number, number>();
  for (const other of new Set(steps.map(otherOf))) {
    const walk = loops[other].steps;
    for (let i = 0; i < walk.length; i++) after.set(walk[i], walk[(i + 1) % walk.length]);
  }
  const isCut = (i: number): boolean => {
    const step = steps[i];
    const before = steps[(i + steps.length - 1) % steps.length];
    return otherOf(step) !== otherOf(before) || after.get(step ^ 1) !== (before ^ 1);
  };
  let first = 0;
  while (first < steps.length && !isCut(first)) first++;
  if (first === steps.length) return [{ other: otherOf(steps[0]), steps: steps.slice() }];
  const runs: Run[] = [];
  for (let i = 0; i < steps.length; i++) {
    const at = (first + i) % steps.length;
    if (isCut(at)) runs.push({ other: otherOf(steps[at]), steps: [] });
    runs[runs.length - 1].steps.push(steps[at]);
  }
  return runs;
}

/** Replaces the entries of `run`, which follow each other around the cyclic list, by `replacement`. */
function splice(steps: number[], run: number[], replacement: number[]): void {
  const at = steps.indexOf(run[0]);
  const rest = steps.slice(at).concat(steps.slice(0, at)).slice(run.length);
  steps.length = 0;
  for (const step of replacement) steps.push(step);
  for (const step of rest) steps.push(step);
}

function straight(from: ArrayLike<number>, to: ArrayLike<number>): Float64Array {
  const line = new Float64Array(CURVE_POWERS);
  for (let axis = 0; axis < 3; axis++) {
    line[axis] = (from[axis] + to[axis]) / 2;
    line[3 + axis] = to[axis] - from[axis];
  }
  return line;
}

/** Where a step begins. */
function startPoint(step: number, segments: Segment[], curves: CurveTable): ArrayLike<number> {
  const segment = segments[step >> 1];
  const end = (step & 1) === 1 ? 1 : 0;
  if (segment.line === null) return curves.end(segment.edge, end);
  const t = end - 0.5;
  return [0, 1, 2].map((axis) => (segment.line === null ? 0 : segment.line[axis] + t * segment.line[3 + axis]));
}

/** Mean of ∫₀¹ C dt over a loop's real edges; over its spokes where it has no real edge. */
function apexOf(steps: number[], segments: Segment[], curves: CurveTable): number[] {
  const apex = [0, 0, 0];
  const real = steps.filter((step) => segments[step >> 1].line === null);
  const counted = real.length > 0 ? real : steps;
  for (const step of counted) {
    const { edge, line } = segments[step >> 1];
    const mean: ArrayLike<number> = line ?? curves.mean(edge);
    for (let axis = 0; axis < 3; axis++) apex[axis] += mean[axis] / counted.length;
  }
  return apex;
}
