import { describe, expect, it } from 'vitest';
import { askedOtherwise } from '@/lib/imports/asked-otherwise';
import { refuseOtherSpace } from '@/lib/imports/refuse-other-space';
import { METRES_PER } from '@/lib/rules/units';
import { failureOf } from '../support/read-cages';

describe('a file that states its unit or up axis', () => {
  const show = { metresPerUnit: METRES_PER.cm, upAxis: 'y' } as const;

  it('passes where it agrees with the show, or states nothing', () => {
    refuseOtherSpace({ metresPerUnit: 0.01, upAxis: 'y' }, show);
    refuseOtherSpace({ metresPerUnit: Math.fround(0.01), upAxis: null }, show);
    refuseOtherSpace({ metresPerUnit: null, upAxis: null }, show);
    refuseOtherSpace({ metresPerUnit: 0.3048, upAxis: 'z' }, { metresPerUnit: METRES_PER.ft, upAxis: 'z' });
  });

  it('is refused where it does not, with both said', () => {
    expect(failureOf(() => refuseOtherSpace({ metresPerUnit: 1, upAxis: 'y' }, show))).toMatchObject({ code: 'units_disagree', found: '1', expected: '0.01 metres per unit' });
    expect(failureOf(() => refuseOtherSpace({ metresPerUnit: 0.01, upAxis: 'z' }, show))).toMatchObject({ code: 'axis_disagrees', found: 'Z', expected: 'Y' });
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
