import { areaError } from './node-choice';
import { inputStride, NET_VALUES, OUTPUT_STRIDE, type FanKernel, type PatchKernel, type PatchKind } from './patch-kinds';
import { scalarKernel } from './scalar-kernel';
import { newVectorKernel, vectorKernel } from './vector-kernel';

const MAGNITUDE_AT = 40;
const COARSE_AREA_AT = 42;
const SECOND_ERROR_AT = 44;
const FIRST_ERROR_AT = 46;
const SURFACE_AT = 20;
const NODES_AT = 48;
const VARIATION_AT = 50;

/** Patches of one kind that are computed together. What one block holds, the next one made over the same kernel overwrites. */
export class PatchBlock {
  /** Patches that it holds. */
  readonly size: number;
  /** Control values of a patch. */
  readonly values: number;
  /** Where nets go: value i of patch k stands at `at(k) + 2 i`. */
  readonly input: Float64Array;
  /** Where results are: solid moment i of patch k at `resultAt(k) + 2 i`, surface moment i at `resultAt(k) + 20 + 2 i`. */
  readonly output: Float64Array;
  private readonly stride: number;

  constructor(private readonly kernel: PatchKernel) {
    this.size = 2 * kernel.pairs;
    this.values = NET_VALUES[kernel.kind];
    this.input = kernel.input;
    this.output = kernel.output;
    this.stride = inputStride(kernel.kind);
  }

  /** Where a patch's first value stands in `input`. */
  at(patch: number): number {
    return (patch >> 1) * this.stride + (patch & 1);
  }

  /** Puts a net (rows of x, y, z as the kind has them, from `net[from]` on) and the point that its moments shall be about. */
  put(patch: number, net: Float64Array, ox: number, oy: number, oz: number, from = 0): void {
    const { input, values } = this;
    const at = this.at(patch);
    for (let i = 0; i < values; i++) input[at + 2 * i] = net[from + i];
    this.putOrigin(patch, ox, oy, oz);
  }

  /** Puts the point that a patch's moments shall be about. */
  putOrigin(patch: number, ox: number, oy: number, oz: number): void {
    const at = this.at(patch) + 2 * this.values;
    this.input[at] = ox;
    this.input[at + 2] = oy;
    this.input[at + 4] = oz;
  }

  /** Computes the first `patches` by `nodes` Gauss nodes a direction; their areas by `coarseNodes` too, where that is not 0. */
  run(patches: number, nodes: number, coarseNodes: number): void {
    this.kernel.run((patches + 1) >> 1, nodes, coarseNodes);
  }

  /**
   * Computes the first `patches` with as few nodes as do (see `PatchKernel`). Two that stand together get the same, so that an odd last one is its own neighbour:
   * numbers depend on the order of the patches alone.
   */
  choose(patches: number, fewest: number, tolerance: number, reach: number): void {
    if ((patches & 1) === 1) this.repeat(patches - 1);
    this.kernel.choose((patches + 1) >> 1, fewest, tolerance, reach);
  }

  /** Puts an even patch beside itself. */
  private repeat(patch: number): void {
    const { input } = this;
    const at = this.at(patch);
    for (let i = at; i < at + this.stride; i += 2) input[i + 1] = input[i];
  }

  /** Where a patch's first result stands in `output`. */
  resultAt(patch: number): number {
    return (patch >> 1) * OUTPUT_STRIDE + (patch & 1);
  }

  /** Reads a patch's moments; returns the magnitude that the volume's rounding error is relative to. */
  read(patch: number, solidOut: Float64Array, surfaceOut: Float64Array): number {
    const { output } = this;
    const at = this.resultAt(patch);
    for (let i = 0; i < 10; i++) {
      solidOut[i] = output[at + 2 * i];
      surfaceOut[i] = output[at + 20 + 2 * i];
    }
    return this.magnitude(patch);
  }

  /** The magnitude that the rounding error of a patch's volume is relative to. */
  magnitude(patch: number): number {
    return this.output[this.resultAt(patch) + MAGNITUDE_AT];
  }

  /** A patch's area by the coarse rule. */
  coarseArea(patch: number): number {
    return this.output[this.resultAt(patch) + COARSE_AREA_AT];
  }

  /** What a patch's area may err by, from how its two rules differ (see `areaError`). */
  areaError(patch: number): number {
    const { output } = this;
    const at = this.resultAt(patch);
    return areaError(this.kernel.kind, output[at + NODES_AT], output[at + SURFACE_AT], output[at + COARSE_AREA_AT], output[at + VARIATION_AT]);
  }

  /** What each of a patch's second and first moments may lack for nodes that were spared; volumes lack nothing. */
  secondError(patch: number): number {
    return this.output[this.resultAt(patch) + SECOND_ERROR_AT];
  }

  firstError(patch: number): number {
    return this.output[this.resultAt(patch) + FIRST_ERROR_AT];
  }

  /** Nodes a direction that a patch was computed with. */
  nodes(patch: number): number {
    return this.output[this.resultAt(patch) + NODES_AT];
  }

  /** Reads a patch's net back. */
  net(patch: number, out: Float64Array): void {
    const { input, values } = this;
    const at = this.at(patch);
    for (let i = 0; i < values; i++) out[i] = input[at + 2 * i];
  }
}

const own = new Map<PatchKind, FanKernel>();
let team: ((kind: PatchKind) => PatchKernel) | null = null;

/** The kernel of this thread alone. */
export function ownKernel(kind: PatchKind): FanKernel {
  let kernel = own.get(kind);
  if (kernel === undefined) {
    kernel = vectorKernel(kind) ?? scalarKernel(kind);
    own.set(kind, kernel);
  }
  return kernel;
}

/** A kernel with a memory of its own, for work in between that must not overwrite what blocks over the thread's other kernels hold. */
export function separateKernel(kind: PatchKind): PatchKernel {
  return newVectorKernel(kind) ?? scalarKernel(kind);
}

/** Lets blocks of patches in this thread be computed by a team of threads (see `teamKernels`) from now on, or (null) by this thread alone again. */
export function setPatchTeam(kernels: ((kind: PatchKind) => PatchKernel) | null): void {
  team = kernels;
}

/** The kernel that computes blocks of regular patches: the team's where there is one. */
export function currentKernel(kind: PatchKind): PatchKernel {
  return team === null ? ownKernel(kind) : team(kind);
}
