import type { EdgeDefects, Topology } from './topology';
import { nextHalfEdge, normalSharpness } from './topology';

/** Half-edges bucketed by the lower vertex of their edge, in the order of the half-edges; `higher` is the other vertex, in the same places. */
interface EdgeBuckets {
  starts: Int32Array;
  halfEdges: Int32Array;
  higher: Int32Array;
}

/** A counting sort: the mesh is walked twice, nothing is hashed and nothing compared. */
function bucketEdges(mesh: Topology): EdgeBuckets {
  const { vertexOf, starts: faceStarts, faces, vertices } = mesh;
  const count = vertexOf.length;
  const starts = new Int32Array(vertices + 1);
  for (let face = 0; face < faces; face++) {
    const first = faceStarts[face];
    const end = faceStarts[face + 1];
    if (first === end) continue;
    let a = vertexOf[end - 1];
    for (let h = first; h < end; h++) {
      const b = vertexOf[h];
      starts[(a < b ? a : b) + 1]++;
      a = b;
    }
  }
  for (let v = 0; v < vertices; v++) starts[v + 1] += starts[v];
  const fill = starts.slice(0, vertices);
  const halfEdges = new Int32Array(count);
  const higher = new Int32Array(count);
  for (let face = 0; face < faces; face++) {
    const first = faceStarts[face];
    const last = faceStarts[face + 1] - 1;
    for (let h = first; h <= last; h++) {
      const a = vertexOf[h];
      const b = vertexOf[h === last ? first : h + 1];
      const place = a < b ? fill[a]++ : fill[b]++;
      halfEdges[place] = h;
      higher[place] = a < b ? b : a;
    }
  }
  return { starts, halfEdges, higher };
}

/** Buckets have about four entries, poles of a sphere some hundreds: from this size on they are sorted by the higher vertex instead of searched. */
const SORTED_FROM = 32;

function sortBucket({ halfEdges, higher }: EdgeBuckets, from: number, to: number): void {
  const order = Array.from({ length: to - from }, (_, i) => from + i).sort((x, y) => higher[x] - higher[y] || x - y);
  const sortedEdges = order.map((place) => halfEdges[place]);
  const sortedHigher = order.map((place) => higher[place]);
  halfEdges.set(sortedEdges, from);
  higher.set(sortedHigher, from);
}

/** Pairs half-edges into twins and puts the crease tags on them; the last tag of an edge wins. */
export function matchEdges(mesh: Topology, creaseVertices: Uint32Array, creaseSharpness: Float32Array): EdgeDefects {
  const defects: EdgeDefects = { nonManifold: [], turned: [], strayCreases: [] };
  const buckets = bucketEdges(mesh);
  pairHalfEdges(mesh, buckets, false, mesh.twin, defects);
  tagCreases(mesh, buckets, creaseVertices, creaseSharpness, defects);
  return defects;
}

/** The other half-edge of each edge with exactly two faces, whichever way they run along it; -1 elsewhere. */
export function pairEdges(mesh: Topology): Int32Array {
  const pair = new Int32Array(mesh.vertexOf.length).fill(-1);
  pairHalfEdges(mesh, bucketEdges(mesh), true, pair, { nonManifold: [], turned: [], strayCreases: [] });
  return pair;
}

/** Enters the two half-edges of each edge that has no more into `pair`; such as run the same way are defects unless `eitherWay`. */
function pairHalfEdges({ vertexOf, vertices }: Topology, buckets: EdgeBuckets, eitherWay: boolean, pair: Int32Array, defects: EdgeDefects): void {
  const { halfEdges, higher, starts } = buckets;
  // 1 at half-edges that were met from the first one of their edge.
  const met = new Uint8Array(vertexOf.length);
  for (let v = 0; v < vertices; v++) {
    const from = starts[v];
    const to = starts[v + 1];
    if (to - from >= SORTED_FROM) sortBucket(buckets, from, to);
    for (let i = from; i < to; i++) {
      const first = halfEdges[i];
      if (met[first] === 1) continue;
      const other = higher[i];
      const reach = to - from >= SORTED_FROM ? endOfRun(higher, i, to) : to;
      let second = -1;
      let count = 1;
      for (let j = i + 1; j < reach; j++) {
        if (higher[j] !== other) continue;
        count++;
        second = halfEdges[j];
        met[second] = 1;
      }
      if (count === 1) continue;
      if (count > 2) defects.nonManifold.push(first);
      else if (!eitherWay && vertexOf[first] === vertexOf[second]) defects.turned.push(first);
      else {
        pair[first] = second;
        pair[second] = first;
      }
    }
  }
}

function endOfRun(higher: Int32Array, from: number, to: number): number {
  let end = from + 1;
  while (end < to && higher[end] === higher[from]) end++;
  return end;
}

function tagCreases(mesh: Topology, buckets: EdgeBuckets, pairs: Uint32Array, sharpness: Float32Array, defects: EdgeDefects): void {
  for (let tag = 0; tag < sharpness.length; tag++) {
    const a = Math.min(pairs[2 * tag], pairs[2 * tag + 1]);
    const b = Math.max(pairs[2 * tag], pairs[2 * tag + 1]);
    let found = false;
    if (b < mesh.vertices) {
      for (let i = buckets.starts[a]; i < buckets.starts[a + 1]; i++) {
        if (buckets.higher[i] !== b) continue;
        mesh.edgeSharpness[buckets.halfEdges[i]] = normalSharpness(sharpness[tag]);
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
