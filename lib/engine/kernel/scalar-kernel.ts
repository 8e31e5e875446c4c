import { netToPowers } from '../patches/bicubic-powers';
import { gaussRule } from '../patches/gauss-rule';
import { bicubicBounds, bicubicNodes, bicubicVariation } from './bicubic-scalar';
import { biquadraticNetToPowers } from './biquadratic-powers';
import { biquadraticBounds, biquadraticNodes, biquadraticVariation } from './biquadratic-scalar';
import { AREA_CALM, AREA_CUTOFF, AREA_NEAR, coarseOf, NODE_RANGES, nodesAfter } from './node-choice';
import { AREA_SUMS, MOMENT_SUMS, TOTALS } from './node-sums';
import { ALONG_EXTRA, inputStride, MOST_PAIRS, NET_VALUES, OUTPUT_STRIDE, type FanKernel, type PatchKind } from './patch-kinds';
import { FAN_ROOM, scalarFans } from './scalar-fans';
import { triangleNetToPowers } from './triangle-powers';
import { triangleBounds, triangleNodes, triangleVariation } from './triangle-scalar';

const TO_POWERS = { bicubic: netToPowers, biquadratic: biquadraticNetToPowers, triangle: triangleNetToPowers };
const NODES = { bicubic: bicubicNodes, biquadratic: biquadraticNodes, triangle: triangleNodes };
const VARIATION = { bicubic: bicubicVariation, biquadratic: biquadraticVariation, triangle: triangleVariation };
const BOUNDS = { bicubic: bicubicBounds, biquadratic: biquadraticBounds, triangle: triangleBounds };

/** What ten solid moments are sums of: ∮ f(X) det(X, X_u, X_v) is 3 + deg f times the moment. */
const DIVISORS = [3, 4, 4, 4, 5, 5, 5, 5, 5, 5];

const totals = new Float64Array(TOTALS);

/**
 * Ten solid and ten surface moments of the patch with the power coefficients `p` about the point that they are relative to, by `nodes` Gauss nodes a direction
 * (one more along a triangle's first side); X_u × X_v points outwards. Solid moments are those of the cone from the point to the patch. Returns
 * ∮ (|x n_x| + |y n_y| + |z n_z|)/3, which the volume's rounding error is relative to.
 */
function powerMoments(kind: PatchKind, p: Float64Array, nodes: number, solid: Float64Array, surface: Float64Array): number {
  totals.fill(0);
  NODES[kind](p, gaussRule(nodes + ALONG_EXTRA[kind]), gaussRule(nodes), MOMENT_SUMS, totals);
  for (let i = 0; i < 10; i++) {
    solid[i] = totals[1 + i] / DIVISORS[i];
    surface[i] = totals[11 + i];
  }
  return totals[0] / 3;
}

/** Area of the patch with the power coefficients `p` by so many nodes a direction. */
function powerArea(kind: PatchKind, p: Float64Array, nodes: number): number {
  totals.fill(0);
  NODES[kind](p, gaussRule(nodes + ALONG_EXTRA[kind]), gaussRule(nodes), AREA_SUMS, totals);
  return totals[11];
}

const net = new Float64Array(48);
const pair = [new Float64Array(48), new Float64Array(48)];
/** Where among the bounds that of the normal's variation stands, and up to which it does instead of looking at the corners, as lib/run/support/kernel-bounds.mjs has it. */
const VARIATION_AT = 7;
const CALM_VARIATION = 0.03;
const pairBounds = [new Float64Array(8), new Float64Array(8)];
const variation = new Float64Array(1);
const solid = new Float64Array(10);
const surface = new Float64Array(10);

/** A kernel in JavaScript: the same layout, the same operations in the same order as the vector kernel, so the same bits. */
export function scalarKernel(kind: PatchKind): FanKernel {
  const values = NET_VALUES[kind];
  const stride = inputStride(kind);
  const input = new Float64Array(MOST_PAIRS * stride);
  const output = new Float64Array(MOST_PAIRS * OUTPUT_STRIDE);
  const { fewest: least, exact, forArea, most } = NODE_RANGES[kind];
  const putPowers = (at: number): void => {
    for (let lane = 0; lane < 2; lane++) {
      const from = at * stride + lane;
      for (let i = 0; i < values; i++) net[i] = input[from + 2 * i];
      TO_POWERS[kind](net, pair[lane]);
      for (let axis = 0; axis < 3; axis++) pair[lane][axis] -= input[from + 2 * (values + axis)];
    }
  };
  const runPair = (at: number, count: number, coarseCount: number): void => {
    for (let lane = 0; lane < 2; lane++) {
      const to = at * OUTPUT_STRIDE + lane;
      output[to + 40] = powerMoments(kind, pair[lane], count, solid, surface);
      for (let i = 0; i < 10; i++) {
        output[to + 2 * i] = solid[i];
        output[to + 2 * (10 + i)] = surface[i];
      }
      if (coarseCount > 0) output[to + 42] = powerArea(kind, pair[lane], coarseCount);
      output[to + 48] = count;
    }
  };
  const putVariation = (at: number, bounded: boolean): void => {
    const calm = bounded && pairBounds.every((bounds) => bounds[VARIATION_AT] <= CALM_VARIATION);
    for (let lane = 0; lane < 2; lane++) {
      if (calm) variation[0] = pairBounds[lane][VARIATION_AT];
      else VARIATION[kind](pair[lane], variation);
      output[at * OUTPUT_STRIDE + 50 + lane] = variation[0];
    }
  };
  const agree = (at: number, cutoff: number): boolean => {
    const from = at * OUTPUT_STRIDE;
    for (let lane = from; lane < from + 2; lane++) if (!(Math.abs(output[lane + 20] - output[lane + 42]) <= cutoff * output[lane + 20])) return false;
    return true;
  };
  const putErrors = (at: number, second: readonly number[], first: readonly number[]): void => {
    for (let lane = 0; lane < 2; lane++) {
      output[at * OUTPUT_STRIDE + 44 + lane] = second[lane];
      output[at * OUTPUT_STRIDE + 46 + lane] = first[lane];
    }
  };
  const NONE = [0, 0];
  /** Nodes that do for the solid moments of a pair, and what they may err by then. */
  const enough = (at: number, fewest: number, tolerance: number, reach: number): number => {
    for (let lane = 0; lane < 2; lane++) BOUNDS[kind](pair[lane], tolerance, reach, pairBounds[lane]);
    const left = (nodes: number): number[] => pairBounds.map((bounds) => bounds[2 + nodes - least]);
    let nodes = fewest;
    while (nodes < exact && !left(nodes).every((bound, lane) => bound <= pairBounds[lane][0])) nodes++;
    if (nodes < exact) putErrors(at, left(nodes).map((bound) => bound / 5), left(nodes).map((bound, lane) => bound / (4 * pairBounds[lane][1])));
    return nodes;
  };
  return {
    kind,
    pairs: MOST_PAIRS,
    input,
    output,
    run(pairs, count, coarseCount) {
      for (let at = 0; at < pairs; at++) {
        putPowers(at);
        if (coarseCount > 0) putVariation(at, false);
        runPair(at, count, coarseCount);
        putErrors(at, NONE, NONE);
      }
    },
    choose(pairs, fewest, tolerance, reach) {
      let start = fewest;
      for (let at = 0; at < pairs; at++) {
        putPowers(at);
        putErrors(at, NONE, NONE);
        let nodes = Math.max(start, tolerance > 0 ? enough(at, fewest, tolerance, reach) : fewest);
        putVariation(at, tolerance > 0);
        runPair(at, nodes, coarseOf(kind, nodes));
        while (!agree(at, AREA_CUTOFF)) {
          const close = agree(at, AREA_NEAR);
          if (nodes < forArea) nodes = close ? nodesAfter(kind, nodes) : forArea;
          else if (nodes < most && close) nodes = nodesAfter(kind, nodes);
          else break;
          runPair(at, nodes, coarseOf(kind, nodes));
        }
        start = nodes >= forArea && !agree(at, AREA_CALM) ? forArea : fewest;
      }
    },
    fans: scalarFans(new Float64Array(FAN_ROOM), input, stride, output, OUTPUT_STRIDE),
  };
}
