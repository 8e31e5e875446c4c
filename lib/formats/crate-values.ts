import type { CrateBytes } from './crate-bytes';
import { MESH_LIMITS } from './mesh-limits';
import type { UsdValue } from './usd-prim';

/** A value as a field holds it: its type, where or what it is, and how. */
export interface CrateRep {
  type: number;
  isArray: boolean;
  isInlined: boolean;
  isPacked: boolean;
  /** Offset of the value, or the value itself. */
  payload: number;
}

/** Tables of a crate that values point into, and the version of its form as 1000 · minor + patch. */
export interface CrateTables {
  tokens: string[];
  /** Tokens by the number of a string. */
  strings: Uint32Array;
  version: number;
  /** Path of each number, `/a/b` or `/a/b.c`. */
  pathOf(index: number): string | null;
}

const [BOOL, UCHAR, INT, UINT, HALF, FLOAT, DOUBLE, STRING, TOKEN, ASSET] = [1, 2, 3, 4, 7, 8, 9, 10, 11, 12];
const MATRIX4D = 15;
const [PATH_LIST, TOKEN_VECTOR, SPECIFIER, VARIABILITY, TIME_SAMPLES, DOUBLE_VECTOR] = [34, 41, 42, 44, 46, 48];
/** Quaternions and vectors: how many numbers of which kind, by type. */
const VECTORS = new Map<number, [number, number]>([
  [16, [4, DOUBLE]], [17, [4, FLOAT]], [18, [4, HALF]],
  [19, [2, DOUBLE]], [20, [2, FLOAT]], [21, [2, HALF]], [22, [2, INT]],
  [23, [3, DOUBLE]], [24, [3, FLOAT]], [25, [3, HALF]], [26, [3, INT]],
  [27, [4, DOUBLE]], [28, [4, FLOAT]], [29, [4, HALF]], [30, [4, INT]],
  [MATRIX4D, [16, DOUBLE]],
]);
const QUATERNIONS = new Set([16, 17, 18]);
const BYTES = new Map([[BOOL, 1], [UCHAR, 1], [INT, 4], [UINT, 4], [HALF, 2], [FLOAT, 4], [DOUBLE, 8], [TOKEN, 4], [STRING, 4]]);
const PACKED_INTEGERS = 0x69;
const PACKED_TABLE = 0x74;
/** Arrays shorter than this are never packed. */
const LEAST_PACKED = 16;
const SPECIFIERS = ['def', 'over', 'class'];

export function readRep(low: number, high: number): CrateRep {
  return { type: (high >>> 16) & 0xff, isArray: high >>> 31 === 1, isInlined: ((high >>> 30) & 1) === 1, isPacked: ((high >>> 29) & 1) === 1, payload: (high & 0xffff) * 2 ** 32 + low };
}

/** The value of a field; null for the types that say nothing of geometry. Errors: MeshError with the byte. */
export function readCrateValue(reader: CrateBytes, tables: CrateTables, rep: CrateRep): UsdValue | null {
  if (rep.isInlined) return inlined(reader, tables, rep);
  if (rep.isArray) return rep.payload === 0 ? [] : readArray(reader, tables, rep);
  reader.seek(rep.payload);
  if (rep.type === TIME_SAMPLES) return firstSample(reader, tables);
  if (rep.type === PATH_LIST) return pathList(reader, tables);
  if (rep.type === TOKEN_VECTOR) return tokenList(reader, tables, reader.count(reader.uint64(), 4, 'tokens'));
  if (rep.type === DOUBLE_VECTOR) return numbers(reader, DOUBLE, reader.count(reader.uint64(), 8, 'numbers'));
  const vector = VECTORS.get(rep.type);
  if (vector) return turnQuaternions(rep.type, numbers(reader, vector[1], vector[0]));
  if (rep.type === DOUBLE || rep.type === FLOAT) return numbers(reader, rep.type, 1)[0];
  return null;
}

function inlined(reader: CrateBytes, tables: CrateTables, { type, payload }: CrateRep): UsdValue | null {
  const bits = new DataView(new ArrayBuffer(4));
  bits.setUint32(0, payload >>> 0, true);
  const token = (index: number) => tokenAt(reader, tables, index);
  if (type === BOOL) return payload !== 0;
  if (type === INT) return bits.getInt32(0, true);
  if (type === UINT || type === UCHAR) return bits.getUint32(0, true);
  if (type === HALF) return fromHalf(payload & 0xffff);
  if (type === FLOAT || type === DOUBLE) return bits.getFloat32(0, true);
  if (type === TOKEN || type === ASSET) return token(payload);
  if (type === STRING) return token(stringAt(reader, tables, payload));
  if (type === SPECIFIER) return SPECIFIERS[payload] ?? null;
  if (type === VARIABILITY) return null;
  const vector = VECTORS.get(type);
  if (!vector) return null;
  // Vectors of small whole numbers are one byte each; a matrix of that kind has only its diagonal.
  if (type !== MATRIX4D) return Float64Array.from({ length: vector[0] }, (_, i) => bits.getInt8(i));
  return Float64Array.from({ length: 16 }, (_, i) => (i % 5 === 0 ? bits.getInt8(i / 5) : 0));
}

function tokenAt(reader: CrateBytes, { tokens }: CrateTables, index: number): string {
  if (index >= tokens.length) throw reader.fail('bad_index', `one of ${tokens.length} tokens`, index, reader.at);
  return tokens[index];
}

function stringAt(reader: CrateBytes, { strings }: CrateTables, index: number): number {
  if (index >= strings.length) throw reader.fail('bad_index', `one of ${strings.length} strings`, index, reader.at);
  return strings[index];
}

function tokenList(reader: CrateBytes, tables: CrateTables, count: number): string[] {
  return Array.from({ length: count }, () => tokenAt(reader, tables, reader.uint32()));
}

/** `count` numbers of a plain kind, one behind the other. */
function numbers(reader: CrateBytes, kind: number, count: number): Float64Array {
  const size = BYTES.get(kind)!;
  const data = reader.slice(count * size);
  const view = new DataView(data.buffer, data.byteOffset, data.byteLength);
  const values = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    const at = i * size;
    values[i] =
      kind === FLOAT ? view.getFloat32(at, true)
      : kind === DOUBLE ? view.getFloat64(at, true)
      : kind === INT ? view.getInt32(at, true)
      : kind === UINT ? view.getUint32(at, true)
      : kind === HALF ? fromHalf(view.getUint16(at, true))
      : view.getUint8(at);
  }
  return values;
}

function readArray(reader: CrateBytes, tables: CrateTables, { type, payload, isPacked }: CrateRep): UsdValue | null {
  reader.seek(payload);
  // Before version 0.5 a rank, always 1, came first; before 0.7 the length had 32 bits.
  if (tables.version < 5000) reader.uint32();
  const at = reader.at;
  const length = tables.version < 7000 ? reader.uint32() : reader.uint64();
  if (length > MESH_LIMITS.corners) throw reader.fail('bad_count', `at most ${MESH_LIMITS.corners} items in an array`, length, at);
  reader.spend(length * (VECTORS.get(type)?.[0] ?? 1));
  if (isPacked && length >= LEAST_PACKED) return unpackArray(reader, type, length);
  if (type === TOKEN) return tokenList(reader, tables, reader.count(length, 4, 'tokens'));
  const [width, kind] = VECTORS.get(type) ?? [1, type];
  const size = BYTES.get(kind);
  if (size === undefined || kind === STRING) return null;
  reader.count(length, width * size, 'items');
  return turnQuaternions(type, numbers(reader, kind, length * width));
}

function unpackArray(reader: CrateBytes, type: number, length: number): UsdValue | null {
  if (type === INT) return reader.integers(length, 'numbers');
  if (type === UINT) return Uint32Array.from(reader.integers(length, 'numbers'));
  if (type !== FLOAT && type !== DOUBLE && type !== HALF) return null;
  const at = reader.at;
  const way = reader.uint8();
  if (way === PACKED_INTEGERS) return Float64Array.from(reader.integers(length, 'numbers'));
  if (way !== PACKED_TABLE) throw reader.fail('bad_packing', 'numbers packed as integers or by a table', way, at);
  const table = numbers(reader, type, reader.count(reader.uint32(), BYTES.get(type)!, 'numbers'));
  const values = Float64Array.from(reader.integers(length, 'numbers'));
  for (let i = 0; i < length; i++) {
    if (!(values[i] >= 0 && values[i] < table.length)) throw reader.fail('bad_index', `one of ${table.length} numbers of the table`, values[i], at);
    values[i] = table[values[i]];
  }
  return values;
}

/** Quaternions lie in the file with the real part last; everywhere else it comes first. */
function turnQuaternions(type: number, values: Float64Array): Float64Array {
  if (QUATERNIONS.has(type)) for (let i = 0; i + 3 < values.length; i += 4) values.set([values[i + 3], values[i], values[i + 1], values[i + 2]], i);
  return values;
}

/** The value at the first time: two offsets, each relative to where it stands, lead to the times and to the values. */
function firstSample(reader: CrateBytes, tables: CrateTables): UsdValue | null {
  const start = reader.at;
  reader.seek(start + reader.int64() + 8);
  const second = reader.at;
  reader.seek(second + reader.int64());
  const count = reader.count(reader.uint64(), 8, 'samples');
  if (count === 0) return null;
  const low = reader.uint32();
  const rep = readRep(low, reader.uint32());
  return rep.type === TIME_SAMPLES ? null : readCrateValue(reader, tables, rep);
}

/** The paths of a list operation: those that are explicit, added, prepended or appended. */
function pathList(reader: CrateBytes, tables: CrateTables): string[] {
  const flags = reader.uint8();
  const paths: string[] = [];
  for (const [bit, used] of [[0x02, true], [0x04, true], [0x20, true], [0x40, true], [0x08, false], [0x10, false]] as const) {
    if ((flags & bit) === 0) continue;
    const count = reader.count(reader.uint64(), 4, 'paths');
    for (let i = 0; i < count; i++) {
      const path = tables.pathOf(reader.uint32());
      if (used && path !== null) paths.push(path);
    }
  }
  return paths;
}

function fromHalf(bits: number): number {
  const [exponent, fraction] = [(bits >> 10) & 31, bits & 0x3ff];
  const size = exponent === 0 ? fraction * 2 ** -24 : exponent === 31 ? (fraction ? NaN : Infinity) : (1 + fraction / 1024) * 2 ** (exponent - 15);
  return bits >> 15 ? -size : size;
}
