import type { BorderCurves } from '../moments/border-curves';
import { triangleToPowers } from '../patches/box-spline';
import { fanRule, type FanKit } from './fan-kit';
import { spokeAt, type FanState } from './fan-state';
import { faceSideAt, type LevelMesh } from './level-mesh';
import { fillLoopChild, loopLimit, refineLoopFan } from './loop-fan';
import { fillTriangleNet } from './loop-net';

const net = new Float64Array(36);
const powers = new Float64Array(45);

function readFan(mesh: LevelMesh, corners: readonly number[], fan: FanState): void {
  for (let j = 0; j < fan.sectors; j++) {
    fillTriangleNet(mesh, corners[j], net);
    const copy = (entry: number, to: Float64Array, at: number): void => to.set(net.subarray(3 * entry, 3 * entry + 3), at);
    copy(0, fan.centre, 0);
    // (1, 0), (2, 0) on the first spoke, (0, 1), (0, 2) on the second, (1, 1) between them.
    copy(1, fan.spokes, spokeAt(fan, j, 0));
    copy(5, fan.spokes, spokeAt(fan, j, 0) + 3);
    copy(2, fan.spokes, spokeAt(fan, j, 1));
    copy(7, fan.spokes, spokeAt(fan, j, 1) + 3);
    copy(6, fan.inner, 27 * j);
  }
}

/** Subdominant eigenvalue of Loop's rule at valence n: 3/8 + cos(2π/n)/4, or what the centre's own mode leaves at small valences. */
function smoothShrinkage(n: number): number {
  const mode = 3 / 8 + Math.cos((2 * Math.PI) / n) / 4;
  return Math.max(mode, mode * mode, 1 / 4);
}

/** Adds a side of a box-spline triangle as a quartic in powers of τ = x − ½ along the side, counter-clockwise. */
export function addTriangleSide(
  curves: BorderCurves, values: Float64Array, side: number, edge: number, weight: number, from: number, share: number, shift: ArrayLike<number>,
): void {
  if (curves.takeSide?.(values, side, edge, from, share, shift) === true) return;
  triangleToPowers(values, powers);
  // Values at five points of the side, s and t from corner to corner, give the quartic.
  const ends = [[0, 0, 1, 0], [1, 0, 0, 1], [0, 1, 0, 0]][side];
  const samples: number[] = [];
  for (let i = 0; i <= 4; i++) {
    const x = i / 4;
    const s = ends[0] + x * (ends[2] - ends[0]);
    const t = ends[1] + x * (ends[3] - ends[1]);
    for (let axis = 0; axis < 3; axis++) samples.push(valueAt(s, t, axis));
  }
  const curve: number[] = [];
  for (const row of SAMPLES_TO_POWERS) {
    for (let axis = 0; axis < 3; axis++) curve.push(row.reduce((sum, factor, i) => sum + factor * samples[3 * i + axis], 0));
  }
  curves.addPowers(curve, edge, weight, from, share, shift);
}

function valueAt(s: number, t: number, axis: number): number {
  let sum = 0;
  for (let degree = 0, k = 0; degree <= 4; degree++) for (let j = 0; j <= degree; j++, k++) sum += powers[3 * k + axis] * s ** (degree - j) * t ** j;
  return sum;
}

/** Powers of τ of the quartic through values at τ = −½, −¼, 0, ¼, ½: central differences, exact. */
const SAMPLES_TO_POWERS: readonly (readonly number[])[] = [
  [0, 0, 1, 0, 0],
  [1 / 3, -8 / 3, 0, 8 / 3, -1 / 3],
  [-2 / 3, 32 / 3, -20, 32 / 3, -2 / 3],
  [-16 / 3, 32 / 3, 0, -32 / 3, 16 / 3],
  [32 / 3, -128 / 3, 64, -128 / 3, 32 / 3],
];

/** Fans of Loop surfaces: sectors are triangles, patches quartic box splines. */
export const LOOP_KIT: FanKit = {
  sides: 3,
  arriving: 2,
  sideAt: faceSideAt,
  fewestNodes: 2,
  smoothShrinkage,
  largestShrinkage: 5 / 8,
  body: (mesh, corner) => mesh.bodyOf[mesh.faceOf[corner]],
  read: readFan,
  refine: refineLoopFan,
  limit: loopLimit,
  fillChild: fillLoopChild,
  addSide: addTriangleSide,
  outerSides: [[0, 1, 1, 0], [2, 1, 1, 1]],
  rule: fanRule('triangle'),
  fillPoints: fillLoopChild,
  hasSpokes: true,
  innerPoints: [0],
  rimNodes: 8,
};
