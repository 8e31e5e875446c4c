import type { Cage } from '../engine/cage';
import { LineCursor } from './line-cursor';
import { MeshError } from './mesh-error';
import { MESH_LIMITS, MOST_LINE_BYTES } from './mesh-limits';
import { PLY_BYTES, readPlyHeader, type PlyHeader, type PlyType } from './ply-header';
import { planPly, PlyPolygons, type PlyPlan } from './ply-polygons';
import { TextLines } from './text-lines';

const CORNERS = 3;

/**
 * Reads a PLY file: text or binary of both byte orders, polygons of any size, lists of any whole-number type; other elements and properties are read over.
 * Vertices and faces are those of the file, in its own unit and frame, which the format does not state. Source: Turk 1994, The PLY polygon file format (from memory).
 * Errors: MeshError with line and column in text and in the header, else with the byte.
 */
export function readPly(bytes: Uint8Array): Cage {
  const header = readPlyHeader(bytes);
  const plans = planPly(header);
  for (const plan of plans) refuseCount(plan, header, bytes.length - header.bodyAt);
  const polygons = new PlyPolygons(header);
  if (header.format === 'ascii') readText(bytes, header, plans, polygons);
  else readBinary(bytes, header, plans, polygons);
  return polygons.finish();
}

/** Refuses, before anything is set aside for them, more elements than the bytes that follow can hold. */
function refuseCount({ element }: PlyPlan, { format, bodyAt }: PlyHeader, left: number): void {
  // In text every value takes a digit and a blank; the last blank may be missing.
  const least = element.properties.reduce((sum, { type, countType }) => sum + (format === 'ascii' ? 2 : PLY_BYTES[countType ?? type]), 0);
  const most = Math.floor((left + 1) / least);
  const bound = element.name === 'vertex' ? MESH_LIMITS.vertices : element.name === 'face' ? MESH_LIMITS.faces : Infinity;
  if (element.count <= most && element.count <= bound) return;
  const expected = element.count > most ? `at most ${most} ${element.name.slice(0, 40)} elements in the ${left} bytes that follow` : `at most ${bound} ${element.name} elements`;
  throw new MeshError({ code: element.count > most ? 'bad_count' : `too_many_${element.name === 'face' ? 'faces' : 'vertices'}`, expected, found: String(element.count), detail: `expected ${expected}, found ${element.count} declared`, offset: bodyAt });
}

function readText(bytes: Uint8Array, header: PlyHeader, plans: PlyPlan[], polygons: PlyPolygons): void {
  const cursor = new LineCursor();
  let physical = 0;
  let current = 0;
  let done = 0;
  const lines = new TextLines((text, start, end, line, joints) => {
    physical = line;
    if (line <= header.lines) return;
    cursor.open(text, start, end, line, joints);
    if (!cursor.nextWord() || current >= plans.length) return;
    readTextElement(cursor, plans[current], polygons);
    if (++done < plans[current].element.count) return;
    current++;
    done = 0;
  }, MOST_LINE_BYTES);
  lines.push(bytes);
  lines.end();
  if (current >= plans.length) return;
  const { element } = plans[current];
  const expected = `${element.count} ${element.name.slice(0, 40)} elements`;
  throw new MeshError({ code: 'truncated', expected, found: String(done), detail: `expected ${expected}, found ${done} before the end of the file`, place: { line: physical + 1, column: 1, text: '' } });
}

function readTextElement(cursor: LineCursor, { element, roles }: PlyPlan, polygons: PlyPolygons): void {
  for (let i = 0; i < roles.length; i++) {
    const { name, countType } = element.properties[i];
    const role = roles[i];
    const at = toWord(cursor, name);
    const place = () => ({ place: cursor.place(at) });
    if (countType === null) {
      if (role < 0) cursor.at = cursor.wordEnd();
      else polygons.coordinate(role, cursor.number(`a number for ${name}`), place);
      continue;
    }
    const length = wholeNumber(cursor, `the length of the list "${name.slice(0, 40)}"`);
    if (length > cursor.end - cursor.at) throw cursor.fail('bad_count', 'as many items as the list says', at);
    if (role === CORNERS) polygons.face(length, cursor.line, place);
    for (let k = 0; k < length; k++) {
      const itemAt = toWord(cursor, name);
      if (role === CORNERS) polygons.corner(wholeNumber(cursor, 'a vertex index from 0'), () => ({ place: cursor.place(itemAt) }));
      else cursor.at = cursor.wordEnd();
    }
  }
  if (cursor.nextWord()) throw cursor.fail('too_many_values', `the end of the ${element.name.slice(0, 40)} element`);
}

function toWord(cursor: LineCursor, name: string): number {
  if (!cursor.nextWord()) throw cursor.fail('missing_value', `a value for "${name.slice(0, 40)}"`);
  return cursor.at;
}

function wholeNumber(cursor: LineCursor, expected: string): number {
  const at = cursor.at;
  const value = cursor.integer(0);
  if (value === null || value < 0 || value > 0xfffffffe) throw cursor.fail(value === null ? 'bad_number' : 'vertex_out_of_range', expected, at);
  return value;
}

const READ: Record<PlyType, (view: DataView, at: number, little: boolean) => number> = {
  int8: (view, at) => view.getInt8(at),
  uint8: (view, at) => view.getUint8(at),
  int16: (view, at, little) => view.getInt16(at, little),
  uint16: (view, at, little) => view.getUint16(at, little),
  int32: (view, at, little) => view.getInt32(at, little),
  uint32: (view, at, little) => view.getUint32(at, little),
  float32: (view, at, little) => view.getFloat32(at, little),
  float64: (view, at, little) => view.getFloat64(at, little),
};

function readBinary(bytes: Uint8Array, header: PlyHeader, plans: PlyPlan[], polygons: PlyPolygons): void {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const little = header.format === 'little';
  let at = header.bodyAt;
  const place = () => ({ offset: at });
  const need = (size: number, what: string) => {
    if (at + size > bytes.length) throw new MeshError({ code: 'truncated', expected: what, detail: `expected ${what}, found the end of the file`, offset: at });
  };
  for (const { element, roles } of plans) {
    const shown = element.name.slice(0, 40);
    for (let i = 0; i < element.count; i++) {
      for (let p = 0; p < roles.length; p++) {
        const { type, countType } = element.properties[p];
        const size = PLY_BYTES[type];
        if (countType === null) {
          need(size, `${shown} ${i} of ${element.count}`);
          if (roles[p] >= 0) polygons.coordinate(roles[p], READ[type](view, at, little), place);
          at += size;
          continue;
        }
        need(PLY_BYTES[countType], `${shown} ${i} of ${element.count}`);
        const length = READ[countType](view, at, little);
        if (length < 0) throw new MeshError({ code: 'bad_count', expected: 'a list length from 0', found: String(length), detail: `expected a list length from 0, found ${length}`, offset: at });
        if (roles[p] === CORNERS) polygons.face(length, 0, place);
        at += PLY_BYTES[countType];
        need(length * size, `a list of ${length} items in ${shown} ${i}`);
        if (roles[p] === CORNERS) for (let k = 0; k < length; k++, at += size) polygons.corner(READ[type](view, at, little), place);
        else at += length * size;
      }
    }
  }
}
