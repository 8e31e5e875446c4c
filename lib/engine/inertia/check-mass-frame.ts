import type { Six, Three } from '../measured';
import { FREE_AXES_GAP, type PrincipalFrame } from './principal-axes';

/** Slack of I1 + I2 ≥ I3, relative to I3: flat bodies meet it with equality, up to rounding. */
const TRIANGLE_SLACK = 1e-13;
const REBUILD_SLACK = 1e-12;

/** Rotation matrix rows of a unit quaternion w, x, y, z. */
export function rotationOfQuaternion([w, x, y, z]: readonly [number, number, number, number]): [Three, Three, Three] {
  return [
    [1 - 2 * (y * y + z * z), 2 * (x * y - w * z), 2 * (x * z + w * y)],
    [2 * (x * y + w * z), 1 - 2 * (x * x + z * z), 2 * (y * z - w * x)],
    [2 * (x * z - w * y), 2 * (y * z + w * x), 1 - 2 * (x * x + y * y)],
  ];
}

/** R · diag(principal) · Rᵀ as matrix entries xx, yy, zz, xy, xz, yz. */
export function rebuildInertia(principal: Three, quatWxyz: readonly [number, number, number, number]): Six {
  const r = rotationOfQuaternion(quatWxyz);
  const entry = (i: number, j: number): number => principal[0] * r[i][0] * r[j][0] + principal[1] * r[i][1] * r[j][1] + principal[2] * r[i][2] * r[j][2];
  return [entry(0, 0), entry(1, 1), entry(2, 2), entry(0, 1), entry(0, 2), entry(1, 2)];
}

/** Null where mass, centre and frame can belong to a body; else a sentence that names what contradicts. */
export function checkMassFrame(massKg: number, comM: Three, inertia: Six, frame: PrincipalFrame, freeGap: number = FREE_AXES_GAP): string | null {
  if (!(massKg > 0) || !Number.isFinite(massKg)) return 'The mass is not a positive finite number.';
  if (!comM.every(Number.isFinite)) return 'The centre of mass is not finite.';
  if (!inertia.every(Number.isFinite)) return 'The inertia matrix is not finite.';
  const [i1, i2, i3] = frame.principal;
  if (!(i3 >= 0) || i1 < -TRIANGLE_SLACK * i3) return 'A principal moment is negative.';
  if (i1 + i2 < i3 - TRIANGLE_SLACK * i3) return 'The principal moments break the triangle inequality, so no body can have them.';
  const slack = (frame.freeAxes === '' ? REBUILD_SLACK : 2 * freeGap) * i3;
  const rebuilt = rebuildInertia(frame.principal, frame.quatWxyz);
  for (let i = 0; i < 6; i++) if (!(Math.abs(rebuilt[i] - inertia[i]) <= slack)) return 'The principal axes do not give the inertia matrix back.';
  return null;
}
