import type { ShellLimits, Six, SolidMoments, Three } from '../measured';
import { PAIRS } from './shell-terms';

/** What a wall is computed from: a measured component that has shell terms. */
export interface HollowComponent {
  solid: SolidMoments;
  hollow: Float64Array;
  hollowLimits: ShellLimits;
}

/** A wall at unit density, in file units. */
export interface WallMoments {
  measure: number;
  /** In the file's frame. */
  centroid: Three;
  centralSecond: Six;
  /** Estimate of max |Δ| / (V L^k), corners included. */
  error: number;
  /** Area of the inner surface; not positive where the wall has passed the middle of the part. */
  innerArea: number;
}

/** Volume, centroid and second moments of the wall of thickness t > 0 (file units), measured inwards from the component's surface. */
export function wallMoments({ solid, hollow, hollowLimits }: HollowComponent, t: number): WallMoments {
  const moment = (index: number): number => {
    let sum = 0;
    for (let power = 4; power >= 0; power--) sum = t * (sum + hollow[5 * index + power]);
    return sum;
  };
  const measure = moment(0);
  const d: Three = [moment(1) / measure, moment(2) / measure, moment(3) / measure];
  const centralSecond = PAIRS.map(([i, j], k) => moment(4 + k) - measure * d[i] * d[j]) as Six;
  const [e1, e2, e3] = hollowLimits.error;
  return {
    measure,
    centroid: [solid.centroid[0] + d[0], solid.centroid[1] + d[1], solid.centroid[2] + d[2]],
    centralSecond,
    error: Math.min(1, (t * (e1 + t * (e2 + t * e3))) / Math.abs(measure)),
    innerArea: hollow[0] + t * (2 * hollow[1] + 3 * t * hollow[2]),
  };
}
