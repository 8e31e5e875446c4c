import { nextHalfEdge } from '../mesh/topology';
import { collectRing } from './classify-vertices';
import { dooSabinWeight } from './doo-sabin-fan';
import type { LevelMesh } from './level-mesh';

/** Faces of a refined mesh while they are laid down. */
class FaceList {
  readonly starts: number[] = [0];
  readonly vertexOf: number[] = [];
  readonly faceOf: number[] = [];

  /** Adds a face and returns its first half-edge. */
  add(vertices: readonly number[]): number {
    const first = this.vertexOf.length;
    for (const vertex of vertices) {
      this.vertexOf.push(vertex);
      this.faceOf.push(this.starts.length - 1);
    }
    this.starts.push(this.vertexOf.length);
    return first;
  }
}

/**
 * Refines around the live vertices [Doo & Sabin 1978]: a new vertex for each corner of the faces there, a face for each such face, for each of their edges
 * and for each live vertex. In these meshes `live` and `bodyOf` belong to vertices, since patches do; the cage's first step hands them over from the faces.
 */
export function refineDooSabin(mesh: LevelMesh, fromCage: boolean): LevelMesh {
  const isLive = (h: number): boolean => mesh.live[fromCage ? mesh.faceOf[h] : mesh.vertexOf[h]] === 1;
  const touched = new Uint8Array(mesh.faces);
  const liveVertex = new Uint8Array(mesh.vertices);
  for (let h = 0; h < mesh.vertexOf.length; h++) {
    if (!isLive(h)) continue;
    liveVertex[mesh.vertexOf[h]] = 1;
  }
  for (let h = 0; h < mesh.vertexOf.length; h++) if (liveVertex[mesh.vertexOf[h]] === 1) touched[mesh.faceOf[h]] = 1;
  const ids = new Int32Array(mesh.vertexOf.length).fill(-1);
  let count = 0;
  for (let h = 0; h < mesh.vertexOf.length; h++) if (touched[mesh.faceOf[h]] === 1) ids[h] = count++;
  const positions = new Float64Array(3 * count);
  const bodyOf = new Int32Array(count);
  const live = new Uint8Array(count);
  const faces = new FaceList();
  const inFace = new Int32Array(mesh.vertexOf.length).fill(-1);
  const inVertex = new Int32Array(mesh.vertexOf.length).fill(-1);
  for (let face = 0; face < mesh.faces; face++) {
    if (touched[face] === 0) continue;
    const start = mesh.starts[face];
    const n = mesh.starts[face + 1] - start;
    const first = faces.add(Array.from({ length: n }, (_, i) => ids[start + i]));
    for (let i = 0; i < n; i++) {
      const h = start + i;
      inFace[h] = first + i;
      bodyOf[ids[h]] = mesh.bodyOf[fromCage ? face : mesh.vertexOf[h]];
      live[ids[h]] = liveVertex[mesh.vertexOf[h]] === 1 && isLive(h) ? 1 : 0;
      for (let axis = 0; axis < 3; axis++) {
        let sum = 0;
        for (let k = 0; k < n; k++) sum += dooSabinWeight(n, k) * mesh.positions[3 * mesh.vertexOf[start + ((i + k) % n)] + axis];
        positions[3 * ids[h] + axis] = sum;
      }
    }
  }
  const ring: number[] = [];
  const seen = new Uint8Array(mesh.vertices);
  for (let h = 0; h < mesh.vertexOf.length; h++) {
    const vertex = mesh.vertexOf[h];
    if (liveVertex[vertex] === 0 || seen[vertex] === 1) continue;
    seen[vertex] = 1;
    if (!collectRing(mesh, h, ring)) continue;
    const first = faces.add(ring.map((corner) => ids[corner]));
    ring.forEach((corner, i) => (inVertex[corner] = first + i));
  }
  const pairs: number[] = [];
  for (let h = 0; h < mesh.vertexOf.length; h++) {
    const t = mesh.twin[h];
    if (t < h || ids[h] < 0 || ids[t] < 0) continue;
    const [nextH, nextT] = [nextHalfEdge(mesh, h), nextHalfEdge(mesh, t)];
    if (liveVertex[mesh.vertexOf[h]] === 0 && liveVertex[mesh.vertexOf[t]] === 0) continue;
    // Counter-clockwise: beside the far face at both ends, then beside the near one.
    const first = faces.add([ids[nextT], ids[t], ids[nextH], ids[h]]);
    pairs.push(first, inFace[t], first + 1, inVertex[nextH], first + 2, inFace[h], first + 3, inVertex[nextT]);
  }
  const twin = new Int32Array(faces.vertexOf.length).fill(-1);
  for (let i = 0; i < pairs.length; i += 2) {
    if (pairs[i + 1] < 0) continue;
    twin[pairs[i]] = pairs[i + 1];
    twin[pairs[i + 1]] = pairs[i];
  }
  const halfEdges = faces.vertexOf.length;
  return {
    faces: faces.starts.length - 1, vertices: count, starts: Int32Array.from(faces.starts), vertexOf: Int32Array.from(faces.vertexOf),
    faceOf: Int32Array.from(faces.faceOf), twin, edgeSharpness: new Float32Array(halfEdges), vertexSharpness: new Float32Array(count),
    positions, bodyOf, live, level: mesh.level + 1, borderOf: new Int32Array(halfEdges).fill(-1), borderFrom: new Float32Array(halfEdges),
  };
}
