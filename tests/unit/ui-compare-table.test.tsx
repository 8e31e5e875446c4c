import { render, screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { DifferenceTable } from '@/components/compare/difference-table';
import { compareValues } from '@/lib/engine/inertia/compare-values';
import type { ComparedNumbers, ComparedSide, ComparisonAnswer } from '@/lib/rules/comparison';
import { differenceGroups, isBeyond } from '@/lib/rules/difference-rows';

/** A cuboid with a corner in the origin: m = ρabc, centre at half of each edge, I about it m(b² + c²)/12 (handbook). Edges in m, ascending moments along z, y, x. */
function cuboid(a: number, b: number, c: number, density: number): ComparedNumbers {
  const m = density * a * b * c;
  const [ixx, iyy, izz] = [(m * (b * b + c * c)) / 12, (m * (a * a + c * c)) / 12, (m * (a * a + b * b)) / 12];
  const [i1, i2, i3] = [ixx, iyy, izz].sort((p, q) => p - q);
  return {
    mass_kg: m, com_x_m: a / 2, com_y_m: b / 2, com_z_m: c / 2, ixx_kg_m2: ixx, iyy_kg_m2: iyy, izz_kg_m2: izz, ixy_kg_m2: 0, ixz_kg_m2: 0, iyz_kg_m2: 0,
    i1_kg_m2: i1, i2_kg_m2: i2, i3_kg_m2: i3, axes_quat_w: 1, axes_quat_x: 0, axes_quat_y: 0, axes_quat_z: 0, free_axes: '',
    bounds_m: [0, 0, 0, a, b, c],
  };
}

function side(ref: string, numbers: ComparedNumbers | null): ComparedSide {
  const [, , , a, b, c] = numbers?.bounds_m ?? [];
  return { ref, version: 'v001', mesh_scale: 1, name: ref, about: '', by: null, at: null, numbers, volume_m3: numbers && a * b * c, area_m2: numbers && 2 * (a * b + b * c + a * c) };
}

function comparison(before: ComparedNumbers | null, after: ComparedNumbers | null): ComparisonAnswer {
  const value = (n: ComparedNumbers) => ({
    massKg: n.mass_kg, comM: [n.com_x_m, n.com_y_m, n.com_z_m] as const, inertiaKgM2: [n.ixx_kg_m2, n.iyy_kg_m2, n.izz_kg_m2, 0, 0, 0] as const,
    principalKgM2: [n.i1_kg_m2, n.i2_kg_m2, n.i3_kg_m2] as const, quatWxyz: [1, 0, 0, 0] as const, freeAxes: n.free_axes,
  });
  const size = before?.bounds_m ? Math.hypot(before.bounds_m[3], before.bounds_m[4], before.bounds_m[5]) : null;
  const d = before && after && compareValues(value(before), value(after), size ?? 0);
  return {
    asset: 'crate', part: 'body', before: side('approved', before), after: side('current', after), verdict: '', beyond_tolerance: null,
    differences: d && { mass_change: d.massChange, com_shift_m: d.comShiftM, com_shift_of_size: d.comShiftOfSize, principal_change: d.principalChange, inertia_change: d.inertiaChange, rotation_deg: d.rotationDeg },
    size_m: size, tolerances: { mass_percent: 0.5, com_percent: 20, moments_percent: 1 }, parts: ['body'], versions: ['v001'], has_approval: true, lock: null,
  };
}

const lineOf = (of: ComparisonAnswer, key: string, unit: 'cm' | 'm' = 'm') => differenceGroups(of, unit).flatMap((group) => group.lines).find((line) => line.key === key)!;

describe('the table of differences', () => {
  // From 2 × 3 × 4 m to 2 × 3 × 5 m at 1 kg/m³.
  const grown = comparison(cuboid(2, 3, 4, 1), cuboid(2, 3, 5, 1));

  it('has before, after and difference in the show’s unit, and each percentage of what its group says', () => {
    expect(lineOf(grown, 'mass')).toMatchObject({ before: 24, after: 30, difference: 6, percent: 25 });
    const volume = lineOf(grown, 'volume', 'cm');
    expect(volume.unit).toBe('cm³');
    expect(volume.before! / 24e6).toBeCloseTo(1, 12);
    expect(lineOf(grown, 'area').difference).toBeCloseTo(10, 12);
    const z = lineOf(grown, 'com_z', 'cm');
    expect(z.difference).toBeCloseTo(50, 10);
    expect(z.percent).toBeCloseTo((0.5 / Math.sqrt(29)) * 100, 10);
    expect(lineOf(grown, 'shift', 'cm')).toMatchObject({ before: null, after: null, limitPercent: 20 });
    expect(lineOf(grown, 'shift', 'cm').difference).toBeCloseTo(50, 10);
    expect(lineOf(grown, 'ixx').before).toBeCloseTo(50, 12);
    // Matrix entries are taken of the largest moment before, which is Ixx here; an entry of 0 then has a percentage too.
    expect(lineOf(grown, 'ixx').percent).toBeCloseTo(((30 * 34) / 12 / 50 - 1) * 100, 10);
    expect(lineOf(grown, 'ixy').percent).toBe(0);
    // 26, 40, 50 kg m² became 32.5, 72.5, 85: gaps below ten times the change say nothing of the axes.
    expect(lineOf(grown, 'rotation')).toMatchObject({ difference: null, label: 'Rotation of the axes, moments too close to tell' });
    expect(lineOf(comparison(cuboid(2, 3, 4, 1), cuboid(2, 3, 4, 1.1)), 'rotation').difference).toBeCloseTo(0, 10);
  });

  it('tells what is beyond the tolerance from what ends at it', () => {
    expect(['mass', 'shift', 'inertia', 'volume'].map((key) => isBeyond(lineOf(grown, key)))).toEqual([true, false, true, null]);
    expect(isBeyond({ percent: -0.5, limitPercent: 0.5 })).toBe(false);
    expect(isBeyond({ percent: -0.51, limitPercent: 0.5 })).toBe(true);
  });

  it('marks both by words beside their shapes, and keeps all digits for copying', () => {
    render(<DifferenceTable of={grown} unit="m" />);
    const mass = within(screen.getByRole('row', { name: /^Mass, kg/ }));
    expect(mass.getByText(/beyond 0.5 %/)).toBeInTheDocument();
    expect(within(screen.getByRole('row', { name: /^Shift/ })).getByText(/within 20 %/)).toBeInTheDocument();
    expect(within(screen.getByRole('row', { name: /^Ixx/ })).queryByText(/beyond|within/)).not.toBeInTheDocument();
    const row = screen.getByRole('row', { name: /^z, m/ });
    expect([...row.querySelectorAll<HTMLElement>('[data-full]')].map((figure) => figure.dataset.full)).toEqual(['2', '2.5', '0.5', String((0.5 / Math.hypot(2, 3, 4)) * 100)]);
  });

  it('says that free axes turn nowhere, and leaves empty what a side lacks', () => {
    const ball = { ...cuboid(1, 1, 1, 1), free_axes: '123' as const };
    expect(lineOf(comparison(ball, ball), 'rotation')).toMatchObject({ label: 'Rotation of the axes, free', difference: null });
    const missing = comparison(null, cuboid(2, 3, 4, 1));
    expect(lineOf(missing, 'mass')).toMatchObject({ before: null, after: 24, difference: null, percent: null });
    expect(isBeyond(lineOf(missing, 'mass'))).toBeNull();
    render(<DifferenceTable of={missing} unit="m" />);
    expect(screen.queryByText(/beyond|within/)).not.toBeInTheDocument();
  });
});
