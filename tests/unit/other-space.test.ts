import { describe, expect, it } from 'vitest';
import { askedOtherwise } from '@/lib/imports/asked-otherwise';
import { isAsItIs, placeOrRefuse, placingIn, type ShowSpace } from '@/lib/imports/file-space';
import { placeCage, placingNotes } from '@/lib/imports/place-cage';
import { LINEAR_UNITS, METRES_PER } from '@/lib/rules/units';
import { failureOf, measureAsIs } from '../support/read-cages';
import { cageOf } from '../support/engine-cages';

/** A box with one corner at the origin, of quads. */
const boxCage = ([a, b, c]: [number, number, number]) =>
  cageOf([[0, 0, 0], [a, 0, 0], [a, b, 0], [0, b, 0], [0, 0, c], [a, 0, c], [a, b, c], [0, b, c]], [[0, 3, 2, 1], [4, 5, 6, 7], [0, 1, 5, 4], [1, 2, 6, 5], [2, 3, 7, 6], [3, 0, 4, 7]]);

const show: ShowSpace = { metresPerUnit: METRES_PER.cm, upAxis: 'y', other: 'convert' };

describe('a file that states its unit or up axis', () => {
  it('is left as it is where it agrees with the show, or states nothing', () => {
    for (const stated of [{ metresPerUnit: 0.01, upAxis: 'y' }, { metresPerUnit: Math.fround(0.01), upAxis: null }, { metresPerUnit: null, upAxis: null }] as const) {
      expect(isAsItIs(placingIn(stated, show)), JSON.stringify(stated)).toBe(true);
      expect(placingNotes(stated, show, placingIn(stated, show))).toEqual([]);
    }
    expect(isAsItIs(placingIn({ metresPerUnit: 0.3048, upAxis: 'z' }, { metresPerUnit: METRES_PER.ft, upAxis: 'z' }))).toBe(true);
  });

  it('is scaled by the ratio of the units, to the last digit, there and back', () => {
    // Ratios of the international inch, foot and metric units, by their definitions.
    const ratios = { 'm cm': 100, 'cm m': 0.01, 'in cm': 2.54, 'ft in': 12, 'ft m': 0.3048, 'mm in': 5 / 127, 'm ft': 1250 / 381 };
    for (const [pair, ratio] of Object.entries(ratios)) {
      const [from, to] = pair.split(' ') as ('m' | 'cm')[];
      expect(placingIn({ metresPerUnit: METRES_PER[from], upAxis: null }, { metresPerUnit: METRES_PER[to], upAxis: 'y' }).unitScale, pair).toBe(ratio);
    }
    for (const from of LINEAR_UNITS) {
      for (const to of LINEAR_UNITS) {
        const rounded = placingIn({ metresPerUnit: Math.fround(METRES_PER[from]), upAxis: null }, { metresPerUnit: METRES_PER[to], upAxis: 'y' });
        expect(rounded, 'written as a float').toEqual(placingIn({ metresPerUnit: METRES_PER[from], upAxis: null }, { metresPerUnit: METRES_PER[to], upAxis: 'y' }));
      }
    }
    expect(placingIn({ metresPerUnit: 0.37, upAxis: null }, show).unitScale).toBeCloseTo(37, 13);
  });

  it('is turned by a rotation, never mirrored: volume stays positive and up stays up', () => {
    for (const [fileUp, showUp, upOf] of [['z', 'y', 1], ['y', 'z', 2]] as const) {
      const cage = boxCage([1, 2, 3]);
      const top = fileUp === 'z' ? 2 : 1;
      const heights = Array.from({ length: 8 }, (_, v) => cage.positions[3 * v + top]);
      placeCage(cage, placingIn({ metresPerUnit: 1, upAxis: fileUp }, { metresPerUnit: 1, upAxis: showUp }));
      expect(Array.from({ length: 8 }, (_, v) => cage.positions[3 * v + upOf])).toEqual(heights);
      expect(measureAsIs(cage).volume).toBeCloseTo(6, 14);
      expect(cage.positions.some((value) => Object.is(value, -0))).toBe(false);
    }
  });

  it('is divided where the unit is a whole part of the show’s, so that no digit is lost', () => {
    const cage = { ...boxCage([1, 1, 1]), positions: Float64Array.of(7, 35, 110, 0, 0, 0, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1) };
    placeCage(cage, { unitScale: 0.01, turn: 'none' });
    expect(Array.from(cage.positions.subarray(0, 3))).toEqual([0.07, 0.35, 1.1]);
  });

  it('is refused where the conversion leaves the range of coordinates', () => {
    const cage = { ...boxCage([1, 1, 1]) };
    cage.positions[4] = 1e49;
    expect(failureOf(() => placeCage(cage, { unitScale: 100, turn: 'none' }))).toMatchObject({ code: 'number_too_large' });
  });

  it('is said with both units and both axes', () => {
    const stated = { metresPerUnit: 0.0254, upAxis: 'z' } as const;
    expect(placingNotes(stated, show, placingIn(stated, show))).toMatchObject([
      { code: 'converted_unit', message: 'The file is in inches, the show in centimetres: its lengths were multiplied by 2.54.' },
      { code: 'turned_axis', message: 'The file has Z up, the show Y up: it was turned by a quarter about X.' },
    ]);
  });

  it('is refused where the show converts nothing, with both said', () => {
    const strict: ShowSpace = { ...show, other: 'refuse' };
    expect(failureOf(() => placeOrRefuse({ metresPerUnit: 1, upAxis: 'y' }, strict))).toMatchObject({ code: 'units_disagree', found: 'metres', expected: 'centimetres', detail: expect.stringMatching(/centimetres.*metres/) });
    expect(failureOf(() => placeOrRefuse({ metresPerUnit: 0.01, upAxis: 'z' }, strict))).toMatchObject({ code: 'axis_disagrees', found: 'Z up', expected: 'Y up' });
    expect(isAsItIs(placeOrRefuse({ metresPerUnit: 0.01, upAxis: 'y' }, strict))).toBe(true);
  });
});

describe('a file that asks for another subdivision', () => {
  const options = { scheme: 'catmull-clark', boundary: 'edge-and-corner', triangles: 'catmark', creasing: 'uniform', partsBy: 'whole' } as const;

  it('is told so, and nothing else is said', () => {
    expect(askedOtherwise({ scheme: 'catmull-clark', boundary: 'edge-and-corner', triangles: 'catmark' }, options)).toEqual([]);
    expect(askedOtherwise({ boundary: null }, options)).toEqual([]);
    expect(askedOtherwise({ scheme: 'loop', boundary: 'edge-only' }, options).map((warning) => warning.code)).toEqual(['scheme_differs']);
    const [boundary, triangles] = askedOtherwise({ scheme: 'catmull-clark', boundary: 'edge-only', triangles: 'smooth' }, options);
    expect(boundary.message).toBe('The file asks for the boundary edge-only; it was measured under edge-and-corner.');
    expect(triangles.code).toBe('triangles_differ');
  });
});
