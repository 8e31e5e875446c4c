import { MAX_COORDINATE, MIN_CORNERS } from './mesh-limits';
import type { ObjLimits } from './obj';
import type { ObjPolygons } from './obj-polygons';
import { readDecimal } from './read-decimal';
import type { PlainLineReader } from './text-lines';

const LF = 0x0a;
const CR = 0x0d;
const TAB = 0x09;
const SPACE = 0x20;
const MINUS = 0x2d;
const SLASH = 0x2f;
const ZERO = 0x30;
const LETTER_F = 0x66;
const LETTER_N = 0x6e;
const LETTER_P = 0x70;
const LETTER_T = 0x74;
const LETTER_V = 0x76;
const BACKSLASH = 0x5c;

/** A face with more corners is left to the reader of any line. */
const MOST_CORNERS = 64;
/** Red, green and blue behind a vertex. */
const COLOURS = 3;
/** Answered where a line is not plain: it is then read again, word by word, which tells of faults, too. */
const NOT_PLAIN = -1;

/**
 * Reads the lines that make up nearly all of an OBJ file straight from its bytes: `v` with three numbers, colours or none; `f` with references to vertices that
 * have been; `vt`, `vn`, `vp`, which say nothing of interest; and empty ones. All else, every fault included, is left alone.
 */
export class ObjPlainLines implements PlainLineReader {
  lines = 0;
  private readonly colours = new Float64Array(COLOURS);

  constructor(
    private readonly polygons: ObjPolygons,
    private readonly limits: ObjLimits,
  ) {}

  read(bytes: Uint8Array, start: number, end: number, line: number): number {
    let at = start;
    let current = line;
    while (at < end) {
      const next = this.readLine(bytes, at, current);
      if (next < 0) break;
      at = next;
      current++;
    }
    this.lines = current - line;
    return at;
  }

  private readLine(bytes: Uint8Array, start: number, line: number): number {
    const first = bytes[start];
    if (first === LF) return start + 1;
    const second = bytes[start + 1];
    if (first === LETTER_V) {
      if (second === SPACE) return this.readVertex(bytes, start);
      if ((second === LETTER_N || second === LETTER_T || second === LETTER_P) && bytes[start + 2] === SPACE) return this.skipLine(bytes, start);
    } else if (first === LETTER_F && second === SPACE) return this.readFace(bytes, start, line);
    return NOT_PLAIN;
  }

  private readVertex(bytes: Uint8Array, start: number): number {
    const { polygons, limits } = this;
    const { positions } = polygons;
    positions.reserve(3);
    const { piece, used } = positions;
    let at = start + 2;
    for (let slot = used; slot < used + 3; slot++) {
      while (bytes[at] === SPACE) at++;
      at = readDecimal(bytes, at, piece, slot);
      if (at < 0) return NOT_PLAIN;
      const value = piece[slot];
      if (value > MAX_COORDINATE || value < -MAX_COORDINATE) return NOT_PLAIN;
    }
    let next = behindLine(bytes, at);
    if (next < 0) next = this.behindColours(bytes, at);
    if (next < 0 || next - start > limits.lineBytes || polygons.vertices >= limits.vertices) return NOT_PLAIN;
    positions.used = used + 3;
    polygons.vertices++;
    return next;
  }

  private behindColours(bytes: Uint8Array, from: number): number {
    let at = from;
    for (let i = 0; i < COLOURS; i++) {
      while (bytes[at] === SPACE) at++;
      at = readDecimal(bytes, at, this.colours, i);
      if (at < 0) return NOT_PLAIN;
    }
    return behindLine(bytes, at);
  }

  private readFace(bytes: Uint8Array, start: number, line: number): number {
    const { polygons, limits } = this;
    const { faceVertices, vertices } = polygons;
    faceVertices.reserve(MOST_CORNERS);
    const { piece, used } = faceVertices;
    let at = start + 2;
    let corners = 0;
    for (;;) {
      let byte = bytes[at];
      while (byte === SPACE || byte === TAB) byte = bytes[++at];
      if (byte === LF || byte === CR) break;
      if (corners === MOST_CORNERS) return NOT_PLAIN;
      const back = byte === MINUS;
      if (back) byte = bytes[++at];
      let digit = byte ^ ZERO;
      if (digit > 9) return NOT_PLAIN;
      let number = 0;
      for (; digit <= 9 && number <= vertices; digit = bytes[++at] ^ ZERO) number = number * 10 + digit;
      if (number < 1 || number > vertices) return NOT_PLAIN;
      piece[used + corners++] = back ? vertices - number : number - 1;
      byte = bytes[at];
      if (byte === SLASH) {
        at = behindSlashes(bytes, at);
        if (at < 0) return NOT_PLAIN;
      } else if (byte > SPACE) return NOT_PLAIN;
    }
    const next = behindLine(bytes, at);
    if (next < 0 || next - start > limits.lineBytes || corners < MIN_CORNERS) return NOT_PLAIN;
    if (polygons.faces >= limits.faces || faceVertices.length + corners > limits.corners) return NOT_PLAIN;
    faceVertices.used = used + corners;
    polygons.endFace(line);
    return next;
  }

  /** Behind a line of no interest, unless it is continued on the next one or holds control bytes. */
  private skipLine(bytes: Uint8Array, start: number): number {
    let at = start + 2;
    let byte = bytes[at];
    while ((byte >= SPACE && byte !== BACKSLASH) || byte === TAB) byte = bytes[++at];
    const next = behindLine(bytes, at);
    return next - start > this.limits.lineBytes ? NOT_PLAIN : next;
  }
}

/** Offset behind the line end that follows, blanks before it passed over; NOT_PLAIN where anything else follows. */
function behindLine(bytes: Uint8Array, from: number): number {
  let at = from;
  let byte = bytes[at];
  while (byte === SPACE || byte === TAB) byte = bytes[++at];
  if (byte === LF) return at + 1;
  return byte === CR && bytes[at + 1] === LF ? at + 2 : NOT_PLAIN;
}

/** Offset behind `/vt`, `//vn` or `/vt/vn`, any number of which may be left out; NOT_PLAIN where something else follows. */
function behindSlashes(bytes: Uint8Array, from: number): number {
  let at = from;
  let byte = bytes[at];
  for (let part = 0; part < 2 && byte === SLASH; part++) {
    byte = bytes[++at];
    if (byte === MINUS) {
      byte = bytes[++at];
      if (byte < ZERO || byte > ZERO + 9) return NOT_PLAIN;
    }
    while (byte >= ZERO && byte <= ZERO + 9) byte = bytes[++at];
  }
  return byte > SPACE ? NOT_PLAIN : at;
}
