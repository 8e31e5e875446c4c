/**
 * A transform as sixteen numbers in row-vector order, point · matrix, with the translation at 12, 13 and 14. That is USD's order by rows and, in the same places of
 * memory, glTF's by columns.
 */
export type Matrix = ArrayLike<number>;

export const IDENTITY: Matrix = [1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1];

/** The transform that does `first` and then `second`. */
export function multiply(first: Matrix, second: Matrix): Float64Array {
  const product = new Float64Array(16);
  for (let row = 0; row < 4; row++) {
    for (let column = 0; column < 4; column++) {
      let sum = 0;
      for (let k = 0; k < 4; k++) sum += first[4 * row + k] * second[4 * k + column];
      product[4 * row + column] = sum;
    }
  }
  return product;
}

/** Whether the transform turns the inside out: the determinant of its linear part is below zero. */
export function mirrors(m: Matrix): boolean {
  return m[0] * (m[5] * m[10] - m[6] * m[9]) - m[1] * (m[4] * m[10] - m[6] * m[8]) + m[2] * (m[4] * m[9] - m[5] * m[8]) < 0;
}

export function isIdentity(m: Matrix, tolerance = 0): boolean {
  for (let i = 0; i < 16; i++) if (!(Math.abs(m[i] - IDENTITY[i]) <= tolerance)) return false;
  return true;
}

/** Moves the points (x, y, z each) in place. */
export function transformPoints(points: Float64Array, m: Matrix): void {
  for (let i = 0; i < points.length; i += 3) {
    const [x, y, z] = [points[i], points[i + 1], points[i + 2]];
    points[i] = x * m[0] + y * m[4] + z * m[8] + m[12];
    points[i + 1] = x * m[1] + y * m[5] + z * m[9] + m[13];
    points[i + 2] = x * m[2] + y * m[6] + z * m[10] + m[14];
  }
}

/** Turns each face round, its first corner staying. */
export function reverseFaces(faceStarts: Uint32Array, faceVertices: Uint32Array): void {
  for (let face = 0; face + 1 < faceStarts.length; face++) faceVertices.subarray(faceStarts[face] + 1, faceStarts[face + 1]).reverse();
}

/** Of translation, quaternion (x, y, z, w) and scale, applied in the order scale, rotation, translation. */
export function fromTranslationRotationScale(t: ArrayLike<number>, q: ArrayLike<number>, s: ArrayLike<number>): Float64Array {
  const length = Math.hypot(q[0], q[1], q[2], q[3]);
  const [x, y, z, w] = length > 0 ? [q[0] / length, q[1] / length, q[2] / length, q[3] / length] : [0, 0, 0, 1];
  return Float64Array.of(
    s[0] * (1 - 2 * (y * y + z * z)), s[0] * 2 * (x * y + z * w), s[0] * 2 * (x * z - y * w), 0,
    s[1] * 2 * (x * y - z * w), s[1] * (1 - 2 * (x * x + z * z)), s[1] * 2 * (y * z + x * w), 0,
    s[2] * 2 * (x * z + y * w), s[2] * 2 * (y * z - x * w), s[2] * (1 - 2 * (x * x + y * y)), 0,
    t[0], t[1], t[2], 1,
  );
}
