import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { alignOnPoint, formatEngineering, formatFixed, formatFull } from '@/lib/rules/format-figure';

const numberOf = (text: string) => Number(text.replace('\u2212', '-'));
const finite = fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e30, max: 1e30 });

describe('formatEngineering', () => {
  it('shows four digits and a power that is a multiple of three', () => {
    fc.assert(
      fc.property(finite, (value) => {
        const { text, exponent } = formatEngineering(value);
        expect(Math.abs(exponent % 3)).toBe(0);
        expect(text.replace(/\D/g, '').replace(/^0(?=[^0])/, '')).toHaveLength(4);
        expect(text.replace('\u2212', '').split('.')[0].length).toBeLessThanOrEqual(4);
      }),
    );
  });

  it('is within half a unit of the fourth digit', () => {
    fc.assert(
      fc.property(
        finite.filter((value) => Math.abs(value) > 1e-290),
        (value) => {
          const { text, exponent } = formatEngineering(value);
          expect(Math.abs(numberOf(`${text}e${exponent}`) / value - 1)).toBeLessThanOrEqual(5.0001e-4);
        },
      ),
    );
  });

  it.each([
    [999.96, '1000', 0],
    [9999.6, '10.00', 3],
    [0.22071, '0.2207', 0],
    [0.0999999, '0.1000', 0],
    [0.008214, '8.214', -3],
    [640, '640.0', 0],
    [-0.000123456, '\u2212123.5', -6],
    [0, '0.000', 0],
  ])('writes %d as %s and 10^%d', (value, text, exponent) => {
    expect(formatEngineering(value)).toEqual({ text, exponent });
  });
});

describe('formatFixed', () => {
  it.each([
    [128.43, '128.4'],
    [-12.726, '\u221212.73'],
    [999.96, '1000'],
    [0.0123456, '0.0123'],
    [-3e-17, '0.0000'],
    [0, '0.000'],
    [123456, '123456'],
  ])('writes %d as %s', (value, text) => {
    expect(formatFixed(value)).toBe(text);
  });
});

describe('alignOnPoint', () => {
  it('puts every point in one place and keeps one width', () => {
    const aligned = ['1', '12.5', '\u2212123.45', '0.0001'].map((text) => alignOnPoint(text, 5, 5));
    expect(new Set(aligned.map((text) => text.length)).size).toBe(1);
    expect(new Set(aligned.filter((text) => text.includes('.')).map((text) => text.indexOf('.')))).toEqual(
      new Set([5]),
    );
  });
});

describe('formatFull', () => {
  it('reads back as the same double', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true }), (value) => {
        expect(Number(formatFull(value))).toBe(value === 0 ? 0 : value);
      }),
    );
  });

  it('of nothing is empty', () => expect(formatFull(null)).toBe(''));
});
