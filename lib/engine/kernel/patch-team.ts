import { ownKernel } from './patch-block';
import { inputStride, MOST_PAIRS, OUTPUT_STRIDE, PATCH_KINDS, type PatchKernel, type PatchKind } from './patch-kinds';

/** Blocks of MOST_PAIRS pairs that one round holds. */
const ROUND_BLOCKS = 32;

/** Cells of the control block. */
const ROUND = 0;
const LEFT = 1;
const DONE = 2;
const PAIRS = 3;
const NODES = 4;
const COARSE_NODES = 5;
const STOP = 6;
const KIND = 7;
const CELLS = 8;

/** Doubles after them: tolerance and reach, where nodes are chosen patch by patch (COARSE_NODES is CHOSEN). */
const LIMITS_AT = 4 * CELLS;
const LIMITS = 2;
const CHOSEN = -1;

const INPUT_AT = LIMITS_AT + 8 * LIMITS;
const OUTPUT_AT = INPUT_AT + 8 * ROUND_BLOCKS * MOST_PAIRS * Math.max(...PATCH_KINDS.map(inputStride));
const BYTES = OUTPUT_AT + 8 * ROUND_BLOCKS * MOST_PAIRS * OUTPUT_STRIDE;

interface Shared {
  cells: Int32Array;
  limits: Float64Array;
  input: Float64Array;
  output: Float64Array;
}

function views(memory: SharedArrayBuffer): Shared {
  return {
    cells: new Int32Array(memory, 0, CELLS),
    limits: new Float64Array(memory, LIMITS_AT, LIMITS),
    input: new Float64Array(memory, INPUT_AT, (OUTPUT_AT - INPUT_AT) / 8),
    output: new Float64Array(memory, OUTPUT_AT, ROUND_BLOCKS * MOST_PAIRS * OUTPUT_STRIDE),
  };
}

/** Memory through which a team of threads shares blocks of patches: give it to the helpers, which call `helpTeam`. */
export function teamMemory(): SharedArrayBuffer {
  return new SharedArrayBuffer(BYTES);
}

/**
 * Kernels whose blocks are computed by this thread and by all that help, for `setPatchTeam`. Each patch is computed alone and the caller adds up in its
 * own order, so the numbers do not depend on how many help, to the last bit. They wait for the helpers: not for a browser's main thread.
 */
export function teamKernels(memory: SharedArrayBuffer): (kind: PatchKind) => PatchKernel {
  const shared = views(memory);
  const { cells, limits } = shared;
  const share = (kind: PatchKind, pairs: number, count: number, coarseCount: number): void => {
    const blocks = Math.ceil(pairs / MOST_PAIRS);
    Atomics.store(cells, KIND, PATCH_KINDS.indexOf(kind));
    Atomics.store(cells, PAIRS, pairs);
    Atomics.store(cells, NODES, count);
    Atomics.store(cells, COARSE_NODES, coarseCount);
    Atomics.store(cells, DONE, 0);
    Atomics.store(cells, LEFT, blocks);
    Atomics.add(cells, ROUND, 1);
    Atomics.notify(cells, ROUND);
    takeBlocks(shared);
    for (let done = Atomics.load(cells, DONE); done < blocks; done = Atomics.load(cells, DONE)) Atomics.wait(cells, DONE, done);
  };
  return (kind) => ({
    kind,
    pairs: ROUND_BLOCKS * MOST_PAIRS,
    input: shared.input,
    output: shared.output,
    run: (pairs, count, coarseCount) => share(kind, pairs, count, coarseCount),
    choose(pairs, fewest, tolerance, reach) {
      limits[0] = tolerance;
      limits[1] = reach;
      share(kind, pairs, fewest, CHOSEN);
    },
  });
}

/** Helps a team in this thread until it is dismissed. */
export function helpTeam(memory: SharedArrayBuffer): void {
  const shared = views(memory);
  const { cells } = shared;
  while (Atomics.load(cells, STOP) === 0) {
    const round = Atomics.load(cells, ROUND);
    takeBlocks(shared);
    if (Atomics.load(cells, STOP) === 0) Atomics.wait(cells, ROUND, round);
  }
}

/** Sends the helpers home. */
export function dismissTeam(memory: SharedArrayBuffer): void {
  const { cells } = views(memory);
  Atomics.store(cells, STOP, 1);
  Atomics.add(cells, ROUND, 1);
  Atomics.notify(cells, ROUND);
}

function takeBlocks({ cells, limits, input, output }: Shared): void {
  // Blocks are counted down: who gets one has it in the round that is under way, since no round ends before all its blocks are done.
  for (let left = Atomics.sub(cells, LEFT, 1); left > 0; left = Atomics.sub(cells, LEFT, 1)) {
    const kernel = ownKernel(PATCH_KINDS[Atomics.load(cells, KIND)]);
    const stride = inputStride(kernel.kind);
    const first = (left - 1) * MOST_PAIRS;
    const pairs = Math.min(MOST_PAIRS, Atomics.load(cells, PAIRS) - first);
    kernel.input.set(input.subarray(first * stride, (first + pairs) * stride));
    const count = Atomics.load(cells, NODES);
    const coarseCount = Atomics.load(cells, COARSE_NODES);
    if (coarseCount === CHOSEN) kernel.choose(pairs, count, limits[0], limits[1]);
    else kernel.run(pairs, count, coarseCount);
    output.set(kernel.output.subarray(0, pairs * OUTPUT_STRIDE), first * OUTPUT_STRIDE);
    Atomics.add(cells, DONE, 1);
    Atomics.notify(cells, DONE);
  }
}
