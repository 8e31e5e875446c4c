import { expect, it } from 'vitest';
import fc from 'fast-check';
import { readDecimal } from '@/lib/formats/read-decimal';
import { decimalTexts } from '../support/decimal-texts';

/** What never comes back is ended by this, and fails. */
const MOST_MS = 900_000;
const RUNS = 4_000;
const TEXTS = 1_000;

it('four million decimals of all kinds are the doubles that Number reads, to the last bit', () => {
  const into = new Float64Array(1);
  const encoder = new TextEncoder();
  let compared = 0;
  fc.assert(
    fc.property(fc.integer(), (seed) => {
      for (const text of decimalTexts(seed, TEXTS)) {
        const wanted = Number(text);
        const length = readDecimal(encoder.encode(`${text}\n`), 0, into, 0);
        if (Number.isFinite(wanted) ? length !== text.length || !Object.is(into[0], wanted) : length !== -1) throw new Error(`${text} is ${wanted}, read as ${into[0]}`);
        compared++;
      }
    }),
    { numRuns: RUNS },
  );
  expect(compared).toBeGreaterThanOrEqual(RUNS * TEXTS);
}, MOST_MS);
