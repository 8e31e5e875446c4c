import { nextHalfEdge, previousHalfEdge } from '../mesh/topology';
import { collectRing } from './classify-vertices';
import { loopWeight } from './loop-fan';
import { isSharpForGood, type LevelMesh } from './level-mesh';

/** One coordinate of a smooth vertex' limit point; `ring` are its corners, counter-clockwise. */
export type SmoothLimit = (mesh: LevelMesh, vertex: number, ring: readonly number[], axis: number) => number;

/** (n²v + 4Σe + Σf)/(n(n+5)). */
function catmullClarkLimit(mesh: LevelMesh, vertex: number, ring: readonly number[], axis: number): number {
  const p = mesh.positions;
  const n = ring.length;
  let sum = n * n * p[3 * vertex + axis];
  for (const corner of ring) {
    const next = nextHalfEdge(mesh, corner);
    sum += 4 * p[3 * mesh.vertexOf[next] + axis] + p[3 * mesh.vertexOf[nextHalfEdge(mesh, next)] + axis];
  }
  return sum / (n * (n + 5));
}

/** (⅜v + nβ · mean e)/(⅜ + nβ) [Loop 1987]. */
export function loopSmoothLimit(mesh: LevelMesh, vertex: number, ring: readonly number[], axis: number): number {
  const weight = loopWeight(ring.length);
  let sum = 0.375 * mesh.positions[3 * vertex + axis];
  for (const corner of ring) sum += weight * mesh.positions[3 * mesh.vertexOf[nextHalfEdge(mesh, corner)] + axis];
  return sum / (0.375 + ring.length * weight);
}

/** Middle of a Doo-Sabin vertex' biquadratic patch: (1, 6, 1)/8 in both directions; at the border the middle of the patch' end there; a corner itself. */
export function dooSabinLimitPoints(mesh: LevelMesh): Float64Array {
  const p = mesh.positions;
  const limit = p.slice();
  const ring: number[] = [];
  for (let h = 0; h < mesh.vertexOf.length; h++) {
    const vertex = mesh.vertexOf[h];
    const closed = collectRing(mesh, h, ring);
    if (!closed && ring.length > 1) {
      const ahead = mesh.vertexOf[nextHalfEdge(mesh, ring[0])];
      const behind = mesh.vertexOf[previousHalfEdge(mesh, ring[ring.length - 1])];
      for (let axis = 0; axis < 3; axis++) limit[3 * vertex + axis] = (p[3 * behind + axis] + 6 * p[3 * vertex + axis] + p[3 * ahead + axis]) / 8;
    }
    if (!closed || ring.length !== 4) continue;
    for (let axis = 0; axis < 3; axis++) {
      let sum = 36 * p[3 * vertex + axis];
      for (const corner of ring) {
        const next = nextHalfEdge(mesh, corner);
        sum += 6 * p[3 * mesh.vertexOf[next] + axis] + p[3 * mesh.vertexOf[nextHalfEdge(mesh, next)] + axis];
      }
      limit[3 * vertex + axis] = sum / 64;
    }
  }
  return limit;
}

/**
 * Limit points of all vertices: smooth as `smoothLimit` says, crease (4v + e₀ + eₙ)/6, corner v [Biermann, Levin & Zorin 2000].
 * Semi-sharp rules are read as they stand at this level, which is exact once they have decayed; good for pictures before that.
 */
export function limitPoints(mesh: LevelMesh, smoothLimit: SmoothLimit = catmullClarkLimit): Float64Array {
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
    for (let axis = 0; axis < 3; axis++) {
      const own = p[3 * vertex + axis];
      if (sharpEnds.length === 2) {
        limit[3 * vertex + axis] = (4 * own + p[3 * sharpEnds[0] + axis] + p[3 * sharpEnds[1] + axis]) / 6;
        continue;
      }
      limit[3 * vertex + axis] = smoothLimit(mesh, vertex, ring, axis);
    }
  }
  return limit;
}
