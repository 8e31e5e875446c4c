import type { GaussRule } from '../patches/gauss-rule';
import type { NodeSums } from './node-sums';

// Written by lib/run/build-kernel.mjs, from the same operations as the vector kernel: change them there.

const node = new Float64Array(19);

function larger(left: number, right: number): number {
  return left < right ? right : left;
}

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

/** Bounds of what rules with fewer nodes than the exact one leave out, as lib/run/support/kernel-bounds.mjs says, to `bounds`: the limit, a norm, then one a rule. */
export function bicubicBounds(p: Float64Array, tolerance: number, reach: number, bounds: Float64Array): void {
  const e00 = Math.sqrt((((p[0] * p[0]) + (p[1] * p[1])) + (p[2] * p[2])));
  const e01 = Math.sqrt((((p[3] * p[3]) + (p[4] * p[4])) + (p[5] * p[5]))) * (1 / 2);
  const e02 = Math.sqrt((((p[6] * p[6]) + (p[7] * p[7])) + (p[8] * p[8]))) * (1 / 4);
  const e03 = Math.sqrt((((p[9] * p[9]) + (p[10] * p[10])) + (p[11] * p[11]))) * (1 / 8);
  const e10 = Math.sqrt((((p[12] * p[12]) + (p[13] * p[13])) + (p[14] * p[14]))) * (1 / 2);
  const e11 = Math.sqrt((((p[15] * p[15]) + (p[16] * p[16])) + (p[17] * p[17]))) * (1 / 4);
  const e12 = Math.sqrt((((p[18] * p[18]) + (p[19] * p[19])) + (p[20] * p[20]))) * (1 / 8);
  const e13 = Math.sqrt((((p[21] * p[21]) + (p[22] * p[22])) + (p[23] * p[23]))) * (1 / 16);
  const e20 = Math.sqrt((((p[24] * p[24]) + (p[25] * p[25])) + (p[26] * p[26]))) * (1 / 4);
  const e21 = Math.sqrt((((p[27] * p[27]) + (p[28] * p[28])) + (p[29] * p[29]))) * (1 / 8);
  const e22 = Math.sqrt((((p[30] * p[30]) + (p[31] * p[31])) + (p[32] * p[32]))) * (1 / 16);
  const e23 = Math.sqrt((((p[33] * p[33]) + (p[34] * p[34])) + (p[35] * p[35]))) * (1 / 32);
  const e30 = Math.sqrt((((p[36] * p[36]) + (p[37] * p[37])) + (p[38] * p[38]))) * (1 / 8);
  const e31 = Math.sqrt((((p[39] * p[39]) + (p[40] * p[40])) + (p[41] * p[41]))) * (1 / 16);
  const e32 = Math.sqrt((((p[42] * p[42]) + (p[43] * p[43])) + (p[44] * p[44]))) * (1 / 32);
  const e33 = Math.sqrt((((p[45] * p[45]) + (p[46] * p[46])) + (p[47] * p[47]))) * (1 / 64);
  const own0u = ((e00 + e01) + e02) + e03;
  const own0v = ((e00 + e10) + e20) + e30;
  const own0 = larger(own0u, own0v);
  const own1u = ((e10 + e11) + e12) + e13;
  const own1v = ((e01 + e11) + e21) + e31;
  const own1 = larger(own1u, own1v);
  const own2u = ((e20 + e21) + e22) + e23;
  const own2v = ((e02 + e12) + e22) + e32;
  const own2 = larger(own2u, own2v);
  const own3u = ((e30 + e31) + e32) + e33;
  const own3v = ((e03 + e13) + e23) + e33;
  const own3 = larger(own3u, own3v);
  const side0u = ((((e01 + e02) + e02) + e03) + e03) + e03;
  const side0v = ((((e10 + e20) + e20) + e30) + e30) + e30;
  const side0 = larger(side0u, side0v);
  const side1u = ((((e11 + e12) + e12) + e13) + e13) + e13;
  const side1v = ((((e11 + e21) + e21) + e31) + e31) + e31;
  const side1 = larger(side1u, side1v);
  const side2u = ((((e21 + e22) + e22) + e23) + e23) + e23;
  const side2v = ((((e12 + e22) + e22) + e32) + e32) + e32;
  const side2 = larger(side2u, side2v);
  const side3u = ((((e31 + e32) + e32) + e33) + e33) + e33;
  const side3v = ((((e13 + e23) + e23) + e33) + e33) + e33;
  const side3 = larger(side3u, side3v);
  const along0 = own1;
  const along1 = own2 + own2;
  const along2 = (own3 + own3) + own3;
  const normal0 = along0 * side0;
  const normal1 = (along0 * side1) + (along1 * side0);
  const normal2 = ((along0 * side2) + (along1 * side1)) + (along2 * side0);
  const normal3 = ((along0 * side3) + (along1 * side2)) + (along2 * side1);
  const normal4 = (along1 * side3) + (along2 * side2);
  const normal5 = along2 * side3;
  const square0 = own0 * own0;
  const square1 = (own0 * own1) + (own1 * own0);
  const square2 = ((own0 * own2) + (own1 * own1)) + (own2 * own0);
  const square3 = (((own0 * own3) + (own1 * own2)) + (own2 * own1)) + (own3 * own0);
  const square4 = ((own1 * own3) + (own2 * own2)) + (own3 * own1);
  const square5 = (own2 * own3) + (own3 * own2);
  const square6 = own3 * own3;
  const cube3 = (((square0 * own3) + (square1 * own2)) + (square2 * own1)) + (square3 * own0);
  const cube4 = (((square1 * own3) + (square2 * own2)) + (square3 * own1)) + (square4 * own0);
  const cube5 = (((square2 * own3) + (square3 * own2)) + (square4 * own1)) + (square5 * own0);
  const cube6 = (((square3 * own3) + (square4 * own2)) + (square5 * own1)) + (square6 * own0);
  const cube7 = ((square4 * own3) + (square5 * own2)) + (square6 * own1);
  const cube8 = (square5 * own3) + (square6 * own2);
  const cube9 = square6 * own3;
  const left8 = (((((cube3 * normal5) + (cube4 * normal4)) + (cube5 * normal3)) + (cube6 * normal2)) + (cube7 * normal1)) + (cube8 * normal0);
  const left10 = ((((cube5 * normal5) + (cube6 * normal4)) + (cube7 * normal3)) + (cube8 * normal2)) + (cube9 * normal1);
  const left12 = ((cube7 * normal5) + (cube8 * normal4)) + (cube9 * normal3);
  const nx = (p[13] * p[5]) - (p[14] * p[4]);
  const ny = (p[14] * p[3]) - (p[12] * p[5]);
  const nz = (p[12] * p[4]) - (p[13] * p[3]);
  const magnitude = ((Math.abs((p[0] * nx)) + Math.abs((p[1] * ny))) + Math.abs((p[2] * nz))) + (reach * Math.sqrt((((nx * nx) + (ny * ny)) + (nz * nz))));
  const size = ((own0 + own1) + own2) + own3;
  const far = larger(reach, size);
  bounds[0] = ((tolerance * magnitude) * far) * far;
  bounds[1] = own0;
  bounds[2] = ((0.0464863 * left8) + (0.103236 * left10)) + (0.152770 * left12);
  bounds[3] = (0.0117390 * left10) + (0.0320063 * left12);
  bounds[4] = 0.00295527 * left12;
}
