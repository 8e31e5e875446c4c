/** What is compared of a value: SI, the asset's axes, inertia about the centre of mass as matrix entries xx yy zz xy xz yz. */
export interface ComparedValue {
  massKg: number;
  comM: readonly [number, number, number];
  inertiaKgM2: readonly [number, number, number, number, number, number];
  /** Ascending. */
  principalKgM2: readonly [number, number, number];
  /** Rotates principal axes into the asset's axes. */
  quatWxyz: readonly [number, number, number, number];
  freeAxes: '' | '12' | '23' | '123';
}

/** How two values of one part differ. */
export interface ValueComparison {
  /** Relative: 0.09 where the mass grew by 9 %. */
  massChange: number;
  /** Shift of the centre of mass in the asset's axes, m. */
  comShiftM: [number, number, number];
  comShiftLengthM: number;
  /** The shift over the part's size (the diagonal of its box). */
  comShiftOfSize: number;
  /** Relative, each to its own moment before. */
  principalChange: [number, number, number];
  /** Frobenius norm of the matrix's change over that of the matrix before. */
  inertiaChange: number;
  /** Least rotation between the two sets of axes, degrees; null where the axes are free. */
  rotationDeg: number | null;
}

/**
 * Differences of a value from an earlier one. `sizeM` is the diagonal of the part's box, m; where it is 0 the shift over it is 0.
 * Axes have no sign, so the rotation is the least over the four proper choices of signs, 120° at most. It is silent where axes are free in either
 * value and where a gap between two moments is below ten times their change, both at equal trace: growing alone turns nothing.
 */
export function compareValues(before: ComparedValue, after: ComparedValue, sizeM: number): ValueComparison {
  const comShiftM: [number, number, number] = [after.comM[0] - before.comM[0], after.comM[1] - before.comM[1], after.comM[2] - before.comM[2]];
  const comShiftLengthM = Math.hypot(...comShiftM);
  const [a, b] = [before.principalKgM2, after.principalKgM2];
  const difference = after.inertiaKgM2.map((value, i) => value - before.inertiaKgM2[i]);
  return {
    massChange: after.massKg / before.massKg - 1,
    comShiftM,
    comShiftLengthM,
    comShiftOfSize: sizeM > 0 ? comShiftLengthM / sizeM : 0,
    principalChange: [relative(a[0], b[0]), relative(a[1], b[1]), relative(a[2], b[2])],
    inertiaChange: frobenius(difference) / frobenius(before.inertiaKgM2),
    rotationDeg: leastRotation(before, after),
  };
}

function relative(before: number, after: number): number {
  return before === after ? 0 : after / before - 1;
}

/** Norm of a symmetric matrix given as xx yy zz xy xz yz. */
function frobenius(m: readonly number[]): number {
  return Math.hypot(m[0], m[1], m[2], Math.SQRT2 * m[3], Math.SQRT2 * m[4], Math.SQRT2 * m[5]);
}

function leastRotation(before: ComparedValue, after: ComparedValue): number | null {
  const [a, b] = [before.principalKgM2, after.principalKgM2];
  const scale = (a[0] + a[1] + a[2]) / (b[0] + b[1] + b[2]);
  const change = Math.max(...a.map((value, i) => Math.abs(b[i] * scale - value)));
  const free = (pair: '12' | '23', low: 0 | 1): boolean =>
    [before, after].some((value) => value.freeAxes === pair || value.freeAxes === '123') || Math.min(a[low + 1] - a[low], (b[low + 1] - b[low]) * scale) < 10 * change;
  const free12 = free('12', 0);
  const free23 = free('23', 1);
  if (free12 && free23) return null;
  const [w, x, y, z] = relativeQuaternion(before.quatWxyz, after.quatWxyz);
  if (free12) return lineDegrees(2 * Math.atan2(Math.hypot(x, y), Math.hypot(w, z)));
  if (free23) return lineDegrees(2 * Math.atan2(Math.hypot(y, z), Math.hypot(w, x)));
  const real = Math.max(Math.abs(w), Math.abs(x), Math.abs(y), Math.abs(z));
  const rest = [w, x, y, z].map(Math.abs).sort((p, q) => p - q).slice(0, 3);
  return (2 * Math.atan2(Math.hypot(...rest), real) * 180) / Math.PI;
}

/** Rotation from the axes before to those after, in the axes before: conj(before) · after. */
function relativeQuaternion(p: readonly number[], q: readonly number[]): [number, number, number, number] {
  const [pw, px, py, pz] = [p[0], -p[1], -p[2], -p[3]];
  const [qw, qx, qy, qz] = q;
  return [
    pw * qw - px * qx - py * qy - pz * qz,
    pw * qx + px * qw + py * qz - pz * qy,
    pw * qy - px * qz + py * qw + pz * qx,
    pw * qz + px * qy - py * qx + pz * qw,
  ];
}

/** Of the one axis that is not free: it has no direction, so no angle between two is above 90°. */
function lineDegrees(angle: number): number {
  return (Math.min(angle, Math.PI - angle) * 180) / Math.PI;
}
