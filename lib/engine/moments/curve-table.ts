import { gaussRule } from '../patches/gauss-rule';
import { CURVE_POWERS, type BorderCurves } from './border-curves';
import { MOMENTS } from './sums';

/** Exact for the chains of quartics: degree 15 with second moments. */
const CURVE_NODES = 8;

/** What a border edge's curve must answer, whether it is a limit curve, a cage edge or a spoke of a cap. */
export interface CurveTable {
  /** ∫₀¹ C dt of the edge's curve. */
  mean(edge: number): [number, number, number];
  length(edge: number): number;
  /** Where the curve starts (0) or ends (1). */
  end(edge: number, which: 0 | 1): [number, number, number];
  /**
   * Adds `sign` times the moments of the chain [O, s, C] about O to `out`, C along the edge's half-edge; all points in one frame.
   * Adds to `doubts` what closing the curve one level earlier would change each of them by. Returns the area of the cone from s to C.
   */
  addChain(edge: number, origin: ArrayLike<number>, apex: ArrayLike<number>, sign: number, out: Float64Array, doubts: Float64Array): number;
}

/** Sorts pieces by their edge. */
export function curveTable(curves: BorderCurves): CurveTable {
  const piecesOf = new Map<number, number[]>();
  for (let piece = 0; piece < curves.edges.length; piece++) {
    const list = piecesOf.get(curves.edges[piece]);
    if (list === undefined) piecesOf.set(curves.edges[piece], [piece]);
    else list.push(piece);
  }
  const powers = Float64Array.from(curves.powers);
  const none: number[] = [];
  const pieces = (edge: number): number[] => piecesOf.get(edge) ?? none;
  return {
    mean(edge) {
      const mean: [number, number, number] = [0, 0, 0];
      for (const piece of pieces(edge)) {
        const share = curves.weights[piece] * curves.shares[piece];
        for (let axis = 0; axis < 3; axis++) mean[axis] += share * (powers[CURVE_POWERS * piece + axis] + powers[CURVE_POWERS * piece + 6 + axis] / 12 + powers[CURVE_POWERS * piece + 12 + axis] / 80);
      }
      return mean;
    },
    length(edge) {
      let sum = 0;
      for (const piece of pieces(edge)) sum += curves.weights[piece] * pieceLength(powers, CURVE_POWERS * piece);
      return sum;
    },
    end: (edge, which) => curves.ends.get(2 * edge + which) ?? [0, 0, 0],
    addChain(edge, origin, apex, sign, out, doubts) {
      let area = 0;
      const changes = noMoments();
      for (const piece of pieces(edge)) {
        const weight = curves.weights[piece];
        area += weight * addPieceChain(powers, CURVE_POWERS * piece, origin, apex, sign * weight, out);
        if (curves.doubts[piece] !== 0) addPieceChain(powers, CURVE_POWERS * piece, origin, apex, curves.doubts[piece], changes);
      }
      for (let m = 0; m < MOMENTS; m++) doubts[m] += Math.abs(changes[m]);
      return area;
    },
  };
}

function pieceLength(p: Float64Array, at: number): number {
  const { nodes, weights } = gaussRule(CURVE_NODES);
  let sum = 0;
  for (let i = 0; i < nodes.length; i++) {
    const t = nodes[i];
    const dx = p[at + 3] + 2 * t * p[at + 6] + t * t * (3 * p[at + 9] + 4 * t * p[at + 12]);
    const dy = p[at + 4] + 2 * t * p[at + 7] + t * t * (3 * p[at + 10] + 4 * t * p[at + 13]);
    const dz = p[at + 5] + 2 * t * p[at + 8] + t * t * (3 * p[at + 11] + 4 * t * p[at + 14]);
    sum += weights[i] * Math.sqrt(dx * dx + dy * dy + dz * dz);
  }
  return sum;
}

/**
 * Chain [O, s, C] of one piece, about O: with b = s − O and c = C − O, dV = det(b, c, c′) dt / 6, first moments dV/4 · (b + 2c),
 * second dV/20 · (b bᵀ + 2 c cᵀ + (b + 2c)(b + 2c)ᵀ). Degree 15 at most, so 8 nodes are exact.
 */
export function addPieceChain(p: Float64Array, at: number, origin: ArrayLike<number>, apex: ArrayLike<number>, sign: number, out: Float64Array): number {
  const { nodes, weights } = gaussRule(CURVE_NODES);
  const bx = apex[0] - origin[0], by = apex[1] - origin[1], bz = apex[2] - origin[2];
  let area = 0;
  for (let i = 0; i < nodes.length; i++) {
    const t = nodes[i];
    const cx = p[at] - origin[0] + t * (p[at + 3] + t * (p[at + 6] + t * (p[at + 9] + t * p[at + 12])));
    const cy = p[at + 1] - origin[1] + t * (p[at + 4] + t * (p[at + 7] + t * (p[at + 10] + t * p[at + 13])));
    const cz = p[at + 2] - origin[2] + t * (p[at + 5] + t * (p[at + 8] + t * (p[at + 11] + t * p[at + 14])));
    const dx = p[at + 3] + t * (2 * p[at + 6] + t * (3 * p[at + 9] + 4 * t * p[at + 12]));
    const dy = p[at + 4] + t * (2 * p[at + 7] + t * (3 * p[at + 10] + 4 * t * p[at + 13]));
    const dz = p[at + 5] + t * (2 * p[at + 8] + t * (3 * p[at + 11] + 4 * t * p[at + 14]));
    const volume = ((sign * weights[i]) / 6) * (bx * (cy * dz - cz * dy) + by * (cz * dx - cx * dz) + bz * (cx * dy - cy * dx));
    const sx = bx + 2 * cx, sy = by + 2 * cy, sz = bz + 2 * cz;
    const first = volume / 4;
    const second = volume / 20;
    out[0] += volume;
    out[1] += first * sx;
    out[2] += first * sy;
    out[3] += first * sz;
    out[4] += second * (bx * bx + 2 * cx * cx + sx * sx);
    out[5] += second * (by * by + 2 * cy * cy + sy * sy);
    out[6] += second * (bz * bz + 2 * cz * cz + sz * sz);
    out[7] += second * (bx * by + 2 * cx * cy + sx * sy);
    out[8] += second * (bx * bz + 2 * cx * cz + sx * sz);
    out[9] += second * (by * bz + 2 * cy * cz + sy * sz);
    const ex = cx - bx, ey = cy - by, ez = cz - bz;
    area += (weights[i] / 2) * Math.sqrt((ey * dz - ez * dy) ** 2 + (ez * dx - ex * dz) ** 2 + (ex * dy - ey * dx) ** 2);
  }
  return area;
}

/** An empty set of ten moments. */
export function noMoments(): Float64Array {
  return new Float64Array(MOMENTS);
}
