import { gaussRule } from '../patches/gauss-rule';
import { seriesRate, type SeriesRate } from './series-rate';
import { addRuleErrors, chooseNodes, UNTRUSTED_NODES } from './shell-nodes';
import { addShellNode, JET, type CurvaturePeak } from './shell-terms';

const jet = new Float64Array(JET);
const row = new Float64Array(36);
const found: SeriesRate = { rate: 0, bend: 0 };

/** Quarterings after which a bend is taken as it is, its whole change counting as error. */
const MOST_QUARTERINGS = 4;

/** What the integrals of one patch may be off by: of the area-like ones (∫ N dA), of ∫ 2H dA and of ∫ K dA. */
export type ShellErrors = [area: number, mean: number, gauss: number];

/** Evaluates a bicubic in powers of u, v about its middle [(4 i + j) · 3 + axis] with its first and second derivatives at (u, v). */
export function bicubicJet(powers: Float64Array, u: number, v: number, out: Float64Array): void {
  fillRow(powers, u);
  finishJet(v, out);
}

/** Coefficients in v of X, X_u, X_uu at u: [12 · derivative + 3 j + axis]. */
function fillRow(p: Float64Array, u: number): void {
  const u2 = 2 * u, uu3 = 3 * u * u, u6 = 6 * u;
  for (let k = 0; k < 12; k++) {
    const c1 = p[12 + k], c2 = p[24 + k], c3 = p[36 + k];
    row[k] = p[k] + u * (c1 + u * (c2 + u * c3));
    row[12 + k] = c1 + u2 * c2 + uu3 * c3;
    row[24 + k] = 2 * c2 + u6 * c3;
  }
}

function finishJet(v: number, out: Float64Array): void {
  const v2 = 2 * v, vv3 = 3 * v * v, v6 = 6 * v;
  for (let axis = 0; axis < 3; axis++) {
    const a1 = row[3 + axis], a2 = row[6 + axis], a3 = row[9 + axis];
    out[axis] = row[axis] + v * (a1 + v * (a2 + v * a3));
    out[6 + axis] = a1 + v2 * a2 + vv3 * a3;
    out[15 + axis] = 2 * a2 + v6 * a3;
    const b1 = row[15 + axis], b2 = row[18 + axis], b3 = row[21 + axis];
    out[3 + axis] = row[12 + axis] + v * (b1 + v * (b2 + v * b3));
    out[12 + axis] = b1 + v2 * b2 + vv3 * b3;
    out[9 + axis] = row[24 + axis] + v * (row[27 + axis] + v * (row[30 + axis] + v * row[33 + axis]));
  }
}

/**
 * Adds the shell terms of a bicubic patch in powers about its middle (and about the point that moments are about) over its unit square.
 * The integrands are quotients with roots: nodes follow from how much the tangents turn, strong bends are quartered.
 * `tolerance` is what a rule may err by, relatively. Adds what it may err by to `errors`.
 */
export function addBicubicShell(powers: Float64Array, tolerance: number, out: Float64Array, peak: CurvaturePeak, errors: ShellErrors): void {
  addSquare(powers, tolerance, 0, out, peak, errors);
}

function addSquare(powers: Float64Array, tolerance: number, depth: number, out: Float64Array, peak: CurvaturePeak, errors: ShellErrors): void {
  seriesRate('bicubic', powers, 0, 1, found);
  found.rate = Math.max(found.rate, normalVariation(powers));
  const nodes = chooseNodes(found.rate, tolerance);
  if (nodes === 0 && depth < MOST_QUARTERINGS) {
    if (isPoint(powers)) return;
    for (let i = 0; i < 4; i++) addSquare(quarterOf(powers, i & 1 ? 0.25 : -0.25, i & 2 ? 0.25 : -0.25, QUARTERS[depth]), tolerance, depth + 1, out, peak, errors);
    return;
  }
  const rule = gaussRule(nodes === 0 ? UNTRUSTED_NODES : nodes);
  const count = rule.nodes.length;
  const area = middle;
  let curvature = 0;
  for (let i = 0; i < count; i++) {
    fillRow(powers, rule.nodes[i]);
    for (let j = 0; j < count; j++) {
      finishJet(rule.nodes[j], jet);
      const h = out[0], k = out[1];
      curvature = Math.max(curvature, addShellNode(jet, rule.weights[i] * rule.weights[j], out, peak));
      if (nodes === 0) addWhole(errors, out[0] - h, out[1] - k);
    }
  }
  if (nodes === 0) errors[0] += area;
  else addRuleErrors(errors, 0, nodes, found, area, curvature, false);
}

/** Whether all of a patch lies in one point. */
export function isPoint(powers: Float64Array): boolean {
  for (let i = 3; i < powers.length; i++) if (powers[i] !== 0) return false;
  return true;
}

/** Counts what a node of a rule that is not trusted adds to ∫ 2H and ∫ K, all of it. */
export function addWhole(errors: ShellErrors, mean: number, gauss: number): void {
  errors[1] += Math.abs(mean);
  errors[2] += Math.abs(gauss);
}

const ENDS = [-0.5, 0.5];
const corners = new Float64Array(12);
/** Length of X_u × X_v in the middle of the patch that was looked at last: about its area. */
let middle = 0;

/** Most that X_u × X_v differs at a corner from the middle, relative to its length there: all integrands are polynomials over powers of that length. */
function normalVariation(p: Float64Array): number {
  for (let i = 0; i < 2; i++) {
    fillRow(p, ENDS[i]);
    for (let j = 0; j < 2; j++) {
      finishJet(ENDS[j], jet);
      normalTo(jet, corners, 3 * (2 * i + j));
    }
  }
  const nx = p[13] * p[5] - p[14] * p[4], ny = p[14] * p[3] - p[12] * p[5], nz = p[12] * p[4] - p[13] * p[3];
  middle = Math.sqrt(nx * nx + ny * ny + nz * nz);
  let square = 0;
  for (let k = 0; k < 12; k += 3) square = Math.max(square, (corners[k] - nx) ** 2 + (corners[k + 1] - ny) ** 2 + (corners[k + 2] - nz) ** 2);
  return middle > 0 ? Math.sqrt(square) / middle : Infinity;
}

/** X_u × X_v of a jet. */
export function normalTo(j: Float64Array, out: Float64Array, at: number): void {
  out[at] = j[4] * j[8] - j[5] * j[7];
  out[at + 1] = j[5] * j[6] - j[3] * j[8];
  out[at + 2] = j[3] * j[7] - j[4] * j[6];
}

/** Room for a quarter at each depth. */
const QUARTERS = Array.from({ length: MOST_QUARTERINGS }, () => new Float64Array(48));

/** The patch over the quarter with the middle (u, v), in powers about that, in `p`. */
function quarterOf(powers: Float64Array, u: number, v: number, p: Float64Array): Float64Array {
  p.set(powers);
  for (let k = 0; k < 12; k++) shrink(p, k, 12, u);
  for (let i = 0; i < 4; i++) for (let axis = 0; axis < 3; axis++) shrink(p, 12 * i + axis, 3, v);
  return p;
}

/** Replaces t by m + t/2 in four coefficients, `stride` apart. */
function shrink(p: Float64Array, at: number, stride: number, m: number): void {
  const c0 = p[at], c1 = p[at + stride], c2 = p[at + 2 * stride], c3 = p[at + 3 * stride];
  p[at] = c0 + m * (c1 + m * (c2 + m * c3));
  p[at + stride] = (c1 + m * (2 * c2 + 3 * m * c3)) / 2;
  p[at + 2 * stride] = (c2 + 3 * m * c3) / 4;
  p[at + 3 * stride] = c3 / 8;
}
