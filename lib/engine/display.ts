import type { Cage } from './cage';
import type { MeasureOptions, Three } from './measured';
import { FindingList } from './mesh/findings';
import { makeFrames } from './mesh/frames';
import { mendCage } from './mesh/mend-cage';
import { partitionFaces } from './mesh/partition';
import { buildTopology, nextHalfEdge, previousHalfEdge } from './mesh/topology';
import { dooSabinLimitPoints, limitPoints, loopSmoothLimit } from './schemes/limit-points';
import { refineAround } from './schemes/catmull-clark-refine';
import { dooSabinCage } from './schemes/doo-sabin-mesh';
import { refineDooSabin } from './schemes/doo-sabin-refine';
import { isSharpForGood, levelZero, type LevelMesh } from './schemes/level-mesh';
import { refineTriangles } from './schemes/loop-refine';

/** Range of one part in a display mesh; parts share no vertices. */
export interface DisplayPart {
  name: string;
  firstIndex: number;
  indexCount: number;
  firstVertex: number;
  vertexCount: number;
}

/** Triangles for the 3D view, grouped by part. */
export interface DisplayMesh {
  /** x, y, z per vertex in file units, relative to `origin`, so that 32 bits suffice far from the file's origin. */
  positions: Float32Array;
  /** Unit normals, outwards, split at infinitely sharp edges. */
  normals: Float32Array;
  indices: Uint32Array;
  /** Point of the file's frame that the positions are relative to. */
  origin: Three;
  parts: DisplayPart[];
}

/**
 * Triangulates the limit surface: `level` uniform refinements, then every vertex on its limit point. `polyhedral` (and a level of 0) gives the cage.
 * The cage is mended as it is for measuring. Holes are left out. Never throws; a cage with problems is drawn as far as its faces go.
 */
export function displayMesh(given: Cage, options: MeasureOptions, level: number): DisplayMesh {
  const { cage } = mendCage(given, options, new FindingList());
  const { mesh } = buildTopology(cage);
  const bodies = partitionFaces(cage, mesh, options.partsBy);
  const onePiece = { ...bodies, bodyOf: new Int32Array(mesh.faces), bodies: 1 };
  const frames = makeFrames(mesh, cage.positions, onePiece);
  const origin: Three = [0, 1, 2].map((axis) => (mesh.faces === 0 ? 0 : frames.boxes[axis] / 2 + frames.boxes[3 + axis] / 2)) as Three;
  const local = cage.positions.map((value, i) => value - origin[i % 3]);
  let fine = levelZero(mesh, local, bodies.partOf, new Uint8Array(bodies.partNames.length), options.boundary);
  if (level > 0) fine = refineForDisplay(fine, options, level);
  const smooth = options.scheme !== 'polyhedral';
  return { ...triangulate(fine, bodies.holePart < 0 ? bodies.partNames : bodies.partNames.slice(0, bodies.holePart), smooth), origin };
}

/** Refines everything and moves the vertices to their limit points; a cage that its scheme cannot refine is left as it is. */
function refineForDisplay(cage: LevelMesh, options: MeasureOptions, level: number): LevelMesh {
  let fine = cage;
  if (options.scheme === 'catmull-clark') {
    for (let step = 0; step < level; step++) fine = refineAround(fine, options);
    return { ...fine, positions: limitPoints(fine) };
  }
  if (options.scheme === 'loop') {
    if (cage.vertexOf.length !== 3 * cage.faces) return cage;
    for (let step = 0; step < level; step++) fine = refineTriangles(fine, options);
    return { ...fine, positions: limitPoints(fine, loopSmoothLimit) };
  }
  if (options.scheme === 'doo-sabin') {
    let dual = dooSabinCage(fine, options.boundary);
    for (let step = 0; step < level; step++) {
      const all = new Uint8Array(dual.vertices).fill(1);
      dual = refineDooSabin(dual, all, all);
    }
    fine = dual;
    // Here parts belong to vertices: a face goes with its first.
    const bodyOf = Int32Array.from({ length: fine.faces }, (_, face) => fine.bodyOf[fine.vertexOf[fine.starts[face]]]);
    return { ...fine, bodyOf, positions: dooSabinLimitPoints(fine) };
  }
  return cage;
}

/** Faces of each of the parts; those of holes, whose number is none of them, are in no list. */
function listFaces(mesh: LevelMesh, parts: number): number[][] {
  const lists: number[][] = Array.from({ length: parts }, () => []);
  for (let face = 0; face < mesh.faces; face++) if (mesh.bodyOf[face] < parts) lists[mesh.bodyOf[face]].push(face);
  return lists;
}

/** Corners of one vertex that share a normal: same part, no sharp edge between them. Numbered part by part. */
function groupCorners(mesh: LevelMesh, facesByPart: number[][], smooth: boolean): { vertexOfCorner: Int32Array; partStarts: number[] } {
  const vertexOfCorner = new Int32Array(mesh.vertexOf.length).fill(-1);
  const partStarts = [0];
  let count = 0;
  const joins = (h: number): boolean => smooth && !isSharpForGood(mesh, h) && mesh.bodyOf[mesh.faceOf[mesh.twin[h]]] === mesh.bodyOf[mesh.faceOf[h]];
  for (const faces of facesByPart) {
    for (const face of faces) {
      for (let h = mesh.starts[face]; h < mesh.starts[face + 1]; h++) {
        if (vertexOfCorner[h] >= 0) continue;
        for (let at = h; vertexOfCorner[at] < 0; ) {
          vertexOfCorner[at] = count;
          if (!joins(at)) break;
          at = nextHalfEdge(mesh, mesh.twin[at]);
        }
        for (let before = previousHalfEdge(mesh, h); joins(before); ) {
          const at = mesh.twin[before];
          if (vertexOfCorner[at] >= 0) break;
          vertexOfCorner[at] = count;
          before = previousHalfEdge(mesh, at);
        }
        count++;
      }
    }
    partStarts.push(count);
  }
  return { vertexOfCorner, partStarts };
}

function triangulate(mesh: LevelMesh, partNames: string[], smooth: boolean): Omit<DisplayMesh, 'origin'> {
  const facesByPart = listFaces(mesh, partNames.length);
  const { vertexOfCorner, partStarts } = groupCorners(mesh, facesByPart, smooth);
  const positions = new Float32Array(3 * partStarts[partNames.length]);
  const normals = new Float32Array(positions.length);
  let triangles = 0;
  for (const faces of facesByPart) for (const face of faces) triangles += Math.max(0, mesh.starts[face + 1] - mesh.starts[face] - 2);
  const indices = new Uint32Array(3 * triangles);
  const parts: DisplayPart[] = [];
  let at = 0;
  for (let part = 0; part < partNames.length; part++) {
    const firstIndex = at;
    for (const face of facesByPart[part]) {
      const start = mesh.starts[face];
      for (let h = start; h < mesh.starts[face + 1]; h++) {
        positions.set(mesh.positions.subarray(3 * mesh.vertexOf[h], 3 * mesh.vertexOf[h] + 3), 3 * vertexOfCorner[h]);
        if (h < start + 2) continue;
        indices[at++] = vertexOfCorner[start];
        indices[at++] = vertexOfCorner[h - 1];
        indices[at++] = vertexOfCorner[h];
      }
      addFaceNormal(mesh, face, vertexOfCorner, normals);
    }
    parts.push({ name: partNames[part], firstIndex, indexCount: at - firstIndex, firstVertex: partStarts[part], vertexCount: partStarts[part + 1] - partStarts[part] });
  }
  for (let i = 0; i < normals.length; i += 3) {
    const size = Math.hypot(normals[i], normals[i + 1], normals[i + 2]) || 1;
    for (let axis = 0; axis < 3; axis++) normals[i + axis] /= size;
  }
  return { positions, normals, indices, parts };
}

/** Adds a face's area vector to the normals of its corners. */
function addFaceNormal(mesh: LevelMesh, face: number, vertexOfCorner: Int32Array, normals: Float32Array): void {
  const p = mesh.positions;
  const start = mesh.starts[face];
  const o = 3 * mesh.vertexOf[start];
  let nx = 0, ny = 0, nz = 0;
  for (let h = start + 1; h + 1 < mesh.starts[face + 1]; h++) {
    const a = 3 * mesh.vertexOf[h];
    const b = 3 * mesh.vertexOf[h + 1];
    const ax = p[a] - p[o], ay = p[a + 1] - p[o + 1], az = p[a + 2] - p[o + 2];
    const bx = p[b] - p[o], by = p[b + 1] - p[o + 1], bz = p[b + 2] - p[o + 2];
    nx += ay * bz - az * by;
    ny += az * bx - ax * bz;
    nz += ax * by - ay * bx;
  }
  for (let h = start; h < mesh.starts[face + 1]; h++) {
    normals[3 * vertexOfCorner[h]] += nx;
    normals[3 * vertexOfCorner[h] + 1] += ny;
    normals[3 * vertexOfCorner[h] + 2] += nz;
  }
}
