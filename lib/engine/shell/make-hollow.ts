import type { MeasuredComponent, ShellLimits, Three } from '../measured';
import { shellPolynomials } from './shell-polynomials';
import type { ShellBody } from './shell-sums';

/** Rounding of an integral relative to the magnitudes that it sums. */
const ROUNDING = 2 ** -46;

/**
 * What a component keeps of its shell integrals: polynomials of the wall's moments about `centroid` (file frame) and their limits. `surface` has the surface's
 * ten moments about `origin`, the body's own (file frame); `surfaceError` is their relative error, `size` half the diagonal of the body's box.
 */
export function makeHollow(
  surface: Float64Array, surfaceError: number, shell: ShellBody, origin: Three, centroid: Three, size: number,
): Pick<MeasuredComponent, 'hollow' | 'hollowLimits'> {
  const centre: Three = [centroid[0] - origin[0], centroid[1] - origin[1], centroid[2] - origin[2]];
  const [area, mean, gauss] = shell.errors;
  // Moments of degree k err by their own integrals and, relative to size^k, by those of lower order in the curvature.
  const rounding = (ROUNDING * surface[0]) / size;
  const limits: ShellLimits = {
    curvature: shell.peak.curvature,
    position: [origin[0] + shell.peak.x, origin[1] + shell.peak.y, origin[2] + shell.peak.z],
    error: [surface[0] * surfaceError, (mean + area / size) / 2 + rounding, (gauss + (2 * mean) / size + area / (size * size)) / 3 + rounding / size + shell.corners],
  };
  return { hollow: shellPolynomials(surface, shell, centre), hollowLimits: limits };
}
