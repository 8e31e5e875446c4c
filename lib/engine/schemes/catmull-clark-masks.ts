import type { CreasingRule } from '../cage';
import { nextHalfEdge, previousHalfEdge } from '../mesh/topology';
import type { LevelMesh } from './level-mesh';
import type { RefinementRules } from './refinement-rules';
import { childEdgeSharpness, type SemiSharpAround } from './sharpness-decay';
import { blendVertexRules } from './vertex-rules';

/** Weight of each triangle beside an edge in the first step of the triangle rule "smooth"; quads have ¼. */
const SMOOTH_TRIANGLE_WEIGHT = 0.47;

/** Mean of a face's vertices, to `out`. */
export function facePoint(mesh: LevelMesh, face: number, out: Float64Array): void {
  const start = mesh.starts[face];
  const n = mesh.starts[face + 1] - start;
  for (let axis = 0; axis < 3; axis++) {
    let sum = 0;
    for (let h = start; h < start + n; h++) sum += mesh.positions[3 * mesh.vertexOf[h] + axis];
    out[axis] = sum / n;
  }
}

const faceA = new Float64Array(3);
const faceB = new Float64Array(3);

/**
 * Edge point: the midpoint where the edge stays sharp, the mean of ends and face points where it is smooth, and s · midpoint + (1 − s) · smooth
 * for a sharpness 0 < s < 1. Under Chaikin creasing an edge below 1 stays sharp where both its children are.
 */
export function edgePoint(mesh: LevelMesh, h: number, rules: RefinementRules, semiSharp: SemiSharpAround, out: Float64Array): void {
  const from = mesh.vertexOf[h];
  const to = mesh.vertexOf[nextHalfEdge(mesh, h)];
  const twin = mesh.twin[h];
  const sharpness = twin < 0 ? Infinity : mesh.edgeSharpness[h];
  const staysSharp = sharpness >= 1 || (sharpness > 0 && childEdgeSharpness(rules.creasing, sharpness, from, semiSharp) > 0
    && childEdgeSharpness(rules.creasing, sharpness, to, semiSharp) > 0);
  const crease = staysSharp ? 1 : sharpness;
  let faceWeight = 0.25;
  if (crease < 1) {
    facePoint(mesh, mesh.faceOf[h], faceA);
    facePoint(mesh, mesh.faceOf[twin], faceB);
    if (rules.triangles === 'smooth' && mesh.level === 0) faceWeight = (triangleWeight(mesh, h) + triangleWeight(mesh, twin)) / 2;
  }
  for (let axis = 0; axis < 3; axis++) {
    const a = mesh.positions[3 * from + axis];
    const b = mesh.positions[3 * to + axis];
    const middle = (a + b) / 2;
    if (crease >= 1) out[axis] = middle;
    else {
      const smooth = (0.5 - faceWeight) * (a + b) + faceWeight * (faceA[axis] + faceB[axis]);
      out[axis] = crease * middle + (1 - crease) * smooth;
    }
  }
}

function triangleWeight(mesh: LevelMesh, h: number): number {
  const face = mesh.faceOf[h];
  return mesh.starts[face + 1] - mesh.starts[face] === 3 ? SMOOTH_TRIANGLE_WEIGHT : 0.25;
}

/** What the vertex rules need of each vertex's ring, gathered in one pass over the corners there. */
export class VertexStars {
  readonly faces: Int32Array;
  /** Sums of x, y, z over the far ends of the edges, over the face points, and over the far ends of edges sharp before and after the step. */
  readonly edgeSums: Float64Array;
  readonly faceSums: Float64Array;
  readonly sharpSums: Float64Array;
  readonly childSharpSums: Float64Array;
  readonly edges: Int32Array;
  readonly sharp: Int32Array;
  readonly childSharp: Int32Array;
  /** Number and sum of the edge sharpnesses that decay to 0 in this step. */
  readonly endings: Int32Array;
  readonly endingSums: Float64Array;

  constructor(private readonly mesh: LevelMesh, private readonly creasing: CreasingRule, corners: Int32Array, count: number, private readonly semiSharp: SemiSharpAround) {
    const n = mesh.vertices;
    this.faces = new Int32Array(n);
    this.edges = new Int32Array(n);
    this.sharp = new Int32Array(n);
    this.childSharp = new Int32Array(n);
    this.endings = new Int32Array(n);
    this.endingSums = new Float64Array(n);
    this.edgeSums = new Float64Array(3 * n);
    this.faceSums = new Float64Array(3 * n);
    this.sharpSums = new Float64Array(3 * n);
    this.childSharpSums = new Float64Array(3 * n);
    for (let i = 0; i < count; i++) this.addCorner(corners[i]);
  }

  private addCorner(c: number): void {
    const mesh = this.mesh;
    const vertex = mesh.vertexOf[c];
    this.faces[vertex]++;
    facePoint(mesh, mesh.faceOf[c], faceA);
    for (let axis = 0; axis < 3; axis++) this.faceSums[3 * vertex + axis] += faceA[axis];
    this.addEdge(vertex, mesh.vertexOf[nextHalfEdge(mesh, c)], mesh.twin[c] < 0 ? Infinity : mesh.edgeSharpness[c]);
    const before = previousHalfEdge(mesh, c);
    if (mesh.twin[before] < 0) this.addEdge(vertex, mesh.vertexOf[before], Infinity);
  }

  private addEdge(vertex: number, far: number, sharpness: number): void {
    const { positions } = this.mesh;
    const child = childEdgeSharpness(this.creasing, sharpness, vertex, this.semiSharp);
    this.edges[vertex]++;
    if (sharpness > 0) this.sharp[vertex]++;
    if (child > 0) this.childSharp[vertex]++;
    else if (sharpness > 0) {
      this.endings[vertex]++;
      this.endingSums[vertex] += sharpness;
    }
    for (let axis = 0; axis < 3; axis++) {
      const value = positions[3 * far + axis];
      this.edgeSums[3 * vertex + axis] += value;
      if (sharpness > 0) this.sharpSums[3 * vertex + axis] += value;
      if (child > 0) this.childSharpSums[3 * vertex + axis] += value;
    }
  }
}

/** Vertex point of Catmull-Clark, to `out`. */
export function vertexPoint(mesh: LevelMesh, vertex: number, stars: VertexStars, out: Float64Array): void {
  const n = stars.faces[vertex];
  const smooth = (axis: number): number =>
    ((n - 2) / n) * mesh.positions[3 * vertex + axis] + (stars.edgeSums[3 * vertex + axis] + stars.faceSums[3 * vertex + axis]) / (n * n);
  for (let axis = 0; axis < 3; axis++) out[axis] = blendVertexRules(mesh, vertex, stars, axis, smooth);
}
