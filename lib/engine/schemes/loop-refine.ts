import { nextHalfEdge, previousHalfEdge } from '../mesh/topology';
import { VertexStars } from './catmull-clark-masks';
import { cutOut } from './cut-out';
import { levelMesh, type LevelMesh } from './level-mesh';
import { loopWeight } from './loop-fan';
import type { RefinementRules } from './refinement-rules';
import { childEdgeSharpness, countSemiSharp, decayed, type SemiSharpAround } from './sharpness-decay';
import { blendVertexRules } from './vertex-rules';
import { wantedVertices } from './wanted-vertices';

/**
 * Refines the live triangles and what shares a vertex with them by Loop's rule. A parent with corners v0, v1, v2 and edge points m0, m1, m2 has the corner
 * children (v_i, m_i, m_{i−1}) and the middle one (m0, m1, m2); of neighbours only the children at the live triangles' vertices and edges are kept.
 */
export function refineTriangles(whole: LevelMesh, rules: RefinementRules): LevelMesh {
  const { mesh, wanted } = cutOut(whole, wantedVertices(whole, rules));
  const cornerChild = new Int32Array(mesh.vertexOf.length).fill(-1);
  const middleChild = new Int32Array(mesh.faces).fill(-1);
  const corners = new Int32Array(mesh.vertexOf.length);
  let cornerCount = 0;
  let children = 0;
  for (let face = 0; face < mesh.faces; face++) {
    let kept = 0;
    for (let h = mesh.starts[face]; h < mesh.starts[face + 1]; h++) {
      if (wanted[mesh.vertexOf[h]] === 0) continue;
      corners[cornerCount++] = h;
      cornerChild[h] = children++;
      kept++;
    }
    if (kept > 1) middleChild[face] = children++;
  }
  const semiSharp = countSemiSharp(mesh, corners, cornerCount);
  const stars = new VertexStars(mesh, rules.creasing, corners, cornerCount, semiSharp, null);
  const points = new TrianglePoints(mesh, rules, stars, semiSharp, children);
  const fine: Omit<LevelMesh, 'positions' | 'vertexSharpness' | 'vertices'> = {
    faces: children, starts: new Int32Array(children + 1).map((_, i) => 3 * i), vertexOf: new Int32Array(3 * children),
    faceOf: new Int32Array(3 * children).map((_, h) => Math.floor(h / 3)), twin: new Int32Array(3 * children).fill(-1),
    edgeSharpness: new Float32Array(3 * children), bodyOf: new Int32Array(children), live: new Uint8Array(children), level: mesh.level + 1,
    borderOf: new Int32Array(3 * children).fill(-1), borderFrom: new Float32Array(3 * children),
  };
  const half = 2 ** (-mesh.level - 1);
  const cornerSide = (h: number, side: number): number => (h < 0 || cornerChild[h] < 0 ? -1 : 3 * cornerChild[h] + side);
  for (let face = 0; face < mesh.faces; face++) {
    const middle = middleChild[face];
    if (mesh.starts[face + 1] - mesh.starts[face] !== 3) continue;
    for (let i = 0; i < 3; i++) {
      const h = mesh.starts[face] + i;
      const before = previousHalfEdge(mesh, h);
      if (middle >= 0) {
        // Side i of the middle child runs from m_i to m_{i+1}, along the corner child at v_{i+1}.
        fine.vertexOf[3 * middle + i] = points.ofEdge(h);
        fine.twin[3 * middle + i] = cornerSide(nextHalfEdge(mesh, h), 1);
      }
      const child = cornerChild[h];
      if (child < 0) continue;
      const at = 3 * child;
      const vertex = mesh.vertexOf[h];
      fine.vertexOf[at] = points.ofVertex(vertex);
      fine.vertexOf[at + 1] = points.ofEdge(h);
      fine.vertexOf[at + 2] = points.ofEdge(before);
      fine.twin[at] = mesh.twin[h] < 0 ? -1 : cornerSide(nextHalfEdge(mesh, mesh.twin[h]), 2);
      fine.twin[at + 1] = middle < 0 ? -1 : 3 * middle + (before - mesh.starts[face]);
      fine.twin[at + 2] = cornerSide(mesh.twin[before], 0);
      fine.edgeSharpness[at] = childEdgeSharpness(rules.creasing, mesh.edgeSharpness[h], vertex, semiSharp);
      fine.edgeSharpness[at + 2] = childEdgeSharpness(rules.creasing, mesh.edgeSharpness[before], vertex, semiSharp);
      fine.borderOf[at] = mesh.borderOf[h];
      fine.borderOf[at + 2] = mesh.borderOf[before];
      fine.borderFrom[at] = mesh.borderFrom[h];
      fine.borderFrom[at + 2] = mesh.borderFrom[before] + half;
      fine.bodyOf[child] = mesh.bodyOf[face];
      fine.live[child] = mesh.live[face];
    }
    if (middle >= 0) {
      fine.bodyOf[middle] = mesh.bodyOf[face];
      fine.live[middle] = mesh.live[face];
    }
  }
  return levelMesh({ ...fine, ...points.finish() });
}

/** Hands out the child points, each computed on first use. */
class TrianglePoints {
  private readonly vertexIds: Int32Array;
  private readonly edgeIds: Int32Array;
  private readonly positions: Float64Array;
  private readonly sharpness: Float32Array;
  private count = 0;

  constructor(
    private readonly mesh: LevelMesh, private readonly rules: RefinementRules, private readonly stars: VertexStars, private readonly semiSharp: SemiSharpAround, children: number,
  ) {
    this.vertexIds = new Int32Array(mesh.vertices).fill(-1);
    this.edgeIds = new Int32Array(mesh.vertexOf.length).fill(-1);
    const most = Math.min(3 * children, mesh.vertices + mesh.vertexOf.length);
    this.positions = new Float64Array(3 * most);
    this.sharpness = new Float32Array(most);
  }

  ofVertex(vertex: number): number {
    if (this.vertexIds[vertex] >= 0) return this.vertexIds[vertex];
    const id = (this.vertexIds[vertex] = this.count++);
    const { mesh, stars } = this;
    const n = stars.edges[vertex];
    const weight = loopWeight(n);
    const smooth = (axis: number): number => (1 - n * weight) * mesh.positions[3 * vertex + axis] + weight * stars.edgeSums[3 * vertex + axis];
    const plain = mesh.vertexSharpness[vertex] === 0 && stars.sharp[vertex] < 2;
    for (let axis = 0; axis < 3; axis++) this.positions[3 * id + axis] = plain ? smooth(axis) : blendVertexRules(mesh, vertex, stars, axis, smooth);
    this.sharpness[id] = decayed(mesh.vertexSharpness[vertex]);
    return id;
  }

  /** Edge point: the midpoint where sharp, (3a + 3b + c + d)/8 where smooth, mixed by a sharpness below 1. */
  ofEdge(h: number): number {
    if (this.edgeIds[h] >= 0) return this.edgeIds[h];
    const id = (this.edgeIds[h] = this.count++);
    const { mesh, rules, semiSharp } = this;
    const from = mesh.vertexOf[h];
    const to = mesh.vertexOf[nextHalfEdge(mesh, h)];
    const twin = mesh.twin[h];
    const sharpness = twin < 0 ? Infinity : mesh.edgeSharpness[h];
    const staysSharp = sharpness >= 1 || (sharpness > 0 && childEdgeSharpness(rules.creasing, sharpness, from, semiSharp) > 0
      && childEdgeSharpness(rules.creasing, sharpness, to, semiSharp) > 0);
    const crease = staysSharp ? 1 : sharpness;
    const c = crease >= 1 ? from : mesh.vertexOf[previousHalfEdge(mesh, h)];
    const d = crease >= 1 ? from : mesh.vertexOf[previousHalfEdge(mesh, twin)];
    for (let axis = 0; axis < 3; axis++) {
      const ends = mesh.positions[3 * from + axis] + mesh.positions[3 * to + axis];
      const smooth = (3 * ends + mesh.positions[3 * c + axis] + mesh.positions[3 * d + axis]) / 8;
      this.positions[3 * id + axis] = crease >= 1 ? ends / 2 : crease === 0 ? smooth : (crease * ends) / 2 + (1 - crease) * smooth;
    }
    if (twin >= 0) this.edgeIds[twin] = id;
    return id;
  }

  finish(): { positions: Float64Array; vertexSharpness: Float32Array; vertices: number } {
    return { positions: this.positions.subarray(0, 3 * this.count), vertexSharpness: this.sharpness.subarray(0, this.count), vertices: this.count };
  }
}
