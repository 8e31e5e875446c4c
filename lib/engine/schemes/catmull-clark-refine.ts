import { nextHalfEdge } from '../mesh/topology';
import { edgePoint, facePoints, vertexPoint, VertexStars } from './catmull-clark-masks';
import { cutOut } from './cut-out';
import { levelMesh, type LevelMesh } from './level-mesh';
import type { RefinementRules } from './refinement-rules';
import { childEdgeSharpness, countSemiSharp, decayed } from './sharpness-decay';
import { wantedVertices } from './wanted-vertices';

/**
 * Refines the live faces and what shares a vertex with them. Of the neighbours only the child quads at the live faces' vertices are kept,
 * so every vertex of a live child has its whole ring. Children of corner c of a face are (vertex, edge, face, edge before), counter-clockwise.
 */
export function refineAround(whole: LevelMesh, rules: RefinementRules): LevelMesh {
  const { mesh, wanted } = cutOut(whole, wantedVertices(whole, rules));
  // The corners at wanted vertices: each becomes a child quad.
  const childOf = new Int32Array(mesh.vertexOf.length).fill(-1);
  const corners = new Int32Array(mesh.vertexOf.length);
  let children = 0;
  for (let h = 0; h < mesh.vertexOf.length; h++) {
    if (wanted[mesh.vertexOf[h]] === 0) continue;
    corners[children] = h;
    childOf[h] = children++;
  }
  const semiSharp = countSemiSharp(mesh, corners, children);
  const points = new ChildPoints(mesh, rules, corners, children, semiSharp);

  const starts = new Int32Array(children + 1);
  const vertexOf = new Int32Array(4 * children);
  const faceOf = new Int32Array(4 * children);
  const twin = new Int32Array(4 * children);
  const edgeSharpness = new Float32Array(4 * children);
  const bodyOf = new Int32Array(children);
  const live = new Uint8Array(children);
  const borderOf = new Int32Array(4 * children);
  const borderFrom = new Float32Array(4 * children);
  const half = 2 ** (-mesh.level - 1);
  for (let child = 0; child < children; child++) {
    const c = corners[child];
    const face = mesh.faceOf[c];
    const start = mesh.starts[face];
    const end = mesh.starts[face + 1];
    const p = c === start ? end - 1 : c - 1;
    const next = c + 1 === end ? start : c + 1;
    const at = 4 * child;
    starts[child + 1] = at + 4;
    faceOf[at] = faceOf[at + 1] = faceOf[at + 2] = faceOf[at + 3] = child;
    bodyOf[child] = mesh.bodyOf[face];
    live[child] = mesh.live[face];
    vertexOf[at] = points.ofVertex(mesh.vertexOf[c]);
    vertexOf[at + 1] = points.ofEdge(c);
    vertexOf[at + 2] = points.ofFace(face);
    vertexOf[at + 3] = points.ofEdge(p);
    // A child's half-edges follow from its corner: side 0 lies across from side 3 of the child after the corner's twin, side 1 from side 2 of the next child.
    const acrossEdge = mesh.twin[c] < 0 ? -1 : childOf[nextHalfEdge(mesh, mesh.twin[c])];
    const acrossBefore = mesh.twin[p] < 0 ? -1 : childOf[mesh.twin[p]];
    const after = childOf[next];
    const before = childOf[p];
    twin[at] = acrossEdge < 0 ? -1 : 4 * acrossEdge + 3;
    twin[at + 1] = after < 0 ? -1 : 4 * after + 2;
    twin[at + 2] = before < 0 ? -1 : 4 * before + 1;
    twin[at + 3] = acrossBefore < 0 ? -1 : 4 * acrossBefore;
    if (mesh.edgeSharpness[c] > 0) edgeSharpness[at] = childEdgeSharpness(rules.creasing, mesh.edgeSharpness[c], mesh.vertexOf[c], semiSharp);
    if (mesh.edgeSharpness[p] > 0) edgeSharpness[at + 3] = childEdgeSharpness(rules.creasing, mesh.edgeSharpness[p], mesh.vertexOf[c], semiSharp);
    borderOf[at] = mesh.borderOf[c];
    borderOf[at + 1] = borderOf[at + 2] = -1;
    borderOf[at + 3] = mesh.borderOf[p];
    borderFrom[at] = mesh.borderFrom[c];
    borderFrom[at + 3] = mesh.borderFrom[p] + half;
  }
  const { positions, vertexSharpness } = points.finish();
  return levelMesh({
    faces: children, vertices: vertexSharpness.length, starts, vertexOf, faceOf, twin, edgeSharpness, vertexSharpness,
    positions, bodyOf, live, level: mesh.level + 1, borderOf, borderFrom,
  });
}

/** Hands out the child points, each computed on first use. */
class ChildPoints {
  private readonly vertexIds: Int32Array;
  private readonly edgeIds: Int32Array;
  private readonly faceIds: Int32Array;
  private readonly positions: Float64Array;
  private readonly sharpness: Float32Array;
  private readonly stars: VertexStars;
  private readonly facePoints: Float64Array;
  private count = 0;

  constructor(
    private readonly mesh: LevelMesh, private readonly rules: RefinementRules, corners: Int32Array, children: number,
    private readonly semiSharp: ReturnType<typeof countSemiSharp>,
  ) {
    this.vertexIds = new Int32Array(mesh.vertices).fill(-1);
    this.edgeIds = new Int32Array(mesh.vertexOf.length).fill(-1);
    this.faceIds = new Int32Array(mesh.faces).fill(-1);
    this.facePoints = facePoints(mesh, corners, children);
    this.stars = new VertexStars(mesh, rules.creasing, corners, children, semiSharp, this.facePoints);
    const most = Math.min(4 * children, mesh.vertices + mesh.vertexOf.length + mesh.faces);
    this.positions = new Float64Array(3 * most);
    this.sharpness = new Float32Array(most);
  }

  ofVertex(vertex: number): number {
    let id = this.vertexIds[vertex];
    if (id < 0) {
      id = this.vertexIds[vertex] = this.count++;
      vertexPoint(this.mesh, vertex, this.stars, this.positions, 3 * id);
      this.sharpness[id] = decayed(this.mesh.vertexSharpness[vertex]);
    }
    return id;
  }

  ofEdge(h: number): number {
    let id = this.edgeIds[h];
    if (id < 0) {
      id = this.edgeIds[h] = this.count++;
      edgePoint(this.mesh, h, this.rules, this.semiSharp, this.facePoints, this.positions, 3 * id);
      if (this.mesh.twin[h] >= 0) this.edgeIds[this.mesh.twin[h]] = id;
    }
    return id;
  }

  ofFace(face: number): number {
    let id = this.faceIds[face];
    if (id < 0) {
      id = this.faceIds[face] = this.count++;
      for (let axis = 0; axis < 3; axis++) this.positions[3 * id + axis] = this.facePoints[3 * face + axis];
    }
    return id;
  }

  finish(): { positions: Float64Array; vertexSharpness: Float32Array } {
    return { positions: this.positions.subarray(0, 3 * this.count), vertexSharpness: this.sharpness.subarray(0, this.count) };
  }
}
