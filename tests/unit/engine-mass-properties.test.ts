import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { rebuildInertia } from '@/lib/engine/inertia/check-mass-frame';
import { principalAxes } from '@/lib/engine/inertia/principal-axes';
import { massProperties, mergeMassProperties, type MassInput, type MassProperties } from '@/lib/engine/mass-properties';
import { measureCage } from '@/lib/engine/measure';
import type { MeasureOptions, Six, Three } from '@/lib/engine/measured';
import { cageOf, CATMULL_CLARK, moved, referenceCage } from '../support/engine-cages';

const POLYHEDRAL: MeasureOptions = { ...CATMULL_CLARK, scheme: 'polyhedral' };

function weigh(input: MassInput): MassProperties {
  const result = massProperties(input);
  if (!result.ok) throw new Error(`${result.code}: ${result.message}`);
  return result;
}

function cuboid(a: number, b: number, c: number, at: Three = [0, 0, 0]): ReturnType<typeof cageOf> {
  const corners = [0, 1, 2, 3, 4, 5, 6, 7].map((i) => [at[0] + (i & 1 ? a : -a) / 2, at[1] + (i & 2 ? b : -b) / 2, at[2] + (i & 4 ? c : -c) / 2]);
  return cageOf(corners, [[0, 2, 3, 1], [4, 5, 7, 6], [0, 1, 5, 4], [2, 6, 7, 3], [0, 4, 6, 2], [1, 3, 7, 5]]);
}

function componentsOf(cage: ReturnType<typeof cageOf>, options = POLYHEDRAL): MassInput['components'] {
  return measureCage(cage, options).parts.flatMap((part) => part.components);
}

const plain = { metresPerUnit: 1, scale: 1, construction: 'solid' as const };

describe('handbook solids', () => {
  it('cuboid: m (b² + c²)/12 about its centre', () => {
    const body = weigh({ ...plain, components: componentsOf(cuboid(2, 3, 5, [10, -7, 4])), densityKgPerM3: 2 });
    expect(body.massKg).toBeCloseTo(60, 10);
    [10, -7, 4].forEach((value, i) => expect(body.comM[i]).toBeCloseTo(value, 12));
    [(60 * (9 + 25)) / 12, (60 * (4 + 25)) / 12, (60 * (4 + 9)) / 12, 0, 0, 0].forEach((value, i) => expect(body.inertiaKgM2[i]).toBeCloseTo(value, 10));
    expect(body.principalKgM2[0]).toBeCloseTo(65, 10);
    expect(body.freeAxes).toBe('');
  });

  // F. Tonon, "Explicit exact formulas for the 3-D tetrahedron inertia tensor in terms of its vertex coordinates",
  // J. Math. Stat. 1 (2004) 8-11; its printed b′ and c′ are swapped and its digits hold to about 2e-8; these are the exact values.
  it('Tonon’s tetrahedron, all six entries', () => {
    const tetrahedron = cageOf(
      [[8.3322, -11.86875, 0.93355], [0.75523, 5, 16.37072], [52.61236, 5, -5.3858], [2, 5, 3]],
      [[0, 1, 3], [0, 3, 2], [0, 2, 1], [1, 2, 3]],
    );
    const components = componentsOf(tetrahedron);
    const turned = components[0].solid.volume < 0 ? componentsOf(cageOf([[8.3322, -11.86875, 0.93355], [0.75523, 5, 16.37072], [52.61236, 5, -5.3858], [2, 5, 3]], [[0, 3, 1], [0, 2, 3], [0, 1, 2], [1, 3, 2]])) : components;
    const body = weigh({ ...plain, components: turned, densityKgPerM3: 1 });
    expect(body.massKg).toBeCloseTo(1873.233364, 6);
    [15.9249475, 0.7828125, 3.7296175].forEach((value, i) => expect(body.comM[i]).toBeCloseTo(value, 7));
    [43520.33329, 194711.29259, 191168.76489, -11996.20139, 46343.16738, -4417.66157].forEach((value, i) => expect(body.inertiaKgM2[i]).toBeCloseTo(value, 4));
  });

  // The all-sharp cage is its own limit surface, so the limit solid must agree with the polyhedron.
  it.each(['cube_allsharp.obj', 'octa_allsharp.obj', 'tetra_allsharp.obj', 'tetra_right_allsharp.obj'])('%s: limit solid of an all-sharp cage is the polyhedron', (file) => {
    const cage = referenceCage(file);
    const limit = componentsOf(cage, CATMULL_CLARK)[0].solid;
    const own = componentsOf(cage)[0].solid;
    expect(Math.abs(limit.volume / own.volume - 1)).toBeLessThan(1e-14);
    limit.centralSecond.forEach((value, i) => expect(Math.abs(value - own.centralSecond[i])).toBeLessThan(1e-14 * Math.max(...own.centralSecond)));
  });
});

describe('sheets', () => {
  it('a rectangle is a plate: m b²/12, m a²/12, m (a² + b²)/12', () => {
    const body = weigh({ ...plain, construction: 'sheet', arealDensityKgPerM2: 0.5, components: componentsOf(cageOf([[0, 0, 0], [4, 0, 0], [4, 2, 0], [0, 2, 0]], [[0, 1, 2, 3]])) });
    expect(body.massKg).toBeCloseTo(4, 12);
    expect(body.areaM2).toBeCloseTo(8, 12);
    [4 * 4 / 12, 4 * 16 / 12, 4 * 20 / 12, 0, 0, 0].forEach((value, i) => expect(body.inertiaKgM2[i]).toBeCloseTo(value, 12));
    expect(body.volumeM3).toBeNull();
  });
});

describe('settings', () => {
  const components = componentsOf(referenceCage('spot.obj'), CATMULL_CLARK);

  it('a target mass wins and the density follows', () => {
    const target = weigh({ ...plain, components, targetMassKg: 640, densityKgPerM3: 1 });
    expect(target.massKg).toBeCloseTo(640, 10);
    const density = weigh({ ...plain, components, densityKgPerM3: target.densityKgPerM3 });
    expect(density.massKg).toBeCloseTo(640, 10);
    expect(density.inertiaKgM2[4]).toBeCloseTo(target.inertiaKgM2[4], 10);
  });

  it('scale s: mass s³, inertia s⁵ at fixed density, centre s; a fixed mass gives s²', () => {
    const one = weigh({ ...plain, components, densityKgPerM3: 1000 });
    const three = weigh({ ...plain, components, densityKgPerM3: 1000, scale: 3 });
    const fixed = weigh({ ...plain, components, targetMassKg: one.massKg, scale: 3 });
    expect(three.massKg / one.massKg).toBeCloseTo(27, 12);
    one.inertiaKgM2.forEach((value, i) => expect(three.inertiaKgM2[i] / value).toBeCloseTo(243, 9));
    one.inertiaKgM2.forEach((value, i) => expect(fixed.inertiaKgM2[i] / value).toBeCloseTo(9, 10));
    one.comM.forEach((value, i) => expect(three.comM[i]).toBeCloseTo(3 * value, 12));
  });

  it('centimetres: everything scales with the unit', () => {
    const metres = weigh({ ...plain, components, densityKgPerM3: 1000 });
    const centimetres = weigh({ ...plain, components, densityKgPerM3: 1000, metresPerUnit: 0.01 });
    expect(centimetres.massKg / metres.massKg).toBeCloseTo(1e-6, 18);
    expect(centimetres.comM[1]).toBeCloseTo(metres.comM[1] / 100, 14);
  });

  it.each([
    ['no_mass', {}], ['no_mass', { construction: 'sheet' as const, densityKgPerM3: 3 }], ['bad_input', { densityKgPerM3: -1 }], ['bad_input', { targetMassKg: NaN }],
    ['bad_input', { densityKgPerM3: 1, metresPerUnit: 0 }], ['no_geometry', { densityKgPerM3: 1, components: [] }],
  ])('refuses with %s', (code, change) => {
    expect(massProperties({ ...plain, components, ...change })).toMatchObject({ ok: false, code });
  });

  it('an inside-out part gets no absolute value', () => {
    expect(massProperties({ ...plain, components: componentsOf(referenceCage('brick_inverted.obj'), CATMULL_CLARK), densityKgPerM3: 1 })).toMatchObject({ ok: false, code: 'inside_out' });
  });
});

describe('merging', () => {
  it('two halves of a cuboid make the cuboid', () => {
    const half = (at: Three): MassProperties => weigh({ ...plain, components: componentsOf(cuboid(1, 3, 5, at)), densityKgPerM3: 7 });
    const merged = mergeMassProperties([half([-0.5, 0, 0]), half([0.5, 0, 0])]);
    const whole = weigh({ ...plain, components: componentsOf(cuboid(2, 3, 5)), densityKgPerM3: 7 });
    if (!merged.ok) throw new Error(merged.code);
    expect(merged.massKg).toBeCloseTo(whole.massKg, 10);
    expect(merged.densityKgPerM3).toBeCloseTo(7, 10);
    merged.inertiaKgM2.forEach((value, i) => expect(value).toBeCloseTo(whole.inertiaKgM2[i], 9));
  });

  it('point masses: Σ m r² about the common centre', () => {
    const point = (massKg: number, comM: Three) => ({ massKg, comM, inertiaKgM2: [0, 0, 0, 0, 0, 0] as Six });
    const merged = mergeMassProperties([point(1, [3, 0, 0]), point(3, [-1, 0, 0])]);
    if (!merged.ok) throw new Error(merged.code);
    merged.comM.forEach((value) => expect(value).toBeCloseTo(0, 15));
    [0, 12, 12, 0, 0, 0].forEach((value, i) => expect(merged.inertiaKgM2[i]).toBeCloseTo(value, 13));
  });
});

describe('principal frames', () => {
  const anyMatrix = fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: 12, maxLength: 12 }).map((points): Six => {
    // Inertia of four unit points, so that the matrix is one that a body can have.
    const inertia: Six = [0, 0, 0, 0, 0, 0];
    for (let i = 0; i < 12; i += 3) {
      const [x, y, z] = points.slice(i, i + 3);
      [y * y + z * z, x * x + z * z, x * x + y * y, -x * y, -x * z, -y * z].forEach((value, k) => (inertia[k] += value));
    }
    return inertia;
  });

  it('rebuild the matrix, ascend, are right-handed and follow the choice of signs', () => {
    fc.assert(fc.property(anyMatrix, (inertia) => {
      const frame = principalAxes(inertia);
      const [i1, i2, i3] = frame.principal;
      expect(i1 <= i2 && i2 <= i3).toBe(true);
      expect(Math.hypot(...frame.quatWxyz)).toBeCloseTo(1, 14);
      expect(frame.quatWxyz[0]).toBeGreaterThanOrEqual(0);
      const slack = frame.freeAxes === '' ? 1e-13 : 1e-5;
      rebuildInertia(frame.principal, frame.quatWxyz).forEach((value, i) => expect(Math.abs(value - inertia[i])).toBeLessThanOrEqual(slack * i3 + 1e-300));
      for (const axis of [frame.axes[0], frame.axes[2]]) {
        const largest = axis.reduce((best, value) => (Math.abs(value) > Math.abs(best) ? value : best), 0);
        expect(largest).toBeGreaterThan(0);
      }
    }));
  });

  it('free axes lie along the asset’s own', () => {
    expect(principalAxes([2, 2, 2, 0, 0, 0])).toMatchObject({ freeAxes: '123', quatWxyz: [1, 0, 0, 0] });
    expect(principalAxes([1, 1, 2, 0, 0, 0])).toMatchObject({ freeAxes: '12', quatWxyz: [1, 0, 0, 0] });
    expect(principalAxes([1, 2, 2, 0, 0, 0])).toMatchObject({ freeAxes: '23', quatWxyz: [1, 0, 0, 0] });
  });

  it('turn with the part: the quaternion follows a rotation of the geometry', () => {
    const cage = cuboid(1, 2, 4, [3, 1, -2]);
    const [c, s] = [Math.cos(0.3), Math.sin(0.3)];
    const before = weigh({ ...plain, components: componentsOf(cage), densityKgPerM3: 1 });
    const after = weigh({ ...plain, components: componentsOf(moved(cage, (x, y, z) => [c * x - s * y, s * x + c * y, z])), densityKgPerM3: 1 });
    before.principalKgM2.forEach((value, i) => expect(after.principalKgM2[i]).toBeCloseTo(value, 12));
    const axis1 = principalAxes(after.inertiaKgM2).axes[0];
    [0, 0, 1].forEach((value, i) => expect(axis1[i]).toBeCloseTo(value, 12));
  });
});

describe('hollow parts', () => {
  const hollow = { ...plain, construction: 'hollow' as const, densityKgPerM3: 1000 };
  const box = (): MassInput['components'] => componentsOf(cuboid(2, 2, 2), { ...POLYHEDRAL, shells: true });
  const codeOf = (input: MassInput): string => {
    const result = massProperties(input);
    return result.ok ? 'ok' : result.code;
  };

  it('weighs the wall of a cuboid but for its corners, whose share stands in the error', () => {
    const t = 0.01;
    const body = weigh({ ...hollow, components: box(), wallM: t });
    const exact = 1000 * (8 - (2 - 2 * t) ** 3);
    expect(Math.abs(body.massKg / exact - 1)).toBeLessThanOrEqual(body.numericError);
    expect(body.numericError).toBeLessThan(1e-3);
    body.comM.forEach((value) => expect(value).toBeCloseTo(0, 12));
  });

  it('keeps the wall where the asset is scaled', () => {
    const [one, two] = [weigh({ ...hollow, components: box(), wallM: 0.01, scale: 2 }), weigh({ ...hollow, components: componentsOf(cuboid(4, 4, 4), { ...POLYHEDRAL, shells: true }), wallM: 0.01 })];
    expect(one.massKg / two.massKg).toBeCloseTo(1, 12);
    one.principalKgM2.forEach((value, i) => expect(value / two.principalKgM2[i]).toBeCloseTo(1, 12));
  });

  it('lets the density follow from a target mass', () => {
    const body = weigh({ ...hollow, densityKgPerM3: null, targetMassKg: 7, components: box(), wallM: 0.05 });
    expect(body.massKg).toBeCloseTo(7, 12);
    expect(body.densityKgPerM3! * body.volumeM3!).toBeCloseTo(7, 12);
  });

  it('refuses what it cannot weigh, by name', () => {
    expect(codeOf({ ...hollow, components: box() })).toBe('no_wall');
    expect(codeOf({ ...hollow, components: box(), wallM: 1.1 })).toBe('wall_too_thick');
    expect(codeOf({ ...hollow, components: componentsOf(cuboid(2, 2, 2)), wallM: 0.1 })).toBe('wall_not_measured');
    expect(codeOf({ ...hollow, densityKgPerM3: null, components: box(), wallM: 0.1 })).toBe('no_mass');
  });

  it('tells where the wall exceeds the radius of the surface', () => {
    const components = componentsOf(referenceCage('cube.obj'), { ...CATMULL_CLARK, shells: true });
    const { curvature } = components[0].hollowLimits!;
    expect(weigh({ ...hollow, components, wallM: 0.9 / curvature }).tightBend).toBeNull();
    expect(weigh({ ...hollow, components, wallM: 1.02 / curvature }).tightBend!.radiusM).toBeCloseTo(1 / curvature, 12);
    expect(weigh({ ...hollow, components: box(), wallM: 0.3 }).tightBend).toBeNull();
  });
});
