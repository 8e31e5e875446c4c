import { AREA_TOLERANCE, CHOICE_TOLERANCE, NODE_RANGES } from '../kernel/node-choice';
import type { PatchBlock } from '../kernel/patch-block';
import type { PatchKind } from '../kernel/patch-kinds';
import { SUMMED_RESULTS } from '../kernel/scalar-fans';
import type { LimitSums } from '../moments/limit-sums';
import { MOMENTS } from '../moments/sums';
import { mendSurface } from '../patches/mend-surface';
import type { FanKit } from './fan-kit';
import { FanMemory } from './fan-memory';
import { packPoints } from './fan-points';
import { RIM_POWERS } from './fan-rim';
import type { FanState } from './fan-state';
import { fanTable, type FanTable } from './fan-tables';
import { fanBlock } from './integrate-fan';
import { mendFanSurface, UNSETTLED } from './mend-fan-surface';
import { addRimChain, moveMoments } from './rim-chain';
import { applyRows } from './sparse-rows';

/** What a coarser rule may change, relative to the moments of the cones from the origin and to the area. */
const SOLID_TOLERANCE = 4e-15;
const SURFACE_TOLERANCE = 1e-11;

/** Nodes by which patches are tried first, those of rougher surfaces with more; a level whose patches all do with fewer is computed with the same for all. */
const FIRST: Readonly<Record<PatchKind, number>> = { bicubic: 5, biquadratic: 5, triangle: 7 };

/** Times the difference of two closings: the earlier one errs about as much as they differ, so that the difference alone may fall short by a little. */
const CLOSING_FACTOR = 2;

/** Differences a fan: ten of the solid, two of the area. */
const CHECKS = MOMENTS + 2;

const solid = new Float64Array(MOMENTS);
const surface = new Float64Array(MOMENTS);
const coarseSolid = new Float64Array(MOMENTS);
const coarseSurface = new Float64Array(MOMENTS);
const differences = new Float64Array(2 * MOMENTS);

/**
 * Fans of one kind and one body whose moments are computed together: cones from each fan's limit point, a level sequence of 3n regular patches closed by
 * weights instead of eigenvectors, and chains along the rim that move the cones' apex to the body's origin.
 */
export class FanBatch {
  private readonly table: FanTable;
  private readonly block: PatchBlock;
  private readonly memory: FanMemory;
  private readonly patches: number;
  /** Fans that are computed at once. */
  private readonly most: number;
  /** Doubles of a fan's points, and those of the fans that wait. */
  private readonly width: number;
  private readonly waiting: Float64Array;
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
  /** Whether the solid moments of the kind want more nodes on the first level than patches are tried with, and those of the level at hand. */
  private rough = false;
  private bounded = false;
  /** The patch that took most nodes and erred most with them. */
  private worst = 0;
  private worstNodes = 0;
  private worstError = 0;
  /** How many patches took fewer nodes than are exact for their solid moments, the last of them, and which of them erred most. */
  private spared = 0;
  private lastSpared = 0;
  private worstSpared = 0;
  private sparedError = 0;
  /** Estimated error of the level's area, and of its first and second solid moments for nodes spared. */
  private levelError = 0;
  private levelFirst = 0;
  private levelSecond = 0;

  /** `scratch` is a fan of the kind, to be read into before `add`. */
  constructor(private readonly kit: FanKit, readonly scratch: FanState, private readonly sums: LimitSums) {
    const { kind } = kit.rule;
    this.table = fanTable(kit, scratch);
    this.block = fanBlock(kind);
    this.patches = 3 * scratch.sectors;
    this.most = Math.max(1, Math.floor(this.block.size / this.patches));
    this.width = 3 * this.table.operator.points.count;
    this.memory = new FanMemory(kind, this.table.operator, this.block, this.patches, this.most);
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
    const { kit, table, memory } = this;
    this.closed.fill(0);
    this.check.fill(0);
    this.areaScale = 0;
    memory.load(this.waiting, this.width, this.count);
    this.addRims();
    const levels = Math.max(table.weights.length, table.surfaceWeights.length);
    const first = FIRST[kit.rule.kind];
    const total = this.count * this.patches;
    // 0: each patch has as many as it wants.
    let nodes = 0;
    for (let k = 0; k < levels; k++) {
      memory.refine();
      if (nodes > 0) memory.sumLevel((size) => this.block.run(size, nodes, 0));
      else this.chooseLevel(k);
      this.addLevel(k);
      if (k + 1 === levels) break;
      // The patch that erred most and one in turn speak for all.
      const probes = [this.worst, (7 * k + 3) % total];
      if (this.bounded) this.bounded = !this.compare(probes, total, kit.rule.nodes, first, false);
      if (nodes === 0 && this.compare(probes, total, first, first - 1)) nodes = first - 1;
      while (nodes > kit.fewestNodes && this.compare(probes, total, nodes, nodes - 1)) nodes--;
    }
    this.finish();
    this.count = 0;
  }

  private setScales(): void {
    this.areaScale = 0;
    for (let fan = 0; fan < this.count; fan++) this.areaScale += this.memory.sums[SUMMED_RESULTS * fan + MOMENTS];
    this.solidScale = (this.areaScale * this.reach) / 3;
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

  /** Sums the results of all patches of this level by fan, each with as many nodes as it wants, and notes what they may err by. */
  private chooseLevel(k: number): void {
    const { sums: { surfaceError, closingError }, body, table, reach } = this;
    const { kind } = this.kit.rule;
    const { fewest, exact } = NODE_RANGES[kind];
    const first = FIRST[kind];
    if (k === 0) this.bounded = this.rough;
    if (!this.bounded) {
      this.sumChosen(first, 0);
      if (k === 0) {
        this.setScales();
        this.rough = this.bounded = this.spared > 0 && !this.compare([this.worstSpared, this.lastSpared], this.spared, exact, first, false);
      }
    }
    // Where the solid moments want more than the area, their bounds say how many.
    if (this.bounded) {
      // Relative to the patches of the first level: those of later ones are smaller.
      this.sumChosen(fewest, CHOICE_TOLERANCE * 4 ** k);
      if (k === 0) this.setScales();
    }
    surfaceError[body] += Math.abs(at(table.surfaceWeights, k)) * this.levelError;
    const weight = Math.abs(at(table.weights, k));
    const firstError = weight * this.levelFirst;
    const secondError = weight * this.levelSecond + 2 * reach * firstError;
    for (let m = 1; m < MOMENTS; m++) closingError[MOMENTS * body + m] += m < 4 ? firstError : secondError;
  }

  private sumChosen(fewest: number, tolerance: number): void {
    this.worstNodes = this.worstError = 0;
    this.spared = this.sparedError = 0;
    this.levelError = this.levelFirst = this.levelSecond = 0;
    this.memory.sumLevel((size) => this.block.choose(size, fewest, tolerance, this.reach), (patch, place) => this.checkPatch(patch, place));
  }

  /** Notes what a patch errs by, and mends its area in its fan's sums where that is too much. */
  private checkPatch(patch: number, place: number): void {
    const { block, memory: { sums } } = this;
    const area = block.output[block.resultAt(place) + 2 * MOMENTS];
    let error = block.areaError(place);
    const nodes = block.nodes(place);
    this.noteWorst(patch, nodes, error);
    if (nodes < NODE_RANGES[this.kit.rule.kind].exact) this.noteSpared(patch, error);
    const second = block.secondError(place);
    if (second > 0) {
      this.levelFirst += block.firstError(place);
      this.levelSecond += second;
    }
    // Small patches of later levels need no more than those of the first.
    const tolerance = AREA_TOLERANCE * Math.max(area, this.areaScale / (this.count * this.patches));
    if (error > tolerance) {
      const to = SUMMED_RESULTS * Math.floor(patch / this.patches) + MOMENTS;
      block.net(place, this.net);
      block.read(place, solid, surface);
      for (let m = 0; m < MOMENTS; m++) sums[to + m] -= surface[m];
      error = mendSurface(this.kit.rule.kind, this.net, 0, 0, 0, surface, block.coarseArea(place), error, tolerance);
      for (let m = 0; m < MOMENTS; m++) sums[to + m] += surface[m];
    }
    this.levelError += error;
  }

  private noteWorst(patch: number, nodes: number, error: number): void {
    if (nodes < this.worstNodes || (nodes === this.worstNodes && !(error > this.worstError))) return;
    this.worstNodes = nodes;
    this.worstError = error;
    this.worst = patch;
  }

  private noteSpared(patch: number, error: number): void {
    this.spared++;
    this.lastSpared = patch;
    if (this.spared > 1 && !(error > this.sparedError)) return;
    this.sparedError = error;
    this.worstSpared = patch;
  }

  private addLevel(k: number): void {
    const { table, closed, check, memory: { sums: level } } = this;
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

  /** Whether `fewer` nodes do as well as `nodes` for `total` patches that `probes` speak for, for the area too or the solid alone. If so, what they may err by is noted. */
  private compare(probes: readonly number[], total: number, nodes: number, fewer: number, area = true): boolean {
    const { block, reach, sums, body, solidScale, areaScale } = this;
    differences.fill(0);
    for (const patch of probes) {
      // Each by itself, both lanes alike.
      this.memory.net(patch, this.net);
      for (let lane = 0; lane < 2; lane++) block.put(lane, this.net, 0, 0, 0);
      block.run(2, nodes, 0);
      block.read(0, solid, surface);
      block.run(2, fewer, 0);
      block.read(1, coarseSolid, coarseSurface);
      for (let m = 0; m < MOMENTS; m++) {
        differences[m] = Math.max(differences[m], total * Math.abs(solid[m] - coarseSolid[m]));
        differences[MOMENTS + m] = Math.max(differences[MOMENTS + m], total * Math.abs(surface[m] - coarseSurface[m]));
      }
    }
    if (area && !(differences[MOMENTS] <= SURFACE_TOLERANCE * areaScale)) return false;
    // About the origin, `reach` away at most.
    const bounds = [differences[0]];
    for (let m = 1; m < 4; m++) bounds.push(differences[m] + reach * differences[0]);
    const first = Math.max(differences[1], differences[2], differences[3]);
    for (let m = 4; m < MOMENTS; m++) bounds.push(differences[m] + 2 * reach * first + reach * reach * differences[0]);
    for (let m = 0; m < MOMENTS; m++) if (!(bounds[m] <= SOLID_TOLERANCE * solidScale * (m === 0 ? 1 : m < 4 ? reach : reach * reach))) return false;
    for (let m = 0; m < MOMENTS; m++) sums.closingError[MOMENTS * body + m] += bounds[m];
    if (area) sums.surfaceError[body] += differences[MOMENTS];
    return true;
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
