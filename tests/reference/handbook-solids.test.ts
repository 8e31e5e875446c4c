import { describe, expect, it } from 'vitest';
import type { Cage, Scheme } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import type { Six, Three } from '@/lib/engine/measured';
import { cageOf, CATMULL_CLARK, facesOf, moved } from '../support/engine-cages';

/** Formulas of the handbooks (Marks' Standard Handbook for Mechanical Engineers, properties of homogeneous solids; from memory), unit density. */
interface Solid {
  name: string;
  points: number[][];
  faces: number[][];
  volume: number;
  centroid: Three;
  /** xx, yy, zz, xy, xz, yz about the centroid. */
  second: Six;
}

/** A polygon in z = 0 (counter-clockwise) drawn up to z = h. */
function extruded(polygon: readonly (readonly [number, number])[], h: number): Pick<Solid, 'points' | 'faces'> {
  const n = polygon.length;
  const sides = polygon.map((_, i) => [i, (i + 1) % n, n + ((i + 1) % n), n + i]);
  const base = polygon.map((_, i) => i);
  return { points: [...polygon.map(([x, y]) => [x, y, 0]), ...polygon.map(([x, y]) => [x, y, h])], faces: [base.slice().reverse(), base.map((i) => n + i), ...sides] };
}

function box(a: number, b: number, c: number): Solid {
  const v = a * b * c;
  return { name: 'box', ...extruded([[0, 0], [a, 0], [a, b], [0, b]], c), volume: v, centroid: [a / 2, b / 2, c / 2], second: [(v * a * a) / 12, (v * b * b) / 12, (v * c * c) / 12, 0, 0, 0] };
}

/** Regular n-gon of circumradius r: area n r² sin(2π/n)/2, second area moment A (6 r² − s²)/24 with the side s = 2 r sin(π/n). */
function prism(n: number, r: number, h: number): Solid {
  const polygon = Array.from({ length: n }, (_, i) => [r * Math.cos((2 * Math.PI * i) / n), r * Math.sin((2 * Math.PI * i) / n)] as const);
  const v = (n * r * r * Math.sin((2 * Math.PI) / n) * h) / 2;
  const across = (v * (6 * r * r - (2 * r * Math.sin(Math.PI / n)) ** 2)) / 24;
  return { name: `prism over a regular ${n}-gon`, ...extruded(polygon, h), volume: v, centroid: [0, 0, h / 2], second: [across, across, (v * h * h) / 12, 0, 0, 0] };
}

/** Right triangle with legs a, b, drawn up: a²/18 and −ab/36 about the centroid. */
function wedge(a: number, b: number, h: number): Solid {
  const v = (a * b * h) / 2;
  return { name: 'wedge', ...extruded([[0, 0], [a, 0], [0, b]], h), volume: v, centroid: [a / 3, b / 3, h / 2], second: [(v * a * a) / 18, (v * b * b) / 18, (v * h * h) / 12, (-v * a * b) / 36, 0, 0] };
}

/** Three edges a, b, c at right angles: 3a²/80 and −ab/80 about the centroid. */
function tetrahedron(a: number, b: number, c: number): Solid {
  const v = (a * b * c) / 6;
  return {
    name: 'tetrahedron', points: [[0, 0, 0], [a, 0, 0], [0, b, 0], [0, 0, c]], faces: [[0, 2, 1], [0, 1, 3], [0, 3, 2], [1, 2, 3]], volume: v, centroid: [a / 4, b / 4, c / 4],
    second: [(3 * v * a * a) / 80, (3 * v * b * b) / 80, (3 * v * c * c) / 80, (-v * a * b) / 80, (-v * a * c) / 80, (-v * b * c) / 80],
  };
}

/** Base a × b, height h: a²/20, b²/20, 3h²/80. */
function pyramid(a: number, b: number, h: number): Solid {
  const v = (a * b * h) / 3;
  return {
    name: 'pyramid', points: [[-a / 2, -b / 2, 0], [a / 2, -b / 2, 0], [a / 2, b / 2, 0], [-a / 2, b / 2, 0], [0, 0, h]], faces: [[0, 3, 2, 1], [0, 1, 4], [1, 2, 4], [2, 3, 4], [3, 0, 4]],
    volume: v, centroid: [0, 0, h / 4], second: [(v * a * a) / 20, (v * b * b) / 20, (3 * v * h * h) / 80, 0, 0, 0],
  };
}

/** A square of side a with a square hole of side b: a box less a box, of genus 1. */
function ring(a: number, b: number, h: number): Solid {
  const square = (side: number, z: number): number[][] => [[-side, -side], [side, -side], [side, side], [-side, side]].map(([x, y]) => [x / 2, y / 2, z]);
  const faces = [0, 1, 2, 3].flatMap((i) => {
    const j = (i + 1) % 4;
    return [[i, j, 8 + j, 8 + i], [4 + j, 4 + i, 12 + i, 12 + j], [8 + i, 8 + j, 12 + j, 12 + i], [j, i, 4 + i, 4 + j]];
  });
  const v = (a * a - b * b) * h;
  const across = (h * (a ** 4 - b ** 4)) / 12;
  return { name: 'ring of square section', points: [...square(a, 0), ...square(b, 0), ...square(a, h), ...square(b, h)], faces, volume: v, centroid: [0, 0, h / 2], second: [across, across, (v * h * h) / 12, 0, 0, 0] };
}

const SOLIDS = [box(2, 3, 5), prism(3, 1.5, 2), prism(6, 1.25, 4), prism(11, 2, 0.5), wedge(2, 3, 1.5), tetrahedron(1, 2, 3), pyramid(3, 2, 4), ring(4, 2.5, 1)];

function allSharp({ points, faces }: Solid, triangles: boolean): Cage {
  const sides = triangles ? faces.flatMap((face) => face.slice(2).map((v, i) => [face[0], face[i + 1], v])) : faces;
  const edges = sides.flatMap((face) => face.map((a, i) => [a, face[(i + 1) % face.length], 10] as const)).filter(([a, b]) => a < b);
  return cageOf(points, sides, edges);
}

describe.each<[Scheme, boolean]>([['catmull-clark', false], ['catmull-clark', true], ['loop', true], ['polyhedral', false]])('%s, triangulated: %s', (scheme, triangles) => {
  it.each(SOLIDS.map((solid) => [solid.name, solid] as const))('%s', (_, solid) => {
    // Turned about a skew axis, shifted and drawn in another unit, so that no entry is zero by chance.
    const r = [[0.36, 0.48, -0.8], [-0.8, 0.6, 0], [0.48, 0.64, 0.6]];
    const shift = [7, -5, 3];
    const place = (p: readonly number[]): Three => r.map((row, i) => row[0] * p[0] + row[1] * p[1] + row[2] * p[2] + shift[i]) as unknown as Three;
    const cage = moved(allSharp(solid, triangles), (x, y, z) => place([x, y, z]));
    const { parts, findings } = measureCage(cage, { ...CATMULL_CLARK, scheme });
    expect(findings).toEqual([]);
    expect(facesOf(cage).length).toBe(parts[0].faces);
    const found = parts[0].components[0].solid;
    expect(Math.abs(found.volume / solid.volume - 1)).toBeLessThan(1e-13);
    place(solid.centroid).forEach((value, i) => expect(Math.abs(found.centroid[i] - value)).toBeLessThan(1e-13 * 10));
    const [xx, yy, zz, xy, xz, yz] = solid.second;
    const m = [[xx, xy, xz], [xy, yy, yz], [xz, yz, zz]];
    const entry = (i: number, j: number): number => m.reduce((sum, row, a) => sum + row.reduce((inner, value, b) => inner + r[i][a] * value * r[j][b], 0), 0);
    const wanted = [entry(0, 0), entry(1, 1), entry(2, 2), entry(0, 1), entry(0, 2), entry(1, 2)];
    wanted.forEach((value, i) => expect(Math.abs(found.centralSecond[i] - value)).toBeLessThan(1e-13 * (xx + yy + zz)));
  });
});
