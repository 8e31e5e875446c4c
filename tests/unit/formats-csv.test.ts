import fc from 'fast-check';
import Papa from 'papaparse';
import { describe, expect, it } from 'vitest';
import { csvRecord, shortestDecimal, stripGuard } from '@/lib/formats/csv';
import { CSV_COLUMNS } from '@/lib/rules/csv-columns';

const plain = { guard: false };
const guarded = { guard: true };

describe('CSV records', () => {
  // RFC 4180, section 2: CRLF, quotes around fields with commas, quotes or line breaks, quotes doubled.
  it('are those of RFC 4180', () => {
    expect(csvRecord(['a', 'b,c', 'say "x"', 'two\nlines', '', null, 1.5], plain)).toBe('a,"b,c","say ""x""","two\nlines",,,1.5\r\n');
  });

  it('read back as they were written by an independent reader', () => {
    fc.assert(
      fc.property(fc.array(fc.array(fc.string({ unit: 'grapheme' }), { minLength: 2, maxLength: 4 }), { minLength: 1, maxLength: 5 }), (rows) => {
        const text = rows.map((row) => csvRecord(row, plain)).join('');
        const parsed = Papa.parse<string[]>(text, { newline: '\r\n', delimiter: ',' }).data.slice(0, -1);
        expect(parsed).toEqual(rows);
      }),
    );
  });

  it('hold numbers that read back as the same double', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        expect(Object.is(Number(shortestDecimal(value)), value)).toBe(true);
        expect(Object.is(Number(shortestDecimal(-value)), -value)).toBe(true);
      }),
    );
  });

  it.each([NaN, Infinity, -Infinity])('refuse %s', (value) => expect(() => csvRecord([value], plain)).toThrow(RangeError));
});

describe('the guard against formulas', () => {
  it.each(['=1+1', '+1', '-1', '@SUM(A1)', '\tx', '\rx', "'quoted", "''"])('puts one apostrophe before %j and takes exactly one back', (text) => {
    const [[cell]] = Papa.parse<string[]>(csvRecord([text], guarded)).data;
    expect(cell).toBe(`'${text}`);
    expect(stripGuard(cell)).toBe(text);
  });

  it('leaves numbers and other text alone', () => {
    expect(csvRecord([-1.25, 'shin_L', "o'clock", ''], guarded)).toBe("-1.25,shin_L,o'clock,\r\n");
  });

  it('is undone exactly for any text', () => {
    fc.assert(
      fc.property(fc.oneof(fc.string(), fc.tuple(fc.constantFrom('=', '+', '-', '@', '\t', '\r', "'"), fc.string()).map((two) => two.join(''))), (text) => {
        const first = csvRecord([text, 'x'], guarded);
        const [[cell]] = Papa.parse<string[]>(first, { newline: '\r\n', delimiter: ',' }).data;
        expect(stripGuard(cell)).toBe(text);
      }),
    );
  });

  it('is off where scripts read', () => expect(csvRecord(['=1+1'], plain)).toBe('=1+1\r\n'));
});

describe('the standard columns', () => {
  it('are lower snake case with the unit as suffix, each once', () => {
    const suffix = new Map([['kg/m³', 'kg_m3'], ['kg/m²', 'kg_m2'], ['m', 'm'], ['kg', 'kg'], ['m²', 'm2'], ['m³', 'm3'], ['kg·m²', 'kg_m2']]);
    const names = CSV_COLUMNS.map((column) => column.name);
    expect(new Set(names).size).toBe(names.length);
    for (const column of CSV_COLUMNS) {
      expect(column.name).toMatch(/^[a-z][a-z0-9]*(_[a-z0-9]+)*$/);
      if (column.unit) expect(column.name.endsWith(`_${suffix.get(column.unit)}`)).toBe(true);
      if (column.kind === 'text') expect(column.unit).toBeNull();
    }
  });
});
