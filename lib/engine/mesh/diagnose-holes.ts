import type { Cage } from '../cage';
import { positionOf } from './diagnose';
import { counted, placeOf, type FindingList } from './findings';
import { partToldAt, type Bodies } from './partition';
import type { Topology } from './topology';

/** Notes the holes at the parts that they lie beside. */
export function noteHoles(cage: Cage, mesh: Topology, bodies: Bodies, findings: FindingList): void {
  if (bodies.holePart < 0) return;
  for (let face = 0; face < mesh.faces; face++) {
    if (bodies.partOf[face] !== bodies.holePart) continue;
    findings.add('hole_faces', 'note', partToldAt(bodies, face), placeOf({ face, position: positionOf(cage, mesh.vertexOf[mesh.starts[face]]), line: cage.faceLines?.[face] ?? null }),
      (n) => `${counted(n, 'face is a hole', 'faces are holes')} in the file: ${n === 1 ? 'it shapes' : 'they shape'} the surface around and ${n === 1 ? 'is' : 'are'} not measured; clear the hole ${n === 1 ? 'tag' : 'tags'} in the file if the surface is meant to be closed there.`);
  }
}
