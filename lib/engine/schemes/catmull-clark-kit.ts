import { approximateLimit, fillChildNet, refineFan } from './catmull-clark-fan';
import { fillNet } from './catmull-clark-net';
import { fanRule, type FanKit } from './fan-kit';
import { spokeAt, type FanState } from './fan-state';
import { faceSideAt, type LevelMesh } from './level-mesh';

const net = new Float64Array(48);

function readFan(mesh: LevelMesh, corners: readonly number[], fan: FanState): void {
  for (let j = 0; j < fan.sectors; j++) {
    fillNet(mesh, corners[j], true, net);
    fan.centre.set(net.subarray(15, 18));
    for (let a = 1; a < 3; a++) {
      const along = 3 * (4 * (a + 1) + 1);
      const across = 3 * (4 + a + 1);
      fan.spokes.set(net.subarray(along, along + 3), spokeAt(fan, j, 0) + 3 * (a - 1));
      fan.spokes.set(net.subarray(across, across + 3), spokeAt(fan, j, 1) + 3 * (a - 1));
      for (let b = 1; b < 3; b++) {
        const at = 3 * (4 * (a + 1) + b + 1);
        fan.inner.set(net.subarray(at, at + 3), 27 * j + 9 * (a - 1) + 3 * (b - 1));
      }
    }
  }
}

/** Subdominant eigenvalue of the smooth rule at valence n > 2 [Stam 1998, with the first Fourier mode]; for n = 2 it is ¼ and this more than enough. */
function smoothShrinkage(n: number): number {
  const c = Math.cos((2 * Math.PI) / n);
  return (5 + c + Math.sqrt((c + 9) * (c + 1))) / 16;
}

/** Fans of Catmull-Clark surfaces: sectors are quads, patches bicubic. */
export const CATMULL_CLARK_KIT: FanKit = {
  sides: 4,
  arriving: 3,
  sideAt: faceSideAt,
  fewestNodes: 3,
  smoothShrinkage,
  largestShrinkage: smoothShrinkage(Infinity),
  body: (mesh, corner) => mesh.bodyOf[mesh.faceOf[corner]],
  read: readFan,
  refine: refineFan,
  limit: approximateLimit,
  fillChild: fillChildNet,
  addSide: (curves, values, side, edge, weight, from, share, shift) => curves.addSide(values, side, edge, weight, from, share, shift),
  outerSides: [[0, 1, 1, 0], [1, 1, 1, 1], [1, 2, 2, 0], [2, 2, 2, 1]],
  rule: fanRule('bicubic'),
  fillPoints: fillChildNet,
  hasSpokes: true,
  innerPoints: [0, 3, 9, 12],
  rimNodes: 6,
};
