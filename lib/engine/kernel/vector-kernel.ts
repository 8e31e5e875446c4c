import { gaussRule } from '../patches/gauss-rule';
import { KERNEL_BYTES } from './kernel-bytes';
import { AREA_CALM, AREA_CUTOFF, AREA_NEAR, coarseOf, NODE_RANGES } from './node-choice';
import { ALONG_EXTRA, inputStride, MOST_NODES, MOST_PAIRS, OUTPUT_STRIDE, type FanKernel, type PatchKind } from './patch-kinds';
import { FAN_ROOM, SUMMED_RESULTS } from './scalar-fans';
import { TRIANGLE_POWERS } from './triangle-powers';

/** Doubles of the kernel's memory. Gauss rules have their places first: nodes, then weights, from double RULE_STRIDE · count on; then the triangle's table. */
const RULE_STRIDE = 2 * (MOST_NODES + 1);
const TABLE_AT = RULE_STRIDE * (MOST_NODES + 2);
const INPUT_AT = 512;
/** A pair's powers while its moments are computed. */
const SCRATCH = 128;

/** What the WebAssembly module exports per kind. Byte addresses. */
type Run = (
  pairs: number, input: number, output: number, fewest: number, most: number, coarse: number, forArea: number,
  cutoff: number, near: number, calm: number, tolerance: number, reach: number, rules: number, table: number, scratch: number,
) => void;

type Routine = (...integers: number[]) => void;

const EXPORTS: Readonly<Record<PatchKind, string>> = { bicubic: 'runBicubic', biquadratic: 'runBiquadratic', triangle: 'runTriangle' };

let code: WebAssembly.Module | null | undefined;
const kernels = new Map<PatchKind, FanKernel | null>();

/** The vector kernel of a kind, made on first need; null where this machine has no WebAssembly with SIMD or forbids it. */
export function vectorKernel(kind: PatchKind): FanKernel | null {
  let kernel = kernels.get(kind);
  if (kernel === undefined) {
    kernel = newVectorKernel(kind);
    kernels.set(kind, kernel);
  }
  return kernel;
}

function compiled(): WebAssembly.Module | null {
  if (code !== undefined) return code;
  try {
    code = new WebAssembly.Module(Uint8Array.from(atob(KERNEL_BYTES), (letter) => letter.charCodeAt(0)));
  } catch {
    code = null;
  }
  return code;
}

/** A vector kernel of a kind with a memory of its own; null where this machine has none. */
export function newVectorKernel(kind: PatchKind): FanKernel | null {
  const made = compiled();
  if (made === null) return null;
  try {
    const { memory, [EXPORTS[kind]]: run, refineFans, gatherFans, sumFans } = new WebAssembly.Instance(made).exports;
    if (!(memory instanceof WebAssembly.Memory) || typeof run !== 'function') return null;
    if (typeof refineFans !== 'function' || typeof gatherFans !== 'function' || typeof sumFans !== 'function') return null;
    return wrap(kind, new Float64Array(memory.buffer), run as Run, refineFans as Routine, gatherFans as Routine, sumFans as Routine);
  } catch {
    return null;
  }
}

function wrap(kind: PatchKind, doubles: Float64Array, run: Run, refineFans: Routine, gatherFans: Routine, sumFans: Routine): FanKernel {
  const extra = ALONG_EXTRA[kind];
  const outputAt = INPUT_AT + MOST_PAIRS * inputStride(kind);
  const scratchAt = outputAt + MOST_PAIRS * OUTPUT_STRIDE;
  const fansAt = scratchAt + SCRATCH;
  const fanAt = (place: number): number => 8 * (fansAt + place);
  doubles.set(TRIANGLE_POWERS, TABLE_AT);
  // Put anew each time, so that the kernel never works with a copy of its own: a rule gone wrong must show in the numbers and the estimate alike.
  const putRule = (count: number): void => {
    for (let size = count; size <= count + extra; size++) {
      const { nodes, weights } = gaussRule(size);
      doubles.set(nodes, RULE_STRIDE * size);
      doubles.set(weights, RULE_STRIDE * size + size);
    }
  };
  const { forArea, most } = NODE_RANGES[kind];
  return {
    kind,
    pairs: MOST_PAIRS,
    input: doubles.subarray(INPUT_AT, outputAt),
    output: doubles.subarray(outputAt, scratchAt),
    run(pairs, count, coarseCount) {
      putRule(count);
      if (coarseCount > 0) putRule(coarseCount);
      run(pairs, 8 * INPUT_AT, 8 * outputAt, count, count, coarseCount, count, 0, 0, 0, 0, 0, 0, 8 * TABLE_AT, 8 * scratchAt);
    },
    choose(pairs, fewest, tolerance, reach) {
      for (let count = coarseOf(kind, fewest); count <= most; count++) putRule(count);
      run(pairs, 8 * INPUT_AT, 8 * outputAt, fewest, most, 0, forArea, AREA_CUTOFF, AREA_NEAR, AREA_CALM, tolerance, reach, 0, 8 * TABLE_AT, 8 * scratchAt);
    },
    fans: {
      memory: doubles.subarray(fansAt, fansAt + FAN_ROOM),
      integers: new Int32Array(doubles.buffer, 8 * fansAt, 2 * FAN_ROOM),
      refine: (fans, stride, rows, starts, columns, factors, source, target) =>
        refineFans(fans, 8 * stride, rows, fanAt(starts), fanAt(columns), fanAt(factors), fanAt(source), fanAt(target)),
      gather: (first, patches, perFan, points, nets, state, stride) =>
        gatherFans(first, patches, perFan, points, fanAt(nets), fanAt(state), 8 * stride, 8 * INPUT_AT, 8 * inputStride(kind)),
      sum: (first, patches, perFan, sums) => sumFans(first, patches, perFan, SUMMED_RESULTS, 8 * outputAt, 8 * OUTPUT_STRIDE, fanAt(sums)),
    },
  };
}
