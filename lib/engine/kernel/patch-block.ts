import { netToPowers } from '../patches/bicubic-powers';
import { gaussRule } from '../patches/gauss-rule';
import { powerArea, powerMoments } from './bicubic-scalar';
import { INPUT_STRIDE, MOST_PAIRS, OUTPUT_STRIDE, vectorKernel, type VectorKernel } from './vector-kernel';

const MAGNITUDE = 20;
const COARSE_AREA = 21;

const net = new Float64Array(48);
const powers = new Float64Array(48);
const solid = new Float64Array(10);
const surface = new Float64Array(10);

/** The kernel in JavaScript: the same layout, the same operations in the same order, so the same bits. */
export function scalarKernel(): VectorKernel {
  const input = new Float64Array(MOST_PAIRS * INPUT_STRIDE);
  const output = new Float64Array(MOST_PAIRS * OUTPUT_STRIDE);
  const runOne = (patch: number, count: number, coarseCount: number): void => {
    const from = (patch >> 1) * INPUT_STRIDE + (patch & 1);
    const to = (patch >> 1) * OUTPUT_STRIDE + (patch & 1);
    for (let i = 0; i < 48; i++) net[i] = input[from + 2 * i];
    netToPowers(net, powers);
    for (let axis = 0; axis < 3; axis++) powers[axis] -= input[from + 2 * (48 + axis)];
    output[to + 2 * MAGNITUDE] = powerMoments(powers, gaussRule(count), solid, surface);
    for (let i = 0; i < 10; i++) {
      output[to + 2 * i] = solid[i];
      output[to + 2 * (10 + i)] = surface[i];
    }
    if (coarseCount > 0) output[to + 2 * COARSE_AREA] = powerArea(powers, gaussRule(coarseCount));
  };
  return {
    pairs: MOST_PAIRS,
    input,
    output,
    run(pairs, count, coarseCount) {
      for (let patch = 0; patch < 2 * pairs; patch++) runOne(patch, count, coarseCount);
    },
  };
}

/** Bicubic patches that are computed together. What one block holds, the next one made in this thread overwrites. */
export class PatchBlock {
  /** Patches that it holds. */
  readonly size: number;

  constructor(private readonly kernel: VectorKernel = currentKernel()) {
    this.size = 2 * kernel.pairs;
  }

  /** Puts a 4 × 4 net [(4 row + column) · 3 + axis] and the point that its moments shall be about. */
  put(patch: number, values: Float64Array, ox: number, oy: number, oz: number): void {
    const { input } = this.kernel;
    const at = (patch >> 1) * INPUT_STRIDE + (patch & 1);
    for (let i = 0; i < 48; i++) input[at + 2 * i] = values[i];
    input[at + 96] = ox;
    input[at + 98] = oy;
    input[at + 100] = oz;
  }

  /** Computes the first `patches` by `nodes` Gauss nodes a direction; their areas by `coarseNodes` too, where that is not 0. */
  run(patches: number, nodes: number, coarseNodes: number): void {
    this.kernel.run((patches + 1) >> 1, nodes, coarseNodes);
  }

  /** Reads a patch's moments; returns the magnitude that the volume's rounding error is relative to. */
  read(patch: number, solidOut: Float64Array, surfaceOut: Float64Array): number {
    const { output } = this.kernel;
    const at = (patch >> 1) * OUTPUT_STRIDE + (patch & 1);
    for (let i = 0; i < 10; i++) {
      solidOut[i] = output[at + 2 * i];
      surfaceOut[i] = output[at + 20 + 2 * i];
    }
    return output[at + 2 * MAGNITUDE];
  }

  coarseArea(patch: number): number {
    return this.kernel.output[(patch >> 1) * OUTPUT_STRIDE + (patch & 1) + 2 * COARSE_AREA];
  }

  /** Reads a patch's net back. */
  net(patch: number, out: Float64Array): void {
    const at = (patch >> 1) * INPUT_STRIDE + (patch & 1);
    for (let i = 0; i < 48; i++) out[i] = this.kernel.input[at + 2 * i];
  }
}

let own: VectorKernel | undefined;
let team: VectorKernel | null = null;

/** The kernel of this thread alone. */
export function ownKernel(): VectorKernel {
  own ??= vectorKernel() ?? scalarKernel();
  return own;
}

/** Lets blocks of patches in this thread be computed by a team of threads from now on, or (null) by this thread alone again. */
export function setPatchTeam(kernel: VectorKernel | null): void {
  team = kernel;
}

function currentKernel(): VectorKernel {
  return team ?? ownKernel();
}
