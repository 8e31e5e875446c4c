import { expect, test } from 'vitest';
import fc from 'fast-check';
import type { Cage, Scheme } from '@/lib/engine/cage';
import { measureCage } from '@/lib/engine/measure';
import type { Finding } from '@/lib/engine/measured';
import { rayCrossing, trianglesCross } from '@/lib/engine/mesh/triangle-crossing';
import { boxPart, cageOf, type TestPart } from '../support/put-cage';

function findings(parts: readonly TestPart[], scheme: Scheme, change: (cage: Cage) => void = () => undefined): Finding[] {
  const cage = cageOf(parts);
  change(cage);
  return measureCage(cage, { scheme, boundary: 'edge-and-corner', triangles: 'catmark', creasing: 'uniform', partsBy: 'group' }).findings;
}

const codes = (found: Finding[]): string[] => found.map((finding) => `${finding.code} ${finding.part}`);
const reversed = (part: TestPart): TestPart => ({ ...part, faces: part.faces.map((face) => face.slice().reverse()) });
const under = (name: string, part: TestPart): TestPart => ({ ...part, name });

const unit = boxPart('a', [0, 0, 0], [1, 1, 1]);

test('boxes that fill the same space overlap, and both parts are told', () => {
  const found = findings([unit, boxPart('b', [0.5, 0.5, 0.5], [1.5, 1.5, 1.5])], 'polyhedral');
  expect(codes(found)).toEqual(['overlap a', 'overlap b']);
  expect(found[0].message).toContain('“b”');
  expect(found[0].count).toBe(3);
  expect(found[0].severity).toBe('warning');
});

test('the same boxes do not overlap as limit surfaces, which lie far inside such cages', () => {
  // The limit of a unit cube lies within 0.5 ± 0.35 an axis, so cubes that share a corner of a tenth stay clear of each other.
  expect(findings([unit, boxPart('b', [0.9, 0.9, 0.9], [1.9, 1.9, 1.9])], 'catmull-clark')).toEqual([]);
  expect(codes(findings([unit, boxPart('b', [0.3, 0.3, 0.3], [1.3, 1.3, 1.3])], 'catmull-clark'))).toEqual(['overlap a', 'overlap b']);
});

test('boxes that stand against each other touch but do not overlap, wherever they stand', () => {
  fc.assert(fc.property(fc.double({ min: -1e3, max: 1e3, noNaN: true }), fc.integer({ min: 0, max: 2 }), (shift, axis) => {
    const low: [number, number, number] = [shift, shift, shift];
    const next = low.slice() as [number, number, number];
    next[axis] += 1;
    const box = (name: string, at: [number, number, number]): TestPart => boxPart(name, at, [at[0] + 1, at[1] + 1, at[2] + 1]);
    expect(findings([box('a', low), box('b', next)], 'polyhedral')).toEqual([]);
  }), { numRuns: 40 });
});

test('a part on the very place of another counts twice', () => {
  for (const scheme of ['polyhedral', 'catmull-clark'] as const) expect(codes(findings([unit, under('b', unit)], scheme))).toEqual(['overlap a', 'overlap b']);
});

test('a part wholly inside another counts twice, but not one in its cavity', () => {
  const inner = boxPart('inner', [0.4, 0.4, 0.4], [0.6, 0.6, 0.6]);
  expect(codes(findings([unit, inner], 'polyhedral'))).toEqual(['overlap a', 'overlap inner']);
  const cavity = under('a', reversed(boxPart('cavity', [0.3, 0.3, 0.3], [0.7, 0.7, 0.7])));
  const found = findings([unit, cavity, inner], 'polyhedral');
  expect(codes(found)).toEqual(['nested_component a']);
  expect(found[0].message).toContain('cavity');
});

test('a body inside another of its part is noted as cavity or as solid by the way it is turned', () => {
  const core = boxPart('a', [0.4, 0.4, 0.4], [0.6, 0.6, 0.6]);
  for (const scheme of ['polyhedral', 'catmull-clark'] as const) {
    const [solid, ...others] = findings([unit, core], scheme);
    expect([solid.code, solid.severity, others]).toEqual(['nested_component', 'note', []]);
    expect(solid.message).toContain('solid');
    const [cavity] = findings([unit, reversed(core)], scheme);
    expect([cavity.code, cavity.severity]).toEqual(['nested_component', 'note']);
    expect(cavity.message).toContain('cavity');
  }
});

test('two bodies of one part that pass through each other overlap', () => {
  const found = findings([unit, boxPart('a', [0.25, 0.25, 0.5], [0.75, 0.75, 2])], 'polyhedral');
  expect(codes(found)).toEqual(['overlap a']);
  expect(found[0].message).toContain('another body of this part');
});

test('an inverted body that is outside all others is inside out, not a cavity', () => {
  expect(codes(findings([unit, reversed(boxPart('a', [2, 2, 2], [3, 3, 3]))], 'polyhedral'))).toEqual(['inside_out a']);
});

test('open edges that lie on each other are told, and closed bodies that touch are not', () => {
  const half = (name: string, z: [number, number], kept: number[]): TestPart => {
    const box = boxPart(name, [0, 0, z[0]], [1, 1, z[1]]);
    return { ...box, faces: kept.map((i) => box.faces[i]) };
  };
  const lower = half('lower', [0, 1], [0, 1, 2, 3, 4]);
  const upper = half('upper', [1, 2], [1, 2, 3, 4, 5]);
  const found = findings([lower, upper], 'polyhedral').filter((finding) => finding.code === 'near_coincident_vertices');
  expect(codes(found)).toEqual(['near_coincident_vertices lower', 'near_coincident_vertices upper']);
  expect(found.map((finding) => finding.count)).toEqual([4, 4]);
  const apart = findings([lower, half('upper', [1.1, 2], [1, 2, 3, 4, 5])], 'polyhedral');
  expect(apart.some((finding) => finding.code === 'near_coincident_vertices')).toBe(false);
});

test('triangles cross alike whichever comes first and however they are numbered', () => {
  const triangle = fc.array(fc.integer({ min: -3, max: 3 }), { minLength: 9, maxLength: 9 }).map((values) => Float64Array.from(values));
  fc.assert(fc.property(triangle, triangle, (s, t) => {
    const cross = trianglesCross(s, 0, t, 0);
    const turnedS = Float64Array.of(...s.subarray(3), ...s.subarray(0, 3));
    const mirroredT = Float64Array.of(...t.subarray(3, 6), ...t.subarray(0, 3), ...t.subarray(6));
    expect(trianglesCross(t, 0, s, 0)).toBe(cross);
    expect(trianglesCross(turnedS, 0, mirroredT, 0)).toBe(cross);
  }));
});

test('a ray leaves a closed surface once more than it enters exactly where it starts inside, also through edges and corners', () => {
  const corners = [[0, 0, 0], [4, 0, 0], [0, 4, 0], [0, 0, 4]];
  const faces = [[0, 2, 1], [0, 1, 3], [0, 3, 2], [1, 2, 3]];
  const triangles = Float64Array.from(faces.flatMap((face) => face.flatMap((corner) => corners[corner])));
  const coordinate = fc.integer({ min: -2, max: 10 }).map((value) => value / 2);
  fc.assert(fc.property(coordinate, coordinate, coordinate, (x, y, z) => {
    fc.pre(x !== 0 && y !== 0 && z !== 0 && x + y + z !== 4);
    let winding = 0;
    for (let t = 0; t < 4; t++) winding += rayCrossing(triangles, 9 * t, x, y, z);
    expect(winding).toBe(x > 0 && y > 0 && z > 0 && x + y + z < 4 ? 1 : 0);
  }));
});
