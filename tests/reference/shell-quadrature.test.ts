import { describe, expect, it } from 'vitest';
import type { Cage, Scheme } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import { gaussRule } from '@/lib/engine/patches/gauss-rule';
import { cageOf, CATMULL_CLARK, facesOf, referenceCage } from '../support/engine-cages';
import { refinedLabels, refinedOnce } from '../support/random-cages';

// Walls of smooth closed parts against a quadrature that shares nothing with the measuring but Gauss's rule: uniform cubic B-splines (de Boor, "A practical guide
// to splines", 1978) over every face that becomes regular, refined again and again towards the extraordinary points, the rest by Wynn's epsilon algorithm
// (P. Wynn, Math. Tables Aids Comput. 10 (1956)); all from memory. t² is −½ ∫ 2H dA, t³ ⅓ ∫ K dA (Weyl 1939).

const NODES = 16;
const STEPS = 15;
/** Rings of faces kept around those that are not regular: a step's rule at the cut reaches less far. */
const RINGS = 3;

/** Values, first and second derivatives of the four uniform cubic B-splines at u in 0 … 1. */
function basis(u: number): number[][] {
  const w = 1 - u;
  return [
    [w ** 3 / 6, (3 * u ** 3 - 6 * u * u + 4) / 6, (3 * w ** 3 - 6 * w * w + 4) / 6, u ** 3 / 6],
    [(-w * w) / 2, (3 * u * u - 4 * u) / 2, (-3 * w * w + 4 * w) / 2, (u * u) / 2],
    [w, 3 * u - 2, 3 * w - 2, u],
  ];
}

const dot = (p: number[], q: number[]): number => p[0] * q[0] + p[1] * q[1] + p[2] * q[2];
const cross = (p: number[], q: number[]): number[] => [p[1] * q[2] - p[2] * q[1], p[2] * q[0] - p[0] * q[2], p[0] * q[1] - p[1] * q[0]];

/** ∫ 2H dA and ∫ K dA of a bicubic patch by its 4 × 4 points, rows along v; 2H positive on a sphere. */
function patchCurvatures(net: number[][]): [number, number] {
  const { nodes, weights } = gaussRule(NODES);
  let mean = 0;
  let gauss = 0;
  nodes.forEach((s, i) => nodes.forEach((t, j) => {
    const [U, V] = [basis(s + 0.5), basis(t + 0.5)];
    const at = (du: number, dv: number): number[] => [0, 1, 2].map((axis) => net.reduce((sum, point, k) => sum + U[du][k % 4] * V[dv][k >> 2] * point[axis], 0));
    const [xu, xv] = [at(1, 0), at(0, 1)];
    const normal = cross(xu, xv);
    const area = Math.sqrt(dot(normal, normal));
    const [L, M, P] = [at(2, 0), at(1, 1), at(0, 2)].map((second) => dot(second, normal) / area);
    const weight = weights[i] * weights[j];
    mean -= (weight * (dot(xu, xu) * P - 2 * dot(xu, xv) * M + dot(xv, xv) * L)) / area;
    gauss += (weight * (L * P - M * M)) / area;
  }));
  return [mean, gauss];
}

/** The 4 × 4 points around a quad, or null where one of its corners is not regular. */
function netAround(cage: Cage, quad: number[], after: Map<string, number>, valences: Int32Array): number[][] | null {
  if (quad.some((v) => valences[v] !== 4)) return null;
  const point = (v: number): number[] => [cage.positions[3 * v], cage.positions[3 * v + 1], cage.positions[3 * v + 2]];
  const net: number[][] = Array.from({ length: 16 }, () => []);
  const PLACES = [[5, 1, 4, 0], [6, 7, 2, 3], [10, 14, 11, 15], [9, 8, 13, 12]];
  for (let i = 0; i < 4; i++) {
    const [v, next] = [quad[i], quad[(i + 1) % 4]];
    const below = after.get(`${next} ${v}`);
    const left = below === undefined ? undefined : after.get(`${below} ${v}`);
    const diagonal = left === undefined ? undefined : after.get(`${v} ${left}`);
    if (below === undefined || left === undefined || diagonal === undefined) return null;
    [v, below, left, diagonal].forEach((vertex, k) => (net[PLACES[i][k]] = point(vertex)));
  }
  return net;
}

/** Those faces with a label and `RINGS` rings around them, renumbered. */
function cutOut(cage: Cage, labels: Int32Array): { cage: Cage; labels: Int32Array } {
  const faces = facesOf(cage);
  const kept = Uint8Array.from(labels);
  for (let ring = 0; ring < RINGS; ring++) {
    const near = new Set(faces.filter((_, f) => kept[f] === 1).flat());
    faces.forEach((face, f) => {
      if (face.some((v) => near.has(v))) kept[f] = 1;
    });
  }
  const chosen = faces.map((_, f) => f).filter((f) => kept[f] === 1);
  const vertices = [...new Set(chosen.flatMap((f) => faces[f]))];
  const place = new Map(vertices.map((v, i) => [v, i]));
  const points = vertices.map((v) => [...cage.positions.subarray(3 * v, 3 * v + 3)]);
  return { cage: cageOf(points, chosen.map((f) => faces[f].map((v) => place.get(v)!))), labels: Int32Array.from(chosen, (f) => labels[f]) };
}

/** Partial sums of ∫ 2H dA and ∫ K dA over all that is regular after so many steps. */
function partialSums(given: Cage): [number[], number[]] {
  let cage = refinedOnce(given, CATMULL_CLARK);
  let labels: Int32Array = new Int32Array(facesOf(cage).length).fill(1);
  const [means, images]: [number[], number[]] = [[], []];
  let [mean, gauss] = [0, 0];
  for (let step = 0; step < STEPS; step++) {
    const faces = facesOf(cage);
    const after = new Map<string, number>();
    const valences = new Int32Array(cage.positions.length / 3);
    for (const face of faces) face.forEach((v, i) => after.set(`${v} ${face[(i + 1) % 4]}`, face[(i + 2) % 4]) && valences[v]++);
    faces.forEach((face, f) => {
      const net = labels[f] === 1 ? netAround(cage, face, after, valences) : null;
      if (net === null) return;
      const [h, k] = patchCurvatures(net);
      mean += h;
      gauss += k;
      labels[f] = 0;
    });
    means.push(mean);
    images.push(gauss);
    const cut = cutOut(cage, labels);
    labels = refinedLabels(cut.cage, cut.labels);
    cage = refinedOnce(cut.cage, CATMULL_CLARK);
  }
  return [means, images];
}

/** Wynn's epsilon algorithm: the last even column whose neighbours agree best, and by how much they do. */
function accelerated(sums: number[]): { value: number; doubt: number } {
  let [before, column] = [sums.map(() => 0), sums];
  let best = { value: sums[sums.length - 1], doubt: Infinity };
  for (let k = 1; column.length > 1; k++) {
    const following = column.slice(1).map((value, i) => before[i + 1] + 1 / (value - column[i]));
    [before, column] = [column, following];
    if (k % 2 === 1 || column.length < 2) continue;
    const [value, last] = column.slice(-2);
    if (Math.abs(last - value) < best.doubt) best = { value: last, doubt: Math.abs(last - value) };
  }
  return best;
}

function coefficients(cage: Cage, scheme: Scheme): { t2: number; t3: number; error: readonly number[] } {
  const [{ hollow, hollowLimits }] = measureCage(cage, { ...CATMULL_CLARK, scheme, shells: true }).parts[0].components;
  if (hollow === null || hollowLimits === null) throw new Error('the wall was not measured');
  return { t2: hollow[1], t3: hollow[2], error: hollowLimits.error };
}

describe('t² and t³ of smooth walls are those of an outside quadrature to 1e-9', () => {
  it.each([['cube.obj', 2], ['prism_5.obj', 2], ['prism_6.obj', 2], ['bipyramid_5.obj', 2], ['frame_genus1.obj', 0]])('%s', (file, characteristic) => {
    const cage = referenceCage(file);
    const [mean, image] = partialSums(cage).map(accelerated);
    const { t2, t3, error } = coefficients(cage, 'catmull-clark');
    // The outside value has to be good itself: its own columns agree, and ∫ K is 2π χ.
    expect(mean.doubt / Math.abs(mean.value)).toBeLessThan(1e-9);
    expect(Math.abs(image.value - 2 * Math.PI * characteristic)).toBeLessThan(1e-9);
    expect(Math.abs(t2 / (-mean.value / 2) - 1)).toBeLessThan(1e-9);
    expect(Math.abs(t2 + mean.value / 2)).toBeLessThanOrEqual(error[1]);
    expect(Math.abs(t3 - (2 * Math.PI * characteristic) / 3)).toBeLessThan(1e-7);
  }, 60_000);
});

// Once or twice may change nothing: the measuring refines by itself until its fans stand alone.
describe('smooth walls are the same from the cage refined three times, whose fans are closed from further in, to 1e-9', () => {
  const cases: [string, Scheme][] = [
    ['cube.obj', 'catmull-clark'], ['prism_6.obj', 'catmull-clark'], ['tetra.obj', 'loop'], ['octa.obj', 'loop'], ['icosa.obj', 'loop'], ['bipyramid_6.obj', 'loop'], ['cube.obj', 'doo-sabin'],
    ['prism_5.obj', 'doo-sabin'],
  ];
  it.each(cases)('%s, %s', (file, scheme) => {
    const cage = referenceCage(file);
    const fine = [1, 2, 3].reduce((coarse) => refinedOnce(coarse, { ...CATMULL_CLARK, scheme }), cage);
    const [one, two] = [cage, fine].map((each) => coefficients(each, scheme));
    expect(Math.abs(two.t2 / one.t2 - 1)).toBeLessThan(1e-9);
    expect(two.t2).not.toBe(one.t2);
    expect(Math.abs(two.t3 - one.t3)).toBeLessThan(1e-7);
  });
});

describe('a Doo-Sabin part with an open border', () => {
  it('has the walls of its halves, none over its cap, and the same from its refined cage', () => {
    // A sheet of quads bent over a paraboloid, open all around: its border is the doubled one, where the surface ends in the quadratic B-spline of the polygon.
    const n = 6;
    const points = Array.from({ length: (n + 1) ** 2 }, (_, k) => {
      const [i, j] = [Math.floor(k / (n + 1)) - n / 2, (k % (n + 1)) - n / 2];
      return [i, j, -(i * i + j * j) / 20];
    });
    const faces = Array.from({ length: n * n }, (_, k) => {
      const a = (n + 1) * Math.floor(k / n) + (k % n);
      return [a, a + n + 1, a + n + 2, a + 1];
    });
    const whole = cageOf(points, faces);
    const split: Cage = { ...whole, groups: { names: ['left', 'right'], labels: Int32Array.from(faces, (_, f) => (f < (n * n) / 2 ? 0 : 1)) } };
    const measured = (cage: Cage, partsBy: 'whole' | 'group') => measureCage(cage, { ...CATMULL_CLARK, scheme: 'doo-sabin', shells: true, partsBy }).parts.flatMap((part) => part.components);
    const [one] = measured(whole, 'whole');
    const parts = measured(split, 'group');
    expect(parts.length).toBe(2);
    for (let power = 0; power < 3; power++) {
      const sum = parts.reduce((total, part) => total + part.hollow![power], 0);
      expect(Math.abs(sum - one.hollow![power])).toBeLessThan(1e-8);
    }
    // A cap carries no wall: the wall's first power is the open surface's area, ∫ K the turning that the paraboloid's slopes bound.
    expect(Math.abs(one.hollow![0] - one.surface.area)).toBeLessThan(1e-12 * one.surface.area);
    expect(one.hollow![1]).toBeLessThan(0);
    expect(one.hollow![2]).toBeGreaterThan(0);
    expect(one.hollow![2]).toBeLessThan((2 * Math.PI) / 3);
    const refined = measured(refinedOnce(whole, { ...CATMULL_CLARK, scheme: 'doo-sabin' }), 'whole');
    expect(Math.abs(refined[0].hollow![1] / one.hollow![1] - 1)).toBeLessThan(1e-6);
  });
});
