import { gaussRule } from '../patches/gauss-rule';
import { BICUBIC_BYTES } from './bicubic-bytes';

/** Pairs of patches that the kernel's memory holds. */
export const MOST_PAIRS = 256;

/** Doubles per pair and where its parts begin: 48 values of the net and 3 of the origin; 10 solid, 10 surface moments, magnitude, coarse area. Two lanes each. */
export const INPUT_STRIDE = 102;
export const OUTPUT_STRIDE = 44;
const INPUT_AT = 512;
const OUTPUT_AT = INPUT_AT + MOST_PAIRS * INPUT_STRIDE;
const SCRATCH_AT = OUTPUT_AT + MOST_PAIRS * OUTPUT_STRIDE;

/** Gauss rules of up to this many nodes have their place in the kernel's memory: nodes, then weights, from double RULE_STRIDE · count on. */
const MOST_NODES = 8;
const RULE_STRIDE = 2 * MOST_NODES;

/** What the WebAssembly module exports. Byte addresses. */
type Run = (pairs: number, input: number, output: number, count: number, nodes: number, coarseCount: number, coarseNodes: number, scratch: number) => void;

/** A kernel of patches in pairs with its memory. */
export interface VectorKernel {
  /** Pairs that the memory holds. */
  pairs: number;
  /** Nets and origins of the pairs, INPUT_STRIDE apart. */
  input: Float64Array;
  /** Results of the pairs, OUTPUT_STRIDE apart. */
  output: Float64Array;
  /** Computes the first `pairs` pairs with `count` Gauss nodes a direction, the coarse area with `coarseCount` (0: not at all). Counts up to MOST_NODES. */
  run(pairs: number, count: number, coarseCount: number): void;
}

let kernel: VectorKernel | null | undefined;

/** The vector kernel, made on first need; null where this machine has no WebAssembly with SIMD or forbids it. */
export function vectorKernel(): VectorKernel | null {
  if (kernel === undefined) kernel = makeKernel();
  return kernel;
}

function makeKernel(): VectorKernel | null {
  try {
    const bytes = Uint8Array.from(atob(BICUBIC_BYTES), (letter) => letter.charCodeAt(0));
    const { exports } = new WebAssembly.Instance(new WebAssembly.Module(bytes));
    const { memory, run } = exports;
    if (!(memory instanceof WebAssembly.Memory) || typeof run !== 'function') return null;
    return wrap(new Float64Array(memory.buffer), run as Run);
  } catch {
    return null;
  }
}

function wrap(doubles: Float64Array, run: Run): VectorKernel {
  const ruleAt = (count: number): number => 8 * RULE_STRIDE * count;
  // Put anew each time, so that the kernel never works with a copy of its own: a rule gone wrong must show in the numbers and the estimate alike.
  const putRule = (count: number): void => {
    if (count === 0) return;
    const { nodes, weights } = gaussRule(count);
    doubles.set(nodes, RULE_STRIDE * count);
    doubles.set(weights, RULE_STRIDE * count + count);
  };
  return {
    pairs: MOST_PAIRS,
    input: doubles.subarray(INPUT_AT, OUTPUT_AT),
    output: doubles.subarray(OUTPUT_AT, SCRATCH_AT),
    run(pairs, count, coarseCount) {
      putRule(count);
      putRule(coarseCount);
      run(pairs, 8 * INPUT_AT, 8 * OUTPUT_AT, count, ruleAt(count), coarseCount, ruleAt(coarseCount), 8 * SCRATCH_AT);
    },
  };
}
