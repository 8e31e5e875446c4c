import type { GaussRule } from '../patches/gauss-rule';
import type { NodeSums } from './node-sums';

// Written by lib/run/build-kernel.mjs, from the same operations as the vector kernel: change them there.

const node = new Float64Array(19);

/** Visits the nodes of a triangle patch with the power coefficients `p` and lets `sums` add them to `totals`. */
export function triangleNodes(p: Float64Array, along: GaussRule, rule: GaussRule, sums: NodeSums, totals: Float64Array): void {
  const { nodes, weights } = rule;
  const alongNodes = along.nodes;
  const alongWeights = along.weights;
  const count = nodes.length;
  const half = count >> 1;
  for (let i = 0; i < count + 1; i++) {
    const u = alongNodes[i];
    const rest = (1 * (1 / 2)) - u;
    const wu = alongWeights[i] * rest;
    const u2 = u * u;
    const ud2 = 2 * u;
    const ud3 = 3 * u2;
    const ud4 = (4 * u) * u2;
    const xa0 = (p[0] + (u2 * (p[9] + (u2 * p[30])))) + (u * (p[3] + (u2 * p[18])));
    const xa1 = (p[6] + (u2 * p[21])) + (u * (p[12] + (u2 * p[33])));
    const xa2 = (p[15] + (u * p[24])) + (u2 * p[36]);
    const xa3 = p[27] + (u * p[39]);
    const xa4 = p[42];
    const xd0 = ((p[3] + (ud2 * p[9])) + (ud3 * p[18])) + (ud4 * p[30]);
    const xd1 = (p[12] + (ud2 * p[21])) + (ud3 * p[33]);
    const xd2 = p[24] + (ud2 * p[36]);
    const xd3 = p[39];
    const ya0 = (p[1] + (u2 * (p[10] + (u2 * p[31])))) + (u * (p[4] + (u2 * p[19])));
    const ya1 = (p[7] + (u2 * p[22])) + (u * (p[13] + (u2 * p[34])));
    const ya2 = (p[16] + (u * p[25])) + (u2 * p[37]);
    const ya3 = p[28] + (u * p[40]);
    const ya4 = p[43];
    const yd0 = ((p[4] + (ud2 * p[10])) + (ud3 * p[19])) + (ud4 * p[31]);
    const yd1 = (p[13] + (ud2 * p[22])) + (ud3 * p[34]);
    const yd2 = p[25] + (ud2 * p[37]);
    const yd3 = p[40];
    const za0 = (p[2] + (u2 * (p[11] + (u2 * p[32])))) + (u * (p[5] + (u2 * p[20])));
    const za1 = (p[8] + (u2 * p[23])) + (u * (p[14] + (u2 * p[35])));
    const za2 = (p[17] + (u * p[26])) + (u2 * p[38]);
    const za3 = p[29] + (u * p[41]);
    const za4 = p[44];
    const zd0 = ((p[5] + (ud2 * p[11])) + (ud3 * p[20])) + (ud4 * p[32]);
    const zd1 = (p[14] + (ud2 * p[23])) + (ud3 * p[35]);
    const zd2 = p[26] + (ud2 * p[38]);
    const zd3 = p[41];
    for (let j = 0; j < half; j++) {
      const v = rest * nodes[count - 1 - j];
      node[18] = wu * weights[j];
      const v2 = v * v;
      const vd2 = 2 * v;
      const vd3 = 3 * v2;
      const vd4 = (4 * v) * v2;
      node[0] = xa0 + (v2 * (xa2 + (v2 * xa4)));
      node[1] = v * (xa1 + (v2 * xa3));
      node[2] = xd0 + (v2 * xd2);
      node[3] = v * (xd1 + (v2 * xd3));
      node[4] = xa1 + (vd3 * xa3);
      node[5] = (vd2 * xa2) + (vd4 * xa4);
      node[6] = ya0 + (v2 * (ya2 + (v2 * ya4)));
      node[7] = v * (ya1 + (v2 * ya3));
      node[8] = yd0 + (v2 * yd2);
      node[9] = v * (yd1 + (v2 * yd3));
      node[10] = ya1 + (vd3 * ya3);
      node[11] = (vd2 * ya2) + (vd4 * ya4);
      node[12] = za0 + (v2 * (za2 + (v2 * za4)));
      node[13] = v * (za1 + (v2 * za3));
      node[14] = zd0 + (v2 * zd2);
      node[15] = v * (zd1 + (v2 * zd3));
      node[16] = za1 + (vd3 * za3);
      node[17] = (vd2 * za2) + (vd4 * za4);
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
