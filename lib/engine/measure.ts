import type { Cage } from './cage';
import type { MeasuredCage, MeasuredComponent, MeasuredPart, MeasureOptions, SolidMoments, Three } from './measured';
import { diagnoseStructure, positionOf } from './mesh/diagnose';
import { counted, FindingList, placeOf } from './mesh/findings';
import { partitionFaces, type Bodies } from './mesh/partition';
import { buildTopology, type Topology } from './mesh/topology';
import { addPolyhedralMoments } from './moments/polyhedral';
import { centralMoments, MOMENTS, MomentSums } from './moments/sums';

/** Part of every geometry record's key: a change of any number that `measureCage` returns raises it. */
export const ENGINE_VERSION = '1';

/**
 * Measures a cage: per part and connected body volume, centroid and second moments of the limit solid, area and its moments, and the cage's own.
 * Lengths are in the file's unit, centroids in its frame. Never throws on a cage that the formats room could build:
 * what cannot be measured is a finding of severity `problem`, and its part then has no components.
 */
export function measureCage(cage: Cage, options: MeasureOptions): MeasuredCage {
  const findings = new FindingList();
  const { mesh, defects } = buildTopology(cage);
  const bodies = partitionFaces(cage, mesh, options.partsBy);
  let bad: Uint8Array;
  if (findNotFinite(cage, findings)) bad = new Uint8Array(mesh.faces).fill(1);
  else bad = diagnoseStructure(cage, mesh, defects, bodies, findings);
  const blocked = blockedBodies(mesh, bodies, bad);
  if (options.scheme !== 'polyhedral') {
    findings.add('scheme_not_measured', 'problem', null, null, () => `Surfaces of the scheme ${options.scheme} cannot be measured yet; choose another scheme.`);
    blocked.fill(1);
  }
  return { parts: assembleParts(cage, mesh, bodies, blocked), findings: findings.list(), faces: mesh.faces, vertices: mesh.vertices };
}

function findNotFinite(cage: Cage, findings: FindingList): boolean {
  let found = false;
  for (let v = 0; 3 * v < cage.positions.length; v++) {
    if (Number.isFinite(cage.positions[3 * v] + cage.positions[3 * v + 1] + cage.positions[3 * v + 2])) continue;
    found = true;
    findings.add('not_finite', 'problem', null, placeOf({ vertex: v, position: positionOf(cage, v) }),
      (n) => `${counted(n, 'vertex has', 'vertices have')} a coordinate that is not a finite number; export the file again.`);
  }
  return found;
}

function blockedBodies(mesh: Topology, bodies: Bodies, bad: Uint8Array): Uint8Array {
  const blocked = new Uint8Array(bodies.bodies);
  for (let face = 0; face < mesh.faces; face++) if (bad[face] === 1) blocked[bodies.bodyOf[face]] = 1;
  return blocked;
}

function assembleParts(cage: Cage, mesh: Topology, bodies: Bodies, blocked: Uint8Array): MeasuredPart[] {
  const boxes = bodyBoxes(cage, mesh, bodies);
  const origins = new Float64Array(3 * bodies.bodies);
  for (let body = 0; body < bodies.bodies; body++) for (let axis = 0; axis < 3; axis++) origins[3 * body + axis] = (boxes[6 * body + axis] + boxes[6 * body + 3 + axis]) / 2;
  const solid = new MomentSums(bodies.bodies);
  const surface = new MomentSums(bodies.bodies);
  addPolyhedralMoments(mesh, cage.positions, bodies.bodyOf, origins, solid, surface);
  const faces = new Int32Array(bodies.bodies);
  const openEdges = new Int32Array(bodies.partNames.length);
  for (let h = 0; h < mesh.twin.length; h++) if (mesh.twin[h] < 0) openEdges[bodies.partOf[mesh.faceOf[h]]]++;
  for (let face = 0; face < mesh.faces; face++) faces[bodies.bodyOf[face]]++;
  const parts: MeasuredPart[] = bodies.partNames.map((name, i) => ({
    name, faces: 0, maxValence: 0, components: [], bounds: [Infinity, Infinity, Infinity, -Infinity, -Infinity, -Infinity],
    capAreaShare: 0, capVolumeShare: 0, openEdges: openEdges[i], looksLikeSheet: false,
  }));
  const blockedPart = new Uint8Array(parts.length);
  for (let body = 0; body < bodies.bodies; body++) if (blocked[body] === 1) blockedPart[bodies.partOfBody[body]] = 1;
  for (let body = 0; body < bodies.bodies; body++) {
    const part = parts[bodies.partOfBody[body]];
    part.faces += faces[body];
    for (let axis = 0; axis < 3; axis++) {
      part.bounds[axis] = Math.min(part.bounds[axis], boxes[6 * body + axis]);
      part.bounds[3 + axis] = Math.max(part.bounds[3 + axis], boxes[6 * body + 3 + axis]);
    }
    if (blockedPart[bodies.partOfBody[body]] === 1) continue;
    const origin: Three = [origins[3 * body], origins[3 * body + 1], origins[3 * body + 2]];
    const area = surface.total(body);
    const areaCentre: Three = [origin[0] + area[1] / area[0], origin[1] + area[2] / area[0], origin[2] + area[3] / area[0]];
    const size = Math.hypot(boxes[6 * body + 3] - boxes[6 * body], boxes[6 * body + 4] - boxes[6 * body + 1], boxes[6 * body + 5] - boxes[6 * body + 2]);
    const cageMoments: SolidMoments = centralMoments(solid.total(body), origin, areaCentre, 1e-14 * size ** 3);
    const surfaceMoments = centralMoments(area, origin, areaCentre, 0);
    const component: MeasuredComponent = {
      faces: faces[body],
      solid: cageMoments,
      surface: { area: surfaceMoments.volume, centroid: surfaceMoments.centroid, centralSecond: surfaceMoments.centralSecond },
      cage: cageMoments,
      hollow: null,
      errorEstimate: (solid.magnitudes[body * MOMENTS] / Math.abs(cageMoments.volume)) * 2 ** -50,
      surfaceErrorEstimate: 2 ** -48,
    };
    part.components.push(component);
  }
  return parts;
}

/** Boxes of the bodies' control points: min x, y, z, max x, y, z each. */
function bodyBoxes(cage: Cage, mesh: Topology, bodies: Bodies): Float64Array {
  const boxes = new Float64Array(6 * bodies.bodies);
  for (let body = 0; body < bodies.bodies; body++) boxes.fill(Infinity, 6 * body, 6 * body + 3).fill(-Infinity, 6 * body + 3, 6 * body + 6);
  for (let h = 0; h < mesh.vertexOf.length; h++) {
    const at = 6 * bodies.bodyOf[mesh.faceOf[h]];
    for (let axis = 0; axis < 3; axis++) {
      const value = cage.positions[3 * mesh.vertexOf[h] + axis];
      if (value < boxes[at + axis]) boxes[at + axis] = value;
      if (value > boxes[at + 3 + axis]) boxes[at + 3 + axis] = value;
    }
  }
  return boxes;
}
