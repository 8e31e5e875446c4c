import type { LevelMesh } from './level-mesh';
import type { RefinementRules } from './refinement-rules';

/**
 * Marks (1) the vertices that a local refinement must carry on with whole rings: those of live faces, since their rules are read next.
 * Chaikin creasing also reads the sharpness around the other ends of their edges, so there the vertices of all faces that touch them join.
 */
export function wantedVertices(mesh: LevelMesh, rules: RefinementRules): Uint8Array {
  const wanted = new Uint8Array(mesh.vertices);
  for (let face = 0; face < mesh.faces; face++) if (mesh.live[face] > 0) markFace(mesh, face, wanted);
  if (rules.creasing === 'uniform') return wanted;
  const wider = wanted.slice();
  for (let h = 0; h < mesh.vertexOf.length; h++) if (wanted[mesh.vertexOf[h]] === 1) markFace(mesh, mesh.faceOf[h], wider);
  return wider;
}

function markFace(mesh: LevelMesh, face: number, marks: Uint8Array): void {
  for (let h = mesh.starts[face]; h < mesh.starts[face + 1]; h++) marks[mesh.vertexOf[h]] = 1;
}
