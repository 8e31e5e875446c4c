import type { Cage } from '../cage';
import { positionOf } from './diagnose';
import { counted, placeOf, type FindingList } from './findings';
import { partToldAt, type Bodies } from './partition';
import { nextHalfEdge, type Topology } from './topology';
import { borderVertices, weldPairs, weldTolerance } from './weld-vertices';

/** Different vertices in almost one place, which a weld would join. */
export const NEAR_COINCIDENT_VERTICES = 'near_coincident_vertices';

/**
 * Warns of vertices on open borders that lie on another border's vertex, or nearly so, and says what a weld would join.
 * Only borders are looked at, since closed surfaces that touch are no fault.
 */
export function diagnoseNearCoincident(cage: Cage, mesh: Topology, bodies: Bodies, findings: FindingList): void {
  const border = borderVertices(mesh);
  const tolerance = weldTolerance(cage.positions, border);
  const into = weldPairs(cage.positions, border, tolerance);
  if (into.size === 0) return;
  const near = new Set<number>();
  into.forEach((kept, vertex) => near.add(kept).add(vertex));
  const faceAt = new Map<number, number>();
  for (let h = 0; h < mesh.twin.length; h++) {
    if (mesh.twin[h] >= 0) continue;
    for (const vertex of [mesh.vertexOf[h], mesh.vertexOf[nextHalfEdge(mesh, h)]]) if (near.has(vertex)) faceAt.set(vertex, mesh.faceOf[h]);
  }
  for (const vertex of [...near].sort((a, b) => a - b)) {
    const face = faceAt.get(vertex) ?? 0;
    findings.add(NEAR_COINCIDENT_VERTICES, 'warning', partToldAt(bodies, face),
      placeOf({ face, vertex, position: positionOf(cage, vertex), line: cage.faceLines?.[face] ?? null }),
      (n) => `${counted(n, 'vertex on an open border lies', 'vertices on open borders lie')} on another within ${tolerance.toPrecision(2)} file units; weld ${n === 1 ? 'it' : 'them'} (an option of the import) if the surface is meant to be closed there.`);
  }
}
