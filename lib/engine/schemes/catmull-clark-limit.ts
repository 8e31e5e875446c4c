import { nextHalfEdge, previousHalfEdge } from '../mesh/topology';
import { collectRing } from './catmull-clark-classify';
import { isSharpForGood, type LevelMesh } from './level-mesh';

/**
 * Limit points of all vertices of a quad mesh: smooth (n²v + 4Σe + Σf)/(n(n+5)), crease (4v + e₀ + eₙ)/6, corner v [Biermann, Levin & Zorin 2000].
 * Semi-sharp rules are read as they stand at this level, which is exact once they have decayed; good for pictures before that.
 */
export function limitPoints(mesh: LevelMesh): Float64Array {
  const limit = mesh.positions.slice();
  const seen = new Uint8Array(mesh.vertices);
  const ring: number[] = [];
  for (let h = 0; h < mesh.vertexOf.length; h++) {
    const vertex = mesh.vertexOf[h];
    if (seen[vertex] === 1) continue;
    seen[vertex] = 1;
    const closed = collectRing(mesh, h, ring);
    const sharpEnds = ring.filter((corner) => isSharpForGood(mesh, corner)).map((corner) => mesh.vertexOf[nextHalfEdge(mesh, corner)]);
    if (!closed) sharpEnds.push(mesh.vertexOf[previousHalfEdge(mesh, ring[ring.length - 1])]);
    if (mesh.vertexSharpness[vertex] > 0 || sharpEnds.length > 2) continue;
    const p = mesh.positions;
    const n = ring.length;
    for (let axis = 0; axis < 3; axis++) {
      const own = p[3 * vertex + axis];
      if (sharpEnds.length === 2) {
        limit[3 * vertex + axis] = (4 * own + p[3 * sharpEnds[0] + axis] + p[3 * sharpEnds[1] + axis]) / 6;
        continue;
      }
      let sum = n * n * own;
      for (const corner of ring) {
        const next = nextHalfEdge(mesh, corner);
        sum += 4 * p[3 * mesh.vertexOf[next] + axis] + p[3 * mesh.vertexOf[nextHalfEdge(mesh, next)] + axis];
      }
      limit[3 * vertex + axis] = sum / (n * (n + 5));
    }
  }
  return limit;
}
