import type { ShellBody } from './shell-sums';

/** Added to the normal matrix of a corner, so that faces in one plane move it along their normal only. */
const RIDGE = 1e-9;

/** Room for corners of more than three faces, whose inner walls meet in more than one point. */
const SAFETY = 2;

/** A cone's bare tip has no edges: the t³ of a whole ball bounds it. */
export const TIP_SHARE = (4 * Math.PI) / 3;

/**
 * What walls hold at corners beyond their mitres: with planes N·(X − v) = −t that meet in v − tw the wall's t³ is ⅓ Σ tan(θ/2) w·T over the edges that
 * end there, T leaving the edge: the inset faces' edges shrink by w·T at each end, and a face's inset area falls by tan(θ/2) times their lengths.
 * A right-angled corner has 1. It is estimated, not added: corners of more planes have no single w.
 */
export class Corners {
  /** Σ N Nᵀ (six) and Σ N (three) per vertex. */
  private readonly sums: Float64Array;
  /** Ends of edges counted at each vertex. */
  readonly ends: Int32Array;

  constructor(vertices: number) {
    this.sums = new Float64Array(9 * vertices);
    this.ends = new Int32Array(vertices);
  }

  /** Counts an edge's end between faces with the outward unit normals `own` and `across`. */
  count(vertex: number, own: ArrayLike<number>, across: ArrayLike<number>): void {
    this.ends[vertex]++;
    this.addNormal(9 * vertex, own);
    this.addNormal(9 * vertex, across);
  }

  private addNormal(at: number, n: ArrayLike<number>): void {
    const { sums } = this;
    sums[at] += n[0] * n[0];
    sums[at + 1] += n[0] * n[1];
    sums[at + 2] += n[0] * n[2];
    sums[at + 3] += n[1] * n[1];
    sums[at + 4] += n[1] * n[2];
    sums[at + 5] += n[2] * n[2];
    for (let axis = 0; axis < 3; axis++) sums[at + 6 + axis] += n[axis];
  }

  /** Adds an end's estimate to the bodies on both sides, once all ends are counted. `outwards` is the unit tangent that leaves the edge there, `tangent` tan(θ/2). */
  estimate(vertex: number, tangent: number, outwards: ArrayLike<number>, own: ShellBody, across: ShellBody): void {
    const w = this.apex(vertex);
    const share = (SAFETY * Math.abs(tangent * (w[0] * outwards[0] + w[1] * outwards[1] + w[2] * outwards[2]))) / 3;
    own.corners += share;
    if (across !== own) across.corners += share;
  }

  /** The w with N·w nearest to 1 for all normals N. */
  private apex(vertex: number): [number, number, number] {
    const m = this.sums.subarray(9 * vertex, 9 * vertex + 9);
    const ridge = RIDGE * (m[0] + m[3] + m[5]);
    const a = m[0] + ridge, b = m[1], c = m[2], d = m[3] + ridge, e = m[4], f = m[5] + ridge, r = m.subarray(6);
    const det = a * (d * f - e * e) - b * (b * f - c * e) + c * (b * e - c * d);
    return [
      (r[0] * (d * f - e * e) + r[1] * (c * e - b * f) + r[2] * (b * e - c * d)) / det,
      (r[0] * (c * e - b * f) + r[1] * (a * f - c * c) + r[2] * (b * c - a * e)) / det,
      (r[0] * (b * e - c * d) + r[1] * (b * c - a * e) + r[2] * (a * d - b * b)) / det,
    ];
  }
}
