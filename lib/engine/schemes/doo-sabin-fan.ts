import { fanRule, type FanKit } from './fan-kit';
import type { FanState } from './fan-state';
import type { LevelMesh } from './level-mesh';
import { nextHalfEdge, previousHalfEdge } from '../mesh/topology';

/** Weight of corner i for the new point at corner j of an n-gon, k = i − j [Doo & Sabin 1978]: (n + 5)/(4n) for k = 0, else (3 + 2 cos(2πk/n))/(4n). */
export function dooSabinWeight(n: number, k: number): number {
  return k === 0 ? (n + 5) / (4 * n) : (3 + 2 * Math.cos((2 * Math.PI * k) / n)) / (4 * n);
}

/** Offset of point (a, b), 0 ≤ a, b ≤ 2, of a sector: (0, 0) is the n-gon's corner, (a, −1) and (−1, b) lie in the sectors before and after. */
function pointAt(fan: FanState, sector: number, a: number, b: number): number {
  const n = fan.sectors;
  if (b < 0) return pointAt(fan, sector === 0 ? n - 1 : sector - 1, 0, a);
  if (a < 0) return pointAt(fan, sector + 1 === n ? 0 : sector + 1, b, 0);
  return 27 * sector + 9 * a + 3 * b;
}

/** The four corners of a quad with the one that the new point is nearest to first: 9, 3, 3, 1 sixteenths, the opposite one last. */
function quadPoint(values: Float64Array, near: number, side: number, otherSide: number, far: number): number {
  return (9 * values[near] + 3 * (values[side] + values[otherSide]) + values[far]) / 16;
}

/** One step of refinement [Doo & Sabin 1978]: the points (0, 0) to (1, 1) of each sector of `from` give those up to (2, 2) of `to`. */
function refineDooSabinFan(from: FanState, to: FanState): void {
  const n = from.sectors;
  const weights = Float64Array.from({ length: n }, (_, k) => dooSabinWeight(n, k));
  const v = from.inner;
  for (let axis = 0; axis < 3; axis++) {
    let sum = 0;
    for (let j = 0; j < n; j++) {
      const at = (a: number, b: number): number => pointAt(from, j, a, b) + axis;
      const put = (a: number, b: number, value: number): void => {
        to.inner[27 * j + 9 * a + 3 * b + axis] = value;
      };
      let corner = 0;
      for (let k = 0; k < n; k++) corner += weights[k] * v[27 * ((j + k) % n) + axis];
      put(0, 0, corner);
      put(1, 0, quadPoint(v, at(0, 0), at(1, 0), at(0, -1), at(1, -1)));
      put(2, 0, quadPoint(v, at(1, 0), at(0, 0), at(1, -1), at(0, -1)));
      put(0, 1, quadPoint(v, at(0, 0), at(0, 1), at(-1, 0), at(-1, 1)));
      put(0, 2, quadPoint(v, at(0, 1), at(0, 0), at(-1, 1), at(-1, 0)));
      put(1, 1, quadPoint(v, at(0, 0), at(1, 0), at(0, 1), at(1, 1)));
      put(2, 1, quadPoint(v, at(1, 0), at(0, 0), at(1, 1), at(0, 1)));
      put(1, 2, quadPoint(v, at(0, 1), at(0, 0), at(1, 1), at(1, 0)));
      put(2, 2, quadPoint(v, at(1, 1), at(1, 0), at(0, 1), at(0, 0)));
      sum += corner;
    }
    to.centre[axis] = sum / n;
  }
}

/** The limit point in the middle of an n-gon: its centroid. */
function centroid(fan: FanState): Float64Array {
  const middle = new Float64Array(3);
  for (let j = 0; j < fan.sectors; j++) for (let axis = 0; axis < 3; axis++) middle[axis] += fan.inner[27 * j + axis] / fan.sectors;
  return middle;
}

const small = new Float64Array(27);

/** Cubic B-spline control values of the uniform quadratic segment with the values q: its blossom at the cubic knots. */
const QUADRATIC_TO_CUBIC: readonly (readonly [number, number, number])[] = [
  [11 / 6, -7 / 6, 1 / 3],
  [1 / 3, 5 / 6, -1 / 6],
  [-1 / 6, 5 / 6, 1 / 3],
  [1 / 3, -7 / 6, 11 / 6],
];

/** Raises a 3 × 3 biquadratic B-spline net [(3 row + column) · 3 + axis] to the 4 × 4 bicubic net of the same patch, so that one kernel serves both. */
export function raiseNet(quadratic: Float64Array, net: Float64Array): void {
  for (let row = 0; row < 4; row++) {
    for (let column = 0; column < 4; column++) {
      for (let axis = 0; axis < 3; axis++) {
        let sum = 0;
        for (let i = 0; i < 3; i++) {
          const factor = QUADRATIC_TO_CUBIC[row][i];
          for (let j = 0; j < 3; j++) sum += factor * QUADRATIC_TO_CUBIC[column][j] * quadratic[3 * (3 * i + j) + axis];
        }
        net[3 * (4 * row + column) + axis] = sum;
      }
    }
  }
}

/** Patches of the refined points (1, 0), (1, 1) and (0, 1) of a sector, as biquadratics. */
function fillPoints(fan: FanState, sector: number, child: number, net: Float64Array): void {
  const a0 = child === 2 ? -1 : 0;
  const b0 = child === 0 ? -1 : 0;
  for (let row = 0; row < 3; row++) {
    for (let column = 0; column < 3; column++) {
      const at = pointAt(fan, sector, a0 + row, b0 + column);
      net.set(fan.inner.subarray(at, at + 3), 3 * (3 * row + column));
    }
  }
}

/** The same patches as bicubics. */
function fillChild(fan: FanState, sector: number, child: number, net: Float64Array): void {
  fillPoints(fan, sector, child, small);
  raiseNet(small, net);
}

/** Reads the n-gon whose half-edges are `corners` and the quads around it. */
function readFan(mesh: LevelMesh, corners: readonly number[], fan: FanState): void {
  const put = (j: number, a: number, b: number, vertex: number): void => fan.inner.set(mesh.positions.subarray(3 * vertex, 3 * vertex + 3), 27 * j + 9 * a + 3 * b);
  for (let j = 0; j < corners.length; j++) {
    const h = corners[j];
    const leaving = previousHalfEdge(mesh, mesh.twin[previousHalfEdge(mesh, h)]);
    const beyond = nextHalfEdge(mesh, mesh.twin[leaving]);
    put(j, 0, 0, mesh.vertexOf[h]);
    put(j, 1, 0, mesh.vertexOf[leaving]);
    put(j, 0, 1, mesh.vertexOf[nextHalfEdge(mesh, nextHalfEdge(mesh, mesh.twin[h]))]);
    put(j, 1, 1, mesh.vertexOf[nextHalfEdge(mesh, beyond)]);
  }
  fan.centre.set(centroid(fan));
}

/** The half-edges from an n-gon's corner whose sides its patch has: to the corner before, into the quads on either side, to the corner after. */
function sideAt(mesh: LevelMesh, corner: number, side: number): number {
  if (side === 3) return corner;
  if (side === 2) return nextHalfEdge(mesh, mesh.twin[corner]);
  const back = mesh.twin[previousHalfEdge(mesh, corner)];
  return side === 0 ? back : mesh.twin[previousHalfEdge(mesh, back)];
}

/** Modulus of the subdominant eigenvalue: ½, but where both first Fourier modes are one, ½ + ¼. */
function smoothShrinkage(n: number): number {
  return n === 2 ? 0.75 : 0.5;
}

/** Fans of Doo-Sabin surfaces: n-gons with a patch for each corner. Their bodies and borders belong to vertices. */
export const DOO_SABIN_KIT: FanKit = {
  sides: 4,
  arriving: 3,
  sideAt,
  fewestNodes: 2,
  smoothShrinkage,
  largestShrinkage: 0.75,
  body: (mesh, corner) => mesh.bodyOf[mesh.vertexOf[corner]],
  read: readFan,
  refine: refineDooSabinFan,
  limit: centroid,
  fillChild,
  addSide: (curves, values, side, edge, weight, from, share, shift) => curves.addSide(values, side, edge, weight, from, share, shift),
  outerSides: [[0, 1, 1, 0], [1, 1, 1, 1], [1, 2, 2, 0], [2, 2, 2, 1]],
  rule: fanRule('biquadratic'),
  fillPoints,
  hasSpokes: false,
  innerPoints: [0, 3, 9, 12],
  rimNodes: 6,
};
