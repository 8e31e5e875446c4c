import type { ShellVisitor } from '../shell/shell-visitor';
import { BorderCurves } from './border-curves';
import { MOMENTS, MomentSums } from './sums';

/** Sums that an integration over all bodies fills; about each body's origin. */
export interface LimitSums {
  solid: MomentSums;
  surface: MomentSums;
  /** Per body and solid moment: differences between two closings of the fans' tails, and between two Gauss rules where a coarser one begins. */
  closingError: Float64Array;
  /** Per body: estimated error of the area. */
  surfaceError: Float64Array;
  curves: BorderCurves;
  /** Shown every regular patch and fan, where shells are measured too. */
  shells: ShellVisitor | null;
}

/** Empty sums. */
export function emptySums(bodies: number): LimitSums {
  return {
    solid: new MomentSums(bodies),
    surface: new MomentSums(bodies),
    closingError: new Float64Array(MOMENTS * bodies),
    surfaceError: new Float64Array(bodies),
    curves: new BorderCurves(),
    shells: null,
  };
}
