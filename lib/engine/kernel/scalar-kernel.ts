import { netToPowers } from '../patches/bicubic-powers';
import { gaussRule } from '../patches/gauss-rule';
import { bicubicNodes } from './bicubic-scalar';
import { biquadraticNetToPowers } from './biquadratic-powers';
import { biquadraticNodes } from './biquadratic-scalar';
import { AREA_SUMS, MOMENT_SUMS, TOTALS } from './node-sums';
import { ALONG_EXTRA, inputStride, MOST_PAIRS, NET_VALUES, OUTPUT_STRIDE, type FanKernel, type PatchKind } from './patch-kinds';
import { FAN_ROOM, scalarFans } from './scalar-fans';
import { triangleNetToPowers } from './triangle-powers';
import { triangleNodes } from './triangle-scalar';

const TO_POWERS = { bicubic: netToPowers, biquadratic: biquadraticNetToPowers, triangle: triangleNetToPowers };
const NODES = { bicubic: bicubicNodes, biquadratic: biquadraticNodes, triangle: triangleNodes };

/** What ten solid moments are sums of: ∮ f(X) det(X, X_u, X_v) is 3 + deg f times the moment. */
const DIVISORS = [3, 4, 4, 4, 5, 5, 5, 5, 5, 5];

const totals = new Float64Array(TOTALS);
const powers = new Float64Array(48);

/** As `patchMoments`, of the patch with the power coefficients `p` about the point that they are relative to. */
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

/**
 * Ten solid and ten surface moments of one patch about (ox, oy, oz), by `nodes` Gauss nodes a direction (one more along a triangle's first side).
 * `net` holds NET_VALUES values, X_u × X_v points outwards. Solid moments are those of the cone from the point to the patch; exact from 7 nodes on for
 * bicubics, 5 for biquadratics, 9 for triangles. Returns ∮ (|x n_x| + |y n_y| + |z n_z|)/3, which the volume's rounding error is relative to.
 */
export function patchMoments(kind: PatchKind, net: Float64Array, ox: number, oy: number, oz: number, nodes: number, solid: Float64Array, surface: Float64Array): number {
  TO_POWERS[kind](net, powers);
  powers[0] -= ox;
  powers[1] -= oy;
  powers[2] -= oz;
  return powerMoments(kind, powers, nodes, solid, surface);
}

const net = new Float64Array(48);
const solid = new Float64Array(10);
const surface = new Float64Array(10);

/** A kernel in JavaScript: the same layout, the same operations in the same order as the vector kernel, so the same bits. */
export function scalarKernel(kind: PatchKind): FanKernel {
  const values = NET_VALUES[kind];
  const stride = inputStride(kind);
  const input = new Float64Array(MOST_PAIRS * stride);
  const output = new Float64Array(MOST_PAIRS * OUTPUT_STRIDE);
  const runOne = (patch: number, count: number, coarseCount: number): void => {
    const from = (patch >> 1) * stride + (patch & 1);
    const to = (patch >> 1) * OUTPUT_STRIDE + (patch & 1);
    for (let i = 0; i < values; i++) net[i] = input[from + 2 * i];
    const origin = from + 2 * values;
    output[to + 40] = patchMoments(kind, net, input[origin], input[origin + 2], input[origin + 4], count, solid, surface);
    for (let i = 0; i < 10; i++) {
      output[to + 2 * i] = solid[i];
      output[to + 2 * (10 + i)] = surface[i];
    }
    if (coarseCount > 0) output[to + 42] = powerArea(kind, powers, coarseCount);
  };
  return {
    kind,
    pairs: MOST_PAIRS,
    input,
    output,
    run(pairs, count, coarseCount) {
      for (let patch = 0; patch < 2 * pairs; patch++) runOne(patch, count, coarseCount);
    },
    fans: scalarFans(new Float64Array(FAN_ROOM), input, stride, output, OUTPUT_STRIDE),
  };
}
