import { LineCursor } from './line-cursor';
import { MeshError } from './mesh-error';

export type PlyType = 'int8' | 'uint8' | 'int16' | 'uint16' | 'int32' | 'uint32' | 'float32' | 'float64';

export interface PlyProperty {
  name: string;
  type: PlyType;
  /** Type of the number of items before a list; null for a single value. */
  countType: PlyType | null;
}

export interface PlyElement {
  name: string;
  count: number;
  properties: PlyProperty[];
}

export interface PlyHeader {
  format: 'ascii' | 'little' | 'big';
  elements: PlyElement[];
  /** Offset of the first byte behind the header, and how many lines the header has. */
  bodyAt: number;
  lines: number;
}

/** Both spellings of the types in use [Turk 1994, from memory]. */
const TYPES = new Map<string, PlyType>([
  ['char', 'int8'], ['int8', 'int8'], ['uchar', 'uint8'], ['uint8', 'uint8'],
  ['short', 'int16'], ['int16', 'int16'], ['ushort', 'uint16'], ['uint16', 'uint16'],
  ['int', 'int32'], ['int32', 'int32'], ['uint', 'uint32'], ['uint32', 'uint32'],
  ['float', 'float32'], ['float32', 'float32'], ['double', 'float64'], ['float64', 'float64'],
]);

export const PLY_BYTES: Record<PlyType, number> = { int8: 1, uint8: 1, int16: 2, uint16: 2, int32: 4, uint32: 4, float32: 4, float64: 8 };

const FORMATS = new Map<string, PlyHeader['format']>([['ascii', 'ascii'], ['binary_little_endian', 'little'], ['binary_big_endian', 'big']]);
const WITHOUT_EFFECT = new Set(['comment', 'obj_info']);
const MOST_HEADER_BYTES = 1 << 20;
const MOST_ELEMENTS = 256;
const MOST_PROPERTIES = 1_024;
const LF = 0x0a;
const CR = 0x0d;

/** Walks the header's lines. How lines end is learned from the first, since in a binary file the byte behind the last is data. */
class PlyHeaderReader {
  private readonly cursor = new LineCursor();
  private readonly elements: PlyElement[] = [];
  private format: PlyHeader['format'] | null = null;
  private at = 0;
  private line = 0;
  private lineEnd: number[] | null = null;

  constructor(private readonly bytes: Uint8Array) {
    if (bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf) this.at = 3;
  }

  read(): PlyHeader {
    this.nextLine();
    if (!this.cursor.nextWord() || this.cursor.word() !== 'ply') throw new MeshError({ code: 'bad_magic', expected: 'ply', detail: 'expected "ply" on the first line', place: { line: 1, column: 1, text: '' } });
    for (;;) {
      this.nextLine();
      if (!this.cursor.nextWord()) continue;
      const keyword = this.cursor.at;
      const word = this.cursor.word();
      if (word === 'end_header') break;
      if (word === 'format') this.readFormat();
      else if (word === 'element') this.readElement();
      else if (word === 'property') this.readProperty(keyword);
      else if (!WITHOUT_EFFECT.has(word)) throw this.cursor.fail('bad_header', 'format, element, property, comment or end_header', keyword);
    }
    if (this.format === null) throw this.cursor.fail('bad_header', 'a line "format ascii 1.0" before the header ends', this.cursor.at);
    return { format: this.format, elements: this.elements, bodyAt: this.at, lines: this.line };
  }

  private nextLine(): void {
    const { bytes } = this;
    const start = this.at;
    const most = Math.min(bytes.length, MOST_HEADER_BYTES);
    let end = start;
    while (end < most && bytes[end] !== LF && bytes[end] !== CR) end++;
    this.line++;
    if (end >= most) throw new MeshError({ code: 'bad_header', expected: 'end_header', detail: 'expected a line "end_header", found the end of the file', place: { line: this.line, column: 1, text: '' } });
    this.lineEnd ??= bytes[end] === LF ? [LF] : bytes[end + 1] === LF ? [CR, LF] : [CR];
    this.at = end + 1;
    if (bytes[end] === CR && this.lineEnd.length === 2 && bytes[end + 1] === LF) this.at++;
    this.cursor.open(bytes, start, end, this.line, null);
  }

  private readFormat(): void {
    const expected = 'ascii, binary_little_endian or binary_big_endian';
    if (!this.cursor.nextWord()) throw this.cursor.fail('bad_header', expected);
    const at = this.cursor.at;
    const format = FORMATS.get(this.cursor.word());
    if (!format) throw this.cursor.fail('bad_header', expected, at);
    this.format = format;
  }

  private readElement(): void {
    const { cursor } = this;
    if (this.elements.length >= MOST_ELEMENTS) throw cursor.fail('bad_header', `at most ${MOST_ELEMENTS} elements`);
    if (!cursor.nextWord()) throw cursor.fail('bad_header', 'the name of an element');
    const name = cursor.word();
    const expected = `a whole number of ${shown(name)} elements`;
    if (!cursor.nextWord()) throw cursor.fail('bad_header', expected);
    const at = cursor.at;
    const count = cursor.integer(0);
    if (count === null || !(count >= 0) || !Number.isSafeInteger(count)) throw cursor.fail('bad_count', expected, at);
    this.elements.push({ name, count, properties: [] });
  }

  private readProperty(keyword: number): void {
    const { cursor } = this;
    const element = this.elements.at(-1);
    if (!element) throw cursor.fail('bad_header', 'an element before its properties', keyword);
    if (element.properties.length >= MOST_PROPERTIES) throw cursor.fail('bad_header', `at most ${MOST_PROPERTIES} properties of an element`, keyword);
    let type = this.readType(true);
    let countType: PlyType | null = null;
    if (type === 'list') {
      const at = cursor.at;
      countType = this.readType(false) as PlyType;
      if (countType.startsWith('float')) throw cursor.fail('bad_header', 'a whole-number type for the length of a list', at + 1);
      type = this.readType(false);
    }
    if (!cursor.nextWord()) throw cursor.fail('bad_header', 'the name of the property');
    element.properties.push({ name: cursor.word(), type: type as PlyType, countType });
  }

  private readType(listToo: boolean): PlyType | 'list' {
    const { cursor } = this;
    const expected = `a type such as float, uchar or int${listToo ? ', or list' : ''}`;
    if (!cursor.nextWord()) throw cursor.fail('bad_header', expected);
    const at = cursor.at;
    const word = cursor.word();
    if (listToo && word === 'list') return 'list';
    const type = TYPES.get(word);
    if (!type) throw cursor.fail('bad_header', expected, at);
    return type;
  }
}

function shown(name: string): string {
  return name.length > 40 ? `${name.slice(0, 40)}…` : name;
}

/** Reads the header of a PLY file, at most a megabyte of it. Errors: bad_magic, bad_header, bad_count, with line and column. */
export function readPlyHeader(bytes: Uint8Array): PlyHeader {
  return new PlyHeaderReader(bytes).read();
}
