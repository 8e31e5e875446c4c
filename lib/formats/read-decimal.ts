import { fillPower, MOST_EXPONENT, POWERS_OF_TEN } from './powers-of-ten';

const SPACE = 0x20;
const PLUS = 0x2b;
const MINUS = 0x2d;
const DOT = 0x2e;
/** The codes of the ten digits differ from this one's by the digit's own bits, those of all else by a number above 9. */
const ZERO = 0x30;
/** `e` and `E`, when the bit that tells small letters is set. */
const LETTER_E = 0x65;
const SMALL = 0x20;

/** Below this a whole mantissa times or over a power of ten up to 10^22 is one correctly rounded operation [Clinger 1990]. */
const EXACT_MANTISSA = 2 ** 53;
const EXACT_POWERS = Float64Array.from({ length: 23 }, (_, i) => Number(`1e${i}`));
/** Nine digits fit into 30 bits; a mantissa has twice as many at most, further ones are told of but not kept. */
const GROUP = 9;
const FULL_GROUP = 10 ** (GROUP - 1);
const HALF_BITS = 15;
const HALF = 2 ** HALF_BITS;
const SPLITTER = 2 ** 27 + 1;
/** Error of the product of two unevaluated sums, relative: its roundings sum up to 2^-102, of which this is four times as much. */
const PRODUCT_ERROR = 2 ** -100;
/** A little more than 1, against the rounding of the bound itself. */
const ABOVE_ONE = 1 + 2 ** -40;
/** From here on an exponent in the text says no more than that the number is 0 or beyond all range. */
const FAR_EXPONENT = 100_000;

/**
 * Reads the finite decimal number that begins at `at` into `into[slot]`, correctly rounded to the nearest double, as `Number` reads it. Answers the offset
 * behind it, or −1 where there is no plain decimal number up to a blank or control byte, or one beyond the range of a double. A byte up to the blank must follow somewhere.
 */
export function readDecimal(bytes: Uint8Array, at: number, into: Float64Array, slot: number): number {
  let byte = bytes[at];
  const negative = byte === MINUS;
  if (negative || byte === PLUS) byte = bytes[++at];
  const first = at;
  let point = -1;
  let high = 0;
  for (; high < FULL_GROUP; byte = bytes[++at]) {
    const digit = byte ^ ZERO;
    if (digit <= 9) high = high * 10 + digit;
    else if (byte === DOT && point < 0) point = at;
    else break;
  }
  let low = 0;
  let lowDigits = 0;
  let dropped = 0;
  let rest = 0;
  if (high >= FULL_GROUP) {
    for (; lowDigits < GROUP; byte = bytes[++at]) {
      const digit = byte ^ ZERO;
      if (digit <= 9) {
        low = low * 10 + digit;
        lowDigits++;
      } else if (byte === DOT && point < 0) point = at;
      else break;
    }
    for (; ; byte = bytes[++at]) {
      const digit = byte ^ ZERO;
      if (digit <= 9) {
        rest |= digit;
        dropped++;
      } else if (byte === DOT && point < 0) point = at;
      else break;
    }
  }
  if (at - first <= (point < 0 ? 0 : 1)) return -1;
  let exponent = dropped - (point < 0 ? 0 : at - point - 1);
  if ((byte | SMALL) === LETTER_E) {
    byte = bytes[++at];
    const down = byte === MINUS;
    if (down || byte === PLUS) byte = bytes[++at];
    const firstOfExponent = at;
    let power = 0;
    for (; byte >= ZERO && byte <= ZERO + 9; byte = bytes[++at]) if (power < FAR_EXPONENT) power = power * 10 + byte - ZERO;
    if (at === firstOfExponent) return -1;
    exponent += down ? -power : power;
  }
  if (byte > SPACE) return -1;
  const mantissa = high * EXACT_POWERS[lowDigits] + low;
  let value: number;
  if (mantissa < EXACT_MANTISSA && dropped === 0 && exponent <= 22 && exponent >= -22) {
    value = exponent < 0 ? mantissa / EXACT_POWERS[-exponent] : mantissa * EXACT_POWERS[exponent];
  } else {
    value = roundProduct(high, low, lowDigits, exponent, rest !== 0);
    if (!(value < Infinity)) {
      value = readAsText(bytes, first, at);
      if (value === Infinity) return -1;
    }
  }
  into[slot] = negative ? -value : value;
  return at;
}

/**
 * (high · 10^lowDigits + low) · 10^exponent, and up to one unit of the mantissa more where digits `follow`, rounded to the nearest double; NaN where the
 * error bound does not tell which one is nearest, or the exponent is out of the table. high < 10^9, and ≥ 10^8 where there are lower digits.
 */
function roundProduct(high: number, low: number, lowDigits: number, exponent: number, follow: boolean): number {
  if (exponent > MOST_EXPONENT || exponent < -MOST_EXPONENT) return NaN;
  const entry = exponent + MOST_EXPONENT;
  const powers = POWERS_OF_TEN;
  if (powers.high[entry] === 0) fillPower(exponent);
  // The mantissa as m + n without error: both summands are whole numbers of few enough bits.
  const shift = EXACT_POWERS[lowDigits];
  const upper = (high >> HALF_BITS) * shift * HALF;
  const lower = (high & (HALF - 1)) * shift + low;
  const m = upper + lower;
  const n = lower - (m - upper);
  const p = powers.high[entry];
  const p1 = powers.top[entry];
  const p0 = p - p1;
  const wide = SPLITTER * m;
  const m1 = wide - (wide - m);
  const m0 = m - m1;
  // m p without error [Dekker 1971], and the small products beside it.
  const product = m * p;
  const rest = m1 * p1 - product + m1 * p0 + m0 * p1 + m0 * p0 + (m * powers.low[entry] + n * p);
  const error = product * PRODUCT_ERROR;
  // Rounding is monotone: where both ends of what may be true are rounded to one double, the truth is.
  const least = product + (rest - error);
  const most = product + (rest + error + (follow ? p * ABOVE_ONE : 0));
  return least === most ? least : NaN;
}

function readAsText(bytes: Uint8Array, from: number, to: number): number {
  let text = '';
  for (let at = from; at < to; at++) text += String.fromCharCode(bytes[at]);
  return Number(text);
}
