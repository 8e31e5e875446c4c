import { netToPowers } from './bicubic-powers';
import type { GaussRule } from './gauss-rule';

const powers = new Float64Array(48);

/**
 * Ten solid and ten surface moments of a bicubic B-spline patch over its unit square.
 * `net` holds 4 × 4 control points as [(4 row + column) · 3 + axis]; rows run along u, columns along v, and X_u × X_v points outwards.
 * Solid moments are those of the cone from (ox, oy, oz) to the patch, about that point: ∫_V f = 1/(3 + deg f) ∮ f(X) det(X, X_u, X_v) du dv,
 * exact with 7 nodes a direction. Returns ∮ (|x n_x| + |y n_y| + |z n_z|)/3, which the volume's rounding error is relative to. Surface moments (∫ f dA, about the same point) hold a root and are as good as the rule.
 */
export function bicubicMoments(net: Float64Array, ox: number, oy: number, oz: number, rule: GaussRule, solid: Float64Array, surface: Float64Array): number {
  const p = powers;
  netToPowers(net, p);
  p[0] -= ox;
  p[1] -= oy;
  p[2] -= oz;
  const { nodes, weights } = rule;
  const count = nodes.length;
  let m = 0, mx = 0, my = 0, mz = 0, mxx = 0, myy = 0, mzz = 0, mxy = 0, mxz = 0, myz = 0;
  let magnitude = 0;
  let s = 0, sx = 0, sy = 0, sz = 0, sxx = 0, syy = 0, szz = 0, sxy = 0, sxz = 0, syz = 0;
  for (let i = 0; i < count; i++) {
    const u = nodes[i];
    const u2 = u * u;
    const u3 = u2 * u;
    const du2 = 2 * u;
    const du3 = 3 * u2;
    // Coefficients in v of X (a…) and X_u (d…) on this line.
    const ax0 = p[0] + u * p[12] + u2 * p[24] + u3 * p[36], dx0 = p[12] + du2 * p[24] + du3 * p[36];
    const ay0 = p[1] + u * p[13] + u2 * p[25] + u3 * p[37], dy0 = p[13] + du2 * p[25] + du3 * p[37];
    const az0 = p[2] + u * p[14] + u2 * p[26] + u3 * p[38], dz0 = p[14] + du2 * p[26] + du3 * p[38];
    const ax1 = p[3] + u * p[15] + u2 * p[27] + u3 * p[39], dx1 = p[15] + du2 * p[27] + du3 * p[39];
    const ay1 = p[4] + u * p[16] + u2 * p[28] + u3 * p[40], dy1 = p[16] + du2 * p[28] + du3 * p[40];
    const az1 = p[5] + u * p[17] + u2 * p[29] + u3 * p[41], dz1 = p[17] + du2 * p[29] + du3 * p[41];
    const ax2 = p[6] + u * p[18] + u2 * p[30] + u3 * p[42], dx2 = p[18] + du2 * p[30] + du3 * p[42];
    const ay2 = p[7] + u * p[19] + u2 * p[31] + u3 * p[43], dy2 = p[19] + du2 * p[31] + du3 * p[43];
    const az2 = p[8] + u * p[20] + u2 * p[32] + u3 * p[44], dz2 = p[20] + du2 * p[32] + du3 * p[44];
    const ax3 = p[9] + u * p[21] + u2 * p[33] + u3 * p[45], dx3 = p[21] + du2 * p[33] + du3 * p[45];
    const ay3 = p[10] + u * p[22] + u2 * p[34] + u3 * p[46], dy3 = p[22] + du2 * p[34] + du3 * p[46];
    const az3 = p[11] + u * p[23] + u2 * p[35] + u3 * p[47], dz3 = p[23] + du2 * p[35] + du3 * p[47];
    const wu = weights[i];
    for (let j = 0; j < count; j++) {
      const v = nodes[j];
      const v2 = v * v;
      const w = wu * weights[j];
      const x = ax0 + v * ax1 + v2 * (ax2 + v * ax3);
      const y = ay0 + v * ay1 + v2 * (ay2 + v * ay3);
      const z = az0 + v * az1 + v2 * (az2 + v * az3);
      const xu = dx0 + v * dx1 + v2 * (dx2 + v * dx3);
      const yu = dy0 + v * dy1 + v2 * (dy2 + v * dy3);
      const zu = dz0 + v * dz1 + v2 * (dz2 + v * dz3);
      const xv = ax1 + 2 * v * ax2 + 3 * v2 * ax3;
      const yv = ay1 + 2 * v * ay2 + 3 * v2 * ay3;
      const zv = az1 + 2 * v * az2 + 3 * v2 * az3;
      const nx = yu * zv - zu * yv;
      const ny = zu * xv - xu * zv;
      const nz = xu * yv - yu * xv;
      const px = x * nx, py = y * ny, pz = z * nz;
      const d = w * (px + py + pz);
      magnitude += w * ((px < 0 ? -px : px) + (py < 0 ? -py : py) + (pz < 0 ? -pz : pz));
      const dx = d * x, dy = d * y, dz = d * z;
      m += d;
      mx += dx;
      my += dy;
      mz += dz;
      mxx += dx * x;
      myy += dy * y;
      mzz += dz * z;
      mxy += dx * y;
      mxz += dx * z;
      myz += dy * z;
      const a = w * Math.sqrt(nx * nx + ny * ny + nz * nz);
      const bx = a * x, by = a * y, bz = a * z;
      s += a;
      sx += bx;
      sy += by;
      sz += bz;
      sxx += bx * x;
      syy += by * y;
      szz += bz * z;
      sxy += bx * y;
      sxz += bx * z;
      syz += by * z;
    }
  }
  solid[0] = m / 3;
  solid[1] = mx / 4;
  solid[2] = my / 4;
  solid[3] = mz / 4;
  solid[4] = mxx / 5;
  solid[5] = myy / 5;
  solid[6] = mzz / 5;
  solid[7] = mxy / 5;
  solid[8] = mxz / 5;
  solid[9] = myz / 5;
  surface[0] = s;
  surface[1] = sx;
  surface[2] = sy;
  surface[3] = sz;
  surface[4] = sxx;
  surface[5] = syy;
  surface[6] = szz;
  surface[7] = sxy;
  surface[8] = sxz;
  surface[9] = syz;
  return magnitude / 3;
}
