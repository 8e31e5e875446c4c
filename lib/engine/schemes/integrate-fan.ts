import { ownKernel, PatchBlock } from '../kernel/patch-block';
import type { PatchKind } from '../kernel/patch-kinds';
import type { BorderCurves } from '../moments/border-curves';
import type { LimitSums } from '../moments/limit-sums';
import { MOMENTS } from '../moments/sums';
import { mendSurface } from '../patches/mend-surface';
import type { Fans } from './classify-vertices';
import type { FanKit } from './fan-kit';
import { makeFanState, translateFan, type FanState } from './fan-state';
import { packPoints } from './fan-points';
import { fanTable, type FanTable } from './fan-tables';
import type { LevelMesh } from './level-mesh';
import { mendFanSurface, UNSETTLED } from './mend-fan-surface';
import { moveMoments } from './rim-chain';

/** What a coarser rule may change, relative to the fan's own moments and area. */
const SOLID_TOLERANCE = 1e-16;
const SURFACE_TOLERANCE = 1e-12;

const net = new Float64Array(48);
const solid = new Float64Array(MOMENTS);
const surface = new Float64Array(MOMENTS);
const coarseSolid = new Float64Array(MOMENTS);
const coarseSurface = new Float64Array(MOMENTS);

/** Sums of one fan, ten per sector. */
interface FanSums {
  solid: Float64Array;
  surface: Float64Array;
  /** The same, closed one level earlier. */
  checkSolid: Float64Array;
  checkArea: Float64Array;
  /** The area, closed from the second level on. */
  lateArea: Float64Array;
  magnitude: Float64Array;
}

/**
 * Adds the moments and border curves of an isolated fan: a level sequence of 3n regular patches each, closed by weights instead of eigenvectors.
 */
export function integrateFan(kit: FanKit, mesh: LevelMesh, fans: Fans, index: number, origins: Float64Array, sums: LimitSums): void {
  let state = makeFanState(fans.starts[index + 1] - fans.starts[index], fans.closed[index], fans.sharpFirst[index], fans.centre[index]);
  let finer = makeFanState(state.sectors, state.closed, state.sharpFirst, state.centreRule);
  const table = fanTable(kit, state);
  const { wideWeights: weights } = table;
  const levels = Math.max(weights.length, table.surfaceWeights.length);
  const corners = fans.corners.slice(fans.starts[index], fans.starts[index + 1]);
  const n = state.sectors;
  kit.read(mesh, corners, state);
  const own: FanSums = {
    solid: new Float64Array(MOMENTS * n), surface: new Float64Array(MOMENTS * n), checkSolid: new Float64Array(MOMENTS * n),
    checkArea: new Float64Array(n), lateArea: new Float64Array(n), magnitude: new Float64Array(n),
  };
  const bordered = corners.some((corner) => [0, 1, 2, 3].some((side) => side < kit.sides && mesh.borderOf[kit.sideAt(mesh, corner, side)] >= 0));
  // About the limit point all rings shrink to 0 and so does their rounding, which the closing would else multiply.
  const limit = kit.limit(state);
  translateFan(state, limit);
  const { points } = table.operator;
  const packed = new Float64Array(3 * points.count);
  packPoints(points, state, new Float64Array(3), packed, 0);
  const originOf = (j: number): [number, number, number] => {
    const at = 3 * kit.body(mesh, corners[j]);
    return [origins[at] - limit[0], origins[at + 1] - limit[1], origins[at + 2] - limit[2]];
  };
  const centre = originOf(0);
  const reach = Math.hypot(centre[0], centre[1], centre[2]) + state.spokes.reduce((far, value) => Math.max(far, Math.abs(value)), 0);
  const { kind, coarseNodes } = kit.rule;
  const block = fanBlock(kind);
  let nodes = kit.rule.nodes;
  let solidScale = 0;
  let areaScale = 0;
  let worst = 0;
  let worstError = 0;
  for (let k = 0; k < levels; k++) {
    kit.refine(state, finer);
    [state, finer] = [finer, state];
    const checked = nodes === kit.rule.nodes;
    for (let j = 0; j < n; j++) {
      const [ox, oy, oz] = originOf(j);
      // As many sectors together as the block holds.
      const place = 3 * (j % Math.floor(block.size / 3));
      if (place === 0) runSectors(kit, block, state, j, originOf, nodes, checked ? coarseNodes : 0);
      for (let child = 0; child < 3; child++) {
        if (bordered) {
          kit.fillChild(state, j, child, net);
          addFanCurves(kit, mesh, corners[j], child, k, table, limit, sums.curves);
        }
        const magnitude = block.read(place + child, solid, surface);
        if (checked) {
          block.net(place + child, net);
          const error = mendSurface(kind, net, ox, oy, oz, surface, block.coarseArea(place + child), block.areaError(place + child));
          sums.surfaceError[kit.body(mesh, corners[j])] += Math.abs(at(table.surfaceWeights, k)) * error;
          if (error > worstError) {
            worstError = error;
            worst = 3 * j + child;
          }
        }
        if (k === 0) {
          solidScale += magnitude;
          areaScale += surface[0];
        }
        addPatch(own, j, table, k, magnitude);
      }
    }
    worstError = 0;
    if (nodes === kit.fewestNodes || k + 1 >= levels) continue;
    // The patch that erred most and one in turn speak for all.
    const fewer = [(7 * k) % (3 * n), worst].every((patch) => {
      const j = Math.floor(patch / 3);
      return probe(kit, state, j, patch % 3, originOf(j), nodes, 3 * n, solidScale, areaScale, reach);
    });
    if (fewer) {
      nodes--;
      const body = kit.body(mesh, corners[Math.floor(worst / 3)]);
      for (let i = 0; i < MOMENTS; i++) sums.closingError[MOMENTS * body + i] += 3 * n * Math.abs(coarseSolid[i] - solid[i]);
      sums.surfaceError[body] += 3 * n * Math.abs(coarseSurface[0] - surface[0]);
    }
  }
  if (bordered) addRestOfCurves(kit, mesh, corners, state, finer, levels, table, limit, sums.curves);
  const changes = own.checkArea.map((area, j) => Math.max(Math.abs(own.surface[MOMENTS * j] - area), Math.abs(own.surface[MOMENTS * j] - own.lateArea[j])));
  if (sumOf(changes) > UNSETTLED * sumOf(own.checkArea)) {
    mendFanSurface(kit, table, n, packed, 0, own.surface, changes);
    for (let j = 0; j < n; j++) moveMoments(own.surface, MOMENTS * j, ...originOf(j));
  }
  finishFan(kit, mesh, corners, own, changes, sums);
}

const blocks = new Map<PatchKind, PatchBlock>();

/** Block for the patches of fans. This thread's own kernel even within a team: they are too few to share. */
export function fanBlock(kind: PatchKind): PatchBlock {
  let block = blocks.get(kind);
  if (block === undefined) {
    block = new PatchBlock(ownKernel(kind));
    blocks.set(kind, block);
  }
  return block;
}

/** Computes the patches of as many sectors from `first` on as the block holds. */
function runSectors(
  kit: FanKit, block: PatchBlock, state: FanState, first: number, originOf: (j: number) => [number, number, number], nodes: number, coarseNodes: number,
): void {
  const sectors = Math.min(state.sectors - first, Math.floor(block.size / 3));
  for (let i = 0; i < sectors; i++) {
    const [ox, oy, oz] = originOf(first + i);
    for (let child = 0; child < 3; child++) {
      kit.fillPoints(state, first + i, child, net);
      block.put(3 * i + child, net, ox, oy, oz);
    }
  }
  block.run(3 * sectors, nodes, coarseNodes);
}

/** Whether one node less would do for a patch; leaves both results in `solid`, `surface` and `coarseSolid`, `coarseSurface`. */
function probe(
  kit: FanKit, state: FanState, sector: number, child: number, [ox, oy, oz]: [number, number, number], nodes: number, patches: number,
  solidScale: number, areaScale: number, reach: number,
): boolean {
  const block = fanBlock(kit.rule.kind);
  kit.fillPoints(state, sector, child, net);
  block.put(0, net, ox, oy, oz);
  block.run(1, nodes, 0);
  block.read(0, solid, surface);
  block.run(1, nodes - 1, 0);
  block.read(0, coarseSolid, coarseSurface);
  if (!(patches * Math.abs(coarseSurface[0] - surface[0]) <= SURFACE_TOLERANCE * areaScale)) return false;
  for (let i = 0; i < MOMENTS; i++) {
    const scale = i === 0 ? 1 : i < 4 ? reach : reach * reach;
    if (!(patches * Math.abs(coarseSolid[i] - solid[i]) <= SOLID_TOLERANCE * solidScale * scale)) return false;
  }
  return true;
}

function sumOf(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value, 0);
}

function at(weights: Float64Array, k: number): number {
  return k < weights.length ? weights[k] : 0;
}

function addPatch(own: FanSums, sector: number, table: FanTable, k: number, magnitude: number): void {
  const to = MOMENTS * sector;
  const weight = at(table.wideWeights, k);
  const checkWeight = at(table.wideCheck, k);
  const surfaceWeight = at(table.surfaceWeights, k);
  for (let i = 0; i < MOMENTS; i++) {
    own.solid[to + i] += weight * solid[i];
    own.surface[to + i] += surfaceWeight * surface[i];
    own.checkSolid[to + i] += checkWeight * solid[i];
  }
  own.lateArea[sector] += at(table.surfaceLate, k) * surface[0];
  own.checkArea[sector] += at(table.surfaceCheck, k) * surface[0];
  own.magnitude[sector] += Math.abs(weight) * magnitude;
}

function finishFan(kit: FanKit, mesh: LevelMesh, corners: number[], own: FanSums, areaErrors: Float64Array, sums: LimitSums): void {
  for (let j = 0; j < corners.length; j++) {
    const body = kit.body(mesh, corners[j]);
    sums.solid.add(body, own.solid, MOMENTS * j);
    sums.surface.add(body, own.surface, MOMENTS * j);
    sums.solid.magnitudes[body] += own.magnitude[j];
    for (let i = 0; i < MOMENTS; i++) sums.closingError[MOMENTS * body + i] += Math.abs(own.solid[MOMENTS * j + i] - own.checkSolid[MOMENTS * j + i]);
    sums.surfaceError[body] += areaErrors[j];
  }
}

/** Border curves shrink more slowly than patches, so their sequence goes on; at its end stand the limit points of the edges. */
function addRestOfCurves(
  kit: FanKit, mesh: LevelMesh, corners: number[], from: FanState, spare: FanState, done: number, table: FanTable, limit: Float64Array, curves: BorderCurves,
): void {
  let state = from;
  let finer = spare;
  for (let k = done; k < table.curveWeights.length; k++) {
    kit.refine(state, finer);
    [state, finer] = [finer, state];
    for (let j = 0; j < corners.length; j++) {
      for (let child = 0; child < 3; child += 2) {
        kit.fillChild(state, j, child, net);
        addFanCurves(kit, mesh, corners[j], child, k, table, limit, curves);
      }
    }
  }
  for (const corner of corners) {
    const leaving = mesh.borderOf[kit.sideAt(mesh, corner, 0)];
    const arriving = mesh.borderOf[kit.sideAt(mesh, corner, kit.arriving)];
    if (leaving >= 0) curves.ends.set(2 * leaving, [limit[0], limit[1], limit[2]]);
    if (arriving >= 0) curves.ends.set(2 * arriving + 1, [limit[0], limit[1], limit[2]]);
  }
}

/** Adds the border curves that the child net in `net` holds at level k of a fan. Sides 0 leave the centre, sides `arriving` run towards it. */
function addFanCurves(
  kit: FanKit, mesh: LevelMesh, corner: number, child: number, k: number, table: FanTable, limit: Float64Array, curves: BorderCurves,
): void {
  const length = 2 ** -mesh.level;
  const weight = at(table.curveWeights, k);
  if (child !== 1 && weight !== 0) {
    const side = child === 0 ? 0 : kit.arriving;
    const h = kit.sideAt(mesh, corner, side);
    const share = length * 2 ** (-1 - k);
    const from = mesh.borderFrom[h] + (side === 0 ? share : length - 2 * share);
    const first = curves.edges.length;
    if (mesh.borderOf[h] >= 0) kit.addSide(curves, net, side, mesh.borderOf[h], weight, from, share, limit);
    curves.doubtFrom(first, weight - at(table.curveCheck, k));
  }
  if (k > 0) return;
  for (const [outerChild, side, faceSide, half] of kit.outerSides) {
    if (outerChild !== child) continue;
    const h = kit.sideAt(mesh, corner, faceSide);
    if (mesh.borderOf[h] >= 0) kit.addSide(curves, net, side, mesh.borderOf[h], 1, mesh.borderFrom[h] + (half * length) / 2, length / 2, limit);
  }
}
