import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fillPower, MOST_EXPONENT, POWERS_OF_TEN } from '@/lib/formats/powers-of-ten';
import { readDecimal } from '@/lib/formats/read-decimal';
import { decimalTexts } from '../support/decimal-texts';

const into = new Float64Array(1);

/** The number that stands at the beginning, as read; null where there is none. */
function read(text: string): { value: number; length: number } | null {
  const length = readDecimal(new TextEncoder().encode(`${text} 7`), 0, into, 0);
  return length < 0 ? null : { value: into[0], length };
}

describe('decimals', () => {
  it('of all kinds are the doubles that Number reads, to the last bit', () => {
    fc.assert(
      fc.property(fc.integer(), (seed) => {
        for (const text of decimalTexts(seed, 50)) {
          const wanted = Number(text);
          const found = read(text);
          if (!Number.isFinite(wanted)) expect(found, text).toBeNull();
          else if (found === null || !Object.is(found.value, wanted) || found.length !== text.length) throw new Error(`${text}: ${found?.value}`);
        }
      }),
      { numRuns: 1_000 },
    );
  });

  it('of any double come back', () => {
    fc.assert(fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => Object.is(read(String(value) === '0' && Object.is(value, -0) ? '-0' : String(value))?.value, value)), { numRuns: 5_000 });
  });

  it.each([
    // Ties and their neighbours about 2^53 and the ends of the range, IEEE 754: ties go to even.
    ['9007199254740993', 9007199254740992],
    ['9007199254740993.0000000000000000000000000000001', 9007199254740994],
    ['9007199254740995', 9007199254740996],
    ['2.2250738585072011e-308', 2.225073858507201e-308],
    ['1.7976931348623157e308', Number.MAX_VALUE],
    ['4.9406564584124654e-324', Number.MIN_VALUE],
    ['2.4703282292062327e-324', 0],
    ['2.4703282292062328e-324', Number.MIN_VALUE],
    ['1e-400', 0],
    ['0e999999999999', 0],
    [`1${'0'.repeat(400)}e-400`, 1],
    [`0.${'0'.repeat(400)}1e401`, 1],
    ['.5', 0.5],
    ['5.', 5],
  ])('reads %s', (text, value) => expect(read(text)).toEqual({ value, length: text.length }));

  it.each(['', '.', '-', '+.', '1e', '1e+', '1.2.3', '12345678901.2.3', '1234567890123456789012.3.4', '1,5', '0x10', 'nan', 'e5', '--1', '1-', '1e5.', '1.8e308', '1e999999999999', '1_000', '½'])('refuses "%s"', (text) =>
    expect(read(text)).toBeNull());

  it('are told apart from what follows at blanks, tabs and line ends only', () => {
    for (const [behind, length] of [['\n', 3], ['\t', 3], ['\r', 3], ['\u0000', 3], [';', -1], ['/', -1], ['\u007f', -1]] as const) {
      expect(readDecimal(new TextEncoder().encode(`1.5${behind}\n`), 0, into, 0)).toBe(length);
    }
  });
});

describe('the table of powers of ten', () => {
  it('holds them to 2^-105, which the bound of the product relies on', () => {
    for (let exponent = -MOST_EXPONENT; exponent <= MOST_EXPONENT; exponent++) {
      fillPower(exponent);
      const at = exponent + MOST_EXPONENT;
      // In units of 2^-1200 all parts are whole numbers.
      const units = (value: number): bigint => {
        let scaled = value;
        let shift = 1200n;
        while (!Number.isInteger(scaled)) {
          scaled *= 2;
          shift--;
        }
        return BigInt(scaled) << shift;
      };
      const held = units(POWERS_OF_TEN.high[at]) + units(POWERS_OF_TEN.low[at]);
      const wanted = exponent < 0 ? (1n << 1200n) / 10n ** BigInt(-exponent) : 10n ** BigInt(exponent) << 1200n;
      const error = held > wanted ? held - wanted : wanted - held;
      expect(error << 105n <= wanted, String(exponent)).toBe(true);
    }
  });
});
