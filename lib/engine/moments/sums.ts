import type { Six, SolidMoments, Three } from '../measured';

/** Ten moments of each body: 1, x, y, z, xx, yy, zz, xy, xz, yz. */
export const MOMENTS = 10;

/** Compensated sums [Neumaier 1974] of ten moments per body. */
export class MomentSums {
  private readonly sums: Float64Array;
  private readonly carries: Float64Array;
  /** Per body, the sum of the magnitudes of all products that went into the first moment of the ten: what its rounding error is relative to. */
  readonly magnitudes: Float64Array;

  constructor(bodies: number) {
    this.sums = new Float64Array(bodies * MOMENTS);
    this.carries = new Float64Array(bodies * MOMENTS);
    this.magnitudes = new Float64Array(bodies);
  }

  /** Adds the ten values that start at `offset`, `stride` apart. */
  add(body: number, values: Float64Array, offset: number, stride = 1): void {
    const { sums, carries } = this;
    const from = body * MOMENTS;
    for (let at = from, i = offset; at < from + MOMENTS; at++, i += stride) {
      const value = values[i];
      const sum = sums[at];
      const total = sum + value;
      carries[at] += (sum < 0 ? -sum : sum) >= (value < 0 ? -value : value) ? sum - total + value : value - total + sum;
      sums[at] = total;
    }
  }

  /** The finished ten moments of a body. */
  total(body: number): Float64Array {
    const result = new Float64Array(MOMENTS);
    for (let i = 0; i < MOMENTS; i++) result[i] = this.sums[body * MOMENTS + i] + this.carries[body * MOMENTS + i];
    return result;
  }
}

/**
 * Moments about `origin` turned into volume, centroid in the file's frame and second moments about the centroid.
 * A body without volume has no centroid of its own: `fallback` (file frame) stands in, and its second moments are about that.
 */
export function centralMoments(moments: Float64Array, origin: Three, fallback: Three, negligibleVolume: number): SolidMoments {
  const volume = moments[0];
  const empty = !(Math.abs(volume) > negligibleVolume);
  const c: Three = empty
    ? [fallback[0] - origin[0], fallback[1] - origin[1], fallback[2] - origin[2]]
    : [moments[1] / volume, moments[2] / volume, moments[3] / volume];
  const about = (i: number, a: number, b: number): number => moments[i] - c[a] * moments[1 + b] - c[b] * moments[1 + a] + volume * c[a] * c[b];
  const centralSecond: Six = [about(4, 0, 0), about(5, 1, 1), about(6, 2, 2), about(7, 0, 1), about(8, 0, 2), about(9, 1, 2)];
  return { volume, centroid: [origin[0] + c[0], origin[1] + c[1], origin[2] + c[2]], centralSecond };
}
