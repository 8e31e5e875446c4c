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
  /** Σ N Nᵀ (six) and Σ N, later w, (three) per vertex. */
  private readonly sums: Float64Array;
  /** Ends of sharp edges at each vertex, which the caller counts. */
  readonly ends: Int32Array;

  constructor(vertices: number) {
    this.sums = new Float64Array(9 * vertices);
    this.ends = new Int32Array(vertices);
  }

  /** Counts the normal of a face at one of its corners. */
  addNormal(vertex: number, x: number, y: number, z: number): void {
    const { sums } = this;
    const at = 9 * vertex;
    sums[at] += x * x;
    sums[at + 1] += x * y;
    sums[at + 2] += x * z;
    sums[at + 3] += y * y;
    sums[at + 4] += y * z;
    sums[at + 5] += z * z;
    sums[at + 6] += x;
    sums[at + 7] += y;
    sums[at + 8] += z;
  }

  /** Once all ends are counted: puts the w with N·w nearest to 1 for all normals N of each corner in place of Σ N. */
  solve(): void {
    const m = this.sums;
    for (let at = 0; at < m.length; at += 9) {
      const ridge = RIDGE * (m[at] + m[at + 3] + m[at + 5]);
      if (ridge === 0) continue;
      const a = m[at] + ridge, b = m[at + 1], c = m[at + 2], d = m[at + 3] + ridge, e = m[at + 4], f = m[at + 5] + ridge;
      const x = m[at + 6], y = m[at + 7], z = m[at + 8];
      const det = a * (d * f - e * e) - b * (b * f - c * e) + c * (b * e - c * d);
      m[at + 6] = (x * (d * f - e * e) + y * (c * e - b * f) + z * (b * e - c * d)) / det;
      m[at + 7] = (x * (c * e - b * f) + y * (a * f - c * c) + z * (b * c - a * e)) / det;
      m[at + 8] = (x * (b * e - c * d) + y * (b * c - a * e) + z * (a * d - b * b)) / det;
    }
  }

  /** Adds an end's estimate to the bodies on both sides, once corners are solved. (x, y, z) is the unit tangent that leaves the edge there, `tangent` tan(θ/2). */
  estimate(vertex: number, tangent: number, x: number, y: number, z: number, own: ShellBody, across: ShellBody): void {
    const w = 9 * vertex + 6;
    const share = (SAFETY * Math.abs(tangent * (this.sums[w] * x + this.sums[w + 1] * y + this.sums[w + 2] * z))) / 3;
    own.corners += share;
    if (across !== own) across.corners += share;
  }
}
