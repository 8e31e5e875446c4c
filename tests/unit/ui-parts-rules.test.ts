import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { groupByAsset, partNodes, passes } from '@/lib/rules/arrange-parts';
import { mergeParts } from '@/lib/rules/merge-parts';
import { parseMassEntry } from '@/lib/rules/parse-mass-entry';
import { partKey } from '@/lib/rules/part-key';
import { moveActive, NO_SELECTION, selectRow } from '@/lib/rules/select-rows';
import { changeOf, itemFor, restoring, shareByVolume } from '@/lib/rules/value-change';
import { readForm, startForm } from '@/lib/rules/value-form';
import { makePartPage, makePartRow } from '../support/make-part-row';

describe('parseMassEntry', () => {
  // Pound and ounce: international agreement of 1959, 1 lb = 0.45359237 kg exactly.
  it.each([
    ['640', { kind: 'target_mass', massKg: 640 }],
    ['640 kg', { kind: 'target_mass', massKg: 640 }],
    ['85 g', { kind: 'target_mass', massKg: 0.085 }],
    ['1.5 t', { kind: 'target_mass', massKg: 1500 }],
    ['2 lb', { kind: 'target_mass', massKg: 0.90718474 }],
    ['7.85 g/cm3', { kind: 'density', densityKgPerM3: 7850 }],
    ['7.85 g/cm³', { kind: 'density', densityKgPerM3: 7850 }],
    ['1000 kg / m^3', { kind: 'density', densityKgPerM3: 1000 }],
    ['300 g/m2', { kind: 'areal_density', arealDensityKgPerM2: 0.3 }],
    ['.5e3', { kind: 'target_mass', massKg: 500 }],
    ['horn, KERATIN', { kind: 'material', name: 'Horn, keratin' }],
  ])('reads %s', (text, expected) => {
    const parsed = parseMassEntry(text, ['Horn, keratin', 'Oak']);
    expect(parsed.ok && Object.keys(parsed.entry)).toEqual(Object.keys(expected));
    for (const [key, value] of Object.entries(expected)) {
      const found = parsed.ok ? Object.entries(parsed.entry).find(([name]) => name === key)?.[1] : undefined;
      if (typeof value === 'number') expect(found).toBeCloseTo(value, 10);
      else expect(found).toBe(value);
    }
  });

  it.each(['', '0', '-3 kg', '1,283 kg', '5 stone', 'brass', 'NaN', '1e999', '12 constructor'])(
    'refuses %j with a sentence',
    (text) => {
      const parsed = parseMassEntry(text, ['Oak']);
      expect(parsed).toMatchObject({ ok: false, message: expect.stringMatching(/\.$/) });
    },
  );
});

describe('changes of values', () => {
  it('name the row with the revision that was seen', () => {
    expect(itemFor(makePartRow({ asset: 'ox', part: 'head', revision: 7 }), { density_kg_m3: 5 })).toEqual({
      asset: 'ox',
      part: 'head',
      revision: 7,
      density_kg_m3: 5,
    });
  });

  it('clear what would win over them', () => {
    expect(changeOf({ kind: 'material', name: 'Oak' })).toEqual({
      target_mass_kg: null,
      density_kg_m3: null,
      material: 'Oak',
    });
  });

  it('bring back a material without making its density a density set by hand', () => {
    const before = makePartRow({ mass_source: 'material', material: 'Oak', density_kg_m3: 750, target_mass_kg: null });
    expect(restoring(before)).toMatchObject({
      material: 'Oak',
      density_kg_m3: null,
      target_mass_kg: null,
      left_out: false,
    });
  });

  it('share a mass by volume, losing and adding nothing', () => {
    const volumes = fc.array(fc.double({ min: 1e-6, max: 1e3, noNaN: true }), { minLength: 1, maxLength: 30 });
    fc.assert(
      fc.property(volumes, fc.double({ min: 1e-3, max: 1e6, noNaN: true }), (list, mass) => {
        const rows = list.map((volume_m3, index) => makePartRow({ part: `p${index}`, volume_m3 }));
        const shares = shareByVolume(rows, mass)!;
        expect(Math.abs(shares.reduce((sum, share) => sum + share, 0) / mass - 1)).toBeLessThan(1e-12);
        shares.forEach((share, index) => expect(share / list[index] / (shares[0] / list[0])).toBeCloseTo(1, 10));
      }),
    );
    expect(shareByVolume([makePartRow({ volume_m3: null })], 5)).toBeNull();
  });

  it('are read from the form in the show’s own unit', () => {
    const rows = [makePartRow({}), makePartRow({ part: 'other' })];
    const form = {
      ...startForm(rows, 'cm'),
      source: 'density' as const,
      amount: '7.85 g/cm3',
      construction: 'hollow' as const,
      wall: '0.12',
    };
    const read = readForm(form, rows, 'cm');
    expect(read.ok && read.changes).toHaveLength(2);
    expect(read.ok && read.changes[0]).toMatchObject({
      construction: 'hollow',
      density_kg_m3: 7850,
      target_mass_kg: null,
    });
    expect(read.ok && read.changes[0].wall_m).toBeCloseTo(0.0012, 12);
    expect(readForm({ ...form, wall: 'thin' }, rows, 'cm')).toMatchObject({ ok: false, field: 'wall' });
    expect(readForm({ ...form, amount: '5 kg' }, rows, 'cm')).toMatchObject({ ok: false, field: 'amount' });
  });
});

describe('arranging', () => {
  const rows = [
    makePartRow({ asset: 'ox', part: 'horn_L', material: 'Horn, keratin' }),
    makePartRow({ asset: 'ox', part: 'horn_R', state: 'blocked' }),
    makePartRow({ asset: 'bell', part: 'shell', category: 'prop', bounds_m: [0, 0, 0, 1, 5, 1] }),
  ];

  it('finds mirror partners within the asset and the asset’s size', () => {
    const [left, right, shell] = partNodes(rows);
    expect([left.partner, right.partner, shell.partner]).toEqual([rows[1], rows[0], null]);
    expect(shell.largest).toBe(5);
  });

  it('filters by every word, by state and by category', () => {
    const all = { text: '', states: [], category: null };
    expect(rows.map((row) => passes(row, { ...all, text: 'OX keratin' }))).toEqual([true, false, false]);
    expect(rows.map((row) => passes(row, { ...all, states: ['blocked'] }))).toEqual([false, true, false]);
    expect(rows.map((row) => passes(row, { ...all, category: 'prop' }))).toEqual([false, false, true]);
  });

  it('leaves out assets with no part left', () => {
    const { assets } = makePartPage(rows);
    expect(groupByAsset(partNodes(rows.slice(0, 2)), assets).map((node) => node.total.asset)).toEqual(['ox']);
  });
});

describe('merging', () => {
  it('never puts an older revision over a newer one', () => {
    const held = makePartRow({ revision: 5, mass_kg: 2 });
    const [page] = mergeParts([makePartPage([held])], { items: [{ ...held, revision: 4, mass_kg: 1 }] });
    expect(page.items[0].mass_kg).toBe(2);
    const [next] = mergeParts([page], { items: [{ ...held, revision: 6, mass_kg: 3 }] });
    expect(next.items[0].mass_kg).toBe(3);
  });
});

describe('selection', () => {
  const rows = ['a', 'b', 'c', 'd'].map((key) => ({ key, parts: [key] }));
  const group = [
    { key: 'ox/', parts: ['ox/1', 'ox/2'] },
    { key: 'ox/1', parts: ['ox/1'] },
    { key: 'ox/2', parts: ['ox/2'] },
  ];

  it('takes a range from the anchor either way', () => {
    const start = selectRow(NO_SELECTION, rows, 'c', 'only');
    expect([...selectRow(start, rows, 'a', 'range').chosen]).toEqual(['a', 'b', 'c']);
    expect([...selectRow(selectRow(start, rows, 'a', 'range'), rows, 'd', 'range').chosen]).toEqual(['c', 'd']);
  });

  it('chooses an asset’s parts, and lets all of them go again', () => {
    const chosen = selectRow(NO_SELECTION, group, 'ox/', 'toggle');
    expect([...chosen.chosen]).toEqual(['ox/1', 'ox/2']);
    expect(selectRow(chosen, group, 'ox/', 'toggle').chosen.size).toBe(0);
  });

  it('stays within the rows however far it moves', () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(fc.integer({ min: -9, max: 9 }), fc.boolean())), (moves) => {
        const end = moves.reduce((now, [steps, extend]) => moveActive(now, rows, steps, extend), NO_SELECTION);
        expect(end.active === null || rows.some((row) => row.key === end.active)).toBe(true);
        for (const key of end.chosen) expect(rows.some((row) => row.key === key)).toBe(true);
      }),
    );
  });
});

describe('partKey', () => {
  it('tells a body from a part of the same name', () => {
    expect(partKey(makePartRow({ row: 'body', body: 'head', part: null }))).not.toBe(
      partKey(makePartRow({ part: 'head' })),
    );
  });
});
