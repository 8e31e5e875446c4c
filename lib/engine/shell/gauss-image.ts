import { gaussRule } from '../patches/gauss-rule';
import { JET, PAIRS } from './shell-terms';

/** ∫ K dA, ∫ K N dA (x y z), ∫ K N Nᵀ dA (xx … yz). */
export const GAUSS_TERMS = 10;

/** A stretch of boundary: fills the jet at `along` (−½ … ½, the region on the left) and tells how u and v go along it. */
export interface ImageSide {
  jet(along: number, out: Float64Array): void;
  u: number;
  v: number;
}

const jet = new Float64Array(JET);

/**
 * The ten integrals over a region whose Gauss map stays within a hemisphere, from its boundary alone [Gauss 1828; Stokes]: ∫ K f(N) dA is that of f over the
 * normals' image on the sphere. About a pole P its area is ∮ P·(N × dN)/(1 + P·N); ∫ N = ½ ∮ N × dN; ∫ N Nᵀ = (δ · area − ∮ N (dN × N)ᵀ)/3.
 * So nothing is left at an extraordinary point, however slowly its level sequence falls. Null where the normals spread too far.
 */
export function gaussImage(sides: readonly ImageSide[], nodes: number): Float64Array | null {
  const rule = gaussRule(nodes);
  const points = new Float64Array(6 * nodes * sides.length);
  const pole = [0, 0, 0];
  for (let s = 0, at = 0; s < sides.length; s++) {
    for (let i = 0; i < nodes; i++, at += 6) {
      sides[s].jet(rule.nodes[i], jet);
      if (!normalAlong(jet, sides[s].u, sides[s].v, points, at)) return null;
      for (let axis = 0; axis < 3; axis++) pole[axis] += points[at + axis];
    }
  }
  const length = Math.hypot(pole[0], pole[1], pole[2]);
  const [px, py, pz] = pole.map((value) => value / length);
  const out = new Float64Array(GAUSS_TERMS);
  const flow = new Float64Array(9);
  for (let at = 0; at < points.length; at += 6) {
    const weight = rule.weights[(at / 6) % nodes];
    const [x, y, z, dx, dy, dz] = points.subarray(at, at + 6);
    const cx = y * dz - z * dy, cy = z * dx - x * dz, cz = x * dy - y * dx;
    const height = px * x + py * y + pz * z;
    if (!(height > 0.2)) return null;
    out[0] += (weight * (px * cx + py * cy + pz * cz)) / (1 + height);
    out[1] += (weight * cx) / 2;
    out[2] += (weight * cy) / 2;
    out[3] += (weight * cz) / 2;
    [x, y, z].forEach((n, i) => [cx, cy, cz].forEach((c, j) => (flow[3 * i + j] -= weight * n * c)));
  }
  PAIRS.forEach(([i, j], k) => (out[4 + k] = ((i === j ? out[0] : 0) - (flow[3 * i + j] + flow[3 * j + i]) / 2) / 3));
  return out;
}

/** N and its derivative along (u, v) to `out`; false where there is no tangent plane. */
function normalAlong(j: Float64Array, u: number, v: number, out: Float64Array, at: number): boolean {
  const n = cross(j, 3, j, 6);
  const area = Math.hypot(n[0], n[1], n[2]);
  if (!(area > 0)) return false;
  const [a, b, c, d] = [cross(j, 9, j, 6), cross(j, 3, j, 12), cross(j, 12, j, 6), cross(j, 3, j, 15)];
  let along = 0;
  for (let axis = 0; axis < 3; axis++) {
    out[at + axis] = n[axis] / area;
    out[at + 3 + axis] = (u * (a[axis] + b[axis]) + v * (c[axis] + d[axis])) / area;
    along += out[at + axis] * out[at + 3 + axis];
  }
  for (let axis = 0; axis < 3; axis++) out[at + 3 + axis] -= along * out[at + axis];
  return true;
}

function cross(p: Float64Array, i: number, q: Float64Array, k: number): [number, number, number] {
  return [p[i + 1] * q[k + 2] - p[i + 2] * q[k + 1], p[i + 2] * q[k] - p[i] * q[k + 2], p[i] * q[k + 1] - p[i + 1] * q[k]];
}
