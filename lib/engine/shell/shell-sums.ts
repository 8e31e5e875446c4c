import type { ShellErrors } from './bicubic-shell';
import { SHELL_TERMS, type CurvaturePeak } from './shell-terms';

/** Coefficients of the mitres' moments: ten moments with t¹ … t⁵ each, [5 moment + power − 1]. */
export const POLYNOMIAL = 50;

/** Shell integrals of one body about its origin. */
export interface ShellBody {
  /** Surface terms, as `addShellNode` orders them. */
  terms: Float64Array;
  /** Mitres along sharp edges, POLYNOMIAL coefficients. */
  mitres: Float64Array;
  /** Largest inward curvature of the surface, in the body's frame. */
  peak: CurvaturePeak;
  /** What ∫ N dA, ∫ 2H dA and ∫ K dA may be off by. */
  errors: ShellErrors;
  /** What the corners hold beyond mitres, per t³. */
  corners: number;
}

/** Sums of zero for so many bodies. */
export function emptyShells(bodies: number): ShellBody[] {
  return Array.from({ length: bodies }, () => ({
    terms: new Float64Array(SHELL_TERMS), mitres: new Float64Array(POLYNOMIAL), peak: { curvature: 0, x: 0, y: 0, z: 0 }, errors: [0, 0, 0], corners: 0,
  }));
}
