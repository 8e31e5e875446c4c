import { nextHalfEdge, previousHalfEdge, type Topology } from '../mesh/topology';
import { gaussRule } from '../patches/gauss-rule';
import { Corners } from './corners';
import { addMitre, mitreTangent } from './mitre';
import { emptyShells, type ShellBody } from './shell-sums';
import { addShellNode, JET } from './shell-terms';

/** Exact along a straight edge: second moments are quadratic there. */
const NODES = 2;

const jet = new Float64Array(JET);

/** Shells of a cage's own faces, polygons as triangles about their vertex mean: flat, so that curvature sits in edges (mitred) and corners (estimated) alone. */
export function integratePolyhedralShells(mesh: Topology, positions: Float64Array, bodyOf: Int32Array, origins: Float64Array, bodies: number): ShellBody[] {
  const shells = emptyShells(bodies);
  const means = faceMeans(mesh, positions);
  const normals = new Float64Array(3 * mesh.vertexOf.length);
  const point = (vertex: number): Float64Array => (vertex < mesh.vertices ? positions.subarray(3 * vertex, 3 * vertex + 3) : means.subarray(3 * (vertex - mesh.vertices), 3 * (vertex - mesh.vertices) + 3));
  for (let h = 0; h < mesh.vertexOf.length; h++) addTriangle(mesh, h, point, bodyOf, origins, normals, shells);
  const corners = new Corners(mesh.vertices + mesh.faces);
  const normal = (h: number): Float64Array => normals.subarray(3 * h, 3 * h + 3);
  const edges = (take: (h: number, other: number, from: number, to: number) => void): void => {
    for (let h = 0; h < mesh.vertexOf.length; h++) {
      const next = nextHalfEdge(mesh, h);
      const twin = mesh.twin[h];
      const to = mesh.vertexOf[next];
      if (twin > h) take(h, twin, mesh.vertexOf[h], to);
      // The spoke back from the triangle's second corner to the mean.
      if (!isTriangle(mesh, mesh.faceOf[h])) take(h, next, to, mesh.vertices + mesh.faceOf[h]);
    }
  };
  edges((h, other, from, to) => {
    corners.count(from, normal(h), normal(other));
    corners.count(to, normal(h), normal(other));
  });
  edges((h, other, from, to) => {
    const sides = [[h, bodyOf[mesh.faceOf[h]]], [other, bodyOf[mesh.faceOf[other]]]];
    const p = point(from), q = point(to);
    const span = [q[0] - p[0], q[1] - p[1], q[2] - p[2]];
    const length = Math.hypot(span[0], span[1], span[2]);
    if (!(length > 0)) return;
    const along = span.map((value) => value / length);
    const back = along.map((value) => -value);
    const tangent = mitreTangent({ tangent: along, own: normal(h), across: normal(other) });
    const [own, across] = sides.map(([, body]) => shells[body]);
    corners.estimate(to, tangent ?? 0, along, own, across);
    corners.estimate(from, tangent ?? 0, back, own, across);
    if (tangent === 0) return;
    const { nodes, weights } = gaussRule(NODES);
    sides.forEach(([side, body], s) => {
      for (let i = 0; i < NODES; i++) {
        const place = [0, 1, 2].map((axis) => p[axis] + (0.5 + nodes[i]) * span[axis] - origins[3 * body + axis]);
        addMitre({ point: place, tangent: s === 0 ? along : back, curvature: STRAIGHT, own: normal(side), across: normal(sides[1 - s][0]), bend: 0 }, weights[i] * length, shells[body]);
      }
    });
  });
  return shells;
}

const STRAIGHT = [0, 0, 0];

function isTriangle(mesh: Topology, face: number): boolean {
  return mesh.starts[face + 1] - mesh.starts[face] === 3;
}

function faceMeans(mesh: Topology, positions: Float64Array): Float64Array {
  const means = new Float64Array(3 * mesh.faces);
  for (let h = 0; h < mesh.vertexOf.length; h++) {
    const face = mesh.faceOf[h];
    for (let axis = 0; axis < 3; axis++) means[3 * face + axis] += positions[3 * mesh.vertexOf[h] + axis] / (mesh.starts[face + 1] - mesh.starts[face]);
  }
  return means;
}

/** The triangle that half-edge h stands for: with the face's mean, or the whole of a triangle, which is added once. Sets the normal of h. */
function addTriangle(
  mesh: Topology, h: number, point: (vertex: number) => Float64Array, bodyOf: Int32Array, origins: Float64Array, normals: Float64Array, shells: ShellBody[],
): void {
  const face = mesh.faceOf[h];
  const whole = isTriangle(mesh, face);
  const apex = point(whole ? mesh.vertexOf[previousHalfEdge(mesh, h)] : mesh.vertices + face);
  const a = point(mesh.vertexOf[h]), b = point(mesh.vertexOf[nextHalfEdge(mesh, h)]);
  const body = bodyOf[face];
  for (let axis = 0; axis < 3; axis++) {
    jet[axis] = (apex[axis] + a[axis] + b[axis]) / 3 - origins[3 * body + axis];
    jet[3 + axis] = a[axis] - apex[axis];
    jet[6 + axis] = b[axis] - apex[axis];
  }
  const n = [jet[4] * jet[8] - jet[5] * jet[7], jet[5] * jet[6] - jet[3] * jet[8], jet[3] * jet[7] - jet[4] * jet[6]];
  const length = Math.hypot(n[0], n[1], n[2]);
  for (let axis = 0; axis < 3; axis++) normals[3 * h + axis] = length > 0 ? n[axis] / length : 0;
  // Linear in X, so the centroid alone is exact.
  if (!whole || h === mesh.starts[face]) addShellNode(jet, 0.5, shells[body].terms, shells[body].peak);
}
