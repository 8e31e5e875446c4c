import type { CreasingRule } from '../cage';
import { nextHalfEdge } from '../mesh/topology';
import type { LevelMesh } from './level-mesh';
import type { RefinementRules } from './refinement-rules';
import { childEdgeSharpness, type SemiSharpAround } from './sharpness-decay';
import { blendVertexRules } from './vertex-rules';

/** Weight of each triangle beside an edge in the first step of the triangle rule "smooth"; quads have ¼. */
const SMOOTH_TRIANGLE_WEIGHT = 0.47;

/** Face points of the faces with one of the corners, x, y, z per face. */
export function facePoints(mesh: LevelMesh, corners: Int32Array, count: number): Float64Array {
  const { starts, vertexOf, faceOf, positions } = mesh;
  const points = new Float64Array(3 * mesh.faces);
  let last = -1;
  for (let i = 0; i < count; i++) {
    const face = faceOf[corners[i]];
    // Corners come face by face.
    if (face === last) continue;
    last = face;
    let x = 0, y = 0, z = 0;
    const end = starts[face + 1];
    for (let h = starts[face]; h < end; h++) {
      const at = 3 * vertexOf[h];
      x += positions[at];
      y += positions[at + 1];
      z += positions[at + 2];
    }
    const n = end - starts[face];
    points[3 * face] = x / n;
    points[3 * face + 1] = y / n;
    points[3 * face + 2] = z / n;
  }
  return points;
}

/**
 * Edge point, to `out[at]`: the midpoint where the edge stays sharp, the mean of ends and face points where it is smooth, and s · midpoint + (1 − s) · smooth
 * for a sharpness 0 < s < 1. Under Chaikin creasing an edge below 1 stays sharp where both its children are.
 */
export function edgePoint(
  mesh: LevelMesh, h: number, rules: RefinementRules, semiSharp: SemiSharpAround, faces: Float64Array, out: Float64Array, at: number,
): void {
  const { positions } = mesh;
  const from = mesh.vertexOf[h];
  const to = mesh.vertexOf[nextHalfEdge(mesh, h)];
  const twin = mesh.twin[h];
  const sharpness = twin < 0 ? Infinity : mesh.edgeSharpness[h];
  const staysSharp = sharpness >= 1 || (sharpness > 0 && childEdgeSharpness(rules.creasing, sharpness, from, semiSharp) > 0
    && childEdgeSharpness(rules.creasing, sharpness, to, semiSharp) > 0);
  const crease = staysSharp ? 1 : sharpness;
  if (crease >= 1) {
    for (let axis = 0; axis < 3; axis++) out[at + axis] = (positions[3 * from + axis] + positions[3 * to + axis]) / 2;
    return;
  }
  const faceWeight = rules.triangles === 'smooth' && mesh.level === 0 ? (triangleWeight(mesh, h) + triangleWeight(mesh, twin)) / 2 : 0.25;
  const faceA = 3 * mesh.faceOf[h];
  const faceB = 3 * mesh.faceOf[twin];
  for (let axis = 0; axis < 3; axis++) {
    const ends = positions[3 * from + axis] + positions[3 * to + axis];
    const smooth = (0.5 - faceWeight) * ends + faceWeight * (faces[faceA + axis] + faces[faceB + axis]);
    out[at + axis] = crease === 0 ? smooth : (crease * ends) / 2 + (1 - crease) * smooth;
  }
}

function triangleWeight(mesh: LevelMesh, h: number): number {
  const face = mesh.faceOf[h];
  return mesh.starts[face + 1] - mesh.starts[face] === 3 ? SMOOTH_TRIANGLE_WEIGHT : 0.25;
}

/** What the vertex rules need of each vertex's ring, gathered in one pass over the corners there. */
export class VertexStars {
  readonly faces: Int32Array;
  /** Sums of x, y, z over the far ends of the edges and over the face points; the latter only where `facePoints` are given. */
  readonly edgeSums: Float64Array;
  readonly faceSums: Float64Array;
  /** The same over the far ends of edges sharp before and after the step. */
  readonly sharpSums: Float64Array;
  readonly childSharpSums: Float64Array;
  readonly edges: Int32Array;
  readonly sharp: Int32Array;
  readonly childSharp: Int32Array;
  /** Number and sum of the edge sharpnesses that decay to 0 in this step. */
  readonly endings: Int32Array;
  readonly endingSums: Float64Array;

  constructor(
    private readonly mesh: LevelMesh, private readonly creasing: CreasingRule, corners: Int32Array, count: number, private readonly semiSharp: SemiSharpAround,
    private readonly facePoints: Float64Array | null,
  ) {
    const n = mesh.vertices;
    this.faces = new Int32Array(n);
    this.edges = new Int32Array(n);
    this.sharp = new Int32Array(n);
    this.childSharp = new Int32Array(n);
    this.endings = new Int32Array(n);
    this.endingSums = new Float64Array(n);
    this.edgeSums = new Float64Array(3 * n);
    this.faceSums = new Float64Array(facePoints === null ? 0 : 3 * n);
    this.sharpSums = new Float64Array(3 * n);
    this.childSharpSums = new Float64Array(3 * n);
    for (let i = 0; i < count; i++) this.addCorner(corners[i]);
  }

  private addCorner(c: number): void {
    const { mesh, facePoints, faceSums } = this;
    const vertex = mesh.vertexOf[c];
    const face = mesh.faceOf[c];
    const start = mesh.starts[face];
    const end = mesh.starts[face + 1];
    this.faces[vertex]++;
    if (facePoints !== null) {
      faceSums[3 * vertex] += facePoints[3 * face];
      faceSums[3 * vertex + 1] += facePoints[3 * face + 1];
      faceSums[3 * vertex + 2] += facePoints[3 * face + 2];
    }
    this.addEdge(vertex, mesh.vertexOf[c + 1 === end ? start : c + 1], mesh.twin[c] < 0 ? Infinity : mesh.edgeSharpness[c]);
    const before = c === start ? end - 1 : c - 1;
    if (mesh.twin[before] < 0) this.addEdge(vertex, mesh.vertexOf[before], Infinity);
  }

  private addEdge(vertex: number, far: number, sharpness: number): void {
    const { positions } = this.mesh;
    const { edgeSums } = this;
    this.edges[vertex]++;
    edgeSums[3 * vertex] += positions[3 * far];
    edgeSums[3 * vertex + 1] += positions[3 * far + 1];
    edgeSums[3 * vertex + 2] += positions[3 * far + 2];
    if (sharpness > 0) this.addSharpEdge(vertex, far, sharpness);
  }

  private addSharpEdge(vertex: number, far: number, sharpness: number): void {
    const { positions } = this.mesh;
    const child = childEdgeSharpness(this.creasing, sharpness, vertex, this.semiSharp);
    this.sharp[vertex]++;
    if (child > 0) this.childSharp[vertex]++;
    else {
      this.endings[vertex]++;
      this.endingSums[vertex] += sharpness;
    }
    for (let axis = 0; axis < 3; axis++) {
      const value = positions[3 * far + axis];
      this.sharpSums[3 * vertex + axis] += value;
      if (child > 0) this.childSharpSums[3 * vertex + axis] += value;
    }
  }
}

/** Vertex point of Catmull-Clark, to `out[at]`. */
export function vertexPoint(mesh: LevelMesh, vertex: number, stars: VertexStars, out: Float64Array, at: number): void {
  const n = stars.faces[vertex];
  const { positions } = mesh;
  const { edgeSums, faceSums } = stars;
  const smooth = (axis: number): number => ((n - 2) / n) * positions[3 * vertex + axis] + (edgeSums[3 * vertex + axis] + faceSums[3 * vertex + axis]) / (n * n);
  if (mesh.vertexSharpness[vertex] === 0 && stars.sharp[vertex] < 2) {
    for (let axis = 0; axis < 3; axis++) out[at + axis] = smooth(axis);
    return;
  }
  for (let axis = 0; axis < 3; axis++) out[at + axis] = blendVertexRules(mesh, vertex, stars, axis, smooth);
}
