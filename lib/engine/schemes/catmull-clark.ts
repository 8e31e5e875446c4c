import type { BorderCurves } from '../moments/border-curves';
import { MOMENTS, type MomentSums } from '../moments/sums';
import { bicubicMoments } from '../patches/bicubic';
import { gaussRule } from '../patches/gauss-rule';
import { classifyVertices, isRegularFace, type Fans } from './catmull-clark-classify';
import { approximateLimit, fillChildNet, makeFanState, refineFan, translateFan, type FanState } from './catmull-clark-fan';
import { fillNet } from './catmull-clark-net';
import { refineAround } from './catmull-clark-refine';
import { fanTable } from './catmull-clark-tables';
import type { LevelMesh } from './level-mesh';
import type { RefinementRules } from './refinement-rules';

/** Refinements after which a cage that still is not resolved is given up; sharpness below 10 needs at most 12. */
const MOST_LEVELS = 16;

/** Gauss nodes a direction for the level sequence of a fan: finer levels are flatter, so fewer do. */
const LEVEL_NODES = [7, 7, 7, 6, 6, 5];

/** Exact for the ten solid moments of a bicubic patch: degree 13 a direction. */
const EXACT_RULE = gaussRule(7);

/** Sums that the integration fills; about each body's origin. */
export interface LimitSums {
  solid: MomentSums;
  surface: MomentSums;
  /** Per body and moment: sum over the fans of the difference between two closings of the tail, and of two Gauss rules where a coarser one begins. */
  closingError: Float64Array;
  curves: BorderCurves;
}

const NO_SHIFT = new Float64Array(3);
const net = new Float64Array(48);
const solid = new Float64Array(MOMENTS);
const surface = new Float64Array(MOMENTS);
const finerSolid = new Float64Array(MOMENTS);

/**
 * Integrates the Catmull-Clark limit surface of the live faces of `cage` about the bodies' origins (x, y, z each, in the cage's frame).
 * Regular faces are exact bicubics, extraordinary fans closed level sequences; the rest is refined locally until nothing is left.
 * Returns false where the cage could not be resolved.
 */
export function integrateCatmullClark(cage: LevelMesh, rules: RefinementRules, origins: Float64Array, sums: LimitSums): boolean {
  let mesh = cage;
  for (let level = 0; level <= MOST_LEVELS; level++) {
    const { kinds, fans } = classifyVertices(mesh);
    let left = 0;
    for (let face = 0; face < mesh.faces; face++) {
      if (mesh.live[face] === 0) continue;
      if (isRegularFace(mesh, kinds, face, -1)) {
        addRegularFace(mesh, face, origins, sums);
        mesh.live[face] = 0;
      } else left++;
    }
    for (let fan = 0; fan < fans.centre.length && left > 0; fan++) {
      if (!isIsolated(mesh, kinds, fans, fan)) continue;
      addFan(mesh, fans, fan, origins, sums);
      for (let i = fans.starts[fan]; i < fans.starts[fan + 1]; i++) mesh.live[mesh.faceOf[fans.corners[i]]] = 0;
      left -= fans.starts[fan + 1] - fans.starts[fan];
    }
    if (left === 0) return true;
    mesh = refineAround(mesh, rules);
  }
  return false;
}

function isIsolated(mesh: LevelMesh, kinds: Uint8Array, fans: Fans, fan: number): boolean {
  for (let i = fans.starts[fan]; i < fans.starts[fan + 1]; i++) {
    const face = mesh.faceOf[fans.corners[i]];
    if (mesh.live[face] === 0 || !isRegularFace(mesh, kinds, face, fans.corners[i])) return false;
  }
  return true;
}

function addRegularFace(mesh: LevelMesh, face: number, origins: Float64Array, sums: LimitSums): void {
  const body = mesh.bodyOf[face];
  const start = mesh.starts[face];
  fillNet(mesh, start, false, net);
  sums.solid.magnitudes[body] += bicubicMoments(net, origins[3 * body], origins[3 * body + 1], origins[3 * body + 2], EXACT_RULE, solid, surface);
  sums.solid.add(body, solid, 0);
  sums.surface.add(body, surface, 0);
  for (let side = 0; side < 4; side++) {
    const edge = mesh.borderOf[start + side];
    if (edge >= 0) sums.curves.addSide(net, side, edge, 1, mesh.borderFrom[start + side], 2 ** -mesh.level, NO_SHIFT);
  }
}

function readFan(mesh: LevelMesh, fans: Fans, index: number): FanState {
  const from = fans.starts[index];
  const fan = makeFanState(fans.starts[index + 1] - from, fans.closed[index], fans.sharpFirst[index], fans.centre[index]);
  for (let j = 0; j < fan.sectors; j++) {
    fillNet(mesh, fans.corners[from + j], true, net);
    fan.centre.set(net.subarray(15, 18));
    const before = 9 * j;
    const after = fan.closed && j + 1 === fan.sectors ? 0 : 9 * (j + 1);
    for (let a = 1; a < 3; a++) {
      fan.spokes.set(net.subarray(3 * (4 * (a + 1) + 1), 3 * (4 * (a + 1) + 1) + 3), before + 3 * (a - 1));
      fan.spokes.set(net.subarray(3 * (4 + a + 1), 3 * (4 + a + 1) + 3), after + 3 * (a - 1));
      for (let b = 1; b < 3; b++) {
        const at = 3 * (4 * (a + 1) + b + 1);
        fan.inner.set(net.subarray(at, at + 3), 27 * j + 9 * (a - 1) + 3 * (b - 1));
      }
    }
  }
  return fan;
}

/** Which sides of the three child nets lie on the sides 0 … 3 of their sector's face (side 0 along spoke j, side 3 along spoke j + 1), and which half of those. */
const OUTER_SIDES: readonly (readonly [child: number, side: number, faceSide: number, half: number])[] = [[0, 1, 1, 0], [1, 1, 1, 1], [1, 2, 2, 0], [2, 2, 2, 1]];

function addFan(mesh: LevelMesh, fans: Fans, index: number, origins: Float64Array, sums: LimitSums): void {
  let state = readFan(mesh, fans, index);
  let finer = makeFanState(state.sectors, state.closed, state.sharpFirst, state.centreRule);
  const { weights, check, curveWeights } = fanTable(state);
  const from = fans.starts[index];
  const n = state.sectors;
  const closedSolid = new Float64Array(MOMENTS * n);
  const closedSurface = new Float64Array(MOMENTS * n);
  const checkSolid = new Float64Array(MOMENTS * n);
  const magnitude = new Float64Array(n);
  let bordered = false;
  for (let j = 0; j < n; j++) for (let side = 0; side < 4; side++) if (mesh.borderOf[sideOf(mesh, fans.corners[from + j], side)] >= 0) bordered = true;
  const levels = bordered ? Math.max(weights.length, curveWeights.length) : weights.length;
  // About the limit point all rings shrink to 0 and so does their rounding, which the closing would else multiply.
  const limit = approximateLimit(state);
  translateFan(state, limit);
  for (let k = 0; k < levels; k++) {
    refineFan(state, finer);
    [state, finer] = [finer, state];
    const rule = gaussRule(LEVEL_NODES[Math.min(k, LEVEL_NODES.length - 1)]);
    const weight = k < weights.length ? weights[k] : 0;
    const checkWeight = k < check.length ? check[k] : 0;
    for (let j = 0; j < n; j++) {
      const corner = fans.corners[from + j];
      const body = mesh.bodyOf[mesh.faceOf[corner]];
      const ox = origins[3 * body] - limit[0], oy = origins[3 * body + 1] - limit[1], oz = origins[3 * body + 2] - limit[2];
      for (let child = 0; child < 3; child++) {
        fillChildNet(state, j, child, net);
        if (bordered) addFanCurves(mesh, corner, child, k, k < curveWeights.length ? curveWeights[k] : 0, limit, sums.curves);
        if (weight === 0) continue;
        const coarser = k > 0 && LEVEL_NODES[k] < LEVEL_NODES[k - 1];
        magnitude[j] += Math.abs(weight) * bicubicMoments(net, ox, oy, oz, rule, solid, surface);
        for (let i = 0; i < MOMENTS; i++) {
          closedSolid[MOMENTS * j + i] += weight * solid[i];
          checkSolid[MOMENTS * j + i] += checkWeight * solid[i];
          closedSurface[MOMENTS * j + i] += weight * surface[i];
        }
        if (!coarser) continue;
        // The step to a coarser rule errs most at its first level: the difference to the rule before bounds it.
        bicubicMoments(net, ox, oy, oz, gaussRule(LEVEL_NODES[k - 1]), finerSolid, surface);
        for (let i = 0; i < MOMENTS; i++) sums.closingError[MOMENTS * body + i] += 2 * Math.abs(solid[i] - finerSolid[i]);
      }
    }
  }
  for (let j = 0; j < n; j++) {
    const leaving = sideOf(mesh, fans.corners[from + j], 0);
    const arriving = sideOf(mesh, fans.corners[from + j], 3);
    if (mesh.borderOf[leaving] >= 0) sums.curves.ends.set(2 * mesh.borderOf[leaving], [limit[0], limit[1], limit[2]]);
    if (mesh.borderOf[arriving] >= 0) sums.curves.ends.set(2 * mesh.borderOf[arriving] + 1, [limit[0], limit[1], limit[2]]);
    const body = mesh.bodyOf[mesh.faceOf[fans.corners[from + j]]];
    sums.solid.add(body, closedSolid, MOMENTS * j);
    sums.surface.add(body, closedSurface, MOMENTS * j);
    sums.solid.magnitudes[body] += magnitude[j];
    for (let i = 0; i < MOMENTS; i++) sums.closingError[MOMENTS * body + i] += Math.abs(closedSolid[MOMENTS * j + i] - checkSolid[MOMENTS * j + i]);
  }
}

/** Half-edge of side `side` of the face with corner 0 at `corner`. */
function sideOf(mesh: LevelMesh, corner: number, side: number): number {
  const start = mesh.starts[mesh.faceOf[corner]];
  return start + ((corner - start + side) & 3);
}

/** Adds the border curves that the child net in `net` holds at level k of a fan. Spokes 0 leave the centre, sides 3 run towards it. */
function addFanCurves(mesh: LevelMesh, corner: number, child: number, k: number, weight: number, limit: Float64Array, curves: BorderCurves): void {
  const length = 2 ** -mesh.level;
  if (child !== 1 && weight !== 0) {
    const side = child === 0 ? 0 : 3;
    const h = sideOf(mesh, corner, side);
    const share = length * 2 ** (-1 - k);
    const from = mesh.borderFrom[h] + (side === 0 ? share : length - 2 * share);
    if (mesh.borderOf[h] >= 0) curves.addSide(net, side, mesh.borderOf[h], weight, from, share, limit);
  }
  if (k > 0) return;
  for (const [outerChild, side, faceSide, half] of OUTER_SIDES) {
    if (outerChild !== child) continue;
    const h = sideOf(mesh, corner, faceSide);
    if (mesh.borderOf[h] >= 0) curves.addSide(net, side, mesh.borderOf[h], 1, mesh.borderFrom[h] + (half * length) / 2, length / 2, limit);
  }
}
