import { approximateLimit, fillChildNet, refineFan } from './catmull-clark-fan';
import { fillNet } from './catmull-clark-net';
import { fanRule, type FanKit } from './fan-kit';
import { spokeAt, type FanState } from './fan-state';
import { faceSideAt, type LevelMesh } from './level-mesh';

const net = new Float64Array(48);

function readFan(mesh: LevelMesh, corners: readonly number[], fan: FanState): void {
  copyVertex(mesh, mesh.vertexOf[corners[0]], fan.centre, 0);
  for (let j = 0; j < fan.sectors; j++) if (!readInnerSector(mesh, corners[j], fan, j)) readSector(mesh, corners[j], fan, j);
}

function copyVertex(mesh: LevelMesh, vertex: number, out: Float64Array, at: number): void {
  const { positions } = mesh;
  out[at] = positions[3 * vertex];
  out[at + 1] = positions[3 * vertex + 1];
  out[at + 2] = positions[3 * vertex + 2];
}

/** Reads a sector with nothing sharp around its outer corners, straight from the vertices; false, and nothing read, where something is. */
function readInnerSector(mesh: LevelMesh, corner: number, fan: FanState, sector: number): boolean {
  const { starts, faceOf, twin, vertexOf, edgeSharpness } = mesh;
  const start = starts[faceOf[corner]];
  const first = corner - start;
  const h1 = start + ((first + 1) & 3), h2 = start + ((first + 2) & 3), h3 = start + ((first + 3) & 3);
  const t1 = twin[h1], t2 = twin[h2];
  if (t1 < 0 || t2 < 0 || edgeSharpness[h1] > 0 || edgeSharpness[h2] > 0) return false;
  const s1 = starts[faceOf[t1]], s2 = starts[faceOf[t2]];
  const beyond = s1 + ((t1 - s1 + 3) & 3);
  const across = twin[beyond];
  if (across < 0 || edgeSharpness[beyond] > 0) return false;
  const s3 = starts[faceOf[across]];
  const spoke = spokeAt(fan, sector, 0), next = spokeAt(fan, sector, 1), at = 27 * sector;
  copyVertex(mesh, vertexOf[h1], fan.spokes, spoke);
  copyVertex(mesh, vertexOf[s1 + ((t1 - s1 + 2) & 3)], fan.spokes, spoke + 3);
  copyVertex(mesh, vertexOf[h3], fan.spokes, next);
  copyVertex(mesh, vertexOf[s2 + ((t2 - s2 + 3) & 3)], fan.spokes, next + 3);
  copyVertex(mesh, vertexOf[h2], fan.inner, at);
  copyVertex(mesh, vertexOf[s2 + ((t2 - s2 + 2) & 3)], fan.inner, at + 3);
  copyVertex(mesh, vertexOf[beyond], fan.inner, at + 9);
  copyVertex(mesh, vertexOf[s3 + ((across - s3 + 2) & 3)], fan.inner, at + 12);
  return true;
}

function readSector(mesh: LevelMesh, corner: number, fan: FanState, sector: number): void {
  fillNet(mesh, corner, true, net);
  for (let a = 1; a < 3; a++) {
    const along = 3 * (4 * (a + 1) + 1);
    const across = 3 * (4 + a + 1);
    fan.spokes.set(net.subarray(along, along + 3), spokeAt(fan, sector, 0) + 3 * (a - 1));
    fan.spokes.set(net.subarray(across, across + 3), spokeAt(fan, sector, 1) + 3 * (a - 1));
    for (let b = 1; b < 3; b++) {
      const at = 3 * (4 * (a + 1) + b + 1);
      fan.inner.set(net.subarray(at, at + 3), 27 * sector + 9 * (a - 1) + 3 * (b - 1));
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
  fewestNodes: 2,
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
