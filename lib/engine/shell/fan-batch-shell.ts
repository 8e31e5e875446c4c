import { tailLevels, tailWeights } from '../moments/tail-weights';
import { FAN_ROOM } from '../kernel/scalar-fans';
import { packPoints } from '../schemes/fan-points';
import type { FanState } from '../schemes/fan-state';
import { fanTable, type FanTable } from '../schemes/fan-tables';
import type { ShellBlock } from './shell-block';
import { imageFall, shellFall, type ShellKit } from './shell-kits';
import type { ShellKernel } from './shell-kernel';
import type { ShellBody } from './shell-sums';
import { addShifted, SHELL_TERMS, TERM_SIGNS, type CurvaturePeak } from './shell-terms';

/** Digits to which the tail is closed. */
const TAIL_DIGITS = 10;

/** Levels beyond which the Gauss map's terms are better taken from the rim. */
const MOST_LEVELS = 18;

/** Fans that are computed at once. */
const MOST_FANS = 48;

/** What a rule may err by at the first level, relatively; terms fall from level to level, and it may err by more as fast, but for the weights' sake. */
const FIRST_TOLERANCE = 5e-10;
const GROWTH_SHARE = 0.9;

/** Levels whose curvature counts for the smallest radius where it may grow without end, over a vanishing area. */
const CURVATURE_LEVELS = 1;

/** Times the difference of two closings, which is about what the earlier one errs by. */
const CLOSING_FACTOR = 2;

/** The largest ratio by which all terms of a smooth fan fall from level to level. */
function slowest(kit: ShellKit, valence: number): number {
  return Math.max(shellFall(kit, valence), imageFall(kit, valence));
}

/** Whether smooth fans of a valence fall fast enough to be closed in a batch. */
export function closesInBatch(kit: ShellKit, valence: number): boolean {
  const fall = slowest(kit, valence);
  return fall < 1 && tailLevels(fall, TAIL_DIGITS) <= MOST_LEVELS;
}

/** The batch whose tables a kernel holds. */
const holders = new WeakMap<ShellKernel, FanBatchShell>();

/** Smooth whole fans of one valence whose shell terms are computed together: a level sequence closed by weights, as `FanBatch` has it for the moments. */
export class FanBatchShell {
  private readonly table: FanTable;
  private readonly patches: number;
  private readonly fall: number;
  private readonly weights: Float64Array;
  private readonly check: Float64Array;
  private readonly curvatureLevels: number;
  private readonly most: number;
  private readonly width: number;
  private readonly stride: number;
  private readonly waiting: Float64Array;
  /** The fans' limit points about their bodies' origins. */
  private readonly shifts: Float64Array;
  private readonly bodies: Int32Array;
  private readonly closed: Float64Array;
  /** ∫ 2H and ∫ K closed one level earlier, less those closed later. */
  private readonly differences: Float64Array;
  private readonly places: { columns: number; factors: number; nets: number; sums: number };
  private readonly peak: CurvaturePeak = { curvature: 0, x: 0, y: 0, z: 0 };
  private state: number;
  private finer: number;
  private count = 0;

  /** `kind` is a fan of the valence. */
  constructor(kit: ShellKit, private readonly block: ShellBlock, kind: FanState, private readonly shells: readonly ShellBody[]) {
    this.table = fanTable(kit.fan, kind);
    const n = kind.sectors;
    this.patches = 3 * n;
    this.fall = slowest(kit, n);
    const levels = tailLevels(this.fall, TAIL_DIGITS);
    this.weights = tailWeights(this.fall, levels);
    this.check = tailWeights(this.fall, levels - 1);
    const [lambda, mu] = kit.modes(n);
    this.curvatureLevels = mu <= lambda * lambda ? levels : CURVATURE_LEVELS;
    const { points, matrix, nets } = this.table.operator;
    this.width = 3 * points.count;
    this.stride = 3 * matrix.rows;
    const columns = Math.ceil((matrix.rows + 1) / 2);
    const factors = columns + Math.ceil(matrix.columns.length / 2);
    const netsAt = factors + matrix.factors.length;
    const sums = netsAt + Math.ceil(nets.length / 2);
    this.places = { columns, factors, nets: netsAt, sums };
    this.most = Math.max(1, Math.min(MOST_FANS, Math.floor((FAN_ROOM - sums) / (SHELL_TERMS + 2 * this.stride))));
    this.state = sums + SHELL_TERMS * this.most;
    this.finer = this.state + this.most * this.stride;
    this.waiting = new Float64Array(this.most * this.width);
    this.shifts = new Float64Array(3 * this.most);
    this.bodies = new Int32Array(this.most);
    this.closed = new Float64Array(SHELL_TERMS * this.most);
    this.differences = new Float64Array(2 * this.most);
  }

  /** Takes a fan with its limit point, of a body whose moments are about (ox, oy, oz). */
  add(fan: FanState, limit: Float64Array, body: number, ox: number, oy: number, oz: number): void {
    if (this.count === this.most) this.flush();
    packPoints(this.table.operator.points, fan, limit, this.waiting, this.count * this.width);
    this.shifts[3 * this.count] = limit[0] - ox;
    this.shifts[3 * this.count + 1] = limit[1] - oy;
    this.shifts[3 * this.count + 2] = limit[2] - oz;
    this.bodies[this.count++] = body;
  }

  /** Computes and adds what is waiting. */
  flush(): void {
    const { count, weights, fall, places, stride } = this;
    if (count === 0) return;
    const { fans } = this.block.kernel;
    const { matrix } = this.table.operator;
    const sums = fans.memory.subarray(places.sums, places.sums + SHELL_TERMS * count);
    this.load();
    this.closed.fill(0);
    this.differences.fill(0);
    let tolerance = FIRST_TOLERANCE;
    for (let k = 0; k < weights.length; k++, tolerance *= GROWTH_SHARE / fall) {
      fans.refine(count, stride, matrix.rows, 0, places.columns, places.factors, this.state, this.finer);
      [this.state, this.finer] = [this.finer, this.state];
      sums.fill(0);
      this.sumLevel(k, tolerance);
      this.close(k, sums);
    }
    this.finish();
    this.count = 0;
  }

  private load(): void {
    const { places, width, stride, waiting, block } = this;
    const { fans } = block.kernel;
    const { matrix, nets } = this.table.operator;
    if (holders.get(block.kernel) !== this) {
      fans.integers.set(matrix.starts, 0);
      fans.integers.set(matrix.columns.map((point) => 3 * point), 2 * places.columns);
      fans.memory.set(matrix.factors, places.factors);
      fans.integers.set(nets.map((row) => 3 * row), 2 * places.nets);
      holders.set(block.kernel, this);
    }
    for (let fan = 0; fan < this.count; fan++) fans.memory.set(waiting.subarray(fan * width, (fan + 1) * width), this.state + fan * stride);
  }

  private sumLevel(k: number, tolerance: number): void {
    const { block, patches, places, stride, weights } = this;
    const { fans } = block.kernel;
    const total = this.count * patches;
    for (let first = 0; first < total; first += block.size) {
      const size = Math.min(block.size, total - first);
      fans.gather(first, size, patches, block.values / 3, places.nets, this.state, stride);
      block.compute(size, tolerance);
      fans.sum(first, size, patches, places.sums);
      for (let i = 0; i < size; i++) {
        const { errors } = this.shells[this.bodies[Math.floor((first + i) / patches)]];
        for (let j = 0; j < 3; j++) errors[j] += Math.abs(weights[k]) * block.errors[3 * i + j];
      }
      if (k < this.curvatureLevels) for (let i = 0; i < size; i++) this.raise(Math.floor((first + i) / patches), i, tolerance);
    }
  }

  private raise(fan: number, place: number, tolerance: number): void {
    const { peak, shifts } = this;
    const known = this.shells[this.bodies[fan]].peak;
    peak.curvature = known.curvature;
    this.block.raise(place, tolerance, peak);
    if (!(peak.curvature > known.curvature)) return;
    known.curvature = peak.curvature;
    known.x = peak.x + shifts[3 * fan];
    known.y = peak.y + shifts[3 * fan + 1];
    known.z = peak.z + shifts[3 * fan + 2];
  }

  private close(k: number, sums: Float64Array): void {
    const { closed, differences, weights, check } = this;
    const weight = weights[k];
    const earlier = weight - (k < check.length ? check[k] : 0);
    for (let i = 0; i < sums.length; i++) closed[i] += weight * sums[i];
    for (let fan = 0; fan < this.count; fan++) {
      differences[2 * fan] += earlier * sums[SHELL_TERMS * fan];
      differences[2 * fan + 1] += earlier * sums[SHELL_TERMS * fan + 1];
    }
  }

  private finish(): void {
    const { closed, shifts, differences } = this;
    for (let fan = 0; fan < this.count; fan++) {
      const shell = this.shells[this.bodies[fan]];
      const at = SHELL_TERMS * fan;
      for (let i = 0; i < SHELL_TERMS; i++) closed[at + i] *= TERM_SIGNS[i];
      addShifted(closed, at, shifts[3 * fan], shifts[3 * fan + 1], shifts[3 * fan + 2], shell.terms);
      shell.errors[1] += CLOSING_FACTOR * Math.abs(differences[2 * fan]);
      shell.errors[2] += CLOSING_FACTOR * Math.abs(differences[2 * fan + 1]);
    }
  }
}
