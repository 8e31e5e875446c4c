import type { MeasureOptions } from '../measured';
import type { Topology } from '../mesh/topology';
import { limitPoints } from './limit-points';
import { refineAround } from './catmull-clark-refine';
import { levelZero, type LevelMesh } from './level-mesh';

/** Quads that the refined faces may have together, about. */
const MOST_QUADS = 20_000;
const MOST_LEVELS = 4;
/** Above this many faces the cage's own triangles stand in: so dense a cage lies on its limit, but for parts in 1e4. */
const MOST_FACES = 20_000;

/** Triangles of some faces, counter-clockwise from outside. */
export interface FaceTriangles {
  /** Nine numbers each: the corners a, b, c. */
  points: Float64Array;
  /** Three numbers each: equal where corners are one vertex. Below `vertices`. */
  vertexOf: Int32Array;
  vertices: number;
  /** Face of the cage that each triangle belongs to. */
  faceOf: Int32Array;
}

/**
 * The chosen faces' limit surface as triangles between limit points, refined the more the fewer they are; neighbours share their points exactly.
 * `positions` may be in any frame. Faces of the scheme `polyhedral` are fans from their vertex mean, as they are measured.
 */
export function limitTriangles(mesh: Topology, positions: Float64Array, chosen: Uint8Array, options: MeasureOptions): FaceTriangles {
  let count = 0;
  for (const one of chosen) count += one;
  if (options.scheme === 'polyhedral' || count > MOST_FACES) return cageTriangles(mesh, positions, chosen);
  const levels = Math.min(MOST_LEVELS, Math.max(1, Math.floor(Math.log(MOST_QUADS / Math.max(1, count)) / Math.log(4))));
  const cage = levelZero(mesh, positions, new Int32Array(mesh.faces), new Uint8Array(1), options.boundary);
  let level: LevelMesh = { ...cage, bodyOf: Int32Array.from(chosen, (_, face) => face), live: chosen };
  for (let step = 0; step < levels; step++) level = refineAround(level, options);
  const limits = limitPoints(level);
  const triangles = new TriangleList();
  for (let face = 0; face < level.faces; face++) {
    if (level.live[face] === 0) continue;
    const at = level.starts[face];
    triangles.add(limits, level.vertexOf[at], level.vertexOf[at + 1], level.vertexOf[at + 2], level.bodyOf[face]);
    triangles.add(limits, level.vertexOf[at], level.vertexOf[at + 2], level.vertexOf[at + 3], level.bodyOf[face]);
  }
  return triangles.finish(level.vertices);
}

function cageTriangles(mesh: Topology, positions: Float64Array, chosen: Uint8Array): FaceTriangles {
  const triangles = new TriangleList();
  // The means of the faces' vertices follow the vertices.
  const points = new Float64Array(3 * (mesh.vertices + mesh.faces));
  points.set(positions);
  for (let face = 0; face < mesh.faces; face++) {
    if (chosen[face] === 0) continue;
    const start = mesh.starts[face];
    const end = mesh.starts[face + 1];
    if (end - start === 3) {
      triangles.add(points, mesh.vertexOf[start], mesh.vertexOf[start + 1], mesh.vertexOf[start + 2], face);
      continue;
    }
    const middle = mesh.vertices + face;
    for (let h = start; h < end; h++) for (let axis = 0; axis < 3; axis++) points[3 * middle + axis] += positions[3 * mesh.vertexOf[h] + axis] / (end - start);
    for (let h = start; h < end; h++) triangles.add(points, middle, mesh.vertexOf[h], mesh.vertexOf[h + 1 === end ? start : h + 1], face);
  }
  return triangles.finish(mesh.vertices + mesh.faces);
}

class TriangleList {
  private readonly numbers: number[] = [];
  private readonly corners: number[] = [];
  private readonly faces: number[] = [];

  add(p: Float64Array, a: number, b: number, c: number, face: number): void {
    this.numbers.push(p[3 * a], p[3 * a + 1], p[3 * a + 2], p[3 * b], p[3 * b + 1], p[3 * b + 2], p[3 * c], p[3 * c + 1], p[3 * c + 2]);
    this.corners.push(a, b, c);
    this.faces.push(face);
  }

  finish(vertices: number): FaceTriangles {
    return { points: Float64Array.from(this.numbers), vertexOf: Int32Array.from(this.corners), vertices, faceOf: Int32Array.from(this.faces) };
  }
}

/** The triangles' points moved by `depth` against the mean normal of their vertex. */
export function movedInwards(triangles: FaceTriangles, depth: number): Float64Array {
  const { points: p, vertexOf } = triangles;
  const normals = new Float64Array(3 * triangles.vertices);
  for (let t = 0; t < p.length; t += 9) {
    const ax = p[t + 3] - p[t], ay = p[t + 4] - p[t + 1], az = p[t + 5] - p[t + 2];
    const bx = p[t + 6] - p[t], by = p[t + 7] - p[t + 1], bz = p[t + 8] - p[t + 2];
    for (let corner = 0; corner < 3; corner++) {
      const at = 3 * vertexOf[t / 3 + corner];
      normals[at] += ay * bz - az * by;
      normals[at + 1] += az * bx - ax * bz;
      normals[at + 2] += ax * by - ay * bx;
    }
  }
  const moved = p.slice();
  for (let i = 0; i < vertexOf.length; i++) {
    const at = 3 * vertexOf[i];
    const size = Math.sqrt(normals[at] ** 2 + normals[at + 1] ** 2 + normals[at + 2] ** 2);
    if (size > 0) for (let axis = 0; axis < 3; axis++) moved[3 * i + axis] -= (depth * normals[at + axis]) / size;
  }
  return moved;
}
