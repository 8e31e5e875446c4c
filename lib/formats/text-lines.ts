import { MeshError } from './mesh-error';
import { decodeText, detectTextStart } from './text-encoding';

const LF = 0x0a;
const CR = 0x0d;
const TAB = 0x09;
const SPACE = 0x20;
const BACKSLASH = 0x5c;
const HASH = 0x23;
/** Vertical tab, form feed, the DOS end-of-file mark and escape occur in old text files; any other control byte means binary. */
const HARMLESS_CONTROLS = new Set([0x0b, 0x0c, 0x1a, 0x1b]);
const SNIFF_BYTES = 4;
/** Of UTF-16 so much is transcoded at once. */
const WIDE_BYTES = 2 ** 20;

/** Start of a physical line inside a joined one: byte offset from the joined line's start, and the physical line's number. */
export interface LineJoint {
  offset: number;
  line: number;
}

/**
 * Reads plain lines at once, past what every line otherwise costs: as many as it knows from bytes[start] on, each up to its end; answers where it stopped,
 * at a line that it left alone, and says in `lines` how many it read. bytes[end - 1] is a line feed, so that reading may go on up to one without a look at `end`.
 */
export interface PlainLineReader {
  lines: number;
  read(bytes: Uint8Array, start: number, end: number, line: number): number;
}

/** Receives each logical line as bytes[start, end) with the number of its first physical line; `joints` is null where nothing was joined. */
export type LineSink = (bytes: Uint8Array, start: number, end: number, line: number, joints: LineJoint[] | null) => void;

/**
 * Cuts a stream of bytes into logical lines: LF, CR or CRLF ends a line, a backslash before the end joins the next one on
 * (never in a comment, where it is usually a Windows path). UTF-16 is transcoded, a byte order mark dropped.
 * Holds at most one chunk and one line; a line longer than `maxLineBytes` and bytes that are not text are a MeshError.
 */
export class TextLines {
  private carry: Uint8Array = new Uint8Array(0);
  private line = 1;
  private started = false;
  private head: Uint8Array = new Uint8Array(0);
  private skipLf = false;
  private wide: TextDecoder | null = null;
  private readonly utf8 = new TextEncoder();
  private joined: Uint8Array[] = [];
  private joinedBytes = 0;
  private joints: LineJoint[] = [];
  /** Bytes of text seen, the mark excluded. */
  bytesSeen = 0;

  constructor(
    private readonly sink: LineSink,
    private readonly maxLineBytes: number,
    private readonly plain: PlainLineReader | null = null,
  ) {}

  push(chunk: Uint8Array): void {
    if (this.started) {
      this.feed(chunk, false);
      return;
    }
    this.head = this.head.length === 0 ? chunk : concat(this.head, chunk);
    if (this.head.length >= SNIFF_BYTES) this.begin();
  }

  end(): void {
    if (!this.started) this.begin();
    this.feed(new Uint8Array(0), true);
  }

  private begin(): void {
    this.started = true;
    const { skip, wide } = detectTextStart(this.head);
    if (wide) this.wide = new TextDecoder(wide);
    const rest = this.head.subarray(skip);
    this.head = new Uint8Array(0);
    this.feed(rest, false);
  }

  private feed(chunk: Uint8Array, last: boolean): void {
    // One view of all chunks, whatever class they are of, keeps what is compiled for them simple.
    if (this.wide === null) this.take(new Uint8Array(chunk.buffer, chunk.byteOffset, chunk.byteLength), last);
    else {
      for (let at = 0; at < chunk.length; at += WIDE_BYTES) this.take(this.utf8.encode(this.wide.decode(chunk.subarray(at, at + WIDE_BYTES), { stream: true })), false);
      if (last) this.take(this.utf8.encode(this.wide.decode()), true);
    }
  }

  private take(bytes: Uint8Array, last: boolean): void {
    this.bytesSeen += bytes.length;
    let rest = bytes;
    // The line that was begun is finished by itself, so that the chunk need not be copied behind it.
    const end = this.carry.length === 0 ? 0 : bytes.indexOf(LF) + 1;
    if (end > 0) {
      this.split(concat(this.carry, bytes.subarray(0, end)), this.carry.length, false);
      rest = bytes.subarray(end);
    }
    this.split(this.carry.length === 0 ? rest : concat(this.carry, rest), this.carry.length, last);
  }

  /** Emits the lines of `bytes`, whose first `scanned` ones hold no line end, and keeps what is unfinished. */
  private split(bytes: Uint8Array, scanned: number, last: boolean): void {
    const length = bytes.length;
    const plainEnd = this.plain === null ? 0 : bytes.lastIndexOf(LF) + 1;
    let start = 0;
    let from = scanned;
    for (;;) {
      if (this.skipLf && start < length) {
        this.skipLf = false;
        if (bytes[start] === LF) start++;
      }
      if (this.plain !== null && start < plainEnd && this.joined.length === 0) {
        start = this.plain.read(bytes, start, plainEnd, this.line);
        this.line += this.plain.lines;
      }
      const end = this.findEnd(bytes, start, Math.max(start, from));
      if (end < 0) break;
      this.skipLf = bytes[end] === CR;
      this.endLine(bytes, start, end, false);
      start = end + 1;
      from = start;
    }
    if (last) {
      if (start < length || this.joined.length > 0) this.endLine(bytes, start, length, true);
      this.carry = new Uint8Array(0);
      return;
    }
    if (length - start > this.maxLineBytes) throw this.tooLong(bytes, start);
    this.carry = start < length ? bytes.slice(start) : new Uint8Array(0);
  }

  /** Offset of the line end from `from` on, -1 where there is none; `start` is the line's start. */
  private findEnd(bytes: Uint8Array, start: number, from: number): number {
    for (let at = from; at < bytes.length; at++) {
      const byte = bytes[at];
      if (byte >= SPACE || byte === TAB) continue;
      if (byte === LF || byte === CR) return at;
      if (!HARMLESS_CONTROLS.has(byte)) throw this.notText(bytes, start, at);
    }
    return -1;
  }

  private endLine(bytes: Uint8Array, start: number, end: number, last: boolean): void {
    if (end - start + this.joinedBytes > this.maxLineBytes) throw this.tooLong(bytes, start);
    const backslash = last ? -1 : continuationAt(bytes, start, end, this.joined.length > 0);
    if (backslash >= 0 || this.joined.length > 0) {
      const stop = backslash >= 0 ? backslash : end;
      this.joints.push({ offset: this.joinedBytes, line: this.line });
      // A blank stands for the joint, so that words on both sides stay apart.
      const piece = new Uint8Array(stop - start + 1);
      piece.set(bytes.subarray(start, stop));
      piece[stop - start] = SPACE;
      this.joined.push(piece);
      this.joinedBytes += piece.length;
      if (backslash < 0) this.emitJoined();
    } else {
      this.sink(bytes, start, end, this.line, null);
    }
    this.line++;
  }

  private emitJoined(): void {
    const whole = new Uint8Array(this.joinedBytes);
    for (let i = 0; i < this.joined.length; i++) whole.set(this.joined[i], this.joints[i].offset);
    const joints = this.joints;
    this.joined = [];
    this.joinedBytes = 0;
    this.joints = [];
    this.sink(whole, 0, whole.length, joints[0].line, joints);
  }

  private notText(bytes: Uint8Array, start: number, at: number): MeshError {
    const text = decodeText(bytes.subarray(start, at));
    return new MeshError({
      code: 'not_text',
      detail: `expected text, found the control byte 0x${bytes[at].toString(16).padStart(2, '0')}; the file looks binary`,
      expected: 'text',
      place: { line: this.line, column: Array.from(text).length + 1, text: '' },
    });
  }

  private tooLong(bytes: Uint8Array, start: number): MeshError {
    return new MeshError({
      code: 'line_too_long',
      detail: `expected a line of at most ${this.maxLineBytes} bytes, found a longer one`,
      expected: `a line of at most ${this.maxLineBytes} bytes`,
      place: { line: this.line, column: 1, text: decodeText(bytes.subarray(start, start + 80)) },
    });
  }
}

/** Offset of the backslash that joins the next line on, or -1. Blanks after it are forgiven. */
function continuationAt(bytes: Uint8Array, start: number, end: number, inJoined: boolean): number {
  let at = end - 1;
  while (at >= start && (bytes[at] === SPACE || bytes[at] === TAB)) at--;
  if (at < start || bytes[at] !== BACKSLASH) return -1;
  if (inJoined) return at;
  let first = start;
  while (bytes[first] === SPACE || bytes[first] === TAB) first++;
  return bytes[first] === HASH ? -1 : at;
}

function concat(a: Uint8Array, b: Uint8Array): Uint8Array {
  const both = new Uint8Array(a.length + b.length);
  both.set(a);
  both.set(b, a.length);
  return both;
}
