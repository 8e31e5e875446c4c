import type { EdgeDefects, Topology } from './topology';
import { nextHalfEdge, normalSharpness } from './topology';

/** Half-edges of each vertex pair, bucketed by the lower vertex and ordered by the higher one. */
interface EdgeBuckets {
  starts: Int32Array;
  halfEdges: Int32Array;
  higher: Int32Array;
}

function bucketEdges(mesh: Topology): EdgeBuckets {
  const count = mesh.vertexOf.length;
  const starts = new Int32Array(mesh.vertices + 1);
  const higher = new Int32Array(count);
  const lower = new Int32Array(count);
  for (let face = 0; face < mesh.faces; face++) {
    const end = mesh.starts[face + 1];
    let b = mesh.vertexOf[mesh.starts[face]];
    for (let h = end - 1; h >= mesh.starts[face]; h--) {
      const a = mesh.vertexOf[h];
      lower[h] = a < b ? a : b;
      higher[h] = a < b ? b : a;
      starts[lower[h] + 1]++;
      b = a;
    }
  }
  for (let v = 0; v < mesh.vertices; v++) starts[v + 1] += starts[v];
  const fill = starts.slice(0, mesh.vertices);
  const halfEdges = new Int32Array(count);
  for (let h = 0; h < count; h++) halfEdges[fill[lower[h]]++] = h;
  for (let v = 0; v < mesh.vertices; v++) sortBucket(halfEdges, higher, starts[v], starts[v + 1]);
  return { starts, halfEdges, higher };
}

/** Buckets have about three entries, poles of a sphere some hundreds: insertion for the first, a real sort for the second. */
function sortBucket(halfEdges: Int32Array, higher: Int32Array, from: number, to: number): void {
  if (to - from > 24) {
    const sorted = Array.from(halfEdges.subarray(from, to)).sort((x, y) => higher[x] - higher[y] || x - y);
    halfEdges.set(sorted, from);
    return;
  }
  for (let i = from + 1; i < to; i++) {
    const h = halfEdges[i];
    const key = higher[h];
    let j = i - 1;
    while (j >= from && higher[halfEdges[j]] > key) {
      halfEdges[j + 1] = halfEdges[j];
      j--;
    }
    halfEdges[j + 1] = h;
  }
}

/** Pairs half-edges into twins and puts the crease tags on them; the last tag of an edge wins. */
export function matchEdges(mesh: Topology, creaseVertices: Uint32Array, creaseSharpness: Float32Array): EdgeDefects {
  const defects: EdgeDefects = { nonManifold: [], turned: [], strayCreases: [] };
  const buckets = bucketEdges(mesh);
  const { halfEdges, higher, starts } = buckets;
  for (let v = 0; v < mesh.vertices; v++) {
    let i = starts[v];
    while (i < starts[v + 1]) {
      const first = halfEdges[i];
      let j = i + 1;
      while (j < starts[v + 1] && higher[halfEdges[j]] === higher[first]) j++;
      if (j - i === 2) {
        const second = halfEdges[i + 1];
        if (mesh.vertexOf[first] === mesh.vertexOf[second]) defects.turned.push(first);
        else {
          mesh.twin[first] = second;
          mesh.twin[second] = first;
        }
      } else if (j - i > 2) defects.nonManifold.push(first);
      i = j;
    }
  }
  tagCreases(mesh, buckets, creaseVertices, creaseSharpness, defects);
  return defects;
}

function tagCreases(mesh: Topology, buckets: EdgeBuckets, pairs: Uint32Array, sharpness: Float32Array, defects: EdgeDefects): void {
  for (let tag = 0; tag < sharpness.length; tag++) {
    const a = Math.min(pairs[2 * tag], pairs[2 * tag + 1]);
    const b = Math.max(pairs[2 * tag], pairs[2 * tag + 1]);
    let found = false;
    if (b < mesh.vertices) {
      for (let i = buckets.starts[a]; i < buckets.starts[a + 1]; i++) {
        const h = buckets.halfEdges[i];
        if (buckets.higher[h] !== b) continue;
        mesh.edgeSharpness[h] = normalSharpness(sharpness[tag]);
        found = true;
      }
    }
    if (!found) defects.strayCreases.push(tag);
  }
}

/** The two ends of a half-edge. */
export function halfEdgeEnds(mesh: Topology, h: number): [number, number] {
  return [mesh.vertexOf[h], mesh.vertexOf[nextHalfEdge(mesh, h)]];
}
