/** Decimal exponents of the table: within them no product of a mantissa below 2^60 leaves the normal range of a double, nor do the parts of its error. */
export const MOST_EXPONENT = 240;

const ENTRIES = 2 * MOST_EXPONENT + 1;
const SPLITTER = 2 ** 27 + 1;

/**
 * 10^e for |e| ≤ MOST_EXPONENT at e + MOST_EXPONENT, as an unevaluated sum `high + low` that errs by 2^-105 of it at most; `top` holds the upper 26 bits
 * of `high`, for products without error [Dekker 1971]. An entry is 0 until `fillPower` has been asked for it.
 */
export const POWERS_OF_TEN = { high: new Float64Array(ENTRIES), low: new Float64Array(ENTRIES), top: new Float64Array(ENTRIES) };

/** Bits of a quotient of whole numbers that are kept of what is left of a power beside its nearest double. */
const REST_BITS = 128;

/** Computes an entry of the table, by whole numbers of any length. */
export function fillPower(exponent: number): void {
  const at = exponent + MOST_EXPONENT;
  const whole = 10n ** BigInt(Math.abs(exponent));
  const high = exponent < 0 ? Number(`1e${exponent}`) : Number(whole);
  POWERS_OF_TEN.high[at] = high;
  POWERS_OF_TEN.low[at] = exponent < 0 ? restOfReciprocal(whole, high) : Number(whole - BigInt(high));
  const wide = SPLITTER * high;
  POWERS_OF_TEN.top[at] = wide - (wide - high);
}

/** 1 / whole − high, for the double `high` next to 1 / whole. */
function restOfReciprocal(whole: bigint, high: number): number {
  // high = mantissa / 2^shift, so the rest is (2^shift − mantissa · whole) / (2^shift · whole).
  const shift = 52 - Math.floor(Math.log2(high)) + 1;
  const mantissa = BigInt(high * 2 ** shift);
  const numerator = (1n << BigInt(shift)) - mantissa * whole;
  return (Number((numerator << BigInt(REST_BITS)) / whole) / 2 ** REST_BITS) / 2 ** shift;
}
