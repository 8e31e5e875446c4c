import type { EdgeDefects, Topology } from './topology';
import { nextHalfEdge, normalSharpness } from './topology';

/**
 * Half-edges bucketed by the lower vertex of their edge, in the order of the half-edges. `entries` holds pairs of a half-edge and the other, higher vertex, side by
 * side since they are looked at together; those of vertex v end before pair `ends[v]` and begin where those of the vertex before end.
 */
interface EdgeBuckets {
  ends: Int32Array;
  entries: Int32Array;
}

/** A counting sort: the mesh is walked twice, nothing is hashed and nothing compared. */
function bucketEdges(mesh: Topology): EdgeBuckets {
  const { vertexOf, starts, faces, vertices } = mesh;
  const ends = new Int32Array(vertices);
  for (let face = 0; face < faces; face++) {
    const first = starts[face];
    const end = starts[face + 1];
    if (first === end) continue;
    let a = vertexOf[end - 1];
    for (let h = first; h < end; h++) {
      const b = vertexOf[h];
      ends[a < b ? a : b]++;
      a = b;
    }
  }
  // Where each bucket begins; filling it moves that to where it ends.
  for (let v = 0, sum = 0; v < vertices; v++) {
    const size = ends[v];
    ends[v] = sum;
    sum += size;
  }
  const entries = new Int32Array(2 * vertexOf.length);
  for (let face = 0; face < faces; face++) {
    const first = starts[face];
    const last = starts[face + 1] - 1;
    if (last < first) continue;
    let a = vertexOf[first];
    for (let h = first; h <= last; h++) {
      const b = vertexOf[h === last ? first : h + 1];
      const place = 2 * ends[a < b ? a : b]++;
      entries[place] = h;
      entries[place + 1] = a < b ? b : a;
      a = b;
    }
  }
  return { ends, entries };
}

/** Buckets have about four entries, poles of a sphere some hundreds: from this size on they are sorted by the higher vertex instead of searched. */
const SORTED_FROM = 32;

function sortBucket(entries: Int32Array, from: number, to: number): void {
  const pairs = Array.from({ length: to - from }, (_, i) => [entries[2 * (from + i)], entries[2 * (from + i) + 1]]);
  pairs.sort((x, y) => x[1] - y[1] || x[0] - y[0]);
  entries.set(pairs.flat(), 2 * from);
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
function pairHalfEdges({ vertexOf, vertices }: Topology, { entries, ends }: EdgeBuckets, eitherWay: boolean, pair: Int32Array, defects: EdgeDefects): void {
  for (let v = 0, from = 0; v < vertices; from = ends[v++]) {
    const to = ends[v];
    const isSorted = to - from >= SORTED_FROM;
    if (isSorted) sortBucket(entries, from, to);
    for (let i = from; i < to; i++) {
      const other = entries[2 * i + 1];
      // Those that were met from the first half-edge of their edge hold the complement.
      if (other < 0) continue;
      const first = entries[2 * i];
      let second = -1;
      let count = 1;
      for (let j = i + 1; j < to; j++) {
        if (entries[2 * j + 1] !== other) {
          if (isSorted) break;
          continue;
        }
        count++;
        second = entries[2 * j];
        entries[2 * j + 1] = ~other;
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

function tagCreases(mesh: Topology, { entries, ends }: EdgeBuckets, pairs: Uint32Array, sharpness: Float32Array, defects: EdgeDefects): void {
  for (let tag = 0; tag < sharpness.length; tag++) {
    const a = Math.min(pairs[2 * tag], pairs[2 * tag + 1]);
    const b = Math.max(pairs[2 * tag], pairs[2 * tag + 1]);
    let found = false;
    if (b < mesh.vertices) {
      for (let i = a === 0 ? 0 : ends[a - 1]; i < ends[a]; i++) {
        if (entries[2 * i + 1] !== b && entries[2 * i + 1] !== ~b) continue;
        mesh.edgeSharpness[entries[2 * i]] = normalSharpness(sharpness[tag]);
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
