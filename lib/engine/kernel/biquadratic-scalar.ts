import type { GaussRule } from '../patches/gauss-rule';
import type { NodeSums } from './node-sums';

// Written by lib/run/build-kernel.mjs, from the same operations as the vector kernel: change them there.

const node = new Float64Array(19);

/** Visits the nodes of a biquadratic patch with the power coefficients `p` and lets `sums` add them to `totals`. */
export function biquadraticNodes(p: Float64Array, _along: GaussRule, rule: GaussRule, sums: NodeSums, totals: Float64Array): void {
  const { nodes, weights } = rule;
  const count = nodes.length;
  const half = count >> 1;
  for (let i = 0; i < count; i++) {
    const u = nodes[i];
    const wu = weights[i];
    const u2 = u * u;
    const ud2 = 2 * u;
    const xa0 = (p[0] + (u2 * p[18])) + (u * p[9]);
    const xd0 = p[9] + (ud2 * p[18]);
    const xa1 = (p[3] + (u2 * p[21])) + (u * p[12]);
    const xd1 = p[12] + (ud2 * p[21]);
    const xa2 = (p[6] + (u2 * p[24])) + (u * p[15]);
    const xd2 = p[15] + (ud2 * p[24]);
    const ya0 = (p[1] + (u2 * p[19])) + (u * p[10]);
    const yd0 = p[10] + (ud2 * p[19]);
    const ya1 = (p[4] + (u2 * p[22])) + (u * p[13]);
    const yd1 = p[13] + (ud2 * p[22]);
    const ya2 = (p[7] + (u2 * p[25])) + (u * p[16]);
    const yd2 = p[16] + (ud2 * p[25]);
    const za0 = (p[2] + (u2 * p[20])) + (u * p[11]);
    const zd0 = p[11] + (ud2 * p[20]);
    const za1 = (p[5] + (u2 * p[23])) + (u * p[14]);
    const zd1 = p[14] + (ud2 * p[23]);
    const za2 = (p[8] + (u2 * p[26])) + (u * p[17]);
    const zd2 = p[17] + (ud2 * p[26]);
    for (let j = 0; j < half; j++) {
      const v = nodes[count - 1 - j];
      node[18] = wu * weights[j];
      const v2 = v * v;
      const vd2 = 2 * v;
      node[0] = xa0 + (v2 * xa2);
      node[1] = v * xa1;
      node[2] = xd0 + (v2 * xd2);
      node[3] = v * xd1;
      node[4] = xa1;
      node[5] = vd2 * xa2;
      node[6] = ya0 + (v2 * ya2);
      node[7] = v * ya1;
      node[8] = yd0 + (v2 * yd2);
      node[9] = v * yd1;
      node[10] = ya1;
      node[11] = vd2 * ya2;
      node[12] = za0 + (v2 * za2);
      node[13] = v * za1;
      node[14] = zd0 + (v2 * zd2);
      node[15] = v * zd1;
      node[16] = za1;
      node[17] = vd2 * za2;
      sums.addPair(node, totals);
    }
    if ((count & 1) === 1) {
      node[18] = wu * weights[half];
      node[0] = xa0;
      node[2] = xd0;
      node[4] = xa1;
      node[6] = ya0;
      node[8] = yd0;
      node[10] = ya1;
      node[12] = za0;
      node[14] = zd0;
      node[16] = za1;
      sums.addMiddle(node, totals);
    }
  }
}
