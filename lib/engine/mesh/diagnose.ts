import type { Cage } from '../cage';
import type { Place } from '../measured';
import { counted, placeOf, type FindingList } from './findings';
import { halfEdgeEnds } from './match-edges';
import { partToldAt, type Bodies } from './partition';
import { findTurnedFaces } from './turned-faces';
import type { EdgeDefects, Topology } from './topology';

/** Area of a face relative to the square of its perimeter below which it counts as none. */
const NO_AREA = 1e-14;

/** Finds what forbids a number. `joined` are vertices that a weld left without faces. Returns the faces that stand in a structural problem (1), for their bodies to be left out. */
export function diagnoseStructure(cage: Cage, mesh: Topology, defects: EdgeDefects, bodies: Bodies, joined: Int32Array, findings: FindingList): Uint8Array {
  const bad = new Uint8Array(mesh.faces);
  const at = (face: number, fields: Partial<Place>): Place => {
    const vertex = fields.vertex ?? fields.edge?.[0] ?? mesh.vertexOf[mesh.starts[face]];
    const position = vertex === undefined ? null : positionOf(cage, vertex);
    return placeOf({ face, position, line: cage.faceLines === null ? null : cage.faceLines[face], ...fields });
  };
  const partName = (face: number): string | null => partToldAt(bodies, face);

  for (const h of defects.nonManifold) {
    const face = mesh.faceOf[h];
    bad[face] = 1;
    findings.add('non_manifold_edge', 'problem', partName(face), at(face, { edge: halfEdgeEnds(mesh, h) }),
      (n) => `${counted(n, 'edge has', 'edges have')} more than two faces; separate the surfaces there so that every edge has at most two.`);
  }
  if (defects.turned.length > 0) {
    const turned = findTurnedFaces(mesh);
    for (const h of defects.turned) bad[mesh.faceOf[h]] = 1;
    for (const face of turned.faces) {
      bad[face] = 1;
      findings.add('flipped_face', 'problem', partName(face), at(face, {}),
        (n) => `${counted(n, 'face is', 'faces are')} turned against the neighbours; reverse ${n === 1 ? 'it' : 'them'}, or import again with faces turned outwards.`);
    }
    for (const h of turned.oneSided) {
      bad[mesh.faceOf[h]] = 1;
      findings.add('one_sided', 'problem', partName(mesh.faceOf[h]), at(mesh.faceOf[h], { edge: halfEdgeEnds(mesh, h) }),
        (n) => `The surface has one side only, as a Möbius strip has, at ${counted(n, 'edge', 'edges')}; cut it there and close it, for it encloses nothing.`);
    }
  }
  diagnoseFaces(cage, mesh, bad, findings, at, partName);
  diagnoseVertices(cage, mesh, bad, bodies.toldOf, joined, findings, at, partName);
  for (const tag of defects.strayCreases) {
    const edge: [number, number] = [cage.creaseVertices[2 * tag], cage.creaseVertices[2 * tag + 1]];
    findings.add('crease_without_edge', 'warning', null, placeOf({ edge, position: positionOf(cage, edge[0]) }),
      (n) => `${counted(n, 'crease tag names', 'crease tags name')} an edge that does not exist and was left out; set the crease again on an edge of the cage.`);
  }
  return bad;
}

/** x, y, z of a vertex in the file's frame; null where there is no such vertex. */
export function positionOf(cage: Cage, vertex: number): [number, number, number] | null {
  if (3 * vertex + 2 >= cage.positions.length) return null;
  return [cage.positions[3 * vertex], cage.positions[3 * vertex + 1], cage.positions[3 * vertex + 2]];
}

type PlaceAt = (face: number, fields: Partial<Place>) => Place;
type PartNameAt = (face: number) => string | null;

function diagnoseFaces(cage: Cage, mesh: Topology, bad: Uint8Array, findings: FindingList, at: PlaceAt, partName: PartNameAt): void {
  const { starts, vertexOf, faces } = mesh;
  const seenAt = new Int32Array(mesh.vertices).fill(-1);
  const crowded: number[] = [];
  for (let face = 0; face < faces; face++) {
    if (repeatsVertex(vertexOf, starts[face], starts[face + 1], face, seenAt)) {
      bad[face] = 1;
      findings.add('degenerate_face', 'problem', partName(face), at(face, {}),
        (n) => `${counted(n, 'face has', 'faces have')} fewer than three different vertices or one vertex twice; delete or rebuild ${n === 1 ? 'it' : 'them'}.`);
    } else if (!hasArea(cage.positions, vertexOf, starts[face], starts[face + 1])) {
      findings.add('degenerate_face', 'warning', partName(face), at(face, {}),
        (n) => `${counted(n, 'face has', 'faces have')} no area; merge the vertices that lie on each other.`);
    }
    if (bad[face] === 1) crowded.push(face);
  }
  for (let i = 0; i < faces && crowded.length > 0; i++) if (bad[i] === 0 && touchesBad(mesh, bad, i)) crowded.push(i);
  reportDuplicates(mesh, crowded, bad, findings, at, partName);
}

/** Whether a face has fewer than three corners or one vertex twice; `seenAt` holds per vertex the larger face that it was last met in. */
function repeatsVertex(vertexOf: Int32Array, start: number, end: number, face: number, seenAt: Int32Array): boolean {
  const a = vertexOf[start], b = vertexOf[start + 1], c = vertexOf[start + 2];
  if (end - start <= 4) {
    if (end - start < 3 || a === b || b === c || c === a) return true;
    const d = vertexOf[end - 1];
    return end - start === 4 && (d === a || d === b || d === c);
  }
  for (let h = start; h < end; h++) {
    if (seenAt[vertexOf[h]] === face) return true;
    seenAt[vertexOf[h]] = face;
  }
  return false;
}

/** Whether a face's area is more than nothing beside the square of its perimeter. */
function hasArea(p: Float64Array, vertexOf: Int32Array, start: number, end: number): boolean {
  const o = 3 * vertexOf[start];
  const ox = p[o], oy = p[o + 1], oz = p[o + 2];
  let nx = 0, ny = 0, nz = 0, squares = 0;
  let ax = 0, ay = 0, az = 0;
  for (let h = start + 1; h < end; h++) {
    const b = 3 * vertexOf[h];
    const bx = p[b] - ox, by = p[b + 1] - oy, bz = p[b + 2] - oz;
    nx += ay * bz - az * by;
    ny += az * bx - ax * bz;
    nz += ax * by - ay * bx;
    squares += (bx - ax) * (bx - ax) + (by - ay) * (by - ay) + (bz - az) * (bz - az);
    ax = bx;
    ay = by;
    az = bz;
  }
  squares += ax * ax + ay * ay + az * az;
  // The square of a sum of n lengths is at most n times the sum of their squares, which settles all but slivers without a root.
  const least = NO_AREA * (end - start) * squares;
  const area = nx * nx + ny * ny + nz * nz;
  if (area > least * least) return true;
  let perimeter = 0;
  for (let h = start; h < end; h++) {
    const a = 3 * vertexOf[h];
    const b = 3 * vertexOf[h + 1 === end ? start : h + 1];
    perimeter += Math.sqrt((p[b] - p[a]) ** 2 + (p[b + 1] - p[a + 1]) ** 2 + (p[b + 2] - p[a + 2]) ** 2);
  }
  return Math.sqrt(area) > NO_AREA * perimeter * perimeter;
}

/** Whether a face has an edge without twin that might belong to a crowded edge; only such faces can be duplicates. */
function touchesBad(mesh: Topology, bad: Uint8Array, face: number): boolean {
  for (let h = mesh.starts[face]; h < mesh.starts[face + 1]; h++) {
    if (mesh.twin[h] < 0) return true;
    if (bad[mesh.faceOf[mesh.twin[h]]] === 1) return true;
  }
  return false;
}

function reportDuplicates(mesh: Topology, faces: number[], bad: Uint8Array, findings: FindingList, at: PlaceAt, partName: PartNameAt): void {
  const known = new Set<string>();
  for (const face of faces.sort((a, b) => a - b)) {
    const key = Array.from(mesh.vertexOf.subarray(mesh.starts[face], mesh.starts[face + 1])).sort((a, b) => a - b).join(' ');
    if (known.has(key)) {
      bad[face] = 1;
      findings.add('duplicate_face', 'problem', partName(face), at(face, {}),
        (n) => `${counted(n, 'face lies', 'faces lie')} on another face with the same vertices; delete ${n === 1 ? 'it' : 'them'}.`);
    }
    known.add(key);
  }
}

function diagnoseVertices(cage: Cage, mesh: Topology, bad: Uint8Array, toldOf: Int32Array, joined: Int32Array, findings: FindingList, at: PlaceAt, partName: PartNameAt): void {
  const { vertexOf } = mesh;
  const corners = new Int32Array(mesh.vertices);
  const visited = new Uint8Array(mesh.vertices);
  for (let h = 0; h < vertexOf.length; h++) corners[vertexOf[h]]++;
  const told = partsToldOf(mesh, bad, toldOf);
  const gone = new Set(joined);
  for (let h = 0; h < vertexOf.length; h++) {
    const v = vertexOf[h];
    if (visited[v] === 1) continue;
    visited[v] = 1;
    if (countFan(mesh, h, corners[v]) === corners[v]) continue;
    const face = mesh.faceOf[h];
    if (bad[face] === 1 || told?.[v] === toldOf[face]) continue;
    bad[face] = 1;
    findings.add('non_manifold_vertex', 'problem', partName(face), at(face, { vertex: v }),
      (n) => `${counted(n, 'vertex joins', 'vertices join')} surfaces that touch in that point only; split ${n === 1 ? 'it' : 'them'} so that each surface has its own.`);
  }
  for (let v = 0; v < mesh.vertices; v++) {
    if (corners[v] > 0 || gone.has(v)) continue;
    findings.add('isolated_vertex', 'note', null, placeOf({ vertex: v, position: positionOf(cage, v) }),
      (n) => `${counted(n, 'vertex belongs', 'vertices belong')} to no face and ${n === 1 ? 'was' : 'were'} ignored; delete ${n === 1 ? 'it' : 'them'} if that was not meant.`);
  }
}

/** Per vertex the part of a face there that already stands in a problem, which breaks the turn about it and says enough; -1 where there is none, null without any. */
function partsToldOf({ starts, vertexOf, vertices }: Topology, bad: Uint8Array, toldOf: Int32Array): Int32Array | null {
  if (!bad.includes(1)) return null;
  const told = new Int32Array(vertices).fill(-1);
  for (let face = 0; face < bad.length; face++) if (bad[face] === 1) for (let h = starts[face]; h < starts[face + 1]; h++) told[vertexOf[h]] = toldOf[face];
  return told;
}

/** Faces met by turning about the start of `first`, both ways from it. */
function countFan({ starts, faceOf, twin }: Topology, first: number, limit: number): number {
  let count = 0;
  let h = first;
  do {
    count++;
    const face = faceOf[h];
    h = twin[h === starts[face] ? starts[face + 1] - 1 : h - 1];
  } while (h >= 0 && h !== first && count < limit);
  if (h === first || count >= limit) return count;
  h = twin[first];
  while (h >= 0 && count < limit) {
    count++;
    const face = faceOf[h];
    h = twin[h + 1 === starts[face + 1] ? starts[face] : h + 1];
  }
  return count;
}
