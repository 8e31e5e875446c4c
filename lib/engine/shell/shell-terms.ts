/**
 * Terms of a shell's moments that come from integrals over its surface. For a point X with outward unit normal N the wall of thickness t holds
 * X − sN, 0 ≤ s ≤ t, with volume element (1 − 2Hs + Ks²) dA ds [Weyl 1939], where dN = S dX, H = tr S / 2, K = det S: H is 1/R on a sphere of radius R.
 * Per power s^p the integrals over the surface of the coefficients of f(X − sN)(1 − 2Hs + Ks²) stand from TERM_STARTS[p] on: 1 (p ≤ 2), x y z (p ≤ 3),
 * xx yy zz xy xz yz (p ≤ 4). Power 0 is not among them: those are the surface's own moments.
 */
export const SHELL_TERMS = 35;

/** First term of 1, of x y z and of xx … yz for the powers s¹ to s⁴; -1 where there is none. */
export const TERM_STARTS: readonly (readonly [volume: number, first: number, second: number])[] = [[0, 2, 11], [1, 5, 17], [-1, 8, 23], [-1, -1, 29]];

/** Numbers of a jet: X, X_u, X_v, X_uu, X_uv, X_vv, three coordinates each. */
export const JET = 18;

/** Largest inward principal curvature met, 1/length, and where: x, y, z in the frame of the jet. */
export interface CurvaturePeak {
  curvature: number;
  x: number;
  y: number;
  z: number;
}

/**
 * Adds `weight` times the 35 terms of one node to `out`, and raises `peak`. X_u × X_v points outwards. A node without a tangent plane adds nothing.
 * Returns the larger of the principal curvatures' moduli.
 */
export function addShellNode(jet: Float64Array, weight: number, out: Float64Array, peak: CurvaturePeak): number {
  const x = jet[0], y = jet[1], z = jet[2];
  const ux = jet[3], uy = jet[4], uz = jet[5], vx = jet[6], vy = jet[7], vz = jet[8];
  const nx = uy * vz - uz * vy, ny = uz * vx - ux * vz, nz = ux * vy - uy * vx;
  const square = nx * nx + ny * ny + nz * nz;
  const area = Math.sqrt(square);
  const inverse = 1 / area;
  if (!(inverse < Infinity)) return 0;
  const X = nx * inverse, Y = ny * inverse, Z = nz * inverse;
  const L = jet[9] * X + jet[10] * Y + jet[11] * Z;
  const M = jet[12] * X + jet[13] * Y + jet[14] * Z;
  const P = jet[15] * X + jet[16] * Y + jet[17] * Z;
  const E = ux * ux + uy * uy + uz * uz, F = ux * vx + uy * vy + uz * vz, G = vx * vx + vy * vy + vz * vz;
  const twiceMean = -(E * P - 2 * F * M + G * L) * inverse * inverse;
  const gauss = (L * P - M * M) * inverse * inverse;
  const apart = Math.sqrt(Math.max(0, twiceMean * twiceMean - 4 * gauss));
  const curvature = (twiceMean + apart) / 2;
  if (curvature > peak.curvature) {
    peak.curvature = curvature;
    peak.x = x;
    peak.y = y;
    peak.z = z;
  }
  const a = weight * area, h = a * twiceMean, k = a * gauss;
  // With A = aN + hX, B = hN + kX, C = kN the coefficients are −h, k; −A, B, −C; −(A Xᵀ + a X Nᵀ), A Nᵀ + B Xᵀ, −(B Nᵀ + C Xᵀ), C Nᵀ, all symmetric.
  const ax = a * X + h * x, ay = a * Y + h * y, az = a * Z + h * z;
  const bx = h * X + k * x, by = h * Y + k * y, bz = h * Z + k * z;
  const cx = k * X, cy = k * Y, cz = k * Z;
  const dx = a * x, dy = a * y, dz = a * z;
  out[0] -= h;
  out[1] += k;
  out[2] -= ax;
  out[3] -= ay;
  out[4] -= az;
  out[5] += bx;
  out[6] += by;
  out[7] += bz;
  out[8] -= cx;
  out[9] -= cy;
  out[10] -= cz;
  out[11] -= ax * x + dx * X;
  out[12] -= ay * y + dy * Y;
  out[13] -= az * z + dz * Z;
  out[14] -= ax * y + dx * Y;
  out[15] -= ax * z + dx * Z;
  out[16] -= ay * z + dy * Z;
  out[17] += ax * X + bx * x;
  out[18] += ay * Y + by * y;
  out[19] += az * Z + bz * z;
  out[20] += ax * Y + bx * y;
  out[21] += ax * Z + bx * z;
  out[22] += ay * Z + by * z;
  out[23] -= bx * X + cx * x;
  out[24] -= by * Y + cy * y;
  out[25] -= bz * Z + cz * z;
  out[26] -= bx * Y + cx * y;
  out[27] -= bx * Z + cx * z;
  out[28] -= by * Z + cy * z;
  out[29] += cx * X;
  out[30] += cy * Y;
  out[31] += cz * Z;
  out[32] += cx * Y;
  out[33] += cx * Z;
  out[34] += cy * Z;
  return (Math.abs(twiceMean) + apart) / 2;
}

/** Rows and columns of xx, yy, zz, xy, xz, yz. */
export const PAIRS: readonly (readonly [number, number])[] = [[0, 0], [1, 1], [2, 2], [0, 1], [0, 2], [1, 2]];

/** Signs of the terms: kernels sum them all with a plus. */
export const TERM_SIGNS: Float64Array = Float64Array.from({ length: SHELL_TERMS }, (_, i) => (i === 0 || (i > 1 && i < 5) || (i > 7 && i < 17) || (i > 22 && i < 29) ? -1 : 1));

/** Adds terms about one point to those about another, from which it lies (sx, sy, sz). */
export function addShifted(terms: Float64Array, from: number, sx: number, sy: number, sz: number, out: Float64Array): void {
  const shift = [sx, sy, sz];
  for (let p = 0; p < TERM_STARTS.length; p++) {
    const [volume, first, second] = TERM_STARTS[p];
    const m0 = volume < 0 ? 0 : terms[from + volume];
    if (volume >= 0) out[volume] += m0;
    if (first >= 0) for (let i = 0; i < 3; i++) out[first + i] += terms[from + first + i] + shift[i] * m0;
    for (let k = 0; k < PAIRS.length; k++) {
      const [i, j] = PAIRS[k];
      const mi = first < 0 ? 0 : terms[from + first + i], mj = first < 0 ? 0 : terms[from + first + j];
      out[second + k] += terms[from + second + k] + shift[i] * mj + shift[j] * mi + shift[i] * shift[j] * m0;
    }
  }
}
