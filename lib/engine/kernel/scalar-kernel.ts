import { netToPowers } from '../patches/bicubic-powers';
import { gaussRule } from '../patches/gauss-rule';
import { bicubicPowerArea, bicubicPowerMoments } from './bicubic-scalar';
import { biquadraticNetToPowers } from './biquadratic-powers';
import { biquadraticPowerArea, biquadraticPowerMoments } from './biquadratic-scalar';
import { inputStride, MOST_PAIRS, NET_VALUES, OUTPUT_STRIDE, type FanKernel, type PatchKind } from './patch-kinds';
import { FAN_ROOM, scalarFans } from './scalar-fans';
import { triangleNetToPowers } from './triangle-powers';
import { trianglePowerArea, trianglePowerMoments } from './triangle-scalar';

/** What the kernels do with one patch. */
interface Steps {
  toPowers(net: Float64Array, powers: Float64Array): void;
  moments(powers: Float64Array, nodes: number, solid: Float64Array, surface: Float64Array): number;
  area(powers: Float64Array, nodes: number): number;
}

const STEPS: Readonly<Record<PatchKind, Steps>> = {
  bicubic: {
    toPowers: netToPowers,
    moments: (powers, nodes, solid, surface) => bicubicPowerMoments(powers, gaussRule(nodes), solid, surface),
    area: (powers, nodes) => bicubicPowerArea(powers, gaussRule(nodes)),
  },
  biquadratic: {
    toPowers: biquadraticNetToPowers,
    moments: (powers, nodes, solid, surface) => biquadraticPowerMoments(powers, gaussRule(nodes), solid, surface),
    area: (powers, nodes) => biquadraticPowerArea(powers, gaussRule(nodes)),
  },
  triangle: {
    toPowers: triangleNetToPowers,
    moments: (powers, nodes, solid, surface) => trianglePowerMoments(powers, gaussRule(nodes + 1), gaussRule(nodes), solid, surface),
    area: (powers, nodes) => trianglePowerArea(powers, gaussRule(nodes + 1), gaussRule(nodes)),
  },
};

const powers = new Float64Array(48);

/**
 * Ten solid and ten surface moments of one patch about (ox, oy, oz), by `nodes` Gauss nodes a direction (one more along a triangle's first side).
 * `net` holds NET_VALUES values, X_u × X_v points outwards. Solid moments are those of the cone from the point to the patch; exact from 7 nodes on for
 * bicubics, 5 for biquadratics, 9 for triangles. Returns ∮ (|x n_x| + |y n_y| + |z n_z|)/3, which the volume's rounding error is relative to.
 */
export function patchMoments(kind: PatchKind, net: Float64Array, ox: number, oy: number, oz: number, nodes: number, solid: Float64Array, surface: Float64Array): number {
  const steps = STEPS[kind];
  steps.toPowers(net, powers);
  powers[0] -= ox;
  powers[1] -= oy;
  powers[2] -= oz;
  return steps.moments(powers, nodes, solid, surface);
}

const net = new Float64Array(48);
const solid = new Float64Array(10);
const surface = new Float64Array(10);

/** A kernel in JavaScript: the same layout, the same operations in the same order as the vector kernel, so the same bits. */
export function scalarKernel(kind: PatchKind): FanKernel {
  const values = NET_VALUES[kind];
  const steps = STEPS[kind];
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
    if (coarseCount > 0) output[to + 42] = steps.area(powers, coarseCount);
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
