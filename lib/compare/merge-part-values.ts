import { mergeMassProperties } from '@/lib/engine/mass-properties';
import type { ComparedNumbers } from '@/lib/rules/comparison';
import { toComparedNumbers } from './to-compared-numbers';

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
  return merged.ok ? toComparedNumbers(merged, boxAround(parts.flatMap((one) => (one.bounds_m?.length === 6 ? [one.bounds_m] : [])))) : null;
}

function boxAround(boxes: readonly number[][]): number[] | null {
  if (boxes.length === 0) return null;
  return [0, 1, 2, 3, 4, 5].map((i) => boxes.reduce((edge, box) => (i < 3 ? Math.min(edge, box[i]) : Math.max(edge, box[i])), boxes[0][i]));
}
