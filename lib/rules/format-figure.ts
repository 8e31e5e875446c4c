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

/** Four significant digits with an exponent that is a multiple of three, so that a column of masses or moments keeps its width. */
export function formatEngineering(value: number, digits = SCREEN_DIGITS): ShownFigure {
  if (!Number.isFinite(value)) return { text: '–', exponent: 0 };
  if (value === 0) return { text: (0).toFixed(digits - 1), exponent: 0 };
  const [mantissa, power] = Math.abs(value)
    .toExponential(digits - 1)
    .split('e');
  const exponent = Math.floor(Number(power) / 3) * 3;
  const shift = Number(power) - exponent;
  const figures = mantissa.replace('.', '');
  const text = shift + 1 < figures.length ? `${figures.slice(0, shift + 1)}.${figures.slice(shift + 1)}` : figures;
  return { text: value < 0 ? MINUS + text : text, exponent };
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
