import { gaussRule } from './gauss-rule';

/**
 * Lattice offsets of the twelve control points of a quartic box-spline triangle with corners (0, 0), (1, 0), (0, 1): corners first, then the ring
 * counter-clockwise from (1, −1).
 */
export const TRIANGLE_NET: readonly (readonly [a: number, b: number])[] = [
  [0, 0], [1, 0], [0, 1],
  [1, -1], [2, -1], [2, 0], [1, 1], [0, 2], [-1, 2], [-1, 1], [-1, 0], [0, -1],
];

/** Exponents (i, j) of the fifteen monomials s^i t^j of degree at most 4. */
const MONOMIALS: readonly (readonly [number, number])[] = [0, 1, 2, 3, 4].flatMap((degree) => Array.from({ length: degree + 1 }, (_, j): [number, number] => [degree - j, j]));

/** Value of the box spline of the six neighbours' limit mask, centre ½ and 1/12 each, after refinements of the lattice [Loop 1987]: the limit on all points with coordinates in quarters. */
function latticeLimits(source: number): Map<string, number> {
  const key = (a: number, b: number): string => `${a} ${b}`;
  const ring: readonly [number, number][] = [[1, 0], [0, 1], [-1, 1], [-1, 0], [0, -1], [1, -1]];
  const [sa, sb] = TRIANGLE_NET[source];
  let values = new Map([[key(sa, sb), 1]]);
  const at = (a: number, b: number): number => values.get(key(a, b)) ?? 0;
  let reach = 4;
  for (let step = 0; step < 2; step++) {
    const finer = new Map<string, number>();
    reach *= 2;
    for (let a = -reach; a <= reach; a++) {
      for (let b = -reach; b <= reach; b++) {
        let value: number;
        const [a0, b0] = [Math.floor(a / 2), Math.floor(b / 2)];
        if (a % 2 === 0 && b % 2 === 0) value = (10 * at(a0, b0) + ring.reduce((sum, [x, y]) => sum + at(a0 + x, b0 + y), 0)) / 16;
        else if (b % 2 === 0) value = (3 * (at(a0, b0) + at(a0 + 1, b0)) + at(a0, b0 + 1) + at(a0 + 1, b0 - 1)) / 8;
        else if (a % 2 === 0) value = (3 * (at(a0, b0) + at(a0, b0 + 1)) + at(a0 + 1, b0) + at(a0 - 1, b0 + 1)) / 8;
        else value = (3 * (at(a0 + 1, b0) + at(a0, b0 + 1)) + at(a0, b0) + at(a0 + 1, b0 + 1)) / 8;
        if (value !== 0) finer.set(key(a, b), value);
      }
    }
    values = finer;
  }
  const limits = new Map<string, number>();
  for (let a = 0; a <= 4; a++) {
    for (let b = 0; a + b <= 4; b++) limits.set(key(a, b), at(a, b) / 2 + ring.reduce((sum, [x, y]) => sum + at(a + x, b + y), 0) / 12);
  }
  return limits;
}

/** Solves a small dense system by elimination with pivots. */
function solve(rows: number[][], right: number[]): number[] {
  const n = right.length;
  const m = rows.map((row, i) => [...row, right[i]]);
  for (let column = 0; column < n; column++) {
    let pivot = column;
    for (let i = column; i < n; i++) if (Math.abs(m[i][column]) > Math.abs(m[pivot][column])) pivot = i;
    [m[column], m[pivot]] = [m[pivot], m[column]];
    for (let i = 0; i < n; i++) {
      if (i === column) continue;
      const factor = m[i][column] / m[column][column];
      for (let k = column; k <= n; k++) m[i][k] -= factor * m[column][k];
    }
  }
  return m.map((row, i) => row[n] / row[i]);
}

/**
 * Coefficients of the twelve basis polynomials in s^i t^j, [12 monomial + point], s along the first and t along the second side from corner 0.
 * Interpolated from limits on the quarter lattice, where a quartic is unique, and set to the whole multiples of 1/24 that they are.
 */
const BASIS: Float64Array = (() => {
  const samples: [number, number][] = [];
  for (let a = 0; a <= 4; a++) for (let b = 0; a + b <= 4; b++) samples.push([a, b]);
  const rows = samples.map(([a, b]) => MONOMIALS.map(([i, j]) => (a / 4) ** i * (b / 4) ** j));
  const basis = new Float64Array(12 * MONOMIALS.length);
  for (let point = 0; point < 12; point++) {
    const limits = latticeLimits(point);
    const coefficients = solve(rows, samples.map(([a, b]) => limits.get(`${a} ${b}`) ?? 0));
    coefficients.forEach((value, monomial) => (basis[12 * monomial + point] = Math.round(24 * value) / 24));
  }
  return basis;
})();

/** Coefficients of a patch in s^i t^j, [3 monomial + axis], from its net [3 point + axis]. */
export function triangleToPowers(net: Float64Array, powers: Float64Array): void {
  for (let monomial = 0; monomial < MONOMIALS.length; monomial++) {
    let x = 0, y = 0, z = 0;
    for (let point = 0; point < 12; point++) {
      const weight = BASIS[12 * monomial + point];
      x += weight * net[3 * point];
      y += weight * net[3 * point + 1];
      z += weight * net[3 * point + 2];
    }
    powers[3 * monomial] = x;
    powers[3 * monomial + 1] = y;
    powers[3 * monomial + 2] = z;
  }
}

/** Nodes of a rule on the triangle with the values of the monomials and their two derivatives there. */
export interface TriangleRule {
  count: number;
  s: Float64Array;
  t: Float64Array;
  weights: Float64Array;
  /** [45 node + 3 monomial]: value, ∂s, ∂t. */
  table: Float64Array;
}

const rules: (TriangleRule | undefined)[] = [];

/**
 * Gauss rule on the triangle through s = x, t = (1 − x)(½ + y): `nodes` + 1 of them along x, whose weight 1 − x costs a degree, `nodes` along y.
 * With 9 it is exact for degree 17, the second moments of quartic triangles.
 */
export function triangleRule(nodes: number): TriangleRule {
  const known = rules[nodes];
  if (known !== undefined) return known;
  const along = gaussRule(nodes + 1);
  const across = gaussRule(nodes);
  const count = nodes * (nodes + 1);
  const rule: TriangleRule = { count, s: new Float64Array(count), t: new Float64Array(count), weights: new Float64Array(count), table: new Float64Array(45 * count) };
  for (let i = 0; i <= nodes; i++) {
    for (let j = 0; j < nodes; j++) {
      const node = i * nodes + j;
      const s = 0.5 + along.nodes[i];
      const t = (1 - s) * (0.5 + across.nodes[j]);
      rule.s[node] = s;
      rule.t[node] = t;
      rule.weights[node] = along.weights[i] * across.weights[j] * (1 - s);
      MONOMIALS.forEach(([p, q], monomial) => {
        const at = 45 * node + 3 * monomial;
        rule.table[at] = s ** p * t ** q;
        rule.table[at + 1] = p === 0 ? 0 : p * s ** (p - 1) * t ** q;
        rule.table[at + 2] = q === 0 ? 0 : q * s ** p * t ** (q - 1);
      });
    }
  }
  rules[nodes] = rule;
  return rule;
}
