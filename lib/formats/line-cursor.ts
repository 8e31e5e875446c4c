import { MeshError, type TextPlace } from './mesh-error';
import { readDecimal } from './read-decimal';
import { decodeText } from './text-encoding';
import type { LineJoint } from './text-lines';

const SPACE = 0x20;
const TAB = 0x09;
const HASH = 0x23;
const PLUS = 0x2b;
const MINUS = 0x2d;
const ZERO = 0x30;
const NINE = 0x39;
const DECIMAL = /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/;
const NOT_FINITE = /^[+-]?(nan|inf|infinity|1\.#(inf|qnan|snan|ind)\w*)(\(\w*\))?$/i;

/** Walks the words of one logical line, reads numbers from its bytes, and makes errors that point at a column. */
export class LineCursor {
  bytes: Uint8Array = new Uint8Array(0);
  /** Offset of the next byte to read. */
  at = 0;
  end = 0;
  line = 0;
  private start = 0;
  private joints: LineJoint[] | null = null;
  private readonly read = new Float64Array(1);

  open(bytes: Uint8Array, start: number, end: number, line: number, joints: LineJoint[] | null): void {
    this.bytes = bytes;
    this.start = start;
    this.at = start;
    this.end = end;
    this.line = line;
    this.joints = joints;
  }

  /** Moves to the next word; false at the line's end or where a comment begins. */
  nextWord(): boolean {
    const { bytes, end } = this;
    let at = this.at;
    // Control bytes that text files may hold count as blanks.
    while (at < end && bytes[at] <= SPACE) at++;
    this.at = at;
    return at < end && bytes[at] !== HASH;
  }

  /** Offset behind the word that begins here. */
  wordEnd(): number {
    const { bytes, end } = this;
    let at = this.at;
    while (at < end && bytes[at] > SPACE) at++;
    return at;
  }

  /** The word that begins here, as text; moves behind it. */
  word(): string {
    const end = this.wordEnd();
    const text = decodeText(this.bytes.subarray(this.at, end));
    this.at = end;
    return text;
  }

  /** Everything up to the line's end or a comment, trimmed, inner blanks kept: names may hold blanks and `#`, a comment needs a blank before it. */
  rest(): string {
    const { bytes, end } = this;
    let stop = this.at;
    while (stop < end && !(bytes[stop] === HASH && (stop === this.start || bytes[stop - 1] === SPACE || bytes[stop - 1] === TAB))) stop++;
    const text = decodeText(bytes.subarray(this.at, stop)).trim();
    this.at = end;
    return text;
  }

  /** A finite decimal number, correctly rounded. Moves behind it. Errors: not_finite, number_too_large, bad_number. */
  number(expected: string): number {
    const { bytes, at } = this;
    const end = this.wordEnd();
    // What ends the bytes is read from a copy with a blank behind it.
    const behind = end < bytes.length ? readDecimal(bytes, at, this.read, 0) : at + readDecimal(withBlank(bytes.subarray(at)), 0, this.read, 0);
    if (behind !== end) throw this.notDecimal(expected, end);
    this.at = end;
    return this.read[0];
  }

  private notDecimal(expected: string, end: number): MeshError {
    const text = decodeText(this.bytes.subarray(this.at, end));
    if (DECIMAL.test(text)) return this.fail('number_too_large', `${expected} below 1.8e308`);
    if (NOT_FINITE.test(text)) return this.fail('not_finite', `a finite number for ${bare(expected)}`);
    return this.fail('bad_number', text.includes(',') ? `${expected} with a decimal point` : expected);
  }

  /** An optionally signed integer that ends at a blank or at the byte `stop`; null where there is none. Moves behind the digits. */
  integer(stop: number): number | null {
    const { bytes, end } = this;
    let at = this.at;
    const negative = bytes[at] === MINUS;
    if (negative || bytes[at] === PLUS) at++;
    const first = at;
    let value = 0;
    for (; at < end && bytes[at] >= ZERO && bytes[at] <= NINE; at++) value = value * 10 + (bytes[at] - ZERO);
    if (at === first || (at < end && bytes[at] > SPACE && bytes[at] !== stop)) return null;
    this.at = at;
    return negative ? -value : value;
  }

  /** An error at the word that begins at `at` (the cursor by default): "expected …, found …". */
  fail(code: string, expected: string, at = this.at): MeshError {
    const found = this.wordAt(at);
    const shown = found === '' ? 'the end of the line' : /^[\w.+-]+$/.test(found) ? found : `"${found}"`;
    return new MeshError({ code, expected, found, detail: `expected ${expected}, found ${shown}`, place: this.place(at) });
  }

  /** Line, column and text of an offset. In a joined line they are those of the physical line it lies on. */
  place(at: number): TextPlace {
    let from = this.start;
    let to = this.end;
    let line = this.line;
    if (this.joints) {
      const index = this.joints.findLastIndex((joint) => joint.offset <= at);
      from = this.joints[index].offset;
      to = this.joints[index + 1]?.offset ?? this.end;
      line = this.joints[index].line;
    }
    const column = Array.from(decodeText(this.bytes.subarray(from, at))).length + 1;
    return { line, column, text: decodeText(this.bytes.subarray(from, to)).trimEnd() };
  }

  private wordAt(at: number): string {
    let stop = at;
    while (stop < this.end && this.bytes[stop] > SPACE) stop++;
    const text = decodeText(this.bytes.subarray(at, stop));
    return text.length > 40 ? `${text.slice(0, 40)}…` : text;
  }
}

function bare(expected: string): string {
  return expected.replace(/^a number for /, '');
}

function withBlank(bytes: Uint8Array): Uint8Array {
  const wider = new Uint8Array(bytes.length + 1);
  wider.set(bytes);
  wider[bytes.length] = SPACE;
  return wider;
}
