/** A cell: text, a number, or null for "not given" (an empty cell). */
export type CsvCell = string | number | null;

export interface CsvOptions {
  /** Put one apostrophe before text that a spreadsheet would run as a formula. For downloads by people, never for scripts, which join on names. */
  guard: boolean;
}

const NEEDS_QUOTES = /[",\r\n]/;
/** What spreadsheets take for a formula, and the apostrophe itself, so that a reader can strip exactly one. */
const LOOKS_LIKE_FORMULA = /^[=+\-@\t\r']/;

/** One record of RFC 4180 with its CRLF. Numbers are the shortest decimals that read back as the same double; NaN and infinity are refused. */
export function csvRecord(cells: readonly CsvCell[], { guard }: CsvOptions): string {
  return `${cells.map((cell) => csvField(cell, guard)).join(',')}\r\n`;
}

function csvField(cell: CsvCell, guard: boolean): string {
  if (cell === null) return '';
  if (typeof cell === 'number') return shortestDecimal(cell);
  const text = guard && LOOKS_LIKE_FORMULA.test(cell) ? `'${cell}` : cell;
  return NEEDS_QUOTES.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

/** The shortest decimal that reads back as the same double, the sign of zero included. Errors: RangeError for NaN and infinity. */
export function shortestDecimal(value: number): string {
  if (!Number.isFinite(value)) throw new RangeError(`${value} cannot be exported`);
  return Object.is(value, -0) ? '-0' : String(value);
}

/** Takes back what `guard` added: exactly one leading apostrophe, where a guarded beginning follows it. */
export function stripGuard(text: string): string {
  return text.startsWith("'") && LOOKS_LIKE_FORMULA.test(text.slice(1)) ? text.slice(1) : text;
}
