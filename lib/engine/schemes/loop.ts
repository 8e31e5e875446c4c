import type { BorderCurves } from '../moments/border-curves';
import type { LimitSums } from '../moments/limit-sums';
import { MOMENTS } from '../moments/sums';
import { boxSplineMoments, mendTriangleSurface, TRIANGLE_NODES } from '../patches/box-spline-moments';
import { classifyVertices, isIsolated, isRegularFace, TRIANGLE_COUNTS } from './classify-vertices';
import { integrateFan } from './integrate-fan';
import type { LevelMesh } from './level-mesh';
import { addTriangleSide, LOOP_KIT } from './loop-kit';
import { fillTriangleNet } from './loop-net';
import { refineTriangles } from './loop-refine';
import type { RefinementRules } from './refinement-rules';

/** Refinements after which a cage that still is not resolved is given up; sharpness below 10 needs at most 12. */
const MOST_LEVELS = 16;

const NO_SHIFT = new Float64Array(3);
const net = new Float64Array(36);
const solid = new Float64Array(MOMENTS);
const surface = new Float64Array(MOMENTS);

/**
 * Integrates the Loop limit surface of the live faces of `cage`, all triangles, about the bodies' origins. Regular triangles are exact quartic box splines,
 * extraordinary fans closed level sequences; the rest is refined locally. Returns false where the cage could not be resolved.
 */
export function integrateLoop(cage: LevelMesh, rules: RefinementRules, origins: Float64Array, sums: LimitSums): boolean {
  let mesh = cage;
  for (let level = 0; level <= MOST_LEVELS; level++) {
    const { kinds, fans } = classifyVertices(mesh, TRIANGLE_COUNTS);
    let left = 0;
    for (let face = 0; face < mesh.faces; face++) {
      if (mesh.live[face] === 0) continue;
      if (isRegularFace(mesh, TRIANGLE_COUNTS, kinds, face, -1)) {
        addRegularTriangle(mesh, face, origins, sums, sums.curves);
        mesh.live[face] = 0;
      } else left++;
    }
    for (let fan = 0; fan < fans.centre.length && left > 0; fan++) {
      if (!isIsolated(mesh, TRIANGLE_COUNTS, kinds, fans, fan)) continue;
      integrateFan(LOOP_KIT, mesh, fans, fan, origins, sums);
      for (let i = fans.starts[fan]; i < fans.starts[fan + 1]; i++) mesh.live[mesh.faceOf[fans.corners[i]]] = 0;
      left -= fans.starts[fan + 1] - fans.starts[fan];
    }
    if (left === 0) return true;
    mesh = refineTriangles(mesh, rules);
  }
  return false;
}

function addRegularTriangle(mesh: LevelMesh, face: number, origins: Float64Array, sums: LimitSums, curves: BorderCurves): void {
  const body = mesh.bodyOf[face];
  const start = mesh.starts[face];
  const [ox, oy, oz] = origins.subarray(3 * body, 3 * body + 3);
  fillTriangleNet(mesh, start, net);
  sums.solid.magnitudes[body] += boxSplineMoments(net, ox, oy, oz, TRIANGLE_NODES, solid, surface);
  sums.surfaceError[body] += mendTriangleSurface(net, ox, oy, oz, surface);
  sums.solid.add(body, solid, 0);
  sums.surface.add(body, surface, 0);
  for (let side = 0; side < 3; side++) {
    const edge = mesh.borderOf[start + side];
    if (edge >= 0) addTriangleSide(curves, net, side, edge, 1, mesh.borderFrom[start + side], 2 ** -mesh.level, NO_SHIFT);
  }
}
