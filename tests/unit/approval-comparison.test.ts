import { describe, expect, test } from 'vitest';
import { compareValues, type ComparedValue } from '@/lib/engine/inertia/compare-values';
import { isWithinTolerance, percentWords, verdictWords, type Differences } from '@/lib/rules/verdict';

type Quaternion = ComparedValue['quatWxyz'];
type Matrix = readonly [readonly number[], readonly number[], readonly number[]];

/** A turn by an angle about a unit axis, as quaternion (cos φ/2, n sin φ/2). Elementary rotations, e.g. Goldstein, Classical Mechanics, ch. 4 (from memory). */
function turn(degrees: number, axis: readonly [number, number, number]): Quaternion {
  const half = (degrees * Math.PI) / 360;
  return [Math.cos(half), axis[0] * Math.sin(half), axis[1] * Math.sin(half), axis[2] * Math.sin(half)];
}

/** The same turn as a matrix, by Rodrigues' formula: R = cos φ 1 + sin φ [n]× + (1 − cos φ) n nᵀ (from memory). */
function turnMatrix(degrees: number, [x, y, z]: readonly [number, number, number]): Matrix {
  const [c, s] = [Math.cos((degrees * Math.PI) / 180), Math.sin((degrees * Math.PI) / 180)];
  const d = 1 - c;
  return [
    [c + x * x * d, x * y * d - z * s, x * z * d + y * s],
    [y * x * d + z * s, c + y * y * d, y * z * d - x * s],
    [z * x * d - y * s, z * y * d + x * s, c + z * z * d],
  ];
}

/** R diag(moments) Rᵀ as xx yy zz xy xz yz. */
function turned(moments: readonly number[], r: Matrix): ComparedValue['inertiaKgM2'] {
  const entry = (i: number, j: number): number => moments.reduce((sum, moment, k) => sum + r[i][k] * moment * r[j][k], 0);
  return [entry(0, 0), entry(1, 1), entry(2, 2), entry(0, 1), entry(0, 2), entry(1, 2)];
}

/** A cuboid of 12 kg with edges 3, 2 and 1 m along x, y, z: moments m(b² + c²)/12 = 5, 10, 13 kg m², already ascending. */
const MOMENTS = [5, 10, 13] as const;
const box = (degrees = 0, axis: readonly [number, number, number] = [0, 0, 1], moments: ComparedValue['principalKgM2'] = MOMENTS, freeAxes: ComparedValue['freeAxes'] = ''): ComparedValue => ({
  massKg: 12,
  comM: [0, 0, 0],
  inertiaKgM2: turned(moments, turnMatrix(degrees, axis)),
  principalKgM2: moments,
  quatWxyz: turn(degrees, axis),
  freeAxes,
});

const DIAGONAL = [Math.sqrt(1 / 3), Math.sqrt(1 / 3), Math.sqrt(1 / 3)] as const;

describe('comparing two values', () => {
  test.each([
    [0, [0, 0, 1], 0],
    [30, [0, 0, 1], 30],
    [30, [1, 0, 0], 30],
    [1, [0, 1, 0], 1],
    [90, [0, 0, 1], 90],
    // Axes have no sign: a half turn about one of them brings the box back.
    [180, [0, 1, 0], 0],
    [150, [0, 0, 1], 30],
    // The threefold axis of a cube takes each axis into the next: no choice of signs makes that less.
    [120, DIAGONAL, 120],
  ] as const)('a box turned by %d° about %o has axes turned by %d°', (degrees, axis, expected) => {
    expect(compareValues(box(), box(degrees, axis), 1).rotationDeg).toBeCloseTo(expected, 10);
    expect(compareValues(box(degrees, axis), box(), 1).rotationDeg).toBeCloseTo(expected, 10);
  });

  test('a turn changes neither mass nor moments, and the matrix by what the turned one differs', () => {
    const found = compareValues(box(), box(90, [0, 0, 1]), 1);
    expect(found.massChange).toBe(0);
    expect(found.principalChange).toEqual([0, 0, 0]);
    // 5 and 10 change places: |diag(5, −5, 0)| over |diag(5, 10, 13)|.
    expect(found.inertiaChange).toBeCloseTo(Math.sqrt(50) / Math.sqrt(25 + 100 + 169), 12);
  });

  test('growing in mass alone turns nothing and moves nothing', () => {
    const before = box(20, [0, 1, 0]);
    const after: ComparedValue = { ...before, massKg: 12 * 1.09, inertiaKgM2: before.inertiaKgM2.map((value) => value * 1.09) as unknown as ComparedValue['inertiaKgM2'], principalKgM2: [5 * 1.09, 10 * 1.09, 13 * 1.09] };
    const found = compareValues(before, after, 1);
    expect(found.massChange).toBeCloseTo(0.09, 14);
    expect(found.inertiaChange).toBeCloseTo(0.09, 13);
    expect(found.rotationDeg).toBeCloseTo(0, 6);
    expect(found.comShiftLengthM).toBe(0);
  });

  test('the shift is told in the asset’s axes and as a share of the size', () => {
    const after = { ...box(), comM: [0.03, 0, -0.04] as const };
    expect(compareValues(box(), after, 2)).toMatchObject({ comShiftM: [0.03, 0, -0.04], comShiftOfSize: 0.025 });
    expect(compareValues(box(), after, 2).comShiftLengthM).toBeCloseTo(0.05, 15);
    expect(compareValues(box(), after, 0).comShiftOfSize).toBe(0);
  });

  test('free axes are silent: all of them, or within the plane of the equal moments', () => {
    const ball = [7, 7, 7] as const;
    expect(compareValues(box(0, [0, 0, 1], ball, '123'), box(40, DIAGONAL, ball, '123'), 1).rotationDeg).toBeNull();
    const disc = [5, 5, 9] as const;
    expect(compareValues(box(0, [0, 0, 1], disc, '12'), box(40, [0, 0, 1], disc, '12'), 1).rotationDeg).toBeCloseTo(0, 10);
    expect(compareValues(box(0, [0, 0, 1], disc, '12'), box(25, [1, 0, 0], disc, '12'), 1).rotationDeg).toBeCloseTo(25, 10);
    const rod = [2, 8, 8] as const;
    expect(compareValues(box(0, [0, 0, 1], rod, '23'), box(70, [1, 0, 0], rod, '23'), 1).rotationDeg).toBeCloseTo(0, 10);
    // The one axis that is left is a line: the angle between two lines is 90° at most.
    expect(compareValues(box(0, [0, 0, 1], rod, '23'), box(120, [0, 0, 1], rod, '23'), 1).rotationDeg).toBeCloseTo(60, 10);
    expect(compareValues(box(0, [0, 0, 1], rod, '23'), box(90, [0, 0, 1], rod, '23'), 1).rotationDeg).toBeCloseTo(90, 10);
  });

  test('axes whose moments lie closer than ten times their change are silent too', () => {
    const before = box(0, [0, 0, 1], [10, 10.5, 20]);
    const after = box(45, [0, 0, 1], [10.06, 10.44, 20]);
    expect(compareValues(before, after, 1).rotationDeg).toBeCloseTo(0, 10);
    // Nearer to what they were, they speak.
    expect(compareValues(before, box(45, [0, 0, 1], [10.001, 10.499, 20]), 1).rotationDeg).toBeCloseTo(45, 10);
  });
});

const same: Differences = { massChange: 0, comShiftM: [0, 0, 0], comShiftLengthM: 0, comShiftOfSize: 0, principalChange: [0, 0, 0], inertiaChange: 0, rotationDeg: 0 };

describe('the verdict', () => {
  test('says mass, shift and axes in one line', () => {
    const all = { ...same, massChange: 0.09, comShiftM: [0, 0, 0.031] as const, comShiftLengthM: 0.031, comShiftOfSize: 0.012, rotationDeg: 1.04 };
    expect(verdictWords(all, 'cm')).toBe('+9 %, 31 mm along +z (1.2 % of its size), axes 1°');
    expect(verdictWords({ ...all, massChange: -0.0031 }, 'cm')).toBe('−0.31 %, 31 mm along +z (1.2 % of its size), axes 1°');
  });

  test('names no direction for a shift askew, and keeps to the show’s feet and inches', () => {
    const askew = { ...same, comShiftM: [0.01, 0.01, 0] as const, comShiftLengthM: Math.hypot(0.01, 0.01), comShiftOfSize: 0.02 };
    expect(verdictWords(askew, 'm')).toBe('14 mm (2 % of its size)');
    expect(verdictWords({ ...same, comShiftM: [-0.0254, 0, 0], comShiftLengthM: 0.0254, comShiftOfSize: 0.02 }, 'in')).toBe('1 in along −x (2 % of its size)');
  });

  test('says nothing of free axes and of what is too small, but of an inertia that changed alone', () => {
    expect(verdictWords({ ...same, rotationDeg: null }, 'cm')).toBe('no difference to speak of');
    expect(verdictWords({ ...same, massChange: 1e-9, rotationDeg: 0.01 }, 'cm')).toBe('no difference to speak of');
    expect(verdictWords({ ...same, inertiaChange: 0.04 }, 'cm')).toBe('inertia 4 %');
  });

  test('writes a change with its sign and two figures', () => {
    expect([0.09, -0.0031, 1.5, 0.00004, 0].map(percentWords)).toEqual(['+9 %', '−0.31 %', '+150 %', '+0.004 %', '0 %']);
  });

  test('a change is within tolerance up to each of the three limits, and beyond any one of them', () => {
    const limits = { toleranceMassPercent: 0.5, toleranceComPercent: 0.5, toleranceMomentsPercent: 1 };
    expect(isWithinTolerance({ ...same, massChange: -0.005, comShiftOfSize: 0.005, inertiaChange: 0.01 }, limits)).toBe(true);
    expect(isWithinTolerance({ ...same, massChange: -0.0051 }, limits)).toBe(false);
    expect(isWithinTolerance({ ...same, comShiftOfSize: 0.0051 }, limits)).toBe(false);
    expect(isWithinTolerance({ ...same, inertiaChange: 0.0101 }, limits)).toBe(false);
  });
});
