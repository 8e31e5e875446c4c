import { mergeMassProperties } from '@/lib/engine/mass-properties';
import type { ComparedNumbers } from '@/lib/rules/comparison';

/** Parts taken together, by the parallel-axis theorem; null for none. The box is around all. */
export function mergePartValues(parts: readonly ComparedNumbers[]): ComparedNumbers | null {
  if (parts.length === 0) return null;
  if (parts.length === 1) return parts[0];
  const merged = mergeMassProperties(
    parts.map((one) => ({
      massKg: one.mass_kg,
      comM: [one.com_x_m, one.com_y_m, one.com_z_m],
      inertiaKgM2: [one.ixx_kg_m2, one.iyy_kg_m2, one.izz_kg_m2, one.ixy_kg_m2, one.ixz_kg_m2, one.iyz_kg_m2],
    })),
  );
  if (!merged.ok) return null;
  const [comX, comY, comZ] = merged.comM;
  const [ixx, iyy, izz, ixy, ixz, iyz] = merged.inertiaKgM2;
  const [i1, i2, i3] = merged.principalKgM2;
  const [w, x, y, z] = merged.quatWxyz;
  return {
    mass_kg: merged.massKg,
    com_x_m: comX, com_y_m: comY, com_z_m: comZ,
    ixx_kg_m2: ixx, iyy_kg_m2: iyy, izz_kg_m2: izz, ixy_kg_m2: ixy, ixz_kg_m2: ixz, iyz_kg_m2: iyz,
    i1_kg_m2: i1, i2_kg_m2: i2, i3_kg_m2: i3,
    axes_quat_w: w, axes_quat_x: x, axes_quat_y: y, axes_quat_z: z,
    free_axes: merged.freeAxes,
    bounds_m: boxAround(parts.flatMap((one) => (one.bounds_m?.length === 6 ? [one.bounds_m] : []))),
  };
}

function boxAround(boxes: readonly number[][]): number[] | null {
  if (boxes.length === 0) return null;
  return [0, 1, 2, 3, 4, 5].map((i) => boxes.reduce((edge, box) => (i < 3 ? Math.min(edge, box[i]) : Math.max(edge, box[i])), boxes[0][i]));
}
