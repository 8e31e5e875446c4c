import { triangleRule } from '../patches/box-spline';
import { addWhole, isPoint, normalTo, type ShellErrors } from './bicubic-shell';
import { seriesRate, type SeriesRate } from './series-rate';
import { addRuleErrors, chooseNodes, UNTRUSTED_NODES } from './shell-nodes';
import { addShellNode, JET, type CurvaturePeak } from './shell-terms';

/** Exponents of s and t of the fifteen monomials, as `triangleToPowers` orders them. */
const EXPONENTS: readonly (readonly [number, number])[] = [0, 1, 2, 3, 4].flatMap((degree) => Array.from({ length: degree + 1 }, (_, j): [number, number] => [degree - j, j]));

/** Quarterings after which a bend is taken as it is, its whole change counting as error. */
const MOST_QUARTERINGS = 4;

/** Values and derivatives of the monomials s^i t^j at (s, t): value, ∂s, ∂t, ∂ss, ∂st, ∂tt each. */
function monomialJets(s: number, t: number, out = new Float64Array(90)): Float64Array {
  for (let monomial = 0; monomial < EXPONENTS.length; monomial++) {
    const i = EXPONENTS[monomial][0], j = EXPONENTS[monomial][1];
    const s0 = power(s, i), s1 = i * power(s, i - 1), s2 = i * (i - 1) * power(s, i - 2);
    const t0 = power(t, j), t1 = j * power(t, j - 1), t2 = j * (j - 1) * power(t, j - 2);
    const at = 6 * monomial;
    out[at] = s0 * t0;
    out[at + 1] = s1 * t0;
    out[at + 2] = s0 * t1;
    out[at + 3] = s2 * t0;
    out[at + 4] = s1 * t1;
    out[at + 5] = s0 * t2;
  }
  return out;
}

/** base^exponent; 0 for exponents below 0, which stand beside a factor 0. */
function power(base: number, exponent: number): number {
  let value = exponent < 0 ? 0 : 1;
  for (let i = 0; i < exponent; i++) value *= base;
  return value;
}

const jets = new Float64Array(90);

/** Evaluates a quartic triangle in powers of s, t [3 monomial + axis] with its first and second derivatives. */
export function triangleJet(powers: Float64Array, s: number, t: number, out: Float64Array): void {
  fillJet(powers, monomialJets(s, t, jets), 0, out);
}

function fillJet(p: Float64Array, table: Float64Array, at: number, out: Float64Array): void {
  let x = 0, y = 0, z = 0, sx = 0, sy = 0, sz = 0, tx = 0, ty = 0, tz = 0;
  let ssx = 0, ssy = 0, ssz = 0, stx = 0, sty = 0, stz = 0, ttx = 0, tty = 0, ttz = 0;
  for (let k = 0, row = at; k < 45; k += 3, row += 6) {
    const px = p[k], py = p[k + 1], pz = p[k + 2];
    const value = table[row], s = table[row + 1], t = table[row + 2], ss = table[row + 3], st = table[row + 4], tt = table[row + 5];
    x += value * px;
    y += value * py;
    z += value * pz;
    sx += s * px;
    sy += s * py;
    sz += s * pz;
    tx += t * px;
    ty += t * py;
    tz += t * pz;
    ssx += ss * px;
    ssy += ss * py;
    ssz += ss * pz;
    stx += st * px;
    sty += st * py;
    stz += st * pz;
    ttx += tt * px;
    tty += tt * py;
    ttz += tt * pz;
  }
  out[0] = x;
  out[1] = y;
  out[2] = z;
  out[3] = sx;
  out[4] = sy;
  out[5] = sz;
  out[6] = tx;
  out[7] = ty;
  out[8] = tz;
  out[9] = ssx;
  out[10] = ssy;
  out[11] = ssz;
  out[12] = stx;
  out[13] = sty;
  out[14] = stz;
  out[15] = ttx;
  out[16] = tty;
  out[17] = ttz;
}

const tables: (Float64Array | undefined)[] = [];

/** Jets of the monomials at the nodes of `triangleRule(nodes)`, 90 numbers each. */
function tableOf(nodes: number): Float64Array {
  const known = tables[nodes];
  if (known !== undefined) return known;
  const rule = triangleRule(nodes);
  const table = new Float64Array(90 * rule.count);
  for (let node = 0; node < rule.count; node++) table.set(monomialJets(rule.s[node], rule.t[node]), 90 * node);
  tables[nodes] = table;
  return table;
}

const jet = new Float64Array(JET);
const CORNERS = [monomialJets(0, 0), monomialJets(1, 0), monomialJets(0, 1), monomialJets(1 / 3, 1 / 3)];
const normals = new Float64Array(12);

/** Adds the shell terms of a quartic triangle in powers of s, t about the point that moments are about; the rest as `addBicubicShell`. */
export function addTriangleShell(powers: Float64Array, tolerance: number, out: Float64Array, peak: CurvaturePeak, errors: ShellErrors): void {
  addTriangle(powers, tolerance, 0, out, peak, errors);
}

function addTriangle(powers: Float64Array, tolerance: number, depth: number, out: Float64Array, peak: CurvaturePeak, errors: ShellErrors): void {
  centreOnLines(powers, centred);
  seriesRate('triangle', centred, 0, 1, found);
  found.rate = Math.max(found.rate, normalVariation(powers));
  const nodes = chooseNodes(found.rate, tolerance);
  if (nodes === 0 && depth < MOST_QUARTERINGS) {
    if (isPoint(powers)) return;
    for (const [s, t, size] of QUARTERS) addTriangle(partOf(powers, s, t, size, PARTS[depth]), tolerance, depth + 1, out, peak, errors);
    return;
  }
  const area = Math.hypot(normals[9], normals[10], normals[11]) / 2;
  const { count, weights } = triangleRule(nodes === 0 ? UNTRUSTED_NODES : nodes);
  const table = tableOf(nodes === 0 ? UNTRUSTED_NODES : nodes);
  let curvature = 0;
  for (let node = 0; node < count; node++) {
    fillJet(powers, table, 90 * node, jet);
    const h = out[0], k = out[1];
    curvature = Math.max(curvature, addShellNode(jet, weights[node], out, peak));
    if (nodes === 0) addWhole(errors, out[0] - h, out[1] - k);
  }
  if (nodes === 0) errors[0] += area;
  else addRuleErrors(errors, 0, nodes, found, area, curvature, true);
}

const centred = new Float64Array(45);
const found: SeriesRate = { rate: 0, bend: 0 };

/** Puts the triangle's coefficients in s^i t^j as those in u = s − ½ and v = t − (1 − s)/2, about the middle of each line of nodes, into `out`. */
function centreOnLines(powers: Float64Array, out: Float64Array): void {
  out.fill(0);
  for (let monomial = 0; monomial < 15; monomial++) {
    const i = EXPONENTS[monomial][0], j = EXPONENTS[monomial][1];
    for (let a = 0; a <= i; a++) {
      const ofS = binomial(i, a) * power(0.5, i - a);
      for (let b = 0; b <= j; b++) {
        for (let c = 0; b + c <= j; c++) {
          const factor = ofS * binomial(j, b) * binomial(j - b, c) * power(0.25, j - b - c) * power(-0.5, c);
          const degree = a + b + c;
          const to = 3 * ((degree * (degree + 1)) / 2 + b);
          for (let axis = 0; axis < 3; axis++) out[to + axis] += factor * powers[3 * monomial + axis];
        }
      }
    }
  }
}

/** Corner 0 of each quarter and its signed size; the middle one stands on its head. */
const QUARTERS: readonly (readonly [number, number, number])[] = [[0, 0, 0.5], [0.5, 0, 0.5], [0, 0.5, 0.5], [0.5, 0.5, -0.5]];

/** Most that X_s × X_t differs at a corner from the middle, relative to its length there; leaves it in the last of `normals`. */
function normalVariation(powers: Float64Array): number {
  for (let i = 0; i < 4; i++) {
    fillJet(powers, CORNERS[i], 0, jet);
    normalTo(jet, normals, 3 * i);
  }
  const [nx, ny, nz] = normals.subarray(9);
  let square = 0;
  for (let k = 0; k < 9; k += 3) square = Math.max(square, (normals[k] - nx) ** 2 + (normals[k + 1] - ny) ** 2 + (normals[k + 2] - nz) ** 2);
  const length = Math.sqrt(nx * nx + ny * ny + nz * nz);
  return length > 0 ? Math.sqrt(square) / length : Infinity;
}

/** Room for a part at each depth. */
const PARTS = Array.from({ length: MOST_QUARTERINGS }, () => new Float64Array(45));

/** The triangle with corner 0 at (s, t) and sides `size` times as long, in powers of its own, in `part`. */
function partOf(powers: Float64Array, s0: number, t0: number, size: number, part: Float64Array): Float64Array {
  part.fill(0);
  for (let monomial = 0; monomial < 15; monomial++) {
    const i = EXPONENTS[monomial][0], j = EXPONENTS[monomial][1];
    for (let a = 0; a <= i; a++) {
      const ofS = binomial(i, a) * power(s0, i - a) * power(size, a);
      for (let b = 0; b <= j; b++) {
        const factor = ofS * binomial(j, b) * power(t0, j - b) * power(size, b);
        const degree = a + b;
        const to = 3 * ((degree * (degree + 1)) / 2 + b);
        for (let axis = 0; axis < 3; axis++) part[to + axis] += factor * powers[3 * monomial + axis];
      }
    }
  }
  return part;
}

function binomial(n: number, k: number): number {
  let value = 1;
  for (let i = 0; i < k; i++) value = (value * (n - i)) / (i + 1);
  return value;
}
