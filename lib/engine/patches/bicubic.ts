import { bicubicPowerMoments } from '../kernel/bicubic-scalar';
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
  netToPowers(net, powers);
  powers[0] -= ox;
  powers[1] -= oy;
  powers[2] -= oz;
  return bicubicPowerMoments(powers, rule, solid, surface);
}
