import type { CreasingRule } from '../cage';
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

/**
 * Takes the net of a piece of a triangle: of the one with the corners (s, t), (s + size, t), (s, t + size) in the triangle's own parameters, or, where `size`
 * is 0, of one within it that none of its sides touches.
 */
export type TakeTriangle = (net: Float64Array, s: number, t: number, size: number) => void;

const net = new Float64Array(36);
const near = new Float64Array(45);
const beyond = new Float64Array(45);
const lattice = new Float64Array(3 * WIDTH * WIDTH);
const fine = new Float64Array(3 * WIDTH * WIDTH);
/** Control points of a row −1 … 2 as polynomials of s, [15 (row + 1) + 3 power + axis]. */
const rows = new Float64Array(60);

/**
 * Hands out the box-spline pieces of the triangle along a semi-sharp crease. While the sharpness is at least 1, either side refines as if the crease were
 * sharp for good, so that up to the last row it is one quartic: one piece. The row is that of ⌊sharpness⌋ steps, 2^(⌊sharpness⌋ + 1) − 1 triangles,
 * refined once more where a fraction of sharpness is left.
 */
export function splitTriangleStrip(mesh: LevelMesh, h: number, creasing: CreasingRule, take: TakeTriangle): void {
  let sharpness = mesh.edgeSharpness[h];
  let steps = 1;
  for (; sharpness >= 1; sharpness = childSharpness(sharpness, creasing)) steps *= 2;
  const size = 1 / steps;
  fillTriangleNet(mesh, h, net);
  readSides();
  if (steps > 1) {
    for (let b = -1; b <= 2; b++) fillRow(near, size + (1 - size) * b, 1 - size, b);
    TRIANGLE_NET.forEach(([a, b], i) => control(b, (1 - size) * a, net, 3 * i));
    take(net, 0, size, 1 - size);
  }
  fillRow(beyond, size, size, -1);
  for (let b = 0; b <= 2; b++) fillRow(near, b * size, size, b);
  for (let i = 0; i < steps; i++) {
    // The quartic beyond has its triangle turned by half a turn: (s, t) is (1 − s, −t) there.
    for (const [a, b] of LATTICE) control(b, b < 0 ? 1 - (i + a) * size : (i + a) * size, lattice, at(a, b));
    if (sharpness > 0) for (const to of FINE_POINTS) finePoint(to, sharpness);
    const [points, pieces, own] = sharpness > 0 ? [fine, QUARTERS, size / 2] : [lattice, WHOLE, size];
    for (let half = 0; half < (i === 0 ? 1 : 2); half++) {
      for (const { a, b, turned, places } of pieces[half]) {
        for (let point = 0; point < 12; point++) copy(points, places[point], net, 3 * point);
        take(net, i * size + a * own, b * own, turned ? 0 : own);
      }
    }
  }
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
