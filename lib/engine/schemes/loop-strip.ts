import type { CreasingRule } from '../cage';
import { nextHalfEdge, previousHalfEdge } from '../mesh/topology';
import { rowRule, rowRuleDefect } from '../moments/row-rule';
import { TRIANGLE_NET, triangleToPowers } from '../patches/box-spline';
import { TRIANGLE_COUNTS } from './classify-vertices';
import { childSharpness, isConstantCrease, isSettled } from './crease-strip';
import type { LevelMesh } from './level-mesh';
import { fillTriangleNet } from './loop-net';

/** Lattice around a triangle with the corners (0, 0), (1, 0), (0, 1), and the one of half the size: the crease is the row b = 0, −4 ≤ a, b < 4. */
const WIDTH = 8;
/** The points that the triangle and the one before it, (0, 0), (0, 1), (−1, 1), need. */
const LATTICE: readonly (readonly [a: number, b: number])[] = [
  [0, -1], [1, -1], [2, -1], [-1, 0], [0, 0], [1, 0], [2, 0], [-2, 1], [-1, 1], [0, 1], [1, 1], [-2, 2], [-1, 2], [0, 2],
];

function at(a: number, b: number): number {
  return 3 * (WIDTH * (b + 4) + a + 4);
}

/** A triangle like the first, at (a, b), or one that is turned into the corners (0, 0), (0, 1), (−1, 1): where the points of its net are in the lattice. */
interface Piece {
  a: number;
  b: number;
  turned: boolean;
  places: readonly number[];
}

function piece(a: number, b: number, turned: boolean): Piece {
  return { a, b, turned, places: TRIANGLE_NET.map(([x, y]) => at(a + (turned ? -y : x), b + (turned ? x + y : y))) };
}

/** The two triangles as they stay where the crease is gone, and the finer ones that they become by one more step. */
const WHOLE = [[piece(0, 0, false)], [piece(0, 0, true)]];
const QUARTERS = [
  [piece(0, 0, false), piece(1, 0, false), piece(0, 1, false), piece(1, 0, true)],
  [piece(0, 0, true), piece(0, 1, true), piece(-1, 1, true), piece(-1, 1, false)],
];
const FINE_POINTS = [...new Set(QUARTERS.flat().flatMap(({ places }) => places))];

/** Net entry of a lattice point. */
function entry(a: number, b: number): number {
  return 3 * TRIANGLE_NET.findIndex(([x, y]) => x === a && y === b);
}

/**
 * The half-edge of a triangle along which a semi-sharp crease of one sharpness runs, where nothing but that crease has a say in the triangle's surface;
 * else -1.
 */
export function triangleStripSide(mesh: LevelMesh, kinds: Uint8Array, face: number): number {
  const start = mesh.starts[face];
  for (let i = 0; i < 3; i++) if (isSettled(kinds[start + ((i + 2) % 3)]) && isConstantCrease(mesh, TRIANGLE_COUNTS, start + i)) return start + i;
  return -1;
}

/** The pieces of a triangle's last row that lie on the crease in one way, those at i a step further along it than those at i − 1. It lasts while its taker runs. */
export interface TriangleRow {
  count: number;
  /** Pieces at each i. */
  pieces: number;
  /** Puts the nets of the pieces at i, 0 ≤ i ≤ count − 1, into `out`, 36 numbers each. They are cubics of i, so it need not be whole. */
  fill(i: number, out: Float64Array): void;
}

/** Takes what a triangle along a crease is made of. */
export interface StripTaker {
  piece(net: Float64Array): void;
  row(row: TriangleRow): void;
  /**
   * A side of a piece where it lies on a side of the triangle, of which it covers [from, from + share]; both have the same number, 0 along the crease and
   * the others counter-clockwise. It counts `weight` times, for others in its row, and may be off by `doubt` of that; the row's ends come with the weight 0
   as well.
   */
  side(net: Float64Array, side: number, from: number, share: number, weight: number, doubt: number): void;
}

/** Longer rows give no sides but those at so many nodes of a rule, exact for the cubics' moments from 6 on; the rest is for lengths and areas. */
const SIDE_NODES = 16;

const net = new Float64Array(36);
const near = new Float64Array(45);
const beyond = new Float64Array(45);
const lattice = new Float64Array(3 * WIDTH * WIDTH);
const fine = new Float64Array(3 * WIDTH * WIDTH);
/** Control points of a row −1 … 2 as polynomials of s, [15 (row + 1) + 3 power + axis]. */
const rows = new Float64Array(60);
/** Nets of the pieces at one i. */
const pieceNets = new Float64Array(4 * 36);

/**
 * Hands out the box-spline pieces of the triangle along a semi-sharp crease. While the sharpness is at least 1, either side refines as if the crease were
 * sharp for good, so that up to the last row it is one quartic: one piece. The row is that of ⌊sharpness⌋ steps, 2^(⌊sharpness⌋ + 1) − 1 triangles,
 * refined once more where a fraction of sharpness is left.
 *
 * The control points of the row's nets lie along lattice rows b of either side's quartic. Its edge on the crease is a cubic, so s⁴ has no share in it, and
 * t s⁴ is none of its monomials: they are cubics of s, whose leading coefficients depend on b alone, and stay so through the last step. Added up along a
 * row of the lattice, the box spline does not change along it, and reproduces what is linear. So of the piece X(i; s, t) = g(t) i³ + …, ∂X/∂s = 3 g i² + …
 * and ∂X/∂t = g′ i³ + …: the determinant det(X, X_s, X_t) is of degree 7 in i, with second moments 13.
 */
export function splitTriangleStrip(mesh: LevelMesh, h: number, creasing: CreasingRule, taker: StripTaker): void {
  let sharpness = mesh.edgeSharpness[h];
  let steps = 1;
  for (; sharpness >= 1; sharpness = childSharpness(sharpness, creasing)) steps *= 2;
  const size = 1 / steps;
  fillTriangleNet(mesh, h, net);
  readSides();
  if (steps > 1) {
    for (let b = -1; b <= 2; b++) fillRow(near, size + (1 - size) * b, 1 - size, b);
    TRIANGLE_NET.forEach(([a, b], i) => control(b, (1 - size) * a, net, 3 * i));
    taker.piece(net);
    taker.side(net, 1, size, 1 - size, 1, 0);
    taker.side(net, 2, 0, 1 - size, 1, 0);
  }
  fillRow(beyond, size, size, -1);
  for (let b = 0; b <= 2; b++) fillRow(near, b * size, size, b);
  const [points, [upright, turned]] = sharpness > 0 ? [fine, QUARTERS] : [lattice, WHOLE];
  const fill = (pieces: readonly Piece[], i: number, out: Float64Array): void => {
    // The quartic beyond has its triangle turned by half a turn: (s, t) is (1 − s, −t) there.
    for (const [a, b] of LATTICE) control(b, b < 0 ? 1 - (i + a) * size : (i + a) * size, lattice, at(a, b));
    if (sharpness > 0) for (const to of FINE_POINTS) finePoint(to, sharpness);
    pieces.forEach(({ places }, piece) => {
      for (let point = 0; point < 12; point++) copy(points, places[point], out, 36 * piece + 3 * point);
    });
  };
  const first: TriangleRow = { count: steps, pieces: upright.length, fill: (i, out) => fill(upright, i, out) };
  taker.row(first);
  if (steps > 1) taker.row({ count: steps - 1, pieces: turned.length, fill: (i, out) => fill(turned, i + 1, out) });
  if ([h, nextHalfEdge(mesh, h), previousHalfEdge(mesh, h)].some((side) => mesh.borderOf[side] >= 0)) takeSides(first, upright, sharpness > 0 ? size / 2 : size, taker);
}

/** Hands out the sides of the row's upright pieces, of size `own`, that lie on the triangle's. */
function takeSides(row: TriangleRow, pieces: readonly Piece[], own: number, taker: StripTaker): void {
  const last = row.count - 1;
  const takeAt = (i: number, weight: number, doubt = 0): void => {
    row.fill(i, pieceNets);
    pieces.forEach(({ a, b, turned }, piece) => {
      if (turned) return;
      const values = pieceNets.subarray(36 * piece, 36 * (piece + 1));
      if (b === 0) taker.side(values, 0, i / row.count + a * own, own, weight, doubt);
      if (i === last && i / row.count + (a + b + 1) * own === 1) taker.side(values, 1, b * own, own, 1, 0);
      if (i === 0 && a === 0) taker.side(values, 2, 1 - (b + 1) * own, own, 1, 0);
    });
  };
  if (row.count <= SIDE_NODES) {
    for (let i = 0; i <= last; i++) takeAt(i, 1);
    return;
  }
  takeAt(0, 0);
  takeAt(last, 0);
  const rule = rowRule(SIDE_NODES, row.count);
  const defect = rowRuleDefect(rule);
  rule.nodes.forEach((node, j) => takeAt(node, rule.weights[j], defect));
}

/** Turns the net of a triangle on the crease into the quartics on both sides as if it were sharp for good; on either, phantom points a + b − c stand beyond. */
function readSides(): void {
  const other = new Float64Array(36);
  for (let a = -1; a <= 2; a++) copy(net, entry(a, 0), other, entry(1 - a, 0));
  for (let a = 0; a <= 2; a++) copy(net, entry(a, -1), other, entry(1 - a, 1));
  // The row that comes after has no say in the rows along the crease, so whichever stands there will do.
  for (let a = -1; a <= 0; a++) combine(other, entry(a, 2), 2, entry(a, 1), -1, entry(a, 0), 0, 0);
  for (const side of [net, other]) for (let a = 0; a <= 2; a++) combine(side, entry(a, -1), 1, entry(a - 1, 0), 1, entry(a, 0), -1, entry(a - 1, 1));
  triangleToPowers(net, near);
  triangleToPowers(other, beyond);
}

function copy(from: Float64Array, source: number, to: Float64Array, target: number): void {
  for (let axis = 0; axis < 3; axis++) to[target + axis] = from[source + axis];
}

function combine(values: Float64Array, to: number, p: number, a: number, q: number, b: number, r: number, c: number): void {
  for (let axis = 0; axis < 3; axis++) values[to + axis] = p * values[a + axis] + q * values[b + axis] + r * values[c + axis];
}

/**
 * Fills row `b` of `rows`: the control points with parameter `t` of a quartic of box splines on a lattice of some size, c = p − Σ_d D_d² p / 12 over the
 * lattice's three directions. The limit mask ½, 1/12 [Loop 1987] says p = c + Σ D_d² c / 12 + Σ D_d⁴ c / 144, and products of two directions' D² vanish on
 * the box splines' quartics, so the fourth derivatives cancel.
 */
function fillRow(powers: Float64Array, t: number, size: number, b: number): void {
  const square = (size * size) / 6;
  const row = rows.subarray(15 * (b + 1), 15 * (b + 2));
  row.fill(0);
  for (let degree = 0, k = 0; degree <= 4; degree++) {
    for (let j = 0; j <= degree; j++, k += 3) {
      const i = degree - j;
      for (let axis = 0; axis < 3; axis++) {
        const p = powers[k + axis];
        row[3 * i + axis] += p * (t ** j - (j > 1 ? square * j * (j - 1) * t ** (j - 2) : 0));
        if (i > 1) row[3 * (i - 2) + axis] -= square * i * (i - 1) * p * t ** j;
        if (i > 0 && j > 0) row[3 * (i - 1) + axis] += square * i * j * p * t ** (j - 1);
      }
    }
  }
}

/** The control point of row `b` at s. */
function control(b: number, s: number, out: Float64Array, to: number): void {
  const from = 15 * (b + 1);
  for (let axis = from; axis < from + 3; axis++) {
    out[to + axis - from] = rows[axis] + s * (rows[axis + 3] + s * (rows[axis + 6] + s * (rows[axis + 9] + s * rows[axis + 12])));
  }
}

/** The point of the lattice of half the size that stands at `to`, by Loop's rules; on the crease mixed with the crease's. */
function finePoint(to: number, sharpness: number): void {
  const a = ((to / 3) % WIDTH) - 4;
  const b = Math.floor(to / 3 / WIDTH) - 4;
  const stay = b === 0 ? sharpness : 0;
  const right = at(1, 0) - at(0, 0);
  const up = at(0, 1) - at(0, 0);
  const c = lattice;
  let p = at(Math.floor(a / 2), Math.floor(b / 2));
  for (let i = to; i < to + 3; i++, p++) {
    let smooth: number;
    let crease = 0;
    if (a % 2 === 0 && b % 2 === 0) {
      smooth = (10 * c[p] + c[p + right] + c[p + up] + c[p + up - right] + c[p - right] + c[p - up] + c[p + right - up]) / 16;
      if (stay > 0) crease = (6 * c[p] + c[p + right] + c[p - right]) / 8;
    } else if (b % 2 === 0) {
      smooth = (3 * (c[p] + c[p + right]) + c[p + up] + c[p + right - up]) / 8;
      crease = (c[p] + c[p + right]) / 2;
    } else if (a % 2 === 0) smooth = (3 * (c[p] + c[p + up]) + c[p + right] + c[p + up - right]) / 8;
    else smooth = (3 * (c[p + right] + c[p + up]) + c[p] + c[p + right + up]) / 8;
    fine[i] = stay * crease + (1 - stay) * smooth;
  }
}
