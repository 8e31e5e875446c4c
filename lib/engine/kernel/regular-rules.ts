import { COARSE_NODES, mendSurfaceMoments } from '../patches/bicubic-surface';
import { mendTriangleSurface, TRIANGLE_NODES } from '../patches/box-spline-moments';
import type { RegularRule } from './regular-patches';

/** Bicubic B-splines: degree 13 a direction with the second moments. */
export const BICUBIC_RULE: RegularRule = { kind: 'bicubic', nodes: 7, coarseNodes: COARSE_NODES, mend: mendSurfaceMoments };

/** Quartic box splines: degree 17 in all. */
export const TRIANGLE_RULE: RegularRule = { kind: 'triangle', nodes: TRIANGLE_NODES, coarseNodes: 6, mend: mendTriangleSurface };
