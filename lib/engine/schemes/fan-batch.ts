import type { PatchBlock } from '../kernel/patch-block';
import type { LimitSums } from '../moments/limit-sums';
import { MOMENTS } from '../moments/sums';
import { AREA_TOLERANCE, areaError, mendSurface } from '../patches/mend-surface';
import type { Fans } from './classify-vertices';
import type { FanKit } from './fan-kit';
import { packPoints } from './fan-points';
import { RIM_POWERS } from './fan-rim';
import { makeFanState, type FanState } from './fan-state';
import { fanKey, fanTable, type FanTable } from './fan-tables';
import { fanBlock, integrateFan } from './integrate-fan';
import type { LevelMesh } from './level-mesh';
import { addRimChain, moveMoments } from './rim-chain';
import { applyRows } from './sparse-rows';

/** What a coarser rule may change, relative to the moments of the cones from the origin and to the area. */
const SOLID_TOLERANCE = 1e-15;
const SURFACE_TOLERANCE = 1e-11;

/** Times the difference of two closings: the earlier one errs about as much as they differ, so that the difference alone may fall short by a little. */
const CLOSING_FACTOR = 2;

/** Ten solid and ten surface moments and the magnitude of a fan's patches at one level. */
const LEVEL_SUMS = 2 * MOMENTS + 1;

const solid = new Float64Array(MOMENTS);
const surface = new Float64Array(MOMENTS);

/**
 * Fans of one kind and one body whose moments are computed together: cones from each fan's limit point, a level sequence of 3n regular patches closed by
 * weights instead of eigenvectors, and chains along the rim that move the cones' apex to the body's origin.
 */
class FanBatch {
  /** A fan to be read into and added. */
  readonly scratch: FanState;
  private readonly table: FanTable;
  private readonly block: PatchBlock;
  private readonly patches: number;
  /** Fans that are computed at once. */
  private readonly most: number;
  private readonly stride: number;
  private state: Float64Array;
  private finer: Float64Array;
  /** The origin as seen from each fan's limit point. */
  private readonly origins: Float64Array;
  private readonly rimPowers: Float64Array;
  /** Per fan: sums of one level, closed sums, and the same closed one level earlier. */
  private readonly level: Float64Array;
  private readonly closed: Float64Array;
  private readonly check: Float64Array;
  private readonly net: Float64Array;
  private count = 0;
  private body = -1;
  private reach = 0;
  /** The patch that erred most. */
  private worst = 0;
  private worstError = 0;

  constructor(private readonly kit: FanKit, kind: FanState, private readonly sums: LimitSums) {
    this.scratch = kind;
    this.table = fanTable(kit, kind);
    this.block = fanBlock(kit.rule.kind);
    this.net = new Float64Array(this.block.values);
    this.patches = 3 * kind.sectors;
    this.most = Math.max(1, Math.floor(this.block.size / this.patches));
    this.stride = 3 * this.table.operator.matrix.rows;
    this.state = new Float64Array(this.most * this.stride);
    this.finer = new Float64Array(this.most * this.stride);
    this.origins = new Float64Array(3 * this.most);
    this.rimPowers = new Float64Array(3 * RIM_POWERS * this.table.rim.curves);
    this.level = new Float64Array(LEVEL_SUMS * this.most);
    this.closed = new Float64Array(LEVEL_SUMS * this.most);
    this.check = new Float64Array((MOMENTS + 1) * this.most);
  }

  /** Takes the fan in `scratch`, of a body whose moments are about (ox, oy, oz). */
  add(body: number, ox: number, oy: number, oz: number): void {
    if (this.count === this.most || (this.count > 0 && body !== this.body)) this.flush();
    this.body = body;
    const fan = this.scratch;
    const limit = this.kit.limit(fan);
    const at = 3 * this.count;
    this.origins[at] = ox - limit[0];
    this.origins[at + 1] = oy - limit[1];
    this.origins[at + 2] = oz - limit[2];
    packPoints(this.table.operator.points, fan, limit, this.state, this.count * this.stride);
    this.count++;
  }

  /** Computes and adds what is waiting. */
  flush(): void {
    if (this.count === 0) return;
    const { kit, table, closed } = this;
    closed.fill(0, 0, LEVEL_SUMS * this.count);
    this.check.fill(0);
    this.worst = 0;
    this.worstError = 0;
    this.addRims();
    const levels = Math.max(table.weights.length, table.surfaceWeights.length);
    let nodes = kit.rule.nodes;
    let solidScale = 0;
    let areaScale = 0;
    for (let k = 0; k < levels; k++) {
      for (let fan = 0; fan < this.count; fan++) applyRows(table.operator.matrix, this.state, fan * this.stride, this.finer, fan * this.stride);
      [this.state, this.finer] = [this.finer, this.state];
      this.sumLevel(nodes, Math.abs(at(table.surfaceWeights, k)));
      if (k === 0) {
        for (let fan = 0; fan < this.count; fan++) areaScale += this.level[LEVEL_SUMS * fan + MOMENTS];
        solidScale = (areaScale * this.reach) / 3;
      }
      this.addLevel(k);
      if (k + 1 < levels) while (nodes > kit.fewestNodes && this.mayCoarsen(k, nodes, solidScale, areaScale)) nodes--;
    }
    this.finish();
    this.count = 0;
  }

  private addRims(): void {
    const { rim } = this.table;
    this.reach = 0;
    for (let fan = 0; fan < this.count; fan++) {
      const [ox, oy, oz] = this.origins.subarray(3 * fan, 3 * fan + 3);
      this.reach = Math.max(this.reach, Math.hypot(ox, oy, oz));
      applyRows(rim.matrix, this.state, fan * this.stride, this.rimPowers, 0);
      solid.fill(0);
      this.sums.solid.magnitudes[this.body] += addRimChain(this.rimPowers, rim.curves, ox, oy, oz, this.kit.rimNodes, solid);
      this.sums.solid.add(this.body, solid, 0);
    }
  }

  /** Sums the moments of all patches of this level by fan. */
  private sumLevel(nodes: number, surfaceWeight: number): void {
    const { block, kit, level } = this;
    const coarse = nodes === kit.rule.nodes ? kit.rule.coarseNodes : 0;
    const total = this.count * this.patches;
    level.fill(0, 0, LEVEL_SUMS * this.count);
    for (let first = 0; first < total; first += block.size) {
      const size = Math.min(block.size, total - first);
      this.gather(first, size);
      block.run(size, nodes, coarse);
      for (let i = 0; i < size; i++) {
        const to = LEVEL_SUMS * Math.floor((first + i) / this.patches);
        level[to + 2 * MOMENTS] += block.read(i, solid, surface);
        if (coarse > 0) this.checkArea(first + i, i, surfaceWeight);
        for (let m = 0; m < MOMENTS; m++) {
          level[to + m] += solid[m];
          level[to + MOMENTS + m] += surface[m];
        }
      }
    }
  }

  /** Puts the nets of patches into the block. */
  private gather(first: number, size: number): void {
    const { block } = this;
    for (let i = 0; i < size; i++) {
      this.put(first + i, i);
      block.putOrigin(i, 0, 0, 0);
    }
  }

  private put(patch: number, place: number): void {
    const netPoints = this.block.values / 3;
    const { nets } = this.table.operator;
    const { input } = this.block;
    const fan = Math.floor(patch / this.patches);
    const base = fan * this.stride;
    const list = (patch - fan * this.patches) * netPoints;
    let to = this.block.at(place);
    for (let i = list; i < list + netPoints; i++, to += 6) {
      const from = base + 3 * nets[i];
      input[to] = this.state[from];
      input[to + 2] = this.state[from + 1];
      input[to + 4] = this.state[from + 2];
    }
  }

  /** Estimates the error of the area in `surface` and mends it where that is too large. */
  private checkArea(patch: number, place: number, weight: number): void {
    const coarseArea = this.block.coarseArea(place);
    let error = areaError(surface[0], coarseArea);
    if (error > AREA_TOLERANCE * surface[0]) {
      this.block.net(place, this.net);
      error = mendSurface(this.kit.rule.kind, this.net, 0, 0, 0, surface, coarseArea);
    }
    this.sums.surfaceError[this.body] += weight * error;
    if (error > this.worstError) {
      this.worstError = error;
      this.worst = patch;
    }
  }

  private addLevel(k: number): void {
    const { table, level, closed, check } = this;
    const weight = at(table.weights, k);
    const surfaceWeight = at(table.surfaceWeights, k);
    const checkWeight = at(table.check, k);
    const checkSurface = at(table.surfaceCheck, k);
    for (let fan = 0; fan < this.count; fan++) {
      const to = LEVEL_SUMS * fan;
      for (let m = 0; m < MOMENTS; m++) {
        closed[to + m] += weight * level[to + m];
        closed[to + MOMENTS + m] += surfaceWeight * level[to + MOMENTS + m];
        check[(MOMENTS + 1) * fan + m] += (weight - checkWeight) * level[to + m];
      }
      closed[to + 2 * MOMENTS] += Math.abs(weight) * level[to + 2 * MOMENTS];
      check[(MOMENTS + 1) * fan + MOMENTS] += (surfaceWeight - checkSurface) * level[to + MOMENTS];
    }
  }

  /** Whether one node less would do from the next level on: the patch that erred most and one in turn speak for all. */
  private mayCoarsen(k: number, nodes: number, solidScale: number, areaScale: number): boolean {
    const { block, reach, sums, body } = this;
    const total = this.count * this.patches;
    const probes = [this.worst, (7 * k + 3) % total];
    probes.forEach((patch, i) => {
      this.put(patch, i);
      block.putOrigin(i, 0, 0, 0);
    });
    block.run(2, nodes, 0);
    const fine = probes.map((_, i) => this.readAbout(i));
    block.run(2, nodes - 1, 0);
    const coarse = probes.map((_, i) => this.readAbout(i));
    const differences = new Float64Array(2 * MOMENTS);
    for (let i = 0; i < 2; i++) for (let m = 0; m < 2 * MOMENTS; m++) differences[m] = Math.max(differences[m], total * Math.abs(fine[i][m] - coarse[i][m]));
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

  private readAbout(place: number): number[] {
    this.block.read(place, solid, surface);
    return [...solid, ...surface];
  }

  private finish(): void {
    const { sums, body, closed, check } = this;
    for (let fan = 0; fan < this.count; fan++) {
      const [ox, oy, oz] = this.origins.subarray(3 * fan, 3 * fan + 3);
      const from = LEVEL_SUMS * fan;
      moveMoments(closed, from, ox, oy, oz);
      moveMoments(closed, from + MOMENTS, ox, oy, oz);
      sums.solid.add(body, closed, from);
      sums.surface.add(body, closed, from + MOMENTS);
      sums.solid.magnitudes[body] += closed[from + 2 * MOMENTS];
      moveMoments(check, (MOMENTS + 1) * fan, ox, oy, oz);
      for (let m = 0; m < MOMENTS; m++) sums.closingError[MOMENTS * body + m] += CLOSING_FACTOR * Math.abs(check[(MOMENTS + 1) * fan + m]);
      sums.surfaceError[body] += CLOSING_FACTOR * Math.abs(check[(MOMENTS + 1) * fan + MOMENTS]);
    }
  }
}

function at(weights: Float64Array, k: number): number {
  return k < weights.length ? weights[k] : 0;
}

/** Fans on their way into the sums: those of one kind together; those with borders or of several bodies by themselves. */
export class FanBatches {
  private readonly batches = new Map<number, FanBatch>();

  /** `origins` has x, y, z per body: the points that moments are about. */
  constructor(private readonly kit: FanKit, private readonly origins: Float64Array, private readonly sums: LimitSums) {}

  /** Takes an isolated fan. */
  add(mesh: LevelMesh, fans: Fans, index: number): void {
    const { kit, origins, sums } = this;
    sums.shells?.fan(mesh, fans, index);
    const corners = fans.corners.slice(fans.starts[index], fans.starts[index + 1]);
    const body = kit.body(mesh, corners[0]);
    if (!isWhole(kit, mesh, corners, body)) {
      integrateFan(kit, mesh, fans, index, origins, sums);
      return;
    }
    const closed = fans.closed[index], sharpFirst = fans.sharpFirst[index], centre = fans.centre[index];
    const key = fanKey(corners.length, closed, sharpFirst, centre);
    let batch = this.batches.get(key);
    if (batch === undefined) {
      batch = new FanBatch(kit, makeFanState(corners.length, closed, sharpFirst, centre), sums);
      this.batches.set(key, batch);
    }
    kit.read(mesh, corners, batch.scratch);
    batch.add(body, origins[3 * body], origins[3 * body + 1], origins[3 * body + 2]);
  }

  /** Computes and adds what is waiting. */
  flush(): void {
    for (const batch of this.batches.values()) batch.flush();
  }
}

/** Whether a fan is of one body and none of its sides is a border. */
function isWhole(kit: FanKit, mesh: LevelMesh, corners: readonly number[], body: number): boolean {
  for (const corner of corners) {
    if (kit.body(mesh, corner) !== body) return false;
    for (let side = 0; side < kit.sides; side++) if (mesh.borderOf[kit.sideAt(mesh, corner, side)] >= 0) return false;
  }
  return true;
}
