/** Where in a text file something was found: line and column count from 1, the column in characters. */
export interface TextPlace {
  line: number;
  column: number;
  /** The whole line as text; cut to a window around the column for display. */
  text: string;
}

export interface MeshErrorFields {
  code: string;
  /** What was wrong, as a clause without place: "expected a number, found \"abc\"". */
  detail: string;
  /** What should have stood there, for a caller that lists expectations; null where the error is not about one word. */
  expected?: string | null;
  found?: string | null;
  place?: TextPlace | null;
  /** Where in a binary file, in bytes from its beginning; `detail` is given it. */
  offset?: number | null;
}

const EXCERPT_BEFORE = 48;
const EXCERPT_AFTER = 32;
const LONG_LINE = 10_000;

/**
 * A mesh file that cannot be read. `message` carries the place ("line 812, column 9: expected …, found …"),
 * `detail` is the same without it, `excerpt` the line with a caret under the column (null where the whole file is meant).
 */
export class MeshError extends Error {
  readonly code: string;
  readonly detail: string;
  readonly line: number | null;
  readonly column: number | null;
  readonly expected: string | null;
  readonly found: string | null;
  readonly excerpt: string | null;
  /** Bytes from the file's beginning; null in text files, and where the whole file is meant. */
  readonly offset: number | null;

  constructor(fields: MeshErrorFields) {
    const place = fields.place ?? null;
    const offset = fields.offset ?? null;
    const clause = printable(fields.detail);
    const detail = offset === null ? clause : `${clause} (byte ${offset})`;
    super(place ? `line ${place.line}, column ${place.column}: ${detail}` : detail);
    this.name = 'MeshError';
    this.code = fields.code;
    this.detail = detail;
    this.offset = offset;
    this.line = place?.line ?? null;
    this.column = place?.column ?? null;
    this.expected = fields.expected ?? null;
    this.found = fields.found ?? null;
    this.excerpt = place ? caretExcerpt(place) : null;
  }

  /** The same error, of a file that lies within another under this name; line, column and byte are those of the inner one. */
  within(name: string): MeshError {
    const { code, expected, found, line, column, offset, excerpt } = this;
    const outer = new MeshError({ code, expected, found, detail: `${name}: ${this.detail}` });
    return Object.assign(outer, { message: `${name}: ${this.message}`, line, column, offset, excerpt });
  }
}

/** Words of a file get into messages: what would break a line of a log or a terminal is shown as the sign for what cannot be read. */
function printable(text: string): string {
  return text.replace(/[\u0000-\u001f\u007f-\u009f]/g, '\ufffd');
}

/** The line, cut to a window around the column, and a caret below it. Tabs become one blank so that the caret stays in step. */
function caretExcerpt(place: TextPlace): string {
  // A line of megabytes is not taken apart: what is far before the column is never shown.
  const far = place.text.length > LONG_LINE ? Math.max(0, Math.min(place.column, place.text.length) - LONG_LINE) : 0;
  const characters = Array.from(place.text.slice(far, far + 2 * LONG_LINE).replaceAll('\t', ' '), printable);
  const at = Math.min(place.column - 1 - far, characters.length);
  const from = Math.max(0, at - EXCERPT_BEFORE);
  const to = Math.min(characters.length, at + EXCERPT_AFTER);
  const head = from > 0 ? '… ' : '';
  const tail = to < characters.length ? ' …' : '';
  const shown = head + characters.slice(from, to).join('') + tail;
  return `${shown}\n${' '.repeat(head.length + at - from)}^`;
}
