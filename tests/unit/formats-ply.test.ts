import { describe, expect, it, vi } from 'vitest';
import { BoxGeometry, Mesh } from 'three';
import { PLYExporter } from 'three/examples/jsm/exporters/PLYExporter.js';
import { MeshError } from '@/lib/formats/mesh-error';
import { readPly } from '@/lib/formats/ply';
import { facesOf, failureOf, measureAsIs } from '../support/read-cages';

// The format: G. Turk, The PLY polygon file format, 1994 (from memory, as commonly documented).
const text = (value: string) => new TextEncoder().encode(value);

/** A 2 × 3 × 4 box of quads, as Turk's own cube example is laid out. */
const BOX = ['0 0 0', '2 0 0', '2 3 0', '0 3 0', '0 0 4', '2 0 4', '2 3 4', '0 3 4'];
const QUADS = [[0, 3, 2, 1], [4, 5, 6, 7], [0, 1, 5, 4], [1, 2, 6, 5], [2, 3, 7, 6], [3, 0, 4, 7]];

function asciiBox(extra = { vertex: '', face: '', vertexValues: '', faceValues: '' }): string {
  return ['ply', 'format ascii 1.0', 'comment made by hand', 'obj_info nothing', 'element vertex 8', 'property float x', 'property float y', 'property float z', extra.vertex, 'element face 6', 'property list uchar int vertex_indices', extra.face, 'end_header',
    ...BOX.map((line) => `${line}${extra.vertexValues}`), ...QUADS.map((quad) => `4 ${quad.join(' ')}${extra.faceValues}`)].filter((line) => line !== '').join('\n');
}

/** The same box in binary with the given types, an element and properties between that mean nothing here. */
function binaryBox(little: boolean, countType: string, indexType: string): Uint8Array {
  const sizes: Record<string, number> = { uchar: 1, char: 1, short: 2, ushort: 2, int: 4, uint: 4 };
  const header = text(['ply', `format binary_${little ? 'little' : 'big'}_endian 1.0`, 'element camera 2', 'property double focal', 'property list uint short marks', 'element vertex 8', 'property uchar flag', 'property double x', 'property double y', 'property double z', 'element face 6', 'property short tag', `property list ${countType} ${indexType} vertex_index`, 'end_header', ''].join('\r\n'));
  const out = new DataView(new ArrayBuffer(4096));
  let at = 0;
  const put = (type: string, value: number) => {
    const size = type === 'double' ? 8 : sizes[type];
    if (type === 'double') out.setFloat64(at, value, little);
    else if (size === 1) out.setUint8(at, value);
    else if (size === 2) out.setUint16(at, value, little);
    else out.setUint32(at, value, little);
    at += size;
  };
  for (const marks of [[7, 8], []]) {
    put('double', 35);
    put('uint', marks.length);
    marks.forEach((mark) => put('short', mark));
  }
  for (const line of BOX) {
    put('uchar', 9);
    line.split(' ').forEach((value) => put('double', Number(value)));
  }
  for (const quad of QUADS) {
    put('short', 1);
    put(countType, 4);
    quad.forEach((index) => put(indexType, index));
  }
  const bytes = new Uint8Array(header.length + at);
  bytes.set(header);
  bytes.set(new Uint8Array(out.buffer, 0, at), header.length);
  return bytes;
}

describe('PLY', () => {
  it.each(['\n', '\r\n', '\r'])('reads a box of quads from text with lines that end in %j', (end) => {
    const cage = readPly(text(asciiBox().replaceAll('\n', end)));
    expect(facesOf(cage)).toEqual(QUADS);
    expect(measureAsIs(cage).volume).toBeCloseTo(2 * 3 * 4, 12);
    expect([cage.metresPerUnit, cage.upAxis, cage.warnings]).toEqual([null, null, []]);
    expect(cage.faceLines![0]).toBe(20);
  });

  it.each([[true, 'uchar', 'int'], [false, 'uchar', 'int'], [true, 'int', 'ushort'], [false, 'ushort', 'uchar'], [true, 'uint', 'uint'], [false, 'char', 'short']])('reads the box from binary, little endian %s, lists of %s and %s', (little, countType, indexType) => {
    const cage = readPly(binaryBox(little, countType, indexType));
    expect(facesOf(cage)).toEqual(QUADS);
    expect(measureAsIs(cage).volume).toBeCloseTo(24, 12);
  });

  it('reads over colours and normals, and says that ids on faces make no parts', () => {
    const cage = readPly(text(asciiBox({ vertex: 'property float nx\nproperty uchar red', vertexValues: ' 0.5 255', face: 'property int material_index', faceValues: ' 3' })));
    expect(facesOf(cage)).toEqual(QUADS);
    expect(cage.warnings.map((warning) => warning.code)).toEqual(['property_ignored']);
    expect(cage.warnings[0].message).toContain('material_index');
  });

  it.each([{}, { binary: true }, { binary: true, littleEndian: true }])('reads what another library writes (%j)', (options) => {
    // The exporter asks a browser when to call back with what it returns as well.
    vi.stubGlobal('requestAnimationFrame', () => 0);
    const made = new PLYExporter().parse(new Mesh(new BoxGeometry(1.5, 2, 2.5)), () => undefined, options as { binary: true });
    const cage = readPly(typeof made === 'string' ? text(made) : new Uint8Array(made as ArrayBuffer));
    // Quads of three's box do not share vertices between sides: six sheets whose cones add up to the box.
    expect(measureAsIs(cage, true).volume).toBeCloseTo(7.5, 12);
  });

  it.each([
    ['a missing coordinate', asciiBox().replace('2 3 0', '2 3'), 'missing_value', 14],
    ['a number that is none', asciiBox().replace('2 3 0', '2 3 x'), 'bad_number', 14],
    ['not a number', asciiBox().replace('2 3 0', '2 nan 0'), 'not_finite', 14],
    ['a huge number', asciiBox().replace('2 3 0', '2 1e308 0'), 'number_too_large', 14],
    ['an index beyond the vertices', asciiBox().replace('4 3 0 4 7', '4 3 0 4 8'), 'vertex_out_of_range', 25],
    ['a negative index', asciiBox().replace('4 3 0 4 7', '4 3 0 4 -7'), 'vertex_out_of_range', 25],
    ['a list shorter than it says', asciiBox().replace('4 3 0 4 7', '4 3 0 4'), 'missing_value', 25],
    ['a list longer than it says', asciiBox().replace('4 3 0 4 7', '4 3 0 4 7 1'), 'too_many_values', 25],
    ['two corners', asciiBox().replace('4 3 0 4 7', '2 3 0'), 'face_too_small', 25],
    ['a file cut off', asciiBox().split('\n').slice(0, -2).join('\n'), 'truncated', 24],
    ['an unknown type', asciiBox().replace('property float y', 'property quad y'), 'bad_header', 7],
    ['no end of the header', asciiBox().split('\n').slice(0, 9).join('\n'), 'bad_header', 9],
  ])('says where %s is', (_, source, code, line) => {
    const error = failureOf(() => readPly(text(source)));
    expect([error.code, error.line]).toEqual([code, line]);
  });

  it('refuses a declared count that the bytes cannot hold before setting memory aside', () => {
    const before = process.memoryUsage().arrayBuffers;
    for (const source of [asciiBox(), new TextDecoder('latin1').decode(binaryBox(true, 'uchar', 'uint'))]) {
      const bytes = Uint8Array.from(source.replace('element vertex 8', 'element vertex 1000000000'), (c) => c.charCodeAt(0));
      expect(failureOf(() => readPly(bytes))).toMatchObject({ code: 'bad_count', found: '1000000000' });
    }
    expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(1e8);
  });

  it('gives the byte of a fault in binary', () => {
    const bytes = binaryBox(true, 'uchar', 'uint');
    const error = failureOf(() => readPly(bytes.subarray(0, bytes.length - 3)));
    expect(error).toBeInstanceOf(MeshError);
    // The last list of four indices of 4 bytes begins 16 bytes before the whole file's end.
    expect([error.code, error.offset]).toEqual(['truncated', bytes.length - 16]);
  });
});
