import type { MeasureOptions } from '../measured';
import { borderEdgeOf, findBorders } from '../mesh/border-loops';
import type { Frames } from '../mesh/frames';
import type { Bodies } from '../mesh/partition';
import type { Topology } from '../mesh/topology';
import { integrateCatmullClark } from '../schemes/catmull-clark';
import { integrateDooSabin } from '../schemes/doo-sabin';
import { levelZero, type LevelMesh } from '../schemes/level-mesh';
import { integrateLoop } from '../schemes/loop';
import { LATER, OWN } from '../schemes/refinement-blocks';
import { addCaps, type CapAmounts } from './caps';
import { curveTable } from './curve-table';
import { emptySums, type LimitSums } from './limit-sums';
import { watchShells } from '../shell/watch-shells';
import { addPolyhedralMoments, addPolyhedralSurface } from './polyhedral';

/** Moments of all bodies about their origins, caps not yet added. */
export interface Integrated extends LimitSums {
  /** False where local refinement did not end; the numbers are then worthless. */
  resolved: boolean;
}

/** Integrates the cage's own faces about the bodies' origins, their areas too where `withSurface`; border curves are the cage's edges. */
export function integrateCage(mesh: Topology, frames: Frames, bodies: Bodies, blocked: Uint8Array, withSurface: boolean): Integrated {
  const sums = emptySums(bodies.bodies);
  addPolyhedralMoments(mesh, frames.positions, bodies.bodyOf, frames.origins, sums.solid);
  if (withSurface) addPolyhedralSurface(mesh, frames.positions, bodies.bodyOf, frames.origins, sums.surface);
  const p = frames.positions;
  for (const h of bodies.borders) {
    if (borderEdgeOf(mesh, bodies.bodyOf, blocked, h) !== h) continue;
    const face = mesh.faceOf[h];
    const a = 3 * mesh.vertexOf[h];
    const b = 3 * mesh.vertexOf[h + 1 === mesh.starts[face + 1] ? mesh.starts[face] : h + 1];
    sums.curves.addLine(p[a], p[a + 1], p[a + 2], p[b], p[b + 1], p[b + 2], h);
  }
  return { ...sums, resolved: true };
}

/** Integrates the limit surface about the bodies' origins, walls too where `shells`. `bad` are faces with a structural defect, where there are any. */
export function integrateLimit(mesh: Topology, frames: Frames, bodies: Bodies, blocked: Uint8Array, options: MeasureOptions, shells = false, bad: Uint8Array | null = null): Integrated {
  const sums = emptySums(bodies.bodies);
  const level = levelZero(mesh, frames.positions, bodies.bodyOf, blocked, options.boundary, bodies.borders);
  if (options.scheme !== 'doo-sabin' && level.live.includes(0)) refineBeside(level, bad);
  if (shells) watchShells(level, options.scheme, frames.origins, bodies.bodies, sums);
  if (options.scheme === 'doo-sabin') return { ...sums, resolved: integrateDooSabin(level, options.boundary, frames.origins, sums) };
  const integrate = options.scheme === 'loop' ? integrateLoop : integrateCatmullClark;
  const resolved = integrate(level, options, frames.origins, sums);
  return { ...sums, resolved };
}

/**
 * Lets holes and sound faces of blocked bodies take part in the fans of the measured faces beside them: these are found isolated by all of their faces.
 * What they add to bodies that are not measured nobody reads.
 */
function refineBeside({ starts, vertexOf, vertices, faces, live }: LevelMesh, bad: Uint8Array | null): void {
  const isMeasured = new Uint8Array(vertices);
  for (let face = 0; face < faces; face++) if (live[face] === OWN) for (let h = starts[face]; h < starts[face + 1]; h++) isMeasured[vertexOf[h]] = 1;
  for (let face = 0; face < faces; face++) {
    if (live[face] === OWN || bad?.[face] === 1) continue;
    for (let h = starts[face]; h < starts[face + 1]; h++) if (isMeasured[vertexOf[h]] === 1) live[face] = LATER;
  }
}

/** Closes the bodies by caps over their borders. */
export function capBodies(mesh: Topology, frames: Frames, bodies: Bodies, blocked: Uint8Array, integrated: Integrated): CapAmounts {
  const borders = findBorders(mesh, bodies, blocked);
  return addCaps(borders, curveTable(integrated.curves), frames.origins, integrated, ranksByName(bodies));
}

/** Of each body the place of its part's name among all names. */
function ranksByName({ partNames, partOfBody }: Bodies): Int32Array {
  const sorted = partNames.map((name, part) => ({ name, part })).sort((a, b) => (a.name < b.name ? -1 : 1));
  const rankOfPart = new Int32Array(partNames.length);
  for (let rank = 0; rank < sorted.length; rank++) rankOfPart[sorted[rank].part] = rank;
  return partOfBody.map((part) => rankOfPart[part]);
}
