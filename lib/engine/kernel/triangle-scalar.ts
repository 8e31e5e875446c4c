import type { GaussRule } from '../patches/gauss-rule';
import type { NodeSums } from './node-sums';

// Written by lib/run/build-kernel.mjs, from the same operations as the vector kernel: change them there.

const node = new Float64Array(19);

function larger(left: number, right: number): number {
  return left < right ? right : left;
}

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

/** Bounds of what rules with fewer nodes than the exact one leave out, as lib/run/support/kernel-bounds.mjs says, to `bounds`: the limit, a norm, then one a rule. */
export function triangleBounds(p: Float64Array, tolerance: number, reach: number, bounds: Float64Array): void {
  const e00 = Math.sqrt((((p[0] * p[0]) + (p[1] * p[1])) + (p[2] * p[2])));
  const e10 = Math.sqrt((((p[3] * p[3]) + (p[4] * p[4])) + (p[5] * p[5]))) * (1 / 2);
  const e01 = Math.sqrt((((p[6] * p[6]) + (p[7] * p[7])) + (p[8] * p[8]))) * (1 / 2);
  const e20 = Math.sqrt((((p[9] * p[9]) + (p[10] * p[10])) + (p[11] * p[11]))) * (1 / 4);
  const e11 = Math.sqrt((((p[12] * p[12]) + (p[13] * p[13])) + (p[14] * p[14]))) * (1 / 4);
  const e02 = Math.sqrt((((p[15] * p[15]) + (p[16] * p[16])) + (p[17] * p[17]))) * (1 / 4);
  const e30 = Math.sqrt((((p[18] * p[18]) + (p[19] * p[19])) + (p[20] * p[20]))) * (1 / 8);
  const e21 = Math.sqrt((((p[21] * p[21]) + (p[22] * p[22])) + (p[23] * p[23]))) * (1 / 8);
  const e12 = Math.sqrt((((p[24] * p[24]) + (p[25] * p[25])) + (p[26] * p[26]))) * (1 / 8);
  const e03 = Math.sqrt((((p[27] * p[27]) + (p[28] * p[28])) + (p[29] * p[29]))) * (1 / 8);
  const e40 = Math.sqrt((((p[30] * p[30]) + (p[31] * p[31])) + (p[32] * p[32]))) * (1 / 16);
  const e31 = Math.sqrt((((p[33] * p[33]) + (p[34] * p[34])) + (p[35] * p[35]))) * (1 / 16);
  const e22 = Math.sqrt((((p[36] * p[36]) + (p[37] * p[37])) + (p[38] * p[38]))) * (1 / 16);
  const e13 = Math.sqrt((((p[39] * p[39]) + (p[40] * p[40])) + (p[41] * p[41]))) * (1 / 16);
  const e04 = Math.sqrt((((p[42] * p[42]) + (p[43] * p[43])) + (p[44] * p[44]))) * (1 / 16);
  const own0u = (((e00 + (e01 * (1 / 2))) + (e02 * (1 / 4))) + (e03 * (1 / 8))) + (e04 * (1 / 16));
  const own0v = (((e00 + e10) + e20) + e30) + e40;
  const own0 = larger(own0u, own0v);
  const own1u = ((((((e10 + (e01 * (1 / 2))) + (e11 * (1 / 2))) + (e02 * (1 / 2))) + (e12 * (1 / 4))) + ((3 * e03) * (1 / 8))) + (e13 * (1 / 8))) + (e04 * (1 / 4));
  const own1v = ((e01 + e11) + e21) + e31;
  const own1 = larger(own1u, own1v);
  const own2u = (((((((e20 + (e11 * (1 / 2))) + (e02 * (1 / 4))) + (e21 * (1 / 2))) + (e12 * (1 / 2))) + ((3 * e03) * (1 / 8))) + (e22 * (1 / 4))) + ((3 * e13) * (1 / 8))) + ((3 * e04) * (1 / 8));
  const own2v = (e02 + e12) + e22;
  const own2 = larger(own2u, own2v);
  const own3u = ((((((e30 + (e21 * (1 / 2))) + (e12 * (1 / 4))) + (e03 * (1 / 8))) + (e31 * (1 / 2))) + (e22 * (1 / 2))) + ((3 * e13) * (1 / 8))) + (e04 * (1 / 4));
  const own3v = e03 + e13;
  const own3 = larger(own3u, own3v);
  const own4u = (((e40 + (e31 * (1 / 2))) + (e22 * (1 / 4))) + (e13 * (1 / 8))) + (e04 * (1 / 16));
  const own4v = e04;
  const own4 = larger(own4u, own4v);
  const side0u = ((e01 + e02) + ((3 * e03) * (1 / 4))) + (e04 * (1 / 2));
  const side0v = (((((e10 + e20) + e20) + e30) + e30) + e30) + (4 * e40);
  const side0 = larger(side0u, side0v);
  const side1u = ((((e11 + e02) + e12) + ((3 * e03) * (1 / 2))) + ((3 * e13) * (1 / 4))) + ((3 * e04) * (1 / 2));
  const side1v = ((((e11 + e21) + e21) + e31) + e31) + e31;
  const side1 = larger(side1u, side1v);
  const side2u = ((((e21 + e12) + ((3 * e03) * (1 / 4))) + e22) + ((3 * e13) * (1 / 2))) + ((3 * e04) * (1 / 2));
  const side2v = (e12 + e22) + e22;
  const side2 = larger(side2u, side2v);
  const side3u = ((e31 + e22) + ((3 * e13) * (1 / 4))) + (e04 * (1 / 2));
  const side3v = e13;
  const side3 = larger(side3u, side3v);
  const along0 = own1;
  const along1 = own2 + own2;
  const along2 = (own3 + own3) + own3;
  const along3 = 4 * own4;
  const normal0 = along0 * side0;
  const normal1 = (along0 * side1) + (along1 * side0);
  const normal2 = ((along0 * side2) + (along1 * side1)) + (along2 * side0);
  const normal3 = (((along0 * side3) + (along1 * side2)) + (along2 * side1)) + (along3 * side0);
  const normal4 = ((along1 * side3) + (along2 * side2)) + (along3 * side1);
  const normal5 = (along2 * side3) + (along3 * side2);
  const normal6 = along3 * side3;
  const weighted0 = normal0;
  const weighted1 = normal1 + (normal0 * (1 / 2));
  const weighted2 = normal2 + (normal1 * (1 / 2));
  const weighted3 = normal3 + (normal2 * (1 / 2));
  const weighted4 = normal4 + (normal3 * (1 / 2));
  const weighted5 = normal5 + (normal4 * (1 / 2));
  const weighted6 = normal6 + (normal5 * (1 / 2));
  const weighted7 = normal6 * (1 / 2);
  const square0 = own0 * own0;
  const square1 = (own0 * own1) + (own1 * own0);
  const square2 = ((own0 * own2) + (own1 * own1)) + (own2 * own0);
  const square3 = (((own0 * own3) + (own1 * own2)) + (own2 * own1)) + (own3 * own0);
  const square4 = ((((own0 * own4) + (own1 * own3)) + (own2 * own2)) + (own3 * own1)) + (own4 * own0);
  const square5 = (((own1 * own4) + (own2 * own3)) + (own3 * own2)) + (own4 * own1);
  const square6 = ((own2 * own4) + (own3 * own3)) + (own4 * own2);
  const square7 = (own3 * own4) + (own4 * own3);
  const square8 = own4 * own4;
  const cube3 = (((square0 * own3) + (square1 * own2)) + (square2 * own1)) + (square3 * own0);
  const cube4 = ((((square0 * own4) + (square1 * own3)) + (square2 * own2)) + (square3 * own1)) + (square4 * own0);
  const cube5 = ((((square1 * own4) + (square2 * own3)) + (square3 * own2)) + (square4 * own1)) + (square5 * own0);
  const cube6 = ((((square2 * own4) + (square3 * own3)) + (square4 * own2)) + (square5 * own1)) + (square6 * own0);
  const cube7 = ((((square3 * own4) + (square4 * own3)) + (square5 * own2)) + (square6 * own1)) + (square7 * own0);
  const cube8 = ((((square4 * own4) + (square5 * own3)) + (square6 * own2)) + (square7 * own1)) + (square8 * own0);
  const cube9 = (((square5 * own4) + (square6 * own3)) + (square7 * own2)) + (square8 * own1);
  const cube10 = ((square6 * own4) + (square7 * own3)) + (square8 * own2);
  const cube11 = (square7 * own4) + (square8 * own3);
  const cube12 = square8 * own4;
  const left10 = (((((((cube3 * weighted7) + (cube4 * weighted6)) + (cube5 * weighted5)) + (cube6 * weighted4)) + (cube7 * weighted3)) + (cube8 * weighted2)) + (cube9 * weighted1)) + (cube10 * weighted0);
  const left12 = (((((((cube5 * weighted7) + (cube6 * weighted6)) + (cube7 * weighted5)) + (cube8 * weighted4)) + (cube9 * weighted3)) + (cube10 * weighted2)) + (cube11 * weighted1)) + (cube12 * weighted0);
  const left14 = (((((cube7 * weighted7) + (cube8 * weighted6)) + (cube9 * weighted5)) + (cube10 * weighted4)) + (cube11 * weighted3)) + (cube12 * weighted2);
  const left16 = (((cube9 * weighted7) + (cube10 * weighted6)) + (cube11 * weighted5)) + (cube12 * weighted4);
  const left18 = (cube11 * weighted7) + (cube12 * weighted6);
  const nx = (p[4] * p[8]) - (p[5] * p[7]);
  const ny = (p[5] * p[6]) - (p[3] * p[8]);
  const nz = (p[3] * p[7]) - (p[4] * p[6]);
  const magnitude = ((Math.abs((p[0] * nx)) + Math.abs((p[1] * ny))) + Math.abs((p[2] * nz))) + (reach * Math.sqrt((((nx * nx) + (ny * ny)) + (nz * nz))));
  const size = (((own0 + own1) + own2) + own3) + own4;
  const far = larger(reach, size);
  bounds[0] = ((tolerance * magnitude) * far) * far;
  bounds[1] = own0;
  bounds[2] = ((((0.0117390 * left10) + (0.0320063 * left12)) + (0.0555231 * left14)) + (0.0786123 * left16)) + (0.0993131 * left18);
  bounds[3] = (((0.00295527 * left12) + (0.00954641 * left14)) + (0.0189758 * left16)) + (0.0300549 * left18);
  bounds[4] = ((0.000742605 * left14) + (0.00277217 * left16)) + (0.00620895 * left18);
  bounds[5] = (0.000186380 * left16) + (0.000789332 * left18);
}
