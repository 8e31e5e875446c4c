import { formatProse } from './format-figure';

/** A mass as a sentence says it: four significant digits, in kg, or in g below one. */
export function massWords(massKg: number): string {
  return Math.abs(massKg) < 1 ? `${formatProse(massKg * 1000)} g` : `${formatProse(massKg)} kg`;
}
