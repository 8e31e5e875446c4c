import { createHash } from 'node:crypto';
import { describe, expect, test } from 'vitest';
import { mergeSetting, settingChanges } from '@/lib/settings/merge-setting';
import { computeValue } from '@/lib/values/compute-value';
import { massSource } from '@/lib/values/mass-source';
import { NO_SETTING, type MassSetting, type MaterialNow, type ValueInputs } from '@/lib/values/value-inputs';

const OAK: MaterialNow = { id: 'm1', name: 'oak', revision: 3, densityKgPerM3: 700, arealDensityKgPerM2: null };
const FELT: MaterialNow = { id: 'm2', name: 'felt', revision: 1, densityKgPerM3: null, arealDensityKgPerM2: 1.5 };

const given = (fields: Partial<MassSetting>): MassSetting => ({ ...NO_SETTING, ...fields });

/** A unit cube about (½, ½, ½), in its own numbers: V = 1, ∫x² about the centre 1/12; surface area 6. */
const CUBE: ValueInputs = {
  record: { contentSha256: 'ab'.repeat(32), scheme: 'polyhedral', boundary: 'edge-and-corner', triangles: 'catmark', creasing: 'uniform', partsBy: 'group', engineVersion: '1' },
  asset: 'box',
  part: 'cube',
  upAxis: 'y',
  metresPerUnit: 1,
  scale: 1,
  setting: NO_SETTING,
  components: [
    {
      solid: { volume: 1, centroid: [0.5, 0.5, 0.5], centralSecond: [1 / 12, 1 / 12, 1 / 12, 0, 0, 0] },
      surface: { area: 6, centroid: [0.5, 0.5, 0.5], centralSecond: [5 / 6, 5 / 6, 5 / 6, 0, 0, 0] },
      hollow: null,
      hollowLimits: null,
      errorEstimate: 1e-16,
      surfaceErrorEstimate: 1e-16,
      cageVolume: 1,
    },
  ],
  bounds: [0, 0, 0, 1, 1, 1],
  findings: [],
};

describe('what the mass comes from', () => {
  test.each([
    ['nothing', {}, null],
    ['a target mass before all', { targetMassKg: 2, densityKgPerM3: 3, material: OAK }, 'target_mass'],
    ['a density before a material', { densityKgPerM3: 3, material: OAK }, 'density'],
    ['a material', { material: OAK }, 'material'],
    ['a weight per area on a solid', { arealDensityKgPerM2: 1 }, null],
    ['a weight per area on a sheet', { construction: 'sheet', arealDensityKgPerM2: 1 }, 'areal_density'],
    ['a cloth on a sheet', { construction: 'sheet', material: FELT }, 'material'],
    ['a cloth on a solid', { material: FELT }, null],
    ['a density on a sheet', { construction: 'sheet', densityKgPerM3: 3 }, null],
    ['a density and a wall on a sheet', { construction: 'sheet', densityKgPerM3: 3, wallM: 0.1 }, 'density'],
    ['a hollow part without its wall', { construction: 'hollow', targetMassKg: 2 }, null],
    ['a hollow part', { construction: 'hollow', densityKgPerM3: 2, wallM: 0.1 }, 'density'],
  ] as const)('%s', (_, fields, source) => {
    expect(massSource(given(fields)).applied?.source ?? null).toBe(source);
  });

  test('a density over a wall is a weight per area', () => {
    expect(massSource(given({ construction: 'sheet', densityKgPerM3: 800, wallM: 0.002 })).applied?.arealDensityKgPerM2).toBeCloseTo(1.6, 15);
  });
});

describe('an item over a setting', () => {
  const item = { asset: 'a', part: 'p', revision: 1 };

  test('replaces the other sources, and only those', () => {
    const before = given({ densityKgPerM3: 5, variant: 'wet', wallM: 0.1 });
    expect(mergeSetting(before, { ...item, target_mass_kg: 2 }, undefined)).toEqual({ ...before, targetMassKg: 2, densityKgPerM3: null });
    expect(mergeSetting(before, { ...item, material: 'oak' }, OAK)).toEqual({ ...before, material: OAK, densityKgPerM3: null });
  });

  test('clears by null and keeps what it leaves out', () => {
    const before = given({ targetMassKg: 2, densityKgPerM3: 5, wallM: 0.1, variant: 'wet' });
    expect(mergeSetting(before, { ...item, target_mass_kg: null }, undefined)).toEqual({ ...before, targetMassKg: null });
    expect(mergeSetting(before, { ...item, wall_m: null, variant: '' }, undefined)).toEqual({ ...before, wallM: null, variant: null });
    expect(mergeSetting(before, item, undefined)).toEqual(before);
  });

  test('is no change where it says what stands', () => {
    const before = given({ material: OAK });
    expect(settingChanges(before, mergeSetting(before, { ...item, material: 'oak' }, OAK))).toEqual([]);
    expect(settingChanges(before, given({ material: { ...OAK, id: 'other' } }))).toHaveLength(1);
  });
});

describe('the hash of a value', () => {
  test('is that of the canonical form as it is written down', () => {
    // A cube of 2 cm, 0.1 kg: m·a²/6 about each axis; 0.1 / 8e-6 kg/m³.
    const canonical =
      `["weighhouse-value-2",["${'ab'.repeat(32)}","polyhedral","edge-and-corner","catmark","uniform","group","1"],["box","cube"],0.01,2,"solid",null,0.1,null,` +
      `["oak",3,700,null],null,"wet","signed","y",[`;
    const value = computeValue({ ...CUBE, metresPerUnit: 0.01, scale: 2, setting: given({ targetMassKg: 0.1, material: OAK, variant: 'wet' }) });
    const text = value.canonical ?? '';
    expect(text.startsWith(canonical)).toBe(true);
    const numbers = (JSON.parse(text) as unknown[][])[14];
    expect(numbers).toHaveLength(23);
    const expected = [12500, null, 24e-4, 8e-6, 0.1, 0.01, 0.01, 0.01, ...[1, 1, 1].map((m) => (m * 0.1 * 4e-4) / 6), 0, 0, 0, ...[1, 1, 1].map((m) => (m * 0.1 * 4e-4) / 6), 1, 0, 0, 0];
    expected.forEach((number, i) => (number ? expect(Number(numbers[i]) / number).toBeCloseTo(1, 13) : expect(numbers[i]).toBe(number)));
    expect(numbers[22]).toBe('123');
    expect(value.valueSha256).toBe(createHash('sha256').update(text, 'utf8').digest('hex'));
  });

  test('differs with every input', () => {
    const base = given({ densityKgPerM3: 5 });
    const changes: ValueInputs[] = [
      { ...CUBE, setting: base },
      { ...CUBE, setting: base, asset: 'other' },
      { ...CUBE, setting: base, part: 'other' },
      { ...CUBE, setting: base, upAxis: 'z' },
      { ...CUBE, setting: base, scale: 2 },
      { ...CUBE, setting: base, metresPerUnit: 0.01 },
      ...Object.keys(CUBE.record).map((key) => ({ ...CUBE, setting: base, record: { ...CUBE.record, [key]: 'x' } })),
      ...([
        { construction: 'sheet', arealDensityKgPerM2: 1 }, { wallM: 0.1 }, { targetMassKg: 1 }, { densityKgPerM3: 6 }, { material: OAK }, { material: { ...OAK, revision: 4 } },
        { arealDensityKgPerM2: 1 }, { variant: 'dry' },
      ] as const).map((fields) => ({ ...CUBE, setting: { ...base, ...fields } })),
    ];
    const hashes = changes.map((inputs) => computeValue(inputs).valueSha256);
    expect(hashes).not.toContain(null);
    expect(new Set(hashes).size).toBe(changes.length);
  });
});

describe('the value of a unit cube', () => {
  const valueOf = (setting: Partial<MassSetting>, rest: Partial<ValueInputs> = {}) => computeValue({ ...CUBE, ...rest, setting: given(setting) });

  test('solid: mass = density, m/6 about each axis', () => {
    const value = valueOf({ densityKgPerM3: 12 });
    expect(value).toMatchObject({ state: 'measured', massSource: 'density', volumeM3: 1, areaM2: 6 });
    expect(value.properties?.massKg).toBe(12);
    for (const moment of value.properties?.principalKgM2 ?? []) expect(moment).toBeCloseTo(2, 14);
    expect(value.properties?.freeAxes).toBe('123');
  });

  test('sheet: mass = weight per area × area, and density follows only from a solid', () => {
    const value = valueOf({ construction: 'sheet', arealDensityKgPerM2: 2 });
    expect(value.properties?.massKg).toBe(12);
    expect(value).toMatchObject({ volumeM3: null, densityKgPerM3: null, arealDensityKgPerM2: 2 });
  });

  /** A unit cube's wall to t² (6t − 12t²), with a surface that bends by a radius of 0.2 somewhere. */
  const walled = CUBE.components.map((component) => {
    const hollow = new Float64Array(50);
    [[0, 6, -12], [4, 5 / 6, -11 / 3], [5, 5 / 6, -11 / 3], [6, 5 / 6, -11 / 3]].forEach(([moment, t1, t2]) => hollow.set([t1, t2], 5 * moment));
    return { ...component, hollow, hollowLimits: { curvature: 5, position: [0.1, 0.2, 0.3] as [number, number, number], error: [0, 0, 16] as [number, number, number] } };
  });

  test('hollow: mass = density × wall', () => {
    const value = valueOf({ construction: 'hollow', densityKgPerM3: 100, wallM: 0.01 }, { components: walled });
    expect(value).toMatchObject({ state: 'measured', volumeM3: 1, warningCodes: [] });
    expect(value.properties?.massKg).toBeCloseTo(100 * (0.06 - 0.0012), 12);
  });

  test('hollow: a wall over the smallest radius is a warning with its place, one that fills the part a problem', () => {
    const value = valueOf({ construction: 'hollow', densityKgPerM3: 100, wallM: 0.22 }, { components: walled, metresPerUnit: 1, scale: 1 });
    expect(value).toMatchObject({ state: 'measured', warningCodes: ['wall_over_radius'] });
    expect(value.valueFindings[0].message).toContain('0.2 m at 0.1, 0.2, 0.3 m');
    expect(valueOf({ construction: 'hollow', densityKgPerM3: 100, wallM: 0.4 }, { components: walled })).toMatchObject({ state: 'blocked', problemCodes: ['wall_too_thick'] });
  });

  test('hollow: a record of an engine without walls is refused by name', () => {
    expect(valueOf({ construction: 'hollow', densityKgPerM3: 100, wallM: 0.01 })).toMatchObject({ state: 'blocked', problemCodes: ['wall_not_measured'] });
  });

  test('a volume is known before a mass', () => {
    expect(valueOf({})).toMatchObject({ state: 'unset', properties: null, volumeM3: 1, cageVolumeM3: 1, valueSha256: null });
  });

  test('a problem blocks; an open border does not block a sheet', () => {
    const findings = [{ code: 'open_border', severity: 'problem' }] as const;
    expect(valueOf({ densityKgPerM3: 1 }, { findings })).toMatchObject({ state: 'blocked', problemCodes: ['open_border'], properties: null });
    expect(valueOf({ construction: 'sheet', arealDensityKgPerM2: 1 }, { findings })).toMatchObject({ state: 'measured', problemCodes: [] });
    expect(valueOf({ construction: 'sheet', arealDensityKgPerM2: 1 }, { findings: [{ code: 'non_manifold_edge', severity: 'problem' }] }).state).toBe('blocked');
  });

  test('warnings are carried and block nothing', () => {
    expect(valueOf({ densityKgPerM3: 1 }, { findings: [{ code: 'cap_large', severity: 'warning' }] })).toMatchObject({ state: 'measured', warningCodes: ['cap_large'] });
  });

  test('left out has no value, whatever else is set', () => {
    expect(valueOf({ densityKgPerM3: 1, leftOut: true })).toMatchObject({ state: 'left_out', properties: null, valueSha256: null, volumeM3: 1 });
  });

  test('a part without geometry is blocked', () => {
    expect(valueOf({ densityKgPerM3: 1 }, { components: [] })).toMatchObject({ state: 'blocked', volumeM3: null, problemCodes: ['no_geometry'] });
  });

  test('a part that is inside out is a problem and never turned positive', () => {
    const [part] = CUBE.components;
    const turned = { ...part, solid: { ...part.solid, volume: -1, centralSecond: [-1 / 12, -1 / 12, -1 / 12, 0, 0, 0] as [number, number, number, number, number, number] } };
    expect(valueOf({ targetMassKg: 5 }, { components: [turned] })).toMatchObject({ state: 'blocked', problemCodes: ['inside_out'], volumeM3: null });
  });
});
