import type { CreasingRule, TriangleRule } from '../cage';

/** The options of the standard that refinement reads at every step. */
export interface RefinementRules {
  triangles: TriangleRule;
  creasing: CreasingRule;
}
