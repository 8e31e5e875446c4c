// Written by lib/run/build-kernel.mjs, from the same operations as the vector kernel: change them there.

/** Totals: magnitude, ten solid and ten surface moments. */
export const TOTALS = 21;

/** Adds what two nodes ±v (in even and odd parts) or one in the middle contribute. A node is, per axis, position, ∂u and ∂v, even and odd part each; then the weight. */
export interface NodeSums {
  addPair(node: Float64Array, totals: Float64Array): void;
  addMiddle(node: Float64Array, totals: Float64Array): void;
}

/** All totals. */
export const MOMENT_SUMS: NodeSums = { addPair: addMomentsOfPair, addMiddle: addMomentsOfMiddle };

function addMomentsOfPair(node: Float64Array, totals: Float64Array): void {
  const xe = node[0];
  const xo = node[1];
  const xue = node[2];
  const xuo = node[3];
  const xve = node[4];
  const xvo = node[5];
  const ye = node[6];
  const yo = node[7];
  const yue = node[8];
  const yuo = node[9];
  const yve = node[10];
  const yvo = node[11];
  const ze = node[12];
  const zo = node[13];
  const zue = node[14];
  const zuo = node[15];
  const zve = node[16];
  const zvo = node[17];
  const w = node[18];
  const xl = xe + xo;
  const xul = xue + xuo;
  const xvl = xve + xvo;
  const yl = ye + yo;
  const yul = yue + yuo;
  const yvl = yve + yvo;
  const zl = ze + zo;
  const zul = zue + zuo;
  const zvl = zve + zvo;
  const xr = xe - xo;
  const xur = xue - xuo;
  const xvr = xve - xvo;
  const yr = ye - yo;
  const yur = yue - yuo;
  const yvr = yve - yvo;
  const zr = ze - zo;
  const zur = zue - zuo;
  const zvr = zve - zvo;
  const nxl = (yul * zvl) - (zul * yvl);
  const nyl = (zul * xvl) - (xul * zvl);
  const nzl = (xul * yvl) - (yul * xvl);
  const pxl = xl * nxl;
  const pyl = yl * nyl;
  const pzl = zl * nzl;
  const dl = w * ((pxl + pyl) + pzl);
  const al = w * Math.sqrt((((nxl * nxl) + (nyl * nyl)) + (nzl * nzl)));
  const dxl = dl * xl;
  const dyl = dl * yl;
  const dzl = dl * zl;
  const axl = al * xl;
  const ayl = al * yl;
  const azl = al * zl;
  const nxr = (yur * zvr) - (zur * yvr);
  const nyr = (zur * xvr) - (xur * zvr);
  const nzr = (xur * yvr) - (yur * xvr);
  const pxr = xr * nxr;
  const pyr = yr * nyr;
  const pzr = zr * nzr;
  const dr = w * ((pxr + pyr) + pzr);
  const ar = w * Math.sqrt((((nxr * nxr) + (nyr * nyr)) + (nzr * nzr)));
  const dxr = dr * xr;
  const dyr = dr * yr;
  const dzr = dr * zr;
  const axr = ar * xr;
  const ayr = ar * yr;
  const azr = ar * zr;
  totals[0] = totals[0] + (w * (((((Math.abs(pxl) + Math.abs(pyl)) + Math.abs(pzl)) + Math.abs(pxr)) + Math.abs(pyr)) + Math.abs(pzr)));
  totals[1] = totals[1] + (dl + dr);
  totals[2] = totals[2] + (dxl + dxr);
  totals[3] = totals[3] + (dyl + dyr);
  totals[4] = totals[4] + (dzl + dzr);
  totals[5] = totals[5] + ((dxl * xl) + (dxr * xr));
  totals[6] = totals[6] + ((dyl * yl) + (dyr * yr));
  totals[7] = totals[7] + ((dzl * zl) + (dzr * zr));
  totals[8] = totals[8] + ((dxl * yl) + (dxr * yr));
  totals[9] = totals[9] + ((dxl * zl) + (dxr * zr));
  totals[10] = totals[10] + ((dyl * zl) + (dyr * zr));
  totals[11] = totals[11] + (al + ar);
  totals[12] = totals[12] + (axl + axr);
  totals[13] = totals[13] + (ayl + ayr);
  totals[14] = totals[14] + (azl + azr);
  totals[15] = totals[15] + ((axl * xl) + (axr * xr));
  totals[16] = totals[16] + ((ayl * yl) + (ayr * yr));
  totals[17] = totals[17] + ((azl * zl) + (azr * zr));
  totals[18] = totals[18] + ((axl * yl) + (axr * yr));
  totals[19] = totals[19] + ((axl * zl) + (axr * zr));
  totals[20] = totals[20] + ((ayl * zl) + (ayr * zr));
}

function addMomentsOfMiddle(node: Float64Array, totals: Float64Array): void {
  const xm = node[0];
  const xum = node[2];
  const xvm = node[4];
  const ym = node[6];
  const yum = node[8];
  const yvm = node[10];
  const zm = node[12];
  const zum = node[14];
  const zvm = node[16];
  const w = node[18];
  const nxm = (yum * zvm) - (zum * yvm);
  const nym = (zum * xvm) - (xum * zvm);
  const nzm = (xum * yvm) - (yum * xvm);
  const pxm = xm * nxm;
  const pym = ym * nym;
  const pzm = zm * nzm;
  const dm = w * ((pxm + pym) + pzm);
  const am = w * Math.sqrt((((nxm * nxm) + (nym * nym)) + (nzm * nzm)));
  const dxm = dm * xm;
  const dym = dm * ym;
  const dzm = dm * zm;
  const axm = am * xm;
  const aym = am * ym;
  const azm = am * zm;
  totals[0] = totals[0] + (w * ((Math.abs(pxm) + Math.abs(pym)) + Math.abs(pzm)));
  totals[1] = totals[1] + dm;
  totals[2] = totals[2] + dxm;
  totals[3] = totals[3] + dym;
  totals[4] = totals[4] + dzm;
  totals[5] = totals[5] + (dxm * xm);
  totals[6] = totals[6] + (dym * ym);
  totals[7] = totals[7] + (dzm * zm);
  totals[8] = totals[8] + (dxm * ym);
  totals[9] = totals[9] + (dxm * zm);
  totals[10] = totals[10] + (dym * zm);
  totals[11] = totals[11] + am;
  totals[12] = totals[12] + axm;
  totals[13] = totals[13] + aym;
  totals[14] = totals[14] + azm;
  totals[15] = totals[15] + (axm * xm);
  totals[16] = totals[16] + (aym * ym);
  totals[17] = totals[17] + (azm * zm);
  totals[18] = totals[18] + (axm * ym);
  totals[19] = totals[19] + (axm * zm);
  totals[20] = totals[20] + (aym * zm);
}

/** The area alone, which is the first surface moment. */
export const AREA_SUMS: NodeSums = { addPair: addAreaOfPair, addMiddle: addAreaOfMiddle };

function addAreaOfPair(node: Float64Array, totals: Float64Array): void {
  const xue = node[2];
  const xuo = node[3];
  const xve = node[4];
  const xvo = node[5];
  const yue = node[8];
  const yuo = node[9];
  const yve = node[10];
  const yvo = node[11];
  const zue = node[14];
  const zuo = node[15];
  const zve = node[16];
  const zvo = node[17];
  const w = node[18];
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
  totals[11] = totals[11] + (w * (Math.sqrt((((nxl * nxl) + (nyl * nyl)) + (nzl * nzl))) + Math.sqrt((((nxr * nxr) + (nyr * nyr)) + (nzr * nzr)))));
}

function addAreaOfMiddle(node: Float64Array, totals: Float64Array): void {
  const xum = node[2];
  const xvm = node[4];
  const yum = node[8];
  const yvm = node[10];
  const zum = node[14];
  const zvm = node[16];
  const w = node[18];
  const nxm = (yum * zvm) - (zum * yvm);
  const nym = (zum * xvm) - (xum * zvm);
  const nzm = (xum * yvm) - (yum * xvm);
  totals[11] = totals[11] + (w * Math.sqrt((((nxm * nxm) + (nym * nym)) + (nzm * nzm))));
}
