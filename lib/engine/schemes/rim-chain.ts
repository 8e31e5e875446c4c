import { gaussRule } from '../patches/gauss-rule';
import { RIM_POWERS } from './fan-rim';

/**
 * Adds to `solid` the ten moments about the point o of the chains [o, 0, C] along `curves` curves C given by powers from `powers[0]` on:
 * the cone from o to a surface is the cone from 0 to it plus these along its edge. With b = −o and X = C − o:
 * dV = det(b, C, C′)/6 dt, first moments dV/4 · (b + 2X), second dV/20 · (b bᵀ + 2 X Xᵀ + (b + 2X)(b + 2X)ᵀ).
 * Returns the magnitude that the volume's rounding error is relative to.
 */
export function addRimChain(powers: Float64Array, curves: number, ox: number, oy: number, oz: number, count: number, solid: Float64Array): number {
  const { nodes, weights } = gaussRule(count);
  let magnitude = 0;
  let v = 0, vx = 0, vy = 0, vz = 0, xx = 0, yy = 0, zz = 0, xy = 0, xz = 0, yz = 0;
  for (let curve = 0, at = 0; curve < curves; curve++, at += 3 * RIM_POWERS) {
    for (let i = 0; i < count; i++) {
      const t = nodes[i];
      const cx = powers[at] + t * (powers[at + 3] + t * (powers[at + 6] + t * (powers[at + 9] + t * powers[at + 12])));
      const cy = powers[at + 1] + t * (powers[at + 4] + t * (powers[at + 7] + t * (powers[at + 10] + t * powers[at + 13])));
      const cz = powers[at + 2] + t * (powers[at + 5] + t * (powers[at + 8] + t * (powers[at + 11] + t * powers[at + 14])));
      const dx = powers[at + 3] + t * (2 * powers[at + 6] + t * (3 * powers[at + 9] + t * 4 * powers[at + 12]));
      const dy = powers[at + 4] + t * (2 * powers[at + 7] + t * (3 * powers[at + 10] + t * 4 * powers[at + 13]));
      const dz = powers[at + 5] + t * (2 * powers[at + 8] + t * (3 * powers[at + 11] + t * 4 * powers[at + 14]));
      const px = ox * (cy * dz - cz * dy), py = oy * (cz * dx - cx * dz), pz = oz * (cx * dy - cy * dx);
      const w = weights[i] / 6;
      const d = -w * (px + py + pz);
      magnitude += w * (Math.abs(px) + Math.abs(py) + Math.abs(pz));
      const x = cx - ox, y = cy - oy, z = cz - oz;
      const sx = 2 * x - ox, sy = 2 * y - oy, sz = 2 * z - oz;
      v += d;
      vx += d * sx;
      vy += d * sy;
      vz += d * sz;
      xx += d * (2 * x * x + sx * sx);
      yy += d * (2 * y * y + sy * sy);
      zz += d * (2 * z * z + sz * sz);
      xy += d * (2 * x * y + sx * sy);
      xz += d * (2 * x * z + sx * sz);
      yz += d * (2 * y * z + sy * sz);
    }
  }
  solid[0] += v;
  solid[1] += vx / 4;
  solid[2] += vy / 4;
  solid[3] += vz / 4;
  solid[4] += (xx + v * ox * ox) / 20;
  solid[5] += (yy + v * oy * oy) / 20;
  solid[6] += (zz + v * oz * oz) / 20;
  solid[7] += (xy + v * ox * oy) / 20;
  solid[8] += (xz + v * ox * oz) / 20;
  solid[9] += (yz + v * oy * oz) / 20;
  return magnitude;
}

/** Moves ten moments about 0 to the point o, in place. */
export function moveMoments(values: Float64Array, at: number, ox: number, oy: number, oz: number): void {
  const m = values[at], x = values[at + 1], y = values[at + 2], z = values[at + 3];
  values[at + 4] += ox * (m * ox - 2 * x);
  values[at + 5] += oy * (m * oy - 2 * y);
  values[at + 6] += oz * (m * oz - 2 * z);
  values[at + 7] += m * ox * oy - ox * y - oy * x;
  values[at + 8] += m * ox * oz - ox * z - oz * x;
  values[at + 9] += m * oy * oz - oy * z - oz * y;
  values[at + 1] = x - m * ox;
  values[at + 2] = y - m * oy;
  values[at + 3] = z - m * oz;
}
