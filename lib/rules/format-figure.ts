/** Significant digits of a number on screen; copying takes all of them. */
export const SCREEN_DIGITS = 4;

/** A number as shown: the mantissa's text and a power of ten set apart from it (0: none is shown). */
export interface ShownFigure {
  text: string;
  exponent: number;
}

const MINUS = '\u2212';

/**
 * Four significant digits without an exponent, with at most `decimals` places behind the point: coordinates and lengths
 * count from an origin, so digits far behind the point say nothing. What rounds to zero loses its sign.
 */
export function formatFixed(value: number, decimals = 4, digits = SCREEN_DIGITS): string {
  if (!Number.isFinite(value)) return '–';
  const magnitude = Math.abs(value);
  const power = Number(magnitude.toExponential(digits - 1).split('e')[1]);
  const text = magnitude.toFixed(Math.max(0, Math.min(decimals, digits - 1 - power)));
  return value < 0 && Number(text) !== 0 ? MINUS + text : text;
}

/** A number in running text: whole and grouped by thousands from 1,000 on, else four significant digits. */
export function formatProse(value: number): string {
  return Math.abs(value) >= 1000 ? Math.round(value).toLocaleString('en') : formatFixed(value);
}

/** From here to there a mass or moment is written without an exponent. */
const PLAIN_FROM = 0.1;
const PLAIN_BELOW = 10_000;

/**
 * Four significant digits; beyond 0.1 … 10,000 with an exponent that is a multiple of three, which stands apart, so that a column
 * of masses or moments keeps its width.
 */
export function formatEngineering(value: number, digits = SCREEN_DIGITS): ShownFigure {
  if (!Number.isFinite(value)) return { text: '–', exponent: 0 };
  if (value === 0) return { text: (0).toFixed(digits - 1), exponent: 0 };
  const rounded = Math.abs(Number(value.toPrecision(digits)));
  const power = Number(rounded.toExponential().split('e')[1]);
  const exponent = rounded >= PLAIN_FROM && rounded < PLAIN_BELOW ? 0 : Math.floor(power / 3) * 3;
  const figures = rounded
    .toExponential(digits - 1)
    .split('e')[0]
    .replace('.', '');
  const shift = power - exponent;
  const text = shift < 0 ? `0.${'0'.repeat(-shift - 1)}${figures}` : pointAfter(figures, shift + 1);
  return { text: value < 0 ? MINUS + text : text, exponent };
}

function pointAfter(figures: string, places: number): string {
  return places < figures.length ? `${figures.slice(0, places)}.${figures.slice(places)}` : figures;
}

/** Pads with spaces so that the point stands after `before` characters; `after` counts the point and what follows. For a monospaced face. */
export function alignOnPoint(text: string, before: number, after: number): string {
  const point = text.indexOf('.');
  const whole = point < 0 ? text : text.slice(0, point);
  const rest = point < 0 ? '' : text.slice(point);
  return whole.padStart(before, ' ') + rest.padEnd(after, ' ');
}

/** Every digit: the shortest decimal that reads back as the same double. */
export function formatFull(value: number | null): string {
  return value === null ? '' : String(value);
}
