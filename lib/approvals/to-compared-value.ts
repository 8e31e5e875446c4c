import type { ComparedValue } from '@/lib/engine/inertia/compare-values';

/** The compared numbers of a row that has a value, under the columns' names; SI. */
export interface ValueNumbers {
  mass_kg: number;
  com_x_m: number;
  com_y_m: number;
  com_z_m: number;
  ixx_kg_m2: number;
  iyy_kg_m2: number;
  izz_kg_m2: number;
  ixy_kg_m2: number;
  ixz_kg_m2: number;
  iyz_kg_m2: number;
  i1_kg_m2: number;
  i2_kg_m2: number;
  i3_kg_m2: number;
  axes_quat_w: number;
  axes_quat_x: number;
  axes_quat_y: number;
  axes_quat_z: number;
  free_axes: '' | '12' | '23' | '123';
  bounds_m: number[] | null;
}

export function toComparedValue(row: ValueNumbers): ComparedValue {
  return {
    massKg: row.mass_kg,
    comM: [row.com_x_m, row.com_y_m, row.com_z_m],
    inertiaKgM2: [row.ixx_kg_m2, row.iyy_kg_m2, row.izz_kg_m2, row.ixy_kg_m2, row.ixz_kg_m2, row.iyz_kg_m2],
    principalKgM2: [row.i1_kg_m2, row.i2_kg_m2, row.i3_kg_m2],
    quatWxyz: [row.axes_quat_w, row.axes_quat_x, row.axes_quat_y, row.axes_quat_z],
    freeAxes: row.free_axes,
  };
}
