import { assembleParts } from './assemble-parts';
import type { Cage } from './cage';
import type { MeasuredCage, MeasuredPart, MeasureOptions } from './measured';
import { noteHoles } from './mesh/diagnose-holes';
import { diagnoseOrientation } from './mesh/diagnose-orientation';
import { diagnoseStructure, positionOf } from './mesh/diagnose';
import { warnOfSharpness } from './mesh/diagnose-sharpness';
import { counted, FindingList, placeOf } from './mesh/findings';
import { makeFrames } from './mesh/frames';
import { holeFlags } from './mesh/holes';
import { mendCage } from './mesh/mend-cage';
import { diagnoseNearCoincident } from './mesh/near-coincident';
import { diagnoseOverlap } from './mesh/overlap';
import { partitionFaces, partToldAt, type Bodies } from './mesh/partition';
import { relatePieces } from './mesh/relate-pieces';
import { buildTopology, type Topology } from './mesh/topology';
import { capBodies, integrateCage, integrateLimit } from './moments/integrate-limit';
import { measuredShells } from './shell/measured-shells';

/** Part of every geometry record's key: a change of any number that `measureCage` returns raises it. */
export const ENGINE_VERSION = '3';

/**
 * Measures a cage: per part and connected body volume, centroid and second moments of the limit solid, area and its moments, and the cage's own.
 * Lengths are in the file's unit, centroids in its frame. Never throws on a cage that the formats room could build:
 * what cannot be measured is a finding of severity `problem`, and its part then has no components.
 * Faces in `given.holes` take part in the refinement and belong to no part: the parts around are open there.
 * With `options.weld` or `options.turnFaces` the cage is mended first, and what that changed is noted.
 * `options.boundary` is taken as it is; whether the file's own rule (`cage.boundary`) comes before it is the caller's to say.
 */
export function measureCage(given: Cage, options: MeasureOptions): MeasuredCage {
  const findings = new FindingList();
  const { cage, joined } = mendCage(given, options, findings);
  const { mesh, defects } = buildTopology(cage);
  const bodies = partitionFaces(cage, mesh, options.partsBy);
  const bad = findNotFinite(cage, findings) ? new Uint8Array(mesh.faces).fill(1) : diagnoseStructure(cage, mesh, defects, bodies, joined, findings);
  const blocked = blockedBodies(mesh, bodies, bad);
  if (options.scheme === 'loop') blockNotTriangles(cage, mesh, bodies, blocked, findings);
  if (options.scheme === 'doo-sabin') warnOfSharpness(cage, mesh, bodies, findings);
  const frames = makeFrames(mesh, cage.positions, bodies);
  const ownCage = integrateCage(mesh, frames, bodies, blocked, options.scheme === 'polyhedral');
  const cageCaps = capBodies(mesh, frames, bodies, blocked, ownCage);
  const limit = options.scheme === 'polyhedral' ? ownCage : integrateLimit(mesh, frames, bodies, blocked, options, options.shells === true, bad);
  const caps = limit === ownCage ? cageCaps : capBodies(mesh, frames, bodies, blocked, limit);
  if (!limit.resolved) {
    findings.add('not_resolved', 'problem', null, null, () => 'The surface could not be resolved by refinement; lower the sharpness of its creases.');
    blocked.fill(1);
  }
  const parts = assembleParts(mesh, bodies, blocked, frames, limit, ownCage, caps, measuredShells(mesh, frames, bodies, limit, options));
  const relations = relatePieces(mesh, cage.positions, bodies, leftOut(mesh, bodies, blocked, parts), options, holeFlags(cage));
  diagnoseOrientation(cage, mesh, bodies, blocked, parts, relations, findings);
  diagnoseOverlap(cage, mesh, bodies, relations, findings);
  diagnoseNearCoincident(cage, mesh, bodies, findings);
  noteHoles(cage, mesh, bodies, findings);
  return { parts, findings: findings.list(), faces: mesh.faces, vertices: mesh.vertices };
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

/** Faces that enclose nothing that could overlap: of blocked bodies and of sheets. */
function leftOut(mesh: Topology, bodies: Bodies, blocked: Uint8Array, parts: readonly MeasuredPart[]): Uint8Array {
  const left = new Uint8Array(mesh.faces);
  for (let face = 0; face < mesh.faces; face++) {
    if (bodies.partOf[face] === bodies.holePart) continue;
    const part = parts[bodies.partOf[face]];
    if (blocked[bodies.bodyOf[face]] === 1 || (part.openEdges > 0 && part.looksLikeSheet)) left[face] = 1;
  }
  return left;
}

/** Loop surfaces are made of triangles: a part in whose piece any other face lies yields no number. */
function blockNotTriangles(cage: Cage, mesh: Topology, bodies: Bodies, blocked: Uint8Array, findings: FindingList): void {
  const spoilt = new Uint8Array(bodies.pieces);
  for (let face = 0; face < mesh.faces; face++) {
    if (mesh.starts[face + 1] - mesh.starts[face] === 3) continue;
    spoilt[bodies.pieceOf[face]] = 1;
    const position = positionOf(cage, mesh.vertexOf[mesh.starts[face]]);
    findings.add('not_triangles', 'problem', partToldAt(bodies, face), placeOf({ face, position, line: cage.faceLines?.[face] ?? null }),
      (n) => `${counted(n, 'face is', 'faces are')} no triangle, which the Loop scheme needs; triangulate ${n === 1 ? 'it' : 'them'} or choose another scheme.`);
  }
  const spoiltParts = new Uint8Array(bodies.partNames.length);
  for (let face = 0; face < mesh.faces; face++) if (spoilt[bodies.pieceOf[face]] === 1) spoiltParts[bodies.partOf[face]] = 1;
  for (let body = 0; body < bodies.bodies; body++) if (spoiltParts[bodies.partOfBody[body]] === 1) blocked[body] = 1;
}

/** A part with a structural problem anywhere, or in a hole of its piece, yields no number, so all its bodies are blocked; those of holes always are. */
function blockedBodies(mesh: Topology, bodies: Bodies, bad: Uint8Array): Uint8Array {
  const blockedParts = new Uint8Array(bodies.partNames.length);
  for (let face = 0; face < mesh.faces; face++) if (bad[face] === 1 && bodies.toldOf[face] >= 0) blockedParts[bodies.toldOf[face]] = 1;
  if (bodies.holePart >= 0) {
    const broken = new Uint8Array(bodies.pieces);
    for (let face = 0; face < mesh.faces; face++) if (bad[face] === 1 && bodies.partOf[face] === bodies.holePart) broken[bodies.pieceOf[face]] = 1;
    for (let face = 0; face < mesh.faces; face++) if (broken[bodies.pieceOf[face]] === 1) blockedParts[bodies.partOf[face]] = 1;
    blockedParts[bodies.holePart] = 1;
  }
  const blocked = new Uint8Array(bodies.bodies);
  for (let body = 0; body < bodies.bodies; body++) blocked[body] = blockedParts[bodies.partOfBody[body]];
  return blocked;
}
