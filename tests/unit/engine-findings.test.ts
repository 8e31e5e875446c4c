import { describe, expect, it } from 'vitest';
import type { Cage } from '@/lib/engine/cage';
import { massProperties } from '@/lib/engine/mass-properties';
import { measureCage } from '@/lib/engine/measure';
import type { Place, Severity } from '@/lib/engine/measured';
import { cageOf, CATMULL_CLARK, facesOf } from '../support/engine-cages';

const POINTS = [0, 1, 2, 3, 4, 5, 6, 7].map((i) => [i & 1, (i >> 1) & 1, i >> 2]);
const FACES = [[0, 2, 3, 1], [4, 5, 7, 6], [0, 1, 5, 4], [2, 6, 7, 3], [0, 4, 6, 2], [1, 3, 7, 5]];
const shifted = (by: number, scale = 1): number[][] => POINTS.map((p) => p.map((x) => scale * x + by));
const more = (faces: readonly number[][], by: number): number[][] => faces.map((face) => face.map((v) => v + by));
const inwards = FACES.map((face) => face.slice().reverse());
const polyhedral = { ...CATMULL_CLARK, scheme: 'polyhedral' as const };

/** One broken cage for each thing that the diagnosis names, and the place that it must give. */
const BROKEN: [code: string, severity: Severity, cage: Cage, place: keyof Place][] = [
  ['open_border', 'problem', cageOf(POINTS, FACES.slice(0, 5)), 'edge'],
  ['non_manifold_edge', 'problem', cageOf([...POINTS, [2, 0, 0.5]], [...FACES, [1, 5, 8]]), 'edge'],
  ['non_manifold_vertex', 'problem', cageOf([...POINTS, ...shifted(1).slice(1)], [...FACES, ...FACES.map((face) => face.map((v) => (v === 0 ? 7 : v + 7)))]), 'vertex'],
  ['flipped_face', 'problem', cageOf(POINTS, [...FACES.slice(0, 5), inwards[5]]), 'face'],
  ['inside_out', 'problem', cageOf(POINTS, inwards), 'face'],
  ['degenerate_face', 'problem', cageOf(POINTS, [...FACES, [0, 1, 1]]), 'face'],
  ['duplicate_face', 'problem', cageOf(POINTS, [...FACES, FACES[3]]), 'face'],
  ['not_finite', 'problem', cageOf([[NaN, 0, 0], ...POINTS.slice(1)], FACES), 'vertex'],
  ['isolated_vertex', 'note', cageOf([...POINTS, [9, 9, 9]], FACES), 'vertex'],
  ['nested_component', 'note', cageOf([...POINTS, ...shifted(0.25, 0.5)], [...FACES, ...more(inwards, 8)]), 'face'],
  ['overlap', 'warning', cageOf([...POINTS, ...shifted(0.5)], [...FACES, ...more(FACES, 8)]), 'face'],
  ['near_coincident_vertices', 'warning', cageOf([...POINTS, ...POINTS.slice(4)], [...FACES.slice(0, 1), ...FACES.slice(2), [8, 9, 11, 10]]), 'vertex'],
  ['crease_without_edge', 'warning', cageOf(POINTS, FACES, [[0, 7, 3]]), 'edge'],
];

describe.each(BROKEN)('%s', (code, severity, cage, place) => {
  const measured = measureCage(cage, polyhedral);
  const found = measured.findings.find((finding) => finding.code === code);

  it('has its severity, its place and a sentence that says what to do', () => {
    expect(measured.findings.map((finding) => finding.code)).toContain(code);
    expect(found?.severity).toBe(severity);
    expect(found?.places[0][place]).not.toBeNull();
    expect(found?.places[0].position).not.toBeNull();
    expect(found?.places.length).toBe(Math.min(20, found?.count ?? 0));
    expect(found?.message).toMatch(/^[^!]{20,}[;,] [^!]+\.$/);
  });

  it('yields a number exactly where it does not forbid one', () => {
    const { components } = measured.parts[0];
    const value = massProperties({ components, metresPerUnit: 1, scale: 1, construction: 'solid', densityKgPerM3: 1000 });
    // An open part is measured, since as a sheet it may have a value; the value of a solid is held back by the finding's severity.
    expect(value.ok).toBe(severity !== 'problem' || code === 'open_border');
    expect(facesOf(cage).length).toBe(measured.faces);
  });
});
