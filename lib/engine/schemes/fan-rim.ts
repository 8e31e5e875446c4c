import { BorderCurves } from '../moments/border-curves';
import type { FanKit } from './fan-kit';
import { forUnitVectors, type FanPoints } from './fan-points';
import { makeFanState, type FanState } from './fan-state';
import { RowBuilder, type SparseRows } from './sparse-rows';

/** Powers of a rim curve: quartics at most. */
export const RIM_POWERS = 5;

/** The factors are whole multiples of one over this, or tiny roundings off them: three 3s at most from the splines' values and powers, the rest halvings. */
const DENOMINATOR = 9 * 2 ** 15;
const ROUNDING = 1e-7;

function rounded(factor: number): number {
  const whole = Math.round(DENOMINATOR * factor);
  return Math.abs(DENOMINATOR * factor - whole) < ROUNDING ? whole / DENOMINATOR : factor;
}

const NO_SHIFT = new Float64Array(3);

/** The edge of a kind of fan as curves, counter-clockwise around the surface: powers of t − ½, row RIM_POWERS · curve + power over the fan's points. */
export interface FanRim {
  curves: number;
  matrix: SparseRows;
}

/** Re-expands powers of τ, whose −½ … ½ is half `half` of a side, in powers of T, −½ … ½ over the whole side: τ = 2T + ½ or 2T − ½. */
function wholeSide(piece: ArrayLike<number>, half: number, out: Float64Array): void {
  const shift = half === 0 ? 0.5 : -0.5;
  out.fill(0);
  for (let axis = 0; axis < 3; axis++) {
    for (let power = RIM_POWERS - 1; power >= 0; power--) {
      for (let i = RIM_POWERS - 1; i >= 0; i--) out[3 * i + axis] = shift * out[3 * i + axis] + (i > 0 ? 2 * out[3 * (i - 1) + axis] : 0);
      out[axis] += piece[3 * power + axis];
    }
  }
}

/**
 * Finds the rim of a kind of fan from sides of its children. Beyond its outer edge the surface is regular, and sharp spokes are regular curves,
 * so that the polynomial of half a side is that of the whole.
 */
export function makeFanRim(kit: FanKit, kind: FanState, points: FanPoints): FanRim {
  const n = kind.sectors;
  const sides: [sector: number, child: number, side: number, half: number][] = [];
  if (!kind.closed) sides.push([0, 0, 0, 1]);
  for (let j = 0; j < n; j++) for (const [child, side, , half] of kit.outerSides) if (half === 0) sides.push([j, child, side, half]);
  if (!kind.closed) sides.push([n - 1, 2, kit.arriving, 0]);
  const rows = new RowBuilder(RIM_POWERS * sides.length);
  const from = makeFanState(n, kind.closed, kind.sharpFirst, kind.centreRule);
  const to = makeFanState(n, kind.closed, kind.sharpFirst, kind.centreRule);
  const net = new Float64Array(48);
  const whole = new Float64Array(3 * RIM_POWERS);
  forUnitVectors(points, from, (first) => {
    kit.refine(from, to);
    sides.forEach(([sector, child, side, half], curve) => {
      kit.fillChild(to, sector, child, net);
      const piece = new BorderCurves();
      kit.addSide(piece, net, side, 0, 1, 0, 0.5, NO_SHIFT);
      wholeSide(piece.powers, half, whole);
      for (let power = 0; power < RIM_POWERS; power++) rows.note(RIM_POWERS * curve + power, first, whole.map(rounded), 3 * power);
    });
  });
  return { curves: sides.length, matrix: rows.finish(Array.from({ length: RIM_POWERS * sides.length }, (_, i) => i)) };
}
