import type { GaussRule } from '../patches/gauss-rule';
import type { NodeSums } from './node-sums';

// Written by lib/run/build-kernel.mjs, from the same operations as the vector kernel: change them there.

const node = new Float64Array(19);

/** Visits the nodes of a bicubic patch with the power coefficients `p` and lets `sums` add them to `totals`. */
export function bicubicNodes(p: Float64Array, _along: GaussRule, rule: GaussRule, sums: NodeSums, totals: Float64Array): void {
  const { nodes, weights } = rule;
  const count = nodes.length;
  const half = count >> 1;
  for (let i = 0; i < count; i++) {
    const u = nodes[i];
    const wu = weights[i];
    const u2 = u * u;
    const ud2 = 2 * u;
    const ud3 = 3 * u2;
    const xa0 = (p[0] + (u2 * p[24])) + (u * (p[12] + (u2 * p[36])));
    const xd0 = (p[12] + (ud2 * p[24])) + (ud3 * p[36]);
    const xa1 = (p[3] + (u2 * p[27])) + (u * (p[15] + (u2 * p[39])));
    const xd1 = (p[15] + (ud2 * p[27])) + (ud3 * p[39]);
    const xa2 = (p[6] + (u2 * p[30])) + (u * (p[18] + (u2 * p[42])));
    const xd2 = (p[18] + (ud2 * p[30])) + (ud3 * p[42]);
    const xa3 = (p[9] + (u2 * p[33])) + (u * (p[21] + (u2 * p[45])));
    const xd3 = (p[21] + (ud2 * p[33])) + (ud3 * p[45]);
    const ya0 = (p[1] + (u2 * p[25])) + (u * (p[13] + (u2 * p[37])));
    const yd0 = (p[13] + (ud2 * p[25])) + (ud3 * p[37]);
    const ya1 = (p[4] + (u2 * p[28])) + (u * (p[16] + (u2 * p[40])));
    const yd1 = (p[16] + (ud2 * p[28])) + (ud3 * p[40]);
    const ya2 = (p[7] + (u2 * p[31])) + (u * (p[19] + (u2 * p[43])));
    const yd2 = (p[19] + (ud2 * p[31])) + (ud3 * p[43]);
    const ya3 = (p[10] + (u2 * p[34])) + (u * (p[22] + (u2 * p[46])));
    const yd3 = (p[22] + (ud2 * p[34])) + (ud3 * p[46]);
    const za0 = (p[2] + (u2 * p[26])) + (u * (p[14] + (u2 * p[38])));
    const zd0 = (p[14] + (ud2 * p[26])) + (ud3 * p[38]);
    const za1 = (p[5] + (u2 * p[29])) + (u * (p[17] + (u2 * p[41])));
    const zd1 = (p[17] + (ud2 * p[29])) + (ud3 * p[41]);
    const za2 = (p[8] + (u2 * p[32])) + (u * (p[20] + (u2 * p[44])));
    const zd2 = (p[20] + (ud2 * p[32])) + (ud3 * p[44]);
    const za3 = (p[11] + (u2 * p[35])) + (u * (p[23] + (u2 * p[47])));
    const zd3 = (p[23] + (ud2 * p[35])) + (ud3 * p[47]);
    for (let j = 0; j < half; j++) {
      const v = nodes[count - 1 - j];
      node[18] = wu * weights[j];
      const v2 = v * v;
      const vd2 = 2 * v;
      const vd3 = 3 * v2;
      node[0] = xa0 + (v2 * xa2);
      node[1] = v * (xa1 + (v2 * xa3));
      node[2] = xd0 + (v2 * xd2);
      node[3] = v * (xd1 + (v2 * xd3));
      node[4] = xa1 + (vd3 * xa3);
      node[5] = vd2 * xa2;
      node[6] = ya0 + (v2 * ya2);
      node[7] = v * (ya1 + (v2 * ya3));
      node[8] = yd0 + (v2 * yd2);
      node[9] = v * (yd1 + (v2 * yd3));
      node[10] = ya1 + (vd3 * ya3);
      node[11] = vd2 * ya2;
      node[12] = za0 + (v2 * za2);
      node[13] = v * (za1 + (v2 * za3));
      node[14] = zd0 + (v2 * zd2);
      node[15] = v * (zd1 + (v2 * zd3));
      node[16] = za1 + (vd3 * za3);
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
