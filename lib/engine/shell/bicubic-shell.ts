import { gaussRule } from '../patches/gauss-rule';
import { chooseNodes, MOST_SHELL_NODES, ruleError } from './shell-nodes';
import { addShellNode, JET, type CurvaturePeak } from './shell-terms';

const jet = new Float64Array(JET);
const row = new Float64Array(36);

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
  const bend = bendOf(powers);
  if (bend.length === 0) return;
  const nodes = chooseNodes(bend.variation, tolerance);
  if (nodes === 0 && depth < MOST_QUARTERINGS) {
    for (let i = 0; i < 4; i++) addSquare(quarterOf(powers, i & 1 ? 0.25 : -0.25, i & 2 ? 0.25 : -0.25), tolerance, depth + 1, out, peak, errors);
    return;
  }
  const rule = gaussRule(nodes === 0 ? MOST_SHELL_NODES : nodes);
  const count = rule.nodes.length;
  for (let i = 0; i < count; i++) {
    fillRow(powers, rule.nodes[i]);
    for (let j = 0; j < count; j++) {
      finishJet(rule.nodes[j], jet);
      addShellNode(jet, rule.weights[i] * rule.weights[j], out, peak);
    }
  }
  const error = bend.length * bend.length * (nodes === 0 ? 1 : ruleError(nodes, bend.variation));
  // Second derivatives are at most four times the variation over half the patch.
  const curvature = (4 * Math.min(1, bend.variation)) / bend.narrow;
  errors[0] += error;
  errors[1] += error * curvature;
  errors[2] += error * curvature * curvature;
}

interface Bend {
  /** Longer tangent in the middle, and what of the shorter one stands across it. */
  length: number;
  narrow: number;
  /** Most that a tangent changes from the middle to the rim, relative to `narrow`. */
  variation: number;
}

const bend: Bend = { length: 0, narrow: 0, variation: 0 };

/** How strongly a patch bends. */
function bendOf(p: Float64Array): Bend {
  let alongU = 0, alongV = 0;
  for (let i = 0; i < 4; i++) {
    for (let j = 0; j < 4; j++) {
      if (i + j < 2) continue;
      const at = 12 * i + 3 * j;
      const size = Math.sqrt(p[at] * p[at] + p[at + 1] * p[at + 1] + p[at + 2] * p[at + 2]);
      const scale = size * HALVES[i + j - 1];
      alongU += i * scale;
      alongV += j * scale;
    }
  }
  const ux = p[12], uy = p[13], uz = p[14], vx = p[3], vy = p[4], vz = p[5];
  const lu = Math.sqrt(ux * ux + uy * uy + uz * uz), lv = Math.sqrt(vx * vx + vy * vy + vz * vz);
  const nx = uy * vz - uz * vy, ny = uz * vx - ux * vz, nz = ux * vy - uy * vx;
  const across = Math.sqrt(nx * nx + ny * ny + nz * nz);
  // Each direction's change counts against its own length, narrowed by the angle between them.
  const slant = across > 0 ? (lu * lv) / across : Infinity;
  bend.length = Math.max(lu, lv, alongU, alongV);
  bend.narrow = Math.max(Math.min(lu, lv) / slant, 2 ** -40 * bend.length);
  bend.variation = slant === Infinity ? Infinity : slant * Math.max(alongU / lu, alongV / lv);
  return bend;
}

const HALVES = [1, 1 / 2, 1 / 4, 1 / 8, 1 / 16, 1 / 32];

/** The patch over the quarter with the middle (u, v), in powers about that. */
function quarterOf(powers: Float64Array, u: number, v: number): Float64Array {
  const p = powers.slice();
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
