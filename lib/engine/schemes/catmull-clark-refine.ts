import { nextHalfEdge, previousHalfEdge } from '../mesh/topology';
import { edgePoint, facePoint, vertexPoint, VertexStars } from './catmull-clark-masks';
import type { LevelMesh } from './level-mesh';
import type { RefinementRules } from './refinement-rules';
import { childEdgeSharpness, countSemiSharp, decayed } from './sharpness-decay';
import { wantedVertices } from './wanted-vertices';

/**
 * Refines the live faces and what shares a vertex with them. Of the neighbours only the child quads at the live faces' vertices are kept,
 * so every vertex of a live child has its whole ring. Children of corner c of a face are (vertex, edge, face, edge before), counter-clockwise.
 */
export function refineAround(mesh: LevelMesh, rules: RefinementRules): LevelMesh {
  const wanted = wantedVertices(mesh, rules);
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
  const borderOf = new Int32Array(4 * children).fill(-1);
  const borderFrom = new Float32Array(4 * children);
  const half = 2 ** (-mesh.level - 1);
  const childTwin = (corner: number, side: number): number => (corner < 0 || childOf[corner] < 0 ? -1 : 4 * childOf[corner] + side);
  for (let child = 0; child < children; child++) {
    const c = corners[child];
    const p = previousHalfEdge(mesh, c);
    const face = mesh.faceOf[c];
    const at = 4 * child;
    starts[child + 1] = at + 4;
    faceOf.fill(child, at, at + 4);
    bodyOf[child] = mesh.bodyOf[face];
    live[child] = mesh.live[face];
    vertexOf[at] = points.ofVertex(mesh.vertexOf[c]);
    vertexOf[at + 1] = points.ofEdge(c);
    vertexOf[at + 2] = points.ofFace(face);
    vertexOf[at + 3] = points.ofEdge(p);
    const acrossEdge = mesh.twin[c];
    const acrossBefore = mesh.twin[p];
    twin[at] = acrossEdge < 0 ? -1 : childTwin(nextHalfEdge(mesh, acrossEdge), 3);
    twin[at + 1] = childTwin(nextHalfEdge(mesh, c), 2);
    twin[at + 2] = childTwin(p, 1);
    twin[at + 3] = childTwin(acrossBefore, 0);
    edgeSharpness[at] = childEdgeSharpness(rules.creasing, mesh.edgeSharpness[c], mesh.vertexOf[c], semiSharp);
    edgeSharpness[at + 3] = childEdgeSharpness(rules.creasing, mesh.edgeSharpness[p], mesh.vertexOf[c], semiSharp);
    borderOf[at] = mesh.borderOf[c];
    borderOf[at + 3] = mesh.borderOf[p];
    borderFrom[at] = mesh.borderFrom[c];
    borderFrom[at + 3] = mesh.borderFrom[p] + half;
  }
  const { positions, vertexSharpness } = points.finish();
  return {
    faces: children, vertices: vertexSharpness.length, starts, vertexOf, faceOf, twin, edgeSharpness, vertexSharpness,
    positions, bodyOf, live, level: mesh.level + 1, borderOf, borderFrom,
  };
}

/** Hands out the child points, each computed on first use. */
class ChildPoints {
  private readonly vertexIds: Int32Array;
  private readonly edgeIds: Int32Array;
  private readonly faceIds: Int32Array;
  private readonly positions: number[] = [];
  private readonly sharpness: number[] = [];
  private readonly stars: VertexStars;
  private readonly point = new Float64Array(3);

  constructor(
    private readonly mesh: LevelMesh, private readonly rules: RefinementRules, corners: Int32Array, count: number,
    private readonly semiSharp: ReturnType<typeof countSemiSharp>,
  ) {
    this.vertexIds = new Int32Array(mesh.vertices).fill(-1);
    this.edgeIds = new Int32Array(mesh.vertexOf.length).fill(-1);
    this.faceIds = new Int32Array(mesh.faces).fill(-1);
    this.stars = new VertexStars(mesh, rules.creasing, corners, count, semiSharp);
  }

  private push(sharpness: number): number {
    this.positions.push(this.point[0], this.point[1], this.point[2]);
    this.sharpness.push(sharpness);
    return this.sharpness.length - 1;
  }

  ofVertex(vertex: number): number {
    if (this.vertexIds[vertex] < 0) {
      vertexPoint(this.mesh, vertex, this.stars, this.point);
      this.vertexIds[vertex] = this.push(decayed(this.mesh.vertexSharpness[vertex]));
    }
    return this.vertexIds[vertex];
  }

  ofEdge(h: number): number {
    if (this.edgeIds[h] < 0) {
      edgePoint(this.mesh, h, this.rules, this.semiSharp, this.point);
      const id = this.push(0);
      this.edgeIds[h] = id;
      if (this.mesh.twin[h] >= 0) this.edgeIds[this.mesh.twin[h]] = id;
    }
    return this.edgeIds[h];
  }

  ofFace(face: number): number {
    if (this.faceIds[face] < 0) {
      facePoint(this.mesh, face, this.point);
      this.faceIds[face] = this.push(0);
    }
    return this.faceIds[face];
  }

  finish(): { positions: Float64Array; vertexSharpness: Float32Array } {
    return { positions: Float64Array.from(this.positions), vertexSharpness: Float32Array.from(this.sharpness) };
  }
}
