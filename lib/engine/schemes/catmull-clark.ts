import { RegularPatches } from '../kernel/regular-patches';
import type { BorderCurves } from '../moments/border-curves';
import type { LimitSums } from '../moments/limit-sums';
import { classifyVertices, isIsolated, isRegularFace, QUAD_COUNTS } from './classify-vertices';
import { CATMULL_CLARK_KIT } from './catmull-clark-kit';
import { fillNet } from './catmull-clark-net';
import { refineAround } from './catmull-clark-refine';
import { integrateFan } from './integrate-fan';
import type { LevelMesh } from './level-mesh';
import type { RefinementRules } from './refinement-rules';

/** Refinements after which a cage that still is not resolved is given up; sharpness below 10 needs at most 12. */
const MOST_LEVELS = 16;

const NO_SHIFT = new Float64Array(3);
const net = new Float64Array(48);

/**
 * Integrates the Catmull-Clark limit surface of the live faces of `cage` about the bodies' origins (x, y, z each, in the cage's frame).
 * Regular faces are exact bicubics, extraordinary fans closed level sequences; the rest is refined locally until nothing is left.
 * Returns false where the cage could not be resolved.
 */
export function integrateCatmullClark(cage: LevelMesh, rules: RefinementRules, origins: Float64Array, sums: LimitSums): boolean {
  let mesh = cage;
  const patches = new RegularPatches(origins, sums);
  for (let level = 0; level <= MOST_LEVELS; level++) {
    const { kinds, fans } = classifyVertices(mesh, QUAD_COUNTS);
    let left = 0;
    for (let face = 0; face < mesh.faces; face++) {
      if (mesh.live[face] === 0) continue;
      if (isRegularFace(mesh, QUAD_COUNTS, kinds, face, -1)) {
        addRegularFace(mesh, face, patches, sums.curves);
        mesh.live[face] = 0;
      } else left++;
    }
    patches.flush();
    for (let fan = 0; fan < fans.centre.length && left > 0; fan++) {
      if (!isIsolated(mesh, QUAD_COUNTS, kinds, fans, fan)) continue;
      integrateFan(CATMULL_CLARK_KIT, mesh, fans, fan, origins, sums);
      for (let i = fans.starts[fan]; i < fans.starts[fan + 1]; i++) mesh.live[mesh.faceOf[fans.corners[i]]] = 0;
      left -= fans.starts[fan + 1] - fans.starts[fan];
    }
    if (left === 0) return true;
    mesh = refineAround(mesh, rules);
  }
  return false;
}

function addRegularFace(mesh: LevelMesh, face: number, patches: RegularPatches, curves: BorderCurves): void {
  const start = mesh.starts[face];
  fillNet(mesh, start, false, net);
  patches.add(mesh.bodyOf[face], net);
  for (let side = 0; side < 4; side++) {
    const edge = mesh.borderOf[start + side];
    if (edge >= 0) curves.addSide(net, side, edge, 1, mesh.borderFrom[start + side], 2 ** -mesh.level, NO_SHIFT);
  }
}
