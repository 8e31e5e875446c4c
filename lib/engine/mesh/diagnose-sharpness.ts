import type { Cage } from '../cage';
import { positionOf } from './diagnose';
import { counted, placeOf, type FindingList } from './findings';
import { halfEdgeEnds } from './match-edges';
import { partToldAt, type Bodies } from './partition';
import type { Topology } from './topology';

/** Doo-Sabin surfaces carry no creases and corners: says which tags of the file go unheard. */
export function warnOfSharpness(cage: Cage, mesh: Topology, bodies: Bodies, findings: FindingList): void {
  const seen = new Uint8Array(mesh.vertices);
  for (let h = 0; h < mesh.vertexOf.length; h++) {
    const vertex = mesh.vertexOf[h];
    if (!(mesh.edgeSharpness[h] > 0) && !(mesh.vertexSharpness[vertex] > 0)) continue;
    const part = partToldAt(bodies, mesh.faceOf[h]);
    const position = positionOf(cage, vertex);
    if (mesh.edgeSharpness[h] > 0 && !(mesh.twin[h] >= 0 && mesh.twin[h] < h)) {
      findings.add('crease_not_carried', 'warning', part, placeOf({ face: mesh.faceOf[h], edge: halfEdgeEnds(mesh, h), position }),
        (n) => `${counted(n, 'edge is', 'edges are')} tagged as sharp, which the Doo-Sabin scheme does not know, and ${n === 1 ? 'was' : 'were'} rounded; choose another scheme if the ${n === 1 ? 'crease matters' : 'creases matter'}.`);
    }
    if (mesh.vertexSharpness[vertex] > 0 && seen[vertex] === 0) {
      findings.add('corner_not_carried', 'warning', part, placeOf({ face: mesh.faceOf[h], vertex, position }),
        (n) => `${counted(n, 'vertex is', 'vertices are')} tagged as sharp, which the Doo-Sabin scheme does not know, and ${n === 1 ? 'was' : 'were'} rounded; choose another scheme if the ${n === 1 ? 'corner matters' : 'corners matter'}.`);
    }
    seen[vertex] = 1;
  }
}
