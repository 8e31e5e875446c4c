import type { GaussRule } from '../patches/gauss-rule';
import type { NodeSums } from './node-sums';

// Written by lib/run/build-kernel.mjs, from the same operations as the vector kernel: change them there.

const node = new Float64Array(19);

function larger(left: number, right: number): number {
  return left < right ? right : left;
}

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

/** Bounds of what rules with fewer nodes than the exact one leave out, as lib/run/support/kernel-bounds.mjs says, to `bounds`: the limit, a norm, then one a rule. */
export function biquadraticBounds(p: Float64Array, tolerance: number, reach: number, bounds: Float64Array): void {
  const e00 = Math.sqrt((((p[0] * p[0]) + (p[1] * p[1])) + (p[2] * p[2])));
  const e01 = Math.sqrt((((p[3] * p[3]) + (p[4] * p[4])) + (p[5] * p[5]))) * (1 / 2);
  const e02 = Math.sqrt((((p[6] * p[6]) + (p[7] * p[7])) + (p[8] * p[8]))) * (1 / 4);
  const e10 = Math.sqrt((((p[9] * p[9]) + (p[10] * p[10])) + (p[11] * p[11]))) * (1 / 2);
  const e11 = Math.sqrt((((p[12] * p[12]) + (p[13] * p[13])) + (p[14] * p[14]))) * (1 / 4);
  const e12 = Math.sqrt((((p[15] * p[15]) + (p[16] * p[16])) + (p[17] * p[17]))) * (1 / 8);
  const e20 = Math.sqrt((((p[18] * p[18]) + (p[19] * p[19])) + (p[20] * p[20]))) * (1 / 4);
  const e21 = Math.sqrt((((p[21] * p[21]) + (p[22] * p[22])) + (p[23] * p[23]))) * (1 / 8);
  const e22 = Math.sqrt((((p[24] * p[24]) + (p[25] * p[25])) + (p[26] * p[26]))) * (1 / 16);
  const own0u = (e00 + e01) + e02;
  const own0v = (e00 + e10) + e20;
  const own0 = larger(own0u, own0v);
  const own1u = (e10 + e11) + e12;
  const own1v = (e01 + e11) + e21;
  const own1 = larger(own1u, own1v);
  const own2u = (e20 + e21) + e22;
  const own2v = (e02 + e12) + e22;
  const own2 = larger(own2u, own2v);
  const side1u = (e11 + e12) + e12;
  const side1v = (e11 + e21) + e21;
  const side1 = larger(side1u, side1v);
  const side2u = (e21 + e22) + e22;
  const side2v = (e12 + e22) + e22;
  const side2 = larger(side2u, side2v);
  const along0 = own1;
  const along1 = own2 + own2;
  const normal2 = (along0 * side2) + (along1 * side1);
  const normal3 = along1 * side2;
  const square3 = (own1 * own2) + (own2 * own1);
  const square4 = own2 * own2;
  const cube5 = (square3 * own2) + (square4 * own1);
  const cube6 = square4 * own2;
  const left8 = (cube5 * normal3) + (cube6 * normal2);
  const nx = (p[10] * p[5]) - (p[11] * p[4]);
  const ny = (p[11] * p[3]) - (p[9] * p[5]);
  const nz = (p[9] * p[4]) - (p[10] * p[3]);
  const magnitude = ((Math.abs((p[0] * nx)) + Math.abs((p[1] * ny))) + Math.abs((p[2] * nz))) + (reach * Math.sqrt((((nx * nx) + (ny * ny)) + (nz * nz))));
  const size = (own0 + own1) + own2;
  const far = larger(reach, size);
  bounds[0] = ((tolerance * magnitude) * far) * far;
  bounds[1] = own0;
  bounds[2] = 0.0464863 * left8;
  const restu = ((((((e11 + e12) + e20) + e20) + e21) + e21) + e22) + e22;
  const restv = ((((((e02 + e02) + e11) + e12) + e12) + e21) + e22) + e22;
  const turned = 4 * (((e10 * restv) + (e01 * restu)) + (restu * restv));
  bounds[7] = (turned * turned) / (((nx * nx) + (ny * ny)) + (nz * nz));
}

/** Puts the square of the most that X_u × X_v differs at a corner from the middle, relative to its length there, into `bends`. */
export function biquadraticVariation(p: Float64Array, bends: Float64Array): void {
  const u = 0;
  const u2 = u * u;
  const ud2 = 2 * u;
  const xd0 = p[9] + (ud2 * p[18]);
  const xa1 = (p[3] + (u2 * p[21])) + (u * p[12]);
  const yd0 = p[10] + (ud2 * p[19]);
  const ya1 = (p[4] + (u2 * p[22])) + (u * p[13]);
  const zd0 = p[11] + (ud2 * p[20]);
  const za1 = (p[5] + (u2 * p[23])) + (u * p[14]);
  const xum = xd0;
  const xvm = xa1;
  const yum = yd0;
  const yvm = ya1;
  const zum = zd0;
  const zvm = za1;
  const nxm = (yum * zvm) - (zum * yvm);
  const nym = (zum * xvm) - (xum * zvm);
  const nzm = (xum * yvm) - (yum * xvm);
  const nxc = nxm;
  const nyc = nym;
  const nzc = nzm;
  let most = 0;
  {
    const u = 0 - (1 * (1 / 2));
    const u2 = u * u;
    const ud2 = 2 * u;
    const xd0 = p[9] + (ud2 * p[18]);
    const xa1 = (p[3] + (u2 * p[21])) + (u * p[12]);
    const xd1 = p[12] + (ud2 * p[21]);
    const xa2 = (p[6] + (u2 * p[24])) + (u * p[15]);
    const xd2 = p[15] + (ud2 * p[24]);
    const yd0 = p[10] + (ud2 * p[19]);
    const ya1 = (p[4] + (u2 * p[22])) + (u * p[13]);
    const yd1 = p[13] + (ud2 * p[22]);
    const ya2 = (p[7] + (u2 * p[25])) + (u * p[16]);
    const yd2 = p[16] + (ud2 * p[25]);
    const zd0 = p[11] + (ud2 * p[20]);
    const za1 = (p[5] + (u2 * p[23])) + (u * p[14]);
    const zd1 = p[14] + (ud2 * p[23]);
    const za2 = (p[8] + (u2 * p[26])) + (u * p[17]);
    const zd2 = p[17] + (ud2 * p[26]);
    const v = 1 * (1 / 2);
    const v2 = v * v;
    const vd2 = 2 * v;
    const xue = xd0 + (v2 * xd2);
    const xuo = v * xd1;
    const xve = xa1;
    const xvo = vd2 * xa2;
    const yue = yd0 + (v2 * yd2);
    const yuo = v * yd1;
    const yve = ya1;
    const yvo = vd2 * ya2;
    const zue = zd0 + (v2 * zd2);
    const zuo = v * zd1;
    const zve = za1;
    const zvo = vd2 * za2;
    const xul = xue + xuo;
    const xvl = xve + xvo;
    const yul = yue + yuo;
    const yvl = yve + yvo;
    const zul = zue + zuo;
    const zvl = zve + zvo;
    const xur = xue - xuo;
    const xvr = xve - xvo;
    const yur = yue - yuo;
    const yvr = yve - yvo;
    const zur = zue - zuo;
    const zvr = zve - zvo;
    const nxl = (yul * zvl) - (zul * yvl);
    const nyl = (zul * xvl) - (xul * zvl);
    const nzl = (xul * yvl) - (yul * xvl);
    const nxr = (yur * zvr) - (zur * yvr);
    const nyr = (zur * xvr) - (xur * zvr);
    const nzr = (xur * yvr) - (yur * xvr);
    most = Math.max(most, (((nxl - nxc) * (nxl - nxc)) + ((nyl - nyc) * (nyl - nyc))) + ((nzl - nzc) * (nzl - nzc)));
    most = Math.max(most, (((nxr - nxc) * (nxr - nxc)) + ((nyr - nyc) * (nyr - nyc))) + ((nzr - nzc) * (nzr - nzc)));
  }
  {
    const u = 1 * (1 / 2);
    const u2 = u * u;
    const ud2 = 2 * u;
    const xd0 = p[9] + (ud2 * p[18]);
    const xa1 = (p[3] + (u2 * p[21])) + (u * p[12]);
    const xd1 = p[12] + (ud2 * p[21]);
    const xa2 = (p[6] + (u2 * p[24])) + (u * p[15]);
    const xd2 = p[15] + (ud2 * p[24]);
    const yd0 = p[10] + (ud2 * p[19]);
    const ya1 = (p[4] + (u2 * p[22])) + (u * p[13]);
    const yd1 = p[13] + (ud2 * p[22]);
    const ya2 = (p[7] + (u2 * p[25])) + (u * p[16]);
    const yd2 = p[16] + (ud2 * p[25]);
    const zd0 = p[11] + (ud2 * p[20]);
    const za1 = (p[5] + (u2 * p[23])) + (u * p[14]);
    const zd1 = p[14] + (ud2 * p[23]);
    const za2 = (p[8] + (u2 * p[26])) + (u * p[17]);
    const zd2 = p[17] + (ud2 * p[26]);
    const v = 1 * (1 / 2);
    const v2 = v * v;
    const vd2 = 2 * v;
    const xue = xd0 + (v2 * xd2);
    const xuo = v * xd1;
    const xve = xa1;
    const xvo = vd2 * xa2;
    const yue = yd0 + (v2 * yd2);
    const yuo = v * yd1;
    const yve = ya1;
    const yvo = vd2 * ya2;
    const zue = zd0 + (v2 * zd2);
    const zuo = v * zd1;
    const zve = za1;
    const zvo = vd2 * za2;
    const xul = xue + xuo;
    const xvl = xve + xvo;
    const yul = yue + yuo;
    const yvl = yve + yvo;
    const zul = zue + zuo;
    const zvl = zve + zvo;
    const xur = xue - xuo;
    const xvr = xve - xvo;
    const yur = yue - yuo;
    const yvr = yve - yvo;
    const zur = zue - zuo;
    const zvr = zve - zvo;
    const nxl = (yul * zvl) - (zul * yvl);
    const nyl = (zul * xvl) - (xul * zvl);
    const nzl = (xul * yvl) - (yul * xvl);
    const nxr = (yur * zvr) - (zur * yvr);
    const nyr = (zur * xvr) - (xur * zvr);
    const nzr = (xur * yvr) - (yur * xvr);
    most = Math.max(most, (((nxl - nxc) * (nxl - nxc)) + ((nyl - nyc) * (nyl - nyc))) + ((nzl - nzc) * (nzl - nzc)));
    most = Math.max(most, (((nxr - nxc) * (nxr - nxc)) + ((nyr - nyc) * (nyr - nyc))) + ((nzr - nzc) * (nzr - nzc)));
  }
  bends[0] = most / (((nxc * nxc) + (nyc * nyc)) + (nzc * nzc));
}
