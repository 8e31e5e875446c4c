import { METRES_PER, type LinearUnit } from './units';

/** Differences of a value from an earlier one; changes are relative, the shift is in the asset's axes. */
export interface Differences {
  massChange: number;
  comShiftM: readonly [number, number, number];
  comShiftLengthM: number;
  /** The shift over the part's size. */
  comShiftOfSize: number;
  principalChange: readonly [number, number, number];
  inertiaChange: number;
  /** Degrees; null where the axes are free. */
  rotationDeg: number | null;
}

/** How far a value may move before anybody is told, in percent of the mass, of the part's size and of the inertia. */
export interface Tolerances {
  toleranceMassPercent: number;
  toleranceComPercent: number;
  toleranceMomentsPercent: number;
}

export function isWithinTolerance(differences: Differences, tolerances: Tolerances): boolean {
  return (
    Math.abs(differences.massChange) * 100 <= tolerances.toleranceMassPercent &&
    differences.comShiftOfSize * 100 <= tolerances.toleranceComPercent &&
    differences.inertiaChange * 100 <= tolerances.toleranceMomentsPercent
  );
}

/** Below these a difference is not worth a word: a share of the mass or inertia, of the size, and degrees. */
const LEAST_SHARE = 5e-5;
const LEAST_DEGREES = 0.05;

/** The differences in one line, such as `+9 %, 31 mm along +z, axes 1°`; lengths in a unit that suits them, from the show's. */
export function verdictWords(differences: Differences, unit: LinearUnit): string {
  const words: string[] = [];
  if (Math.abs(differences.massChange) >= LEAST_SHARE) words.push(percentWords(differences.massChange));
  if (differences.comShiftOfSize >= LEAST_SHARE) words.push(shiftWords(differences, unit));
  if (differences.rotationDeg !== null && differences.rotationDeg >= LEAST_DEGREES) words.push(`axes ${short(differences.rotationDeg)}°`);
  // Where mass, centre and axes say nothing the inertia may still have changed.
  if (words.length === 0 && differences.inertiaChange >= LEAST_SHARE) words.push(`inertia ${percentWords(differences.inertiaChange).replace('+', '')}`);
  return words.length > 0 ? words.join(', ') : 'no difference to speak of';
}

/** A relative change with its sign: +9 %, −0.31 %. */
export function percentWords(change: number): string {
  return `${change > 0 ? '+' : ''}${short(change * 100)} %`;
}

/** Two figures, or all before the point; a true minus sign. */
function short(value: number): string {
  const size = Math.abs(value);
  return (value < 0 ? '−' : '') + String(size >= 100 ? Math.round(size) : Number(size.toPrecision(2)));
}

const AXES = ['x', 'y', 'z'] as const;

function shiftWords({ comShiftM, comShiftLengthM, comShiftOfSize }: Differences, unit: LinearUnit): string {
  const length = unit === 'in' || unit === 'ft' ? `${short(comShiftLengthM / METRES_PER[unit])} ${unit}` : `${short(comShiftLengthM * 1000)} mm`;
  const main = [0, 1, 2].reduce((best, i) => (Math.abs(comShiftM[i]) > Math.abs(comShiftM[best]) ? i : best), 0);
  const along = Math.abs(comShiftM[main]) > 0.9 * comShiftLengthM ? ` along ${comShiftM[main] < 0 ? '−' : '+'}${AXES[main]}` : '';
  return `${length}${along} (${percentWords(comShiftOfSize).replace('+', '')} of its size)`;
}
