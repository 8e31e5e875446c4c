import { biquadraticNetToPowers } from '../kernel/biquadratic-powers';
import { ALONG_EXTRA, inputStride, NET_VALUES, type PatchKind } from '../kernel/patch-kinds';
import { FAN_ROOM, scalarFans, type FanRoutines } from '../kernel/scalar-fans';
import { triangleNetToPowers } from '../kernel/triangle-powers';
import { netToPowers } from '../patches/bicubic-powers';
import { gaussRule } from '../patches/gauss-rule';
import { SHELL_TERMS } from './shell-terms';
import { bicubicBends, bicubicTerms, biquadraticBends, biquadraticTerms, SHELL_TOTALS, triangleBends, triangleTerms } from './shell-scalar';

/** Pairs of patches that a kernel holds: few, so that what one pass leaves is still near for the next. */
export const SHELL_PAIRS = 64;

/** Doubles per pair and two lanes: squares of X_u × X_v in the middle and of how much it varies, as `bendVariation` reads them, and room to work in. */
export const BENDS_STRIDE = 24;

/** Doubles of a pair's powers. */
export const POWERS_STRIDE = 96;

/** Doubles of a pair's totals. */
export const TOTALS_STRIDE = 2 * SHELL_TOTALS;

/** A kernel of walls' terms over patches in pairs: first the bends, by which the caller sets `counts`, then the terms. */
export interface ShellKernel {
  kind: PatchKind;
  /** Nets and origins of the pairs as the moments' kernels have them, `inputStride` apart. */
  input: Float64Array;
  /** Power coefficients that `bend` leaves, or that are put for `terms` alone: coefficient i of a patch at POWERS_STRIDE · pair + lane + 2 i. */
  powers: Float64Array;
  /** BENDS_STRIDE apart. */
  bends: Float64Array;
  /** Gauss nodes a direction for each pair; 0 leaves it out. */
  counts: Int32Array;
  /** `SHELL_TOTALS` results a patch, TOTALS_STRIDE apart. */
  output: Float64Array;
  bend(pairs: number): void;
  terms(pairs: number): void;
  fans: FanRoutines;
}

const TO_POWERS = { bicubic: netToPowers, biquadratic: biquadraticNetToPowers, triangle: triangleNetToPowers };
const BENDS = { bicubic: bicubicBends, biquadratic: biquadraticBends, triangle: triangleBends };
const TERMS = { bicubic: bicubicTerms, biquadratic: biquadraticTerms, triangle: triangleTerms };

/** The kernel in JavaScript: the same operations in the same order as the vector kernel, so the same bits. */
export function scalarShellKernel(kind: PatchKind): ShellKernel {
  const values = NET_VALUES[kind];
  const stride = inputStride(kind);
  const input = new Float64Array(SHELL_PAIRS * stride);
  const bends = new Float64Array(SHELL_PAIRS * BENDS_STRIDE);
  const output = new Float64Array(SHELL_PAIRS * TOTALS_STRIDE);
  const counts = new Int32Array(SHELL_PAIRS);
  const powers = new Float64Array(SHELL_PAIRS * POWERS_STRIDE);
  const own = new Float64Array(POWERS_STRIDE / 2);
  const net = new Float64Array(values);
  const found = new Float64Array(BENDS_STRIDE / 2);
  const totals = new Float64Array(SHELL_TOTALS);
  const routines = scalarFans(new Float64Array(FAN_ROOM), input, stride, output, TOTALS_STRIDE);
  return {
    kind, input, powers, bends, counts, output,
    bend(pairs) {
      for (let patch = 0; patch < 2 * pairs; patch++) {
        const from = (patch >> 1) * stride + (patch & 1);
        for (let i = 0; i < values; i++) net[i] = input[from + 2 * i];
        TO_POWERS[kind](net, own);
        for (let axis = 0; axis < 3; axis++) own[axis] -= input[from + 2 * (values + axis)];
        for (let i = 0; i < own.length; i++) powers[(patch >> 1) * POWERS_STRIDE + 2 * i + (patch & 1)] = own[i];
        BENDS[kind](own, found);
        for (let i = 0; i < found.length; i++) bends[(patch >> 1) * BENDS_STRIDE + 2 * i + (patch & 1)] = found[i];
      }
    },
    terms(pairs) {
      for (let patch = 0; patch < 2 * pairs; patch++) {
        const count = counts[patch >> 1];
        if (count === 0) continue;
        totals.fill(0);
        for (let i = 0; i < own.length; i++) own[i] = powers[(patch >> 1) * POWERS_STRIDE + 2 * i + (patch & 1)];
        TERMS[kind](own, gaussRule(count + ALONG_EXTRA[kind]), gaussRule(count), totals);
        for (let i = 0; i < SHELL_TOTALS; i++) output[(patch >> 1) * TOTALS_STRIDE + 2 * i + (patch & 1)] = totals[i];
      }
    },
    fans: { ...routines, sum: (first, patches, perFan, sums) => sumTerms(routines.memory, output, first, patches, perFan, sums) },
  };
}

function sumTerms(memory: Float64Array, output: Float64Array, first: number, patches: number, perFan: number, sums: number): void {
  for (let i = 0; i < patches; i++) {
    const to = sums + SHELL_TERMS * Math.floor((first + i) / perFan);
    const from = (i >> 1) * TOTALS_STRIDE + (i & 1);
    for (let k = 0; k < SHELL_TERMS; k++) memory[to + k] += output[from + 2 * k];
  }
}
