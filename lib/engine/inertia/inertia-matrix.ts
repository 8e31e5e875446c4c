import type { Six, Three } from '../measured';

/** Inertia matrix entries (ixx, iyy, izz, ixy, ixz, iyz) of second moments ∫ρ x xᵀ (xx, yy, zz, xy, xz, yz): tr(S)·1 − S. */
export function inertiaOfSecondMoments(second: Six): Six {
  const [xx, yy, zz, xy, xz, yz] = second;
  return [yy + zz, xx + zz, xx + yy, -xy, -xz, -yz];
}

/** Adds to `inertia` what `mass` at the offset (x, y, z) contributes about the origin: the parallel-axis theorem. */
export function shiftInertia(inertia: Six, mass: number, offset: Three): Six {
  const [x, y, z] = offset;
  return [
    inertia[0] + mass * (y * y + z * z),
    inertia[1] + mass * (x * x + z * z),
    inertia[2] + mass * (x * x + y * y),
    inertia[3] - mass * x * y,
    inertia[4] - mass * x * z,
    inertia[5] - mass * y * z,
  ];
}
