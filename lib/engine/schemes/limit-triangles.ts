import type { MeasureOptions } from '../measured';
import { emptyBoxes, faceHulls } from '../mesh/face-hulls';
import { growBox } from '../mesh/box-tree';
import { previousHalfEdge, nextHalfEdge, type Topology } from '../mesh/topology';
import { refineAround } from './catmull-clark-refine';
import { collectRing } from './classify-vertices';
import { dooSabinCage, type DooSabinMesh } from './doo-sabin-mesh';
import { refineDooSabin } from './doo-sabin-refine';
import { levelZero, type LevelMesh } from './level-mesh';
import { dooSabinLimitPoints, limitPoints, loopSmoothLimit } from './limit-points';
import { refineTriangles } from './loop-refine';

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
 * A cage's surface on its way to the limit, element by element. Elements are the level's faces, and from the first Doo-Sabin refinement on its vertices,
 * since the patches belong to them; `live` and `bodyOf` count elements, and `bodyOf` is the cage's face that an element is a piece of.
 */
export type LimitLevel = LevelMesh | DooSabinMesh;

/** The cage as level 0; all faces are live. `positions` may be in any frame. */
export function startLimit(mesh: Topology, positions: Float64Array, options: MeasureOptions): LimitLevel {
  const cage = levelZero(mesh, positions, new Int32Array(mesh.faces), new Uint8Array(1), options.boundary);
  const level = { ...cage, bodyOf: Int32Array.from(cage.live.keys()) };
  return options.scheme === 'doo-sabin' ? dooSabinCage(level, options.boundary) : level;
}

/** Refines the live elements by the scheme's rule. Loop takes triangles only, and `polyhedral` cannot be refined. */
export function refineLimit(level: LimitLevel, options: MeasureOptions): LimitLevel {
  if ('keepsCorners' in level) {
    const vertices = level.level === 0 ? verticesOfLive(level) : level.live;
    return refineDooSabin(level, vertices, vertices);
  }
  return options.scheme === 'loop' ? refineTriangles(level, options) : refineAround(level, options);
}

function verticesOfLive(level: LimitLevel): Uint8Array {
  const marks = new Uint8Array(level.vertices);
  for (let h = 0; h < level.vertexOf.length; h++) if (level.live[level.faceOf[h]] === 1) marks[level.vertexOf[h]] = 1;
  return marks;
}

/** A box (min x, y, z, max x, y, z) per element that holds its limit surface, by the hull of the points around it; of use for live elements only. */
export function elementHulls(level: LimitLevel, options: MeasureOptions): Float64Array {
  if (options.scheme !== 'doo-sabin' || level.level === 0) return faceHulls(level, level.positions, options.scheme !== 'polyhedral');
  const faces = faceHulls(level, level.positions, false);
  const around = emptyBoxes(level.vertices);
  for (let h = 0; h < level.vertexOf.length; h++) growBox(around, 6 * level.vertexOf[h], faces, 6 * level.faceOf[h]);
  return around;
}

/**
 * The live elements' limit surface as triangles between limit points; neighbours share their points exactly. Faces of the scheme `polyhedral`
 * (and of a level 0) are fans from their vertex mean, as they are measured.
 */
export function limitTriangles(level: LimitLevel, options: MeasureOptions): FaceTriangles {
  if (level.level === 0) return cageTriangles(level, level.positions, level.live);
  if (options.scheme === 'doo-sabin') return dualTriangles(level);
  const limits = options.scheme === 'loop' ? limitPoints(level, loopSmoothLimit) : limitPoints(level);
  const triangles = new TriangleList();
  for (let face = 0; face < level.faces; face++) {
    if (level.live[face] === 0) continue;
    const at = level.starts[face];
    for (let h = at + 2; h < level.starts[face + 1]; h++) triangles.add(limits, level.vertexOf[at], level.vertexOf[h - 1], level.vertexOf[h], level.bodyOf[face]);
  }
  return triangles.finish(level.vertices);
}

/**
 * Doo-Sabin: the patch of a vertex as a fan about its limit point. It reaches to the centroids of the faces around, which are limit points, and on a border
 * to the middles of the border's edges [Doo & Sabin 1978].
 */
function dualTriangles(level: LimitLevel): FaceTriangles {
  const { faces, vertices, positions: p } = level;
  const points = new Float64Array(3 * (vertices + faces + level.vertexOf.length));
  points.set(dooSabinLimitPoints(level));
  for (let h = 0; h < level.vertexOf.length; h++) {
    const face = level.faceOf[h];
    const corners = level.starts[face + 1] - level.starts[face];
    const next = level.vertexOf[nextHalfEdge(level, h)];
    for (let axis = 0; axis < 3; axis++) {
      points[3 * (vertices + face) + axis] += p[3 * level.vertexOf[h] + axis] / corners;
      points[3 * (vertices + faces + h) + axis] = (p[3 * level.vertexOf[h] + axis] + p[3 * next + axis]) / 2;
    }
  }
  const triangles = new TriangleList();
  const ring: number[] = [];
  const seen = new Uint8Array(vertices);
  for (let h = 0; h < level.vertexOf.length; h++) {
    const vertex = level.vertexOf[h];
    if (level.live[vertex] === 0 || seen[vertex] === 1) continue;
    seen[vertex] = 1;
    const closed = collectRing(level, h, ring);
    const around = ring.map((corner) => vertices + level.faceOf[corner]);
    if (closed) around.push(around[0]);
    else {
      around.unshift(vertices + faces + ring[0]);
      around.push(vertices + faces + previousHalfEdge(level, ring[ring.length - 1]));
    }
    for (let i = 1; i < around.length; i++) triangles.add(points, vertex, around[i - 1], around[i], level.bodyOf[vertex]);
  }
  return triangles.finish(points.length / 3);
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

/** Gathers triangles in arrays that double when they are full. */
class TriangleList {
  private points = new Float64Array(9 * 1024);
  private corners = new Int32Array(3 * 1024);
  private faces = new Int32Array(1024);
  private count = 0;

  add(p: Float64Array, a: number, b: number, c: number, face: number): void {
    const t = this.count++;
    if (t === this.faces.length) this.grow();
    const { points, corners } = this;
    for (let axis = 0; axis < 3; axis++) {
      points[9 * t + axis] = p[3 * a + axis];
      points[9 * t + 3 + axis] = p[3 * b + axis];
      points[9 * t + 6 + axis] = p[3 * c + axis];
    }
    corners[3 * t] = a;
    corners[3 * t + 1] = b;
    corners[3 * t + 2] = c;
    this.faces[t] = face;
  }

  private grow(): void {
    const doubled = <T extends Float64Array | Int32Array>(from: T, to: T): T => {
      to.set(from);
      return to;
    };
    this.points = doubled(this.points, new Float64Array(2 * this.points.length));
    this.corners = doubled(this.corners, new Int32Array(2 * this.corners.length));
    this.faces = doubled(this.faces, new Int32Array(2 * this.faces.length));
  }

  finish(vertices: number): FaceTriangles {
    const { count } = this;
    return { points: this.points.slice(0, 9 * count), vertexOf: this.corners.slice(0, 3 * count), vertices, faceOf: this.faces.slice(0, count) };
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
