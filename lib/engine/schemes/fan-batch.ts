import { ownKernel, type PatchBlock } from '../kernel/patch-block';
import { inputStride, OUTPUT_STRIDE } from '../kernel/patch-kinds';
import { FAN_ROOM, scalarFans, SUMMED_RESULTS, type FanRoutines } from '../kernel/scalar-fans';
import type { LimitSums } from '../moments/limit-sums';
import { MOMENTS } from '../moments/sums';
import { AREA_TOLERANCE, areaError, measureSurface } from '../patches/mend-surface';
import type { FanKit } from './fan-kit';
import { packPoints } from './fan-points';
import { RIM_POWERS } from './fan-rim';
import type { FanState } from './fan-state';
import { fanTable, type FanTable } from './fan-tables';
import { fanBlock } from './integrate-fan';
import { mendFanSurface, UNSETTLED } from './mend-fan-surface';
import { addRimChain, moveMoments } from './rim-chain';
import { applyRows } from './sparse-rows';

/** What a coarser rule may change, relative to the moments of the cones from the origin and to the area. */
const SOLID_TOLERANCE = 1e-15;
const SURFACE_TOLERANCE = 1e-11;

/** Nodes that the first level may do without where patches are smooth, and the share of its patches that may want mending then. */
const FIRST_SAVING = 2;
const MOST_MENDED = 1 / 8;

/** Times the difference of two closings: the earlier one errs about as much as they differ, so that the difference alone may fall short by a little. */
const CLOSING_FACTOR = 2;

/** Differences a fan: ten of the solid, two of the area. */
const CHECKS = MOMENTS + 2;

const solid = new Float64Array(MOMENTS);
const surface = new Float64Array(MOMENTS);
const coarseSolid = new Float64Array(MOMENTS);
const coarseSurface = new Float64Array(MOMENTS);
const differences = new Float64Array(2 * MOMENTS);

/** Places of a batch's tables and sums in the memory of the routines, in doubles. */
interface Places {
  starts: number;
  columns: number;
  factors: number;
  nets: number;
  sums: number;
  size: number;
}

/** The batch whose tables the routines hold. */
const holders = new WeakMap<FanRoutines, FanBatch>();

/**
 * Fans of one kind and one body whose moments are computed together: cones from each fan's limit point, a level sequence of 3n regular patches closed by
 * weights instead of eigenvectors, and chains along the rim that move the cones' apex to the body's origin.
 */
export class FanBatch {
  private readonly table: FanTable;
  private readonly block: PatchBlock;
  private readonly routines: FanRoutines;
  private readonly places: Places;
  private readonly patches: number;
  /** Fans that are computed at once. */
  private readonly most: number;
  /** Doubles of a fan's points, and those of the fans that wait. */
  private readonly width: number;
  private readonly waiting: Float64Array;
  /** Doubles from fan to fan in the routines' memory, and where the level's points and the next one's stand there. */
  private readonly stride: number;
  private state: number;
  private finer: number;
  /** The origin as seen from each fan's limit point. */
  private readonly origins: Float64Array;
  private readonly rimPowers: Float64Array;
  private readonly net: Float64Array;
  /** Per fan: closed sums; how those of the solid and the area differ from others closed one level earlier, and the area from one closed from the second level on. */
  private readonly closed: Float64Array;
  private readonly check: Float64Array;
  private count = 0;
  private body = -1;
  private reach = 0;
  /** Volume and area that errors are relative to. */
  private solidScale = 0;
  private areaScale = 0;
  /** Whether the first level wants all nodes. */
  private rough = false;
  /** The patch that erred most. */
  private worst = 0;
  private worstError = 0;
  /** Estimated error of the level's area, and how many of its patches were mended. */
  private levelError = 0;
  private mended = 0;

  /** `scratch` is a fan of the kind, to be read into before `add`. */
  constructor(private readonly kit: FanKit, readonly scratch: FanState, private readonly sums: LimitSums) {
    const { kind } = kit.rule;
    this.table = fanTable(kit, scratch);
    this.block = fanBlock(kind);
    this.patches = 3 * scratch.sectors;
    this.most = Math.max(1, Math.floor(this.block.size / this.patches));
    const { points, matrix, nets } = this.table.operator;
    this.width = 3 * points.count;
    this.stride = 3 * matrix.rows;
    const starts = 0;
    const columns = starts + Math.ceil((matrix.rows + 1) / 2);
    const factors = columns + Math.ceil(matrix.columns.length / 2);
    const netsAt = factors + matrix.factors.length;
    const sumsAt = netsAt + Math.ceil(nets.length / 2);
    this.state = sumsAt + SUMMED_RESULTS * this.most;
    this.finer = this.state + this.most * this.stride;
    this.places = { starts, columns, factors, nets: netsAt, sums: sumsAt, size: this.finer + this.most * this.stride };
    const own = ownKernel(kind);
    // A fan too large for the kernel's memory has one of its own.
    this.routines = this.places.size <= FAN_ROOM ? own.fans : scalarFans(new Float64Array(this.places.size), own.input, inputStride(kind), own.output, OUTPUT_STRIDE);
    this.waiting = new Float64Array(this.most * this.width);
    this.origins = new Float64Array(3 * this.most);
    this.rimPowers = new Float64Array(3 * RIM_POWERS * this.table.rim.curves);
    this.net = new Float64Array(this.block.values);
    this.closed = new Float64Array(SUMMED_RESULTS * this.most);
    this.check = new Float64Array(CHECKS * this.most);
  }

  /** Takes the fan in `scratch`, of a body whose moments are about (ox, oy, oz). */
  add(body: number, ox: number, oy: number, oz: number): void {
    if (this.count === this.most || (this.count > 0 && body !== this.body)) this.flush();
    this.body = body;
    const limit = this.kit.limit(this.scratch);
    const at = 3 * this.count;
    this.origins[at] = ox - limit[0];
    this.origins[at + 1] = oy - limit[1];
    this.origins[at + 2] = oz - limit[2];
    // About the limit point all rings shrink to 0 and so does their rounding, which the closing would else multiply.
    packPoints(this.table.operator.points, this.scratch, limit, this.waiting, this.count * this.width);
    this.count++;
  }

  /** Computes and adds what is waiting. */
  flush(): void {
    if (this.count === 0) return;
    const { kit, table, routines, places } = this;
    const { matrix } = table.operator;
    const sums = routines.memory.subarray(places.sums, places.sums + SUMMED_RESULTS * this.count);
    this.closed.fill(0);
    this.check.fill(0);
    this.worst = 0;
    this.worstError = 0;
    this.areaScale = 0;
    this.load();
    this.addRims();
    const levels = Math.max(table.weights.length, table.surfaceWeights.length);
    let nodes = kit.rule.nodes;
    for (let k = 0; k < levels; k++) {
      routines.refine(this.count, this.stride, matrix.rows, places.starts, places.columns, places.factors, this.state, this.finer);
      [this.state, this.finer] = [this.finer, this.state];
      if (k === 0 && !this.rough && this.tryFirst(sums)) nodes = kit.rule.nodes - FIRST_SAVING;
      else this.sumLevel(nodes, sums);
      if (k === 0) this.setScales(sums);
      this.sums.surfaceError[this.body] += Math.abs(at(table.surfaceWeights, k)) * this.levelError;
      this.addLevel(k, sums);
      if (k + 1 < levels) while (nodes > kit.fewestNodes && this.compare(k, nodes, nodes - 1)) nodes--;
    }
    this.finish();
    this.count = 0;
  }

  private setScales(sums: Float64Array): void {
    this.areaScale = 0;
    for (let fan = 0; fan < this.count; fan++) this.areaScale += sums[SUMMED_RESULTS * fan + MOMENTS];
    this.solidScale = (this.areaScale * this.reach) / 3;
  }

  /** Sums the first level by fewer nodes; false, and no more tried with this kind, where many patches want mending then or the one that erred most wants more nodes. */
  private tryFirst(sums: Float64Array): boolean {
    const { nodes } = this.kit.rule;
    this.sumLevel(nodes - FIRST_SAVING, sums);
    this.setScales(sums);
    this.rough = this.mended > MOST_MENDED * this.count * this.patches || !this.compare(0, nodes, nodes - FIRST_SAVING);
    this.worstError = 0;
    if (this.rough) this.areaScale = 0;
    return !this.rough;
  }

  /** Puts tables and the waiting fans into the routines' memory. */
  private load(): void {
    const { routines, places, width, stride, waiting } = this;
    const { matrix, nets } = this.table.operator;
    if (holders.get(routines) !== this) {
      routines.integers.set(matrix.starts, 2 * places.starts);
      routines.integers.set(matrix.columns.map((point) => 3 * point), 2 * places.columns);
      routines.memory.set(matrix.factors, places.factors);
      routines.integers.set(nets.map((row) => 3 * row), 2 * places.nets);
      holders.set(routines, this);
    }
    for (let fan = 0; fan < this.count; fan++) routines.memory.set(waiting.subarray(fan * width, (fan + 1) * width), this.state + fan * stride);
  }

  private addRims(): void {
    const { rim } = this.table;
    this.reach = 0;
    for (let fan = 0; fan < this.count; fan++) {
      const ox = this.origins[3 * fan], oy = this.origins[3 * fan + 1], oz = this.origins[3 * fan + 2];
      this.reach = Math.max(this.reach, Math.sqrt(ox * ox + oy * oy + oz * oz));
      applyRows(rim.matrix, this.waiting, fan * this.width, this.rimPowers, 0);
      solid.fill(0);
      this.sums.solid.magnitudes[this.body] += addRimChain(this.rimPowers, rim.curves, ox, oy, oz, this.kit.rimNodes, solid);
      this.sums.solid.add(this.body, solid, 0);
    }
  }

  /** Sums the results of all patches of this level by fan; areas by the first two numbers of nodes are checked. */
  private sumLevel(nodes: number, sums: Float64Array): void {
    const { block, kit, routines, places, patches } = this;
    const { nodes: most, coarseNodes } = kit.rule;
    const coarse = nodes === most ? coarseNodes : nodes === most - FIRST_SAVING ? coarseNodes - 1 : 0;
    const total = this.count * patches;
    sums.fill(0);
    this.levelError = 0;
    this.mended = 0;
    for (let first = 0; first < total; first += block.size) {
      const size = Math.min(block.size, total - first);
      routines.gather(first, size, patches, block.values / 3, places.nets, this.state, this.stride);
      block.run(size, nodes, coarse);
      routines.sum(first, size, patches, places.sums);
      if (coarse > 0) for (let i = 0; i < size; i++) this.checkArea(first + i, i, sums);
    }
  }

  /** Estimates the error of a patch's area and mends it in its fan's sums where that is too large. */
  private checkArea(patch: number, place: number, sums: Float64Array): void {
    const { block } = this;
    const area = block.output[block.resultAt(place) + 2 * MOMENTS];
    let error = areaError(area, block.coarseArea(place));
    this.noteWorst(patch, error);
    // Small patches of later levels need no more than those of the first.
    const tolerance = AREA_TOLERANCE * Math.max(area, this.areaScale / (this.count * this.patches));
    if (error > tolerance) {
      const to = SUMMED_RESULTS * Math.floor(patch / this.patches) + MOMENTS;
      this.mended++;
      block.net(place, this.net);
      block.read(place, solid, surface);
      for (let m = 0; m < MOMENTS; m++) sums[to + m] -= surface[m];
      error = measureSurface(this.kit.rule.kind, this.net, 0, 0, 0, surface, tolerance);
      for (let m = 0; m < MOMENTS; m++) sums[to + m] += surface[m];
    }
    this.levelError += error;
  }

  private noteWorst(patch: number, error: number): void {
    if (!(error > this.worstError)) return;
    this.worstError = error;
    this.worst = patch;
  }

  private addLevel(k: number, level: Float64Array): void {
    const { table, closed, check } = this;
    const weight = at(table.weights, k);
    const surfaceWeight = at(table.surfaceWeights, k);
    const checkWeight = at(table.check, k);
    const checkSurface = at(table.surfaceCheck, k);
    const lateSurface = at(table.surfaceLate, k);
    for (let fan = 0; fan < this.count; fan++) {
      const to = SUMMED_RESULTS * fan;
      for (let m = 0; m < MOMENTS; m++) {
        closed[to + m] += weight * level[to + m];
        closed[to + MOMENTS + m] += surfaceWeight * level[to + MOMENTS + m];
        check[CHECKS * fan + m] += (weight - checkWeight) * level[to + m];
      }
      closed[to + 2 * MOMENTS] += Math.abs(weight) * level[to + 2 * MOMENTS];
      check[CHECKS * fan + MOMENTS] += (surfaceWeight - checkSurface) * level[to + MOMENTS];
      check[CHECKS * fan + MOMENTS + 1] += (surfaceWeight - lateSurface) * level[to + MOMENTS];
    }
  }

  /** Whether `fewer` nodes do as well as `nodes`: the patch that erred most and one in turn speak for all. If so, what they may err by is noted. */
  private compare(k: number, nodes: number, fewer: number): boolean {
    const { block, reach, sums, body, solidScale, areaScale } = this;
    const total = this.count * this.patches;
    const probes = [this.worst, (7 * k + 3) % total];
    differences.fill(0);
    for (const patch of probes) {
      // Each by itself, both lanes alike.
      for (let lane = 0; lane < 2; lane++) this.putPatch(patch, lane);
      block.run(2, nodes, 0);
      block.read(0, solid, surface);
      block.run(2, fewer, 0);
      block.read(1, coarseSolid, coarseSurface);
      for (let m = 0; m < MOMENTS; m++) {
        differences[m] = Math.max(differences[m], total * Math.abs(solid[m] - coarseSolid[m]));
        differences[MOMENTS + m] = Math.max(differences[MOMENTS + m], total * Math.abs(surface[m] - coarseSurface[m]));
      }
    }
    if (!(differences[MOMENTS] <= SURFACE_TOLERANCE * areaScale)) return false;
    // About the origin, `reach` away at most.
    const bounds = [differences[0]];
    for (let m = 1; m < 4; m++) bounds.push(differences[m] + reach * differences[0]);
    const first = Math.max(differences[1], differences[2], differences[3]);
    for (let m = 4; m < MOMENTS; m++) bounds.push(differences[m] + 2 * reach * first + reach * reach * differences[0]);
    for (let m = 0; m < MOMENTS; m++) if (!(bounds[m] <= SOLID_TOLERANCE * solidScale * (m === 0 ? 1 : m < 4 ? reach : reach * reach))) return false;
    for (let m = 0; m < MOMENTS; m++) sums.closingError[MOMENTS * body + m] += bounds[m];
    sums.surfaceError[body] += differences[MOMENTS];
    return true;
  }

  private putPatch(patch: number, place: number): void {
    const { block, net, stride, patches, routines } = this;
    const { nets } = this.table.operator;
    const points = block.values / 3;
    const fan = Math.floor(patch / patches);
    const list = (patch - fan * patches) * points;
    for (let i = 0; i < points; i++) {
      const from = this.state + fan * stride + 3 * nets[list + i];
      for (let axis = 0; axis < 3; axis++) net[3 * i + axis] = routines.memory[from + axis];
    }
    block.put(place, net, 0, 0, 0);
  }

  private finish(): void {
    const { sums, body, closed, check } = this;
    for (let fan = 0; fan < this.count; fan++) {
      const ox = this.origins[3 * fan], oy = this.origins[3 * fan + 1], oz = this.origins[3 * fan + 2];
      const from = SUMMED_RESULTS * fan;
      const checks = CHECKS * fan;
      const change = Math.max(Math.abs(check[checks + MOMENTS]), Math.abs(check[checks + MOMENTS + 1]));
      sums.surfaceError[body] += change > UNSETTLED * closed[from + MOMENTS] ? this.mendArea(fan, from + MOMENTS) : CLOSING_FACTOR * change;
      moveMoments(closed, from, ox, oy, oz);
      moveMoments(closed, from + MOMENTS, ox, oy, oz);
      sums.solid.add(body, closed, from);
      sums.surface.add(body, closed, from + MOMENTS);
      sums.solid.magnitudes[body] += closed[from + 2 * MOMENTS];
      moveMoments(check, checks, ox, oy, oz);
      for (let m = 0; m < MOMENTS; m++) sums.closingError[MOMENTS * body + m] += CLOSING_FACTOR * Math.abs(check[checks + m]);
    }
  }

  /** Puts the surface moments of a fan whose closing has not settled at `to` in the closed sums anew; returns the estimated error of its area. */
  private mendArea(fan: number, to: number): number {
    const { sectors } = this.scratch;
    const moments = new Float64Array(MOMENTS * sectors);
    const errors = new Float64Array(sectors);
    mendFanSurface(this.kit, this.table, sectors, this.waiting, fan * this.width, moments, errors);
    this.closed.fill(0, to, to + MOMENTS);
    for (let i = 0; i < moments.length; i++) this.closed[to + (i % MOMENTS)] += moments[i];
    return errors.reduce((sum, error) => sum + error, 0);
  }
}

function at(weights: Float64Array, k: number): number {
  return k < weights.length ? weights[k] : 0;
}
