import { describe, expect, it } from 'vitest';
import type { Scheme } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import { boxPart, cageOf, type TestPart } from '../support/put-cage';

function overlaps(parts: readonly TestPart[], scheme: Scheme): boolean {
  const { findings } = measureCage(cageOf(parts), { scheme, boundary: 'edge-and-corner', triangles: 'catmark', creasing: 'uniform', partsBy: 'group' });
  const codes = findings.map((finding) => `${finding.code} ${finding.part}`);
  if (codes.length > 0) expect(codes).toEqual(parts.map((part) => `overlap ${part.name}`));
  return codes.length > 0;
}

/** Two unit cubes that share a corner of edge `depth`. */
function cornered(depth: number): TestPart[] {
  const from = 1 - depth;
  return [boxPart('a', [0, 0, 0], [1, 1, 1]), boxPart('b', [from, from, from], [from + 1, from + 1, from + 1])];
}

function octahedron(name: string, x: number): TestPart {
  return {
    name, positions: [[x + 1, 0, 0], [x - 1, 0, 0], [x, 1, 0], [x, -1, 0], [x, 0, 1], [x, 0, -1]],
    faces: [[0, 2, 4], [2, 1, 4], [1, 3, 4], [3, 0, 4], [2, 0, 5], [1, 2, 5], [3, 1, 5], [0, 3, 5]],
  };
}

/** Two octahedra of radius 1, tip against tip along x, their centres so far apart. */
const tipped = (distance: number): TestPart[] => [octahedron('a', 0), octahedron('b', distance)];

/** Where the limit surfaces of two equal cages begin to overlap, by the limit masks at the vertices that come first. */
describe.each<[Scheme, string, (size: number) => TestPart[], number, number]>([
  // Catmull-Clark limit at a corner of a cube (n²v + 4Σe + Σf)/(n(n + 5)), n = 3: a quarter of the edge inwards an axis [Halstead, Kass & DeRose 1993].
  ['catmull-clark', 'corners of cubes', cornered, 0.51, 0.49],
  // At the corner of a cube the first step leaves the triangle (¼, ¼, 0), (¼, 0, ¼), (0, ¼, ¼), whose centroid (1, 1, 1)/6 stays [Doo & Sabin 1978].
  ['doo-sabin', 'corners of cubes', cornered, 1 / 3 + 0.01, 1 / 3 - 0.01],
  // Loop limit (⅜v + nβ · mean e)/(⅜ + nβ) at a tip, n = 4, nβ = 31/64, mean e = 0: 24/55 of the radius [Loop 1987].
  ['loop', 'tips of octahedra', tipped, 48 / 55 - 0.01, 48 / 55 + 0.01],
  // Catmull-Clark at the same tip, after one refinement into quads: 13/27 of the radius.
  ['catmull-clark', 'tips of octahedra', tipped, 26 / 27 - 0.01, 26 / 27 + 0.01],
  ['polyhedral', 'corners of cubes', cornered, 0.01, -0.01],
  ['polyhedral', 'tips of octahedra', tipped, 1.99, 2.01],
])('%s, %s', (scheme, _, make, within, beyond) => {
  it('overlap as soon as the limits do', () => expect(overlaps(make(within), scheme)).toBe(true));

  it('do not while only the cages do', () => expect(overlaps(make(beyond), scheme)).toBe(false));
});

describe.each<Scheme>(['catmull-clark', 'loop', 'doo-sabin', 'polyhedral'])('%s', (scheme) => {
  it('tells a part wholly inside another from one that only its cage holds', () => {
    const inside: TestPart = { ...octahedron('b', 0), positions: octahedron('b', 0).positions.map(([x, y, z]) => [0.1 * x, 0.1 * y, 0.1 * z]) };
    expect(overlaps([octahedron('a', 0), inside], scheme)).toBe(true);
    // At 0.97 of the radius an octahedron's cage is about the tiny part, its limit surface is not.
    const atTip: TestPart = { ...inside, positions: inside.positions.map(([x, y, z]) => [0.97 + 0.1 * x, 0.1 * y, 0.1 * z]) };
    expect(overlaps([octahedron('a', 0), atTip], scheme)).toBe(scheme === 'polyhedral');
  });
});
