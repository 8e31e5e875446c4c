import { AREA_NODES, measureSurface, mendSurface } from '../patches/mend-surface';
import type { PatchKind } from './patch-kinds';
import type { RegularRule } from './regular-patches';

function ruleOf(kind: PatchKind): RegularRule {
  const [nodes, coarseNodes] = AREA_NODES[kind];
  return { kind, nodes, coarseNodes, mend: (net, ox, oy, oz, surface, coarseArea) => mendSurface(kind, net, ox, oy, oz, surface, coarseArea) };
}

/** Bicubic B-splines: degree 13 a direction with the second moments. */
export const BICUBIC_RULE = ruleOf('bicubic');

/** Quartic box splines: degree 17 in all. */
export const TRIANGLE_RULE = ruleOf('triangle');

/** Biquadratic B-splines: degree 8 a direction. Where five nodes are too few for the root of the area, seven are tried before quartering. */
export const BIQUADRATIC_RULE: RegularRule = {
  kind: 'biquadratic',
  nodes: 5,
  coarseNodes: 3,
  mend: (net, ox, oy, oz, surface) => measureSurface('biquadratic', net, ox, oy, oz, surface),
};
