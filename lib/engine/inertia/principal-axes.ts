import type { Six, Three } from '../measured';
import { symmetricEigen } from './symmetric-eigen';

/** Relative difference of two principal moments below which the axes of their plane are free. */
export const FREE_AXES_GAP = 1e-6;

export type FreeAxes = '' | '12' | '23' | '123';

/** Principal moments and axes of an inertia matrix. */
export interface PrincipalFrame {
  /** Principal moments, ascending. */
  principal: Three;
  /** Unit quaternion w, x, y, z (w ≥ 0) that rotates the principal axes into the asset's axes. */
  quatWxyz: [number, number, number, number];
  /** The axes as rows, in the asset's frame; right-handed. */
  axes: [Three, Three, Three];
  /** Axes whose direction means nothing because their moments are equal; chosen nearest the asset's own. */
  freeAxes: FreeAxes;
}

/**
 * Principal moments and axes of an inertia matrix given by its entries (ixx, iyy, izz, ixy, ixz, iyz; ixy = −∫ρxy).
 * Of the four right-handed frames the one with the largest component of axis 1 and of axis 3 positive (x before y before z on ties); axis 2 = 3 × 1.
 * `freeGap` is max(1e-6, 100 × the input's relative precision).
 */
export function principalAxes(inertia: Six, freeGap: number = FREE_AXES_GAP): PrincipalFrame {
  const { values, vectors } = symmetricEigen(inertia);
  const gap = freeGap * Math.abs(values[2]);
  const free12 = values[1] - values[0] < gap;
  const free23 = values[2] - values[1] < gap;
  let axis1 = vectors[0] as Three;
  let axis3 = vectors[2] as Three;
  let freeAxes: FreeAxes = '';
  if (free12 && free23) {
    freeAxes = '123';
    axis1 = [1, 0, 0];
    axis3 = [0, 0, 1];
  } else if (free12) {
    freeAxes = '12';
    axis1 = nearestAxisAcross(axis3, [0, 1, 2]);
  } else if (free23) {
    freeAxes = '23';
    axis3 = nearestAxisAcross(axis1, [2, 1, 0]);
  }
  axis1 = largestPositive(axis1);
  axis3 = largestPositive(axis3);
  const axis2 = cross(axis3, axis1);
  return { principal: [values[0], values[1], values[2]], quatWxyz: quaternionOf(axis1, axis2, axis3), axes: [axis1, axis2, axis3], freeAxes };
}

/** The asset's axis that leans least on `axis` (the first in `order` where several do alike), laid into the plane across it. */
function nearestAxisAcross(axis: Three, order: readonly number[]): Three {
  let best = order[0];
  for (const i of order) if (Math.abs(axis[i]) < Math.abs(axis[best])) best = i;
  const laid: Three = [0, 0, 0];
  for (let i = 0; i < 3; i++) laid[i] = (i === best ? 1 : 0) - axis[best] * axis[i];
  const size = Math.sqrt(laid[0] * laid[0] + laid[1] * laid[1] + laid[2] * laid[2]);
  return [laid[0] / size, laid[1] / size, laid[2] / size];
}

function largestPositive(axis: Three): Three {
  let largest = 0;
  for (let i = 1; i < 3; i++) if (Math.abs(axis[i]) > Math.abs(axis[largest])) largest = i;
  const sign = axis[largest] < 0 ? -1 : 1;
  // Adding 0 turns −0 into 0, so that equal frames print alike.
  return [sign * axis[0] + 0, sign * axis[1] + 0, sign * axis[2] + 0];
}

function cross(a: Three, b: Three): Three {
  return [a[1] * b[2] - a[2] * b[1] + 0, a[2] * b[0] - a[0] * b[2] + 0, a[0] * b[1] - a[1] * b[0] + 0];
}

/** Quaternion of the rotation whose matrix has the three axes as columns [Shepperd 1978]: the largest of its four components is taken from the diagonal. */
function quaternionOf(x: Three, y: Three, z: Three): [number, number, number, number] {
  const candidates = [1 + x[0] + y[1] + z[2], 1 + x[0] - y[1] - z[2], 1 - x[0] + y[1] - z[2], 1 - x[0] - y[1] + z[2]];
  let largest = 0;
  for (let i = 1; i < 4; i++) if (candidates[i] > candidates[largest]) largest = i;
  const raw: number[] = [
    [candidates[0], y[2] - z[1], z[0] - x[2], x[1] - y[0]],
    [y[2] - z[1], candidates[1], x[1] + y[0], z[0] + x[2]],
    [z[0] - x[2], x[1] + y[0], candidates[2], y[2] + z[1]],
    [x[1] - y[0], z[0] + x[2], y[2] + z[1], candidates[3]],
  ][largest];
  const size = Math.sqrt(raw[0] * raw[0] + raw[1] * raw[1] + raw[2] * raw[2] + raw[3] * raw[3]);
  const lead = raw.find((value) => value !== 0) ?? 1;
  const sign = lead < 0 ? -1 : 1;
  return [(sign * raw[0]) / size + 0, (sign * raw[1]) / size + 0, (sign * raw[2]) / size + 0, (sign * raw[3]) / size + 0];
}
