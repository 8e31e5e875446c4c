import { ownKernel, type PatchBlock } from '../kernel/patch-block';
import { inputStride, OUTPUT_STRIDE, type PatchKind } from '../kernel/patch-kinds';
import { FAN_ROOM, scalarFans, SUMMED_RESULTS, type FanRoutines } from '../kernel/scalar-fans';
import type { FanOperator } from './fan-operator';

/** Places of tables and sums in the memory of the routines, in doubles. */
interface Places {
  starts: number;
  columns: number;
  factors: number;
  nets: number;
  sums: number;
}

/** The fans whose tables the routines hold. */
const holders = new WeakMap<FanRoutines, FanMemory>();

/** Fans of one kind in the memory of a kernel's routines: their refinement level by level, and the sums of each level's patches by fan. */
export class FanMemory {
  private readonly routines: FanRoutines;
  private readonly places: Places;
  /** Doubles from fan to fan, and where the level's points and the next one's stand. */
  private readonly stride: number;
  private state: number;
  private finer: number;
  private count = 0;
  /** Sums of a level, SUMMED_RESULTS a fan. */
  readonly sums: Float64Array;

  /** For `most` fans with `patches` patches each, computed in `block`. */
  constructor(kind: PatchKind, private readonly operator: FanOperator, private readonly block: PatchBlock, private readonly patches: number, most: number) {
    const { matrix, nets } = operator;
    this.stride = 3 * matrix.rows;
    const starts = 0;
    const columns = starts + Math.ceil((matrix.rows + 1) / 2);
    const factors = columns + Math.ceil(matrix.columns.length / 2);
    const netsAt = factors + matrix.factors.length;
    const sums = netsAt + Math.ceil(nets.length / 2);
    this.places = { starts, columns, factors, nets: netsAt, sums };
    this.state = sums + SUMMED_RESULTS * most;
    this.finer = this.state + most * this.stride;
    const size = this.finer + most * this.stride;
    const own = ownKernel(kind);
    // A fan too large for the kernel's memory has one of its own.
    this.routines = size <= FAN_ROOM ? own.fans : scalarFans(new Float64Array(size), own.input, inputStride(kind), own.output, OUTPUT_STRIDE);
    this.sums = this.routines.memory.subarray(sums, sums + SUMMED_RESULTS * most);
  }

  /** Puts the tables and `count` fans of `width` doubles into the memory. */
  load(fans: Float64Array, width: number, count: number): void {
    const { routines, places, stride } = this;
    const { matrix, nets } = this.operator;
    this.count = count;
    if (holders.get(routines) !== this) {
      routines.integers.set(matrix.starts, 2 * places.starts);
      routines.integers.set(matrix.columns.map((point) => 3 * point), 2 * places.columns);
      routines.memory.set(matrix.factors, places.factors);
      routines.integers.set(nets.map((row) => 3 * row), 2 * places.nets);
      holders.set(routines, this);
    }
    for (let fan = 0; fan < count; fan++) routines.memory.set(fans.subarray(fan * width, (fan + 1) * width), this.state + fan * stride);
  }

  /** Goes on to the next level. */
  refine(): void {
    const { places } = this;
    this.routines.refine(this.count, this.stride, this.operator.matrix.rows, places.starts, places.columns, places.factors, this.state, this.finer);
    [this.state, this.finer] = [this.finer, this.state];
  }

  /** Lets `run` compute the level's patches in the block, some at a time, sums the results by fan, and shows each patch with its place to `look`. */
  sumLevel(run: (size: number) => void, look?: (patch: number, place: number) => void): void {
    const { block, routines, places, patches, sums } = this;
    const total = this.count * patches;
    sums.fill(0);
    for (let first = 0; first < total; first += block.size) {
      const size = Math.min(block.size, total - first);
      routines.gather(first, size, patches, block.values / 3, places.nets, this.state, this.stride);
      run(size);
      routines.sum(first, size, patches, places.sums);
      if (look !== undefined) for (let i = 0; i < size; i++) look(first + i, i);
    }
  }

  /** Reads the net of a patch. */
  net(patch: number, out: Float64Array): void {
    const { stride, patches, routines, block } = this;
    const { nets } = this.operator;
    const points = block.values / 3;
    const fan = Math.floor(patch / patches);
    const list = (patch - fan * patches) * points;
    for (let i = 0; i < points; i++) {
      const from = this.state + fan * stride + 3 * nets[list + i];
      for (let axis = 0; axis < 3; axis++) out[3 * i + axis] = routines.memory[from + axis];
    }
  }
}
