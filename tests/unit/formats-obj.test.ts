import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Cage } from '@/lib/engine/cage';
import { MeshError } from '@/lib/formats/mesh-error';
import { OBJ_LIMITS, readObj, readObjStream } from '@/lib/formats/obj';

const bytes = (text: string) => new TextEncoder().encode(text);
const read = (text: string) => readObj(bytes(text));

function faces(cage: Cage): number[][] {
  return Array.from({ length: cage.faceStarts.length - 1 }, (_, f) => Array.from(cage.faceVertices.subarray(cage.faceStarts[f], cage.faceStarts[f + 1])));
}

function nameOfFace(labels: Cage['groups'], face: number): string | null {
  if (!labels || labels.labels[face] < 0) return null;
  return labels.names[labels.labels[face]];
}

function failure(source: string | Uint8Array): MeshError {
  try {
    readObj(typeof source === 'string' ? bytes(source) : source);
  } catch (error) {
    if (error instanceof MeshError) return error;
    throw error;
  }
  throw new Error('read without an error');
}

const SQUARE = 'v 0 0 0\nv 1 0 0\nv 1 1 0\nv 0 1 0\n';

describe('polygons', () => {
  it('reads vertices and polygons of any size', () => {
    const cage = read(`${SQUARE}v .5 1.5 -2e-1\nf 1 2 3 4\nf 1 2 3\nf 1 2 3 5 4\n`);
    expect(Array.from(cage.positions.subarray(12))).toEqual([0.5, 1.5, -0.2]);
    expect(faces(cage)).toEqual([[0, 1, 2, 3], [0, 1, 2], [0, 1, 2, 4, 3]]);
    expect(Array.from(cage.faceLines ?? [])).toEqual([6, 7, 8]);
  });

  it.each(['f 1/1 2/2 3/3', 'f 1//1 2//1 3//1', 'f 1/7/9 2/7/9 3/7/9', 'f 1// 2// 3//', 'f 1/2/ 2/2/ 3/2/', 'f 1/ 2/ 3/', 'f -4 -3 -2', 'f -4/-1/-1 -3/-1/-1 -2/-1/-1', 'fo 1 2 3', '  f\t1\t 2 3  # a face'])(
    'takes the reference form of "%s"',
    (line) => expect(faces(read(`${SQUARE}${line}\n`))).toEqual([[0, 1, 2]]),
  );

  it('counts negative references from the vertices read so far', () => {
    const cage = read('v 0 0 0\nv 1 0 0\nv 0 1 0\nf -3 -2 -1\nv 0 0 1\nv 1 0 1\nv 0 1 1\nf -3 -2 -1\n');
    expect(faces(cage)).toEqual([[0, 1, 2], [3, 4, 5]]);
  });

  it('lets a face name vertices that come later in the file', () => {
    expect(faces(read(`f 1 2 3\n${SQUARE}`))).toEqual([[0, 1, 2]]);
  });

  it.each([
    ['CRLF', (t: string) => t.replaceAll('\n', '\r\n')],
    ['CR', (t: string) => t.replaceAll('\n', '\r')],
    ['tabs', (t: string) => t.replaceAll(' ', '\t')],
    ['no newline at the end', (t: string) => t.trimEnd()],
    ['blank lines and comments', (t: string) => t.replaceAll('\n', ' # x \\\n\n  # C:\\here\\\n')],
  ])('reads %s alike', (_, change) => {
    const text = `${SQUARE}f 1 2 3\nf 1 3 4\n`;
    const cage = read(change(text));
    expect(faces(cage)).toEqual([[0, 1, 2], [0, 2, 3]]);
    expect(Array.from(cage.positions)).toEqual(Array.from(read(text).positions));
  });

  it('joins continued lines, blanks behind the backslash included', () => {
    const cage = read('v 0 \\\n 0 0\nv 1 0 0\nv 1 1 \\  \r\n 0\nf 1 \\\n2 \\\n3\n');
    expect(faces(cage)).toEqual([[0, 1, 2]]);
    expect(Array.from(cage.faceLines ?? [])).toEqual([6]);
  });

  it('reads a byte order mark, UTF-16 of both orders with and without one, and Latin-1 names', () => {
    const text = `g Pfütze\n${SQUARE}f 1 2 3\n`;
    const utf16 = (big: boolean, mark: boolean) => {
      const body = (mark ? '\ufeff' : '') + text;
      const out = new Uint8Array(body.length * 2);
      const view = new DataView(out.buffer);
      for (let i = 0; i < body.length; i++) view.setUint16(2 * i, body.charCodeAt(i), !big);
      return out;
    };
    const latin1 = Uint8Array.from(text, (c) => c.charCodeAt(0));
    for (const source of [bytes(`\ufeff${text}`), utf16(false, true), utf16(true, true), utf16(false, false), utf16(true, false), latin1]) {
      const cage = readObj(source);
      expect(nameOfFace(cage.groups, 0)).toBe('Pfütze');
      expect(faces(cage)).toEqual([[0, 1, 2]]);
    }
  });

  it('takes colours and weights behind a vertex, warning of weights other than 1', () => {
    const cage = read('v 0 0 0 0.5 0.25 1\nv 1 0 0 1\nv 0 1 0 2\nv 0 0 1 2 .1 .2 .3\nf 1 2 3\nf 1 2 4\n');
    expect(Array.from(cage.positions)).toEqual([0, 0, 0, 1, 0, 0, 0, 1, 0, 0, 0, 1]);
    expect(cage.warnings.map((w) => [w.code, w.line])).toEqual([['weight_ignored', 3]]);
  });

  it('warns once of each kind of geometry that is no polygon and of each unknown word', () => {
    const cage = read(`${SQUARE}l 1 2\nl 2 3\np 1\nwobble 3\nwobble 4\nvt 0 0\nvn 0 0 1\ns off\nmtllib a b.mtl\nf 1 2 3\n`);
    expect(cage.warnings.map((w) => [w.code, w.line])).toEqual([['not_polygons', 5], ['not_polygons', 7], ['unknown_keyword', 8]]);
  });

  const CODES: [name: string, encode: (text: string) => Uint8Array][] = [
    ['UTF-8 with a mark', (text) => bytes(`\ufeff${text}`)],
    ['Latin-1', (text) => Uint8Array.from(text, (c) => c.charCodeAt(0))],
    ['UTF-16, low byte first, with a mark', (text) => new Uint8Array(Uint16Array.from(`\ufeff${text}`, (c) => c.charCodeAt(0)).buffer)],
    ['UTF-16, high byte first, without a mark', (text) => new Uint8Array(Uint16Array.from(text, (c) => (c.charCodeAt(0) << 8) | (c.charCodeAt(0) >> 8)).buffer)],
  ];

  it.each(CODES)('gives the same cage however the bytes are cut into chunks: %s', async (_, encode) => {
    const text = `o ox\r\ng torso skin\r\n${SQUARE.replaceAll('\n', '\r\n')}f 1 \\\r\n 2 3\rusemtl häute\nf 1 3 4\nt crease 2/1/0 0 1 2.5\nvn 0 0 1\nf 2//1 3//1 4//1\nv 7 8 9.25`;
    const source = encode(text);
    const whole = read(text);
    await fc.assert(
      fc.asyncProperty(fc.array(fc.integer({ min: 1, max: 30 }), { minLength: 1 }), async (sizes) => {
        const streamed = await readObjStream(
          (async function* () {
            let at = 0;
            for (let i = 0; at < source.length; i++) {
              const size = sizes[i % sizes.length];
              yield source.slice(at, at + size);
              at += size;
            }
          })(),
        );
        expect(streamed).toEqual(whole);
      }),
      { numRuns: 60 },
    );
  });

  it('reads megabytes of UTF-16 in one piece', () => {
    const encode = CODES[2][1];
    const count = 60_000;
    const cage = readObj(encode(`${'v 1.5 -2 3e2\n'.repeat(count)}f 1 2 ${count}\n`));
    expect(cage.positions.length).toBe(3 * count);
    expect(Array.from(cage.positions.subarray(-3))).toEqual([1.5, -2, 300]);
    expect(faces(cage)).toEqual([[0, 1, count - 1]]);
  });
});

describe('plain lines', () => {
  // Ended by a carriage return alone, no line is plain: each then goes the way of all faults and rarities, word by word.
  const outcome = (text: string): unknown => {
    try {
      return read(text);
    } catch (error) {
      if (!(error instanceof MeshError)) throw error;
      const { code, line, column, detail, excerpt } = error;
      return { code, line, column, detail, excerpt };
    }
  };
  const number = fc.oneof(fc.double({ noNaN: true, min: -1e3, max: 1e3 }).map(String), fc.integer({ min: -99, max: 99 }).map(String), fc.constantFrom('1e-7', '.5', '-0', '+1', '1e60', 'nan', '1,5', '0x1', '3.'));
  const reference = fc.oneof({ weight: 12, arbitrary: fc.constantFrom('1', '2', '3', '-1', '-2', '1/2', '2//3', '3/1/1', '1/', '2//', '3/-1/-2') }, { weight: 1, arbitrary: fc.constantFrom('0', '99', '-9', '1/x', '1/-', '1/1/1/1', '1;', '', '+2', '-0', '01') });
  const gap = fc.constantFrom(' ', '  ', '\t', ' \t ');
  const words = (first: string, word: fc.Arbitrary<string>, least: number, most: number) =>
    fc.tuple(gap, fc.array(fc.tuple(word, gap), { minLength: least, maxLength: most }), fc.constantFrom('', '', ' ', '\t', ' # x', '#', '\\')).map(([blank, rest, end]) => `${first}${blank}${rest.flat().join('')}${end}`);
  const line = fc.oneof(
    { weight: 6, arbitrary: words('v', number, 3, 3) },
    { weight: 1, arbitrary: words('v', number, 0, 8) },
    { weight: 6, arbitrary: words('f', reference, 3, 5) },
    { weight: 1, arbitrary: words('f', reference, 0, 2) },
    { weight: 2, arbitrary: fc.constantFrom('vt', 'vn', 'vp', 'vx').chain((word) => words(word, number, 0, 3)) },
    { weight: 1, arbitrary: fc.constantFrom('', ' ', '# c', 'g a', 'g', 'o b c', 'usemtl m', 's 1', 'v', 'f', 'vn', 'vt\u0001', 'vn \u001a', 'vn 1 \\ ', 'p 1', 't corner 1/1/0 0 2') },
  );

  it('are read as any line is, to the last bit and fault', () => {
    fc.assert(
      fc.property(fc.array(line, { maxLength: 30 }), fc.boolean(), (lines, wide) => {
        const text = (end: string): string => `${SQUARE.replaceAll('\n', end)}f 1 2 3${end}${lines.map((one) => one + end).join('')}`;
        expect(outcome(text(wide ? '\r\n' : '\n'))).toEqual(outcome(text('\r')));
      }),
      { numRuns: 3_000 },
    );
  });

  it('with as many corners as one likes are faces', () => {
    for (const corners of [63, 64, 65, 200]) {
      const ring = Array.from({ length: corners }, (_, i) => `v ${i} 0 0\n`).join('');
      expect(faces(read(`${ring}f ${Array.from({ length: corners }, (_, i) => i + 1).join(' ')}\n`))).toEqual([Array.from({ length: corners }, (_, i) => i)]);
    }
  });
});

describe('numbers', () => {
  it('are the doubles that JavaScript reads', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, min: -1e49, max: 1e49 }), fc.integer({ min: 0, max: 20 }), (value, digits) => {
        for (const text of [String(value), value.toExponential(), value.toFixed(digits)]) {
          const cage = read(`v ${text} 0 0\nv 0 0 0\nv 1 1 1\nf 1 2 3\n`);
          expect(Object.is(cage.positions[0], Number(text))).toBe(true);
        }
      }),
    );
  });

  it.each(['9007199254740993', '0.1234567890123456789', '00001.5', '+2.', '-.5', '1E+2', '123456789012345678901234567890e-20'])('reads %s correctly rounded', (text) => {
    expect(read(`v ${text} 0 0\nv 0 0 0\nv 1 1 1\nf 1 2 3\n`).positions[0]).toBe(Number(text));
  });

  it.each([
    ['nan', 'not_finite'],
    ['-inf', 'not_finite'],
    ['Infinity', 'not_finite'],
    ['-1.#IND00', 'not_finite'],
    ['-nan(ind)', 'not_finite'],
    ['1e999', 'number_too_large'],
    ['1e60', 'number_too_large'],
    ['1,5', 'bad_number'],
    ['0x10', 'bad_number'],
    ['1e', 'bad_number'],
    ['.', 'bad_number'],
    ['--1', 'bad_number'],
  ])('refuses %s with %s', (text, code) => {
    const error = failure(`v 0 0 0\nv 0 ${text} 0\n`);
    expect([error.code, error.line, error.column]).toEqual([code, 2, 5]);
  });
});

describe('names', () => {
  it('keeps groups, objects and materials apart and joins several names on one line', () => {
    const cage = read(`${SQUARE}o ox body\ng torso  skin\nusemtl hide\nf 1 2 3\ng\nf 1 3 4\ng leg#1 # the left one\no\nf 1 2 4\n`);
    expect([0, 1, 2].map((f) => nameOfFace(cage.groups, f))).toEqual(['torso skin', 'default', 'leg#1']);
    expect([0, 1, 2].map((f) => nameOfFace(cage.objects, f))).toEqual(['ox body', 'ox body', null]);
    expect([0, 1, 2].map((f) => nameOfFace(cage.materials, f))).toEqual(['hide', 'hide', 'hide']);
  });

  it('leaves no trace of names without faces, and none at all where nothing is named', () => {
    const cage = read(`g empty\n${SQUARE}g full\nf 1 2 3\ng full\nf 1 3 4\n`);
    expect(cage.groups?.names).toEqual(['full']);
    expect(cage.objects).toBeNull();
    expect(cage.materials).toBeNull();
  });
});

describe('sharpness tags', () => {
  it('reads creases, chains, corners and the boundary rule, sharpness as 32-bit float', () => {
    const cage = read(`${SQUARE}f 1 2 3 4\nt crease 2/1/0 0 1 1.7\nt crease 3/1/0 1 2 3 10\nt crease 3/2/0 1 2 3 1 2\nt corner 1/1/0 3 0.3\nt corner 2/1/0 0 1 4\nt interpolateboundary 1/0/0 2\n`);
    expect(Array.from(cage.creaseVertices)).toEqual([0, 1, 1, 2, 2, 3, 1, 2, 2, 3]);
    expect(Array.from(cage.creaseSharpness)).toEqual([Math.fround(1.7), 10, 10, 1, 2]);
    expect(Array.from(cage.cornerVertices)).toEqual([3, 0, 1]);
    expect(Array.from(cage.cornerSharpness)).toEqual([Math.fround(0.3), 4, 4]);
    expect(cage.boundary).toBe('edge-only');
  });

  // OpenSubdiv, regression/common/far_utils.h: 0 none, 1 edge and corner, 2 edge only.
  it.each([[0, null], [1, 'edge-and-corner'], [2, 'edge-only']])('takes boundary rule %d as %s', (rule, boundary) => {
    expect(read(`${SQUARE}f 1 2 3 4\nt interpolateboundary 1/0/0 ${rule}\n`).boundary).toBe(boundary);
  });

  it('leaves out other tags with a warning', () => {
    const cage = read(`${SQUARE}f 1 2 3 4\nt hole 1/0/0 0\nt facevaryinginterpolateboundary 1/0/0 1\nt vertexedit 1/3/2 0 1 2 3 set P\n`);
    expect(cage.warnings.map((w) => [w.code, w.line])).toEqual([['tag_ignored', 6], ['tag_ignored', 8]]);
  });

  it.each([
    ['t crease 2/1/0 0 4 1', 'vertex_out_of_range', 18],
    ['t crease 2/1/0 0 -1 1', 'vertex_out_of_range', 18],
    ['t crease 2/1/0 0 1', 'bad_tag', 19],
    ['t crease 2/1/0 0 1 -2', 'bad_tag', 20],
    ['t crease 2/1/0 0 1 nan', 'not_finite', 20],
    ['t crease 1/1/0 0 1', 'bad_tag', 10],
    ['t crease two 0 1', 'bad_tag', 10],
    ['t corner 1/1/0 x 1', 'bad_tag', 16],
    ['t interpolateboundary 1/0/0 7', 'bad_tag', 29],
    ['t', 'bad_tag', 2],
  ])('points into "%s"', (line, code, column) => {
    const error = failure(`${SQUARE}f 1 2 3 4\n${line}\n`);
    expect([error.code, error.line, error.column]).toEqual([code, 6, column]);
  });
});

describe('errors', () => {
  it('say where, what was expected and what was found, with a caret below it', () => {
    const error = failure(`${SQUARE}f 1 2 3 999\n`);
    expect(error.message).toBe('line 5, column 9: expected a vertex number from 1 to 4 or −1 to −4, found 999');
    expect(error.detail).toBe('expected a vertex number from 1 to 4 or −1 to −4, found 999');
    expect(error.excerpt).toBe('f 1 2 3 999\n        ^');
    expect([error.expected, error.found]).toEqual(['a vertex number from 1 to 4 or −1 to −4', '999']);
  });

  it.each([
    ['f 0 1 2', 'vertex_out_of_range', 3],
    ['f 1 2 -5', 'vertex_out_of_range', 7],
    ['f 1 2 99999999999999999999', 'vertex_out_of_range', 7],
    ['f 1 2', 'face_too_small', 1],
    ['f', 'face_too_small', 1],
    ['f 1 2 x', 'bad_vertex_reference', 7],
    ['f 1 2 3.5', 'bad_vertex_reference', 7],
    ['f 1/x 2 3', 'bad_vertex_reference', 5],
    ['f 1/1/1/1 2 3', 'bad_vertex_reference', 8],
    ['v 1 2', 'missing_coordinate', 6],
    ['v 1 2 3 red', 'bad_number', 9],
    ['\tf 1 2 ü', 'bad_vertex_reference', 8],
  ])('points into "%s"', (line, code, column) => {
    const error = failure(`${SQUARE}${line}\nf 1 2 3\n`);
    expect([error.code, error.line, error.column]).toEqual([code, 5, column]);
  });

  it('names the first wrong reference in the file although the vertices come last', () => {
    const error = failure('f 1 2 3\nf 1 2 9\nf 1 2 8\nf 1 2 77\nv 0 0 0\nv 1 0 0\nv 0 1 0\n');
    expect([error.line, error.column, error.found]).toEqual([2, 7, '9']);
  });

  it('gives the physical line and column inside a continued line', () => {
    const error = failure(`${SQUARE}f 1 2 \\\n 3 \\\n  x 4\n`);
    expect([error.line, error.column]).toEqual([7, 3]);
    expect(error.excerpt).toBe('  x 4\n  ^');
  });

  it('cuts the excerpt of a long line to a window around the caret', () => {
    const error = failure(`${SQUARE}f ${'1 2 3 '.repeat(200)}bad ${'1 2 3 '.repeat(200)}\n`);
    const [shown, caret] = (error.excerpt ?? '').split('\n');
    expect(shown.length).toBeLessThan(100);
    expect(shown.slice(caret.length - 1).startsWith('bad ')).toBe(true);
  });

  it('refuses what is empty, without faces, or no text', () => {
    expect(failure('').code).toBe('empty_file');
    expect(failure('\ufeff').code).toBe('empty_file');
    expect(failure(SQUARE).code).toBe('no_faces');
    expect(failure('hello\nworld\n').code).toBe('no_faces');
    expect(failure(Uint8Array.from([0x67, 0x6c, 0x54, 0x46, 2, 0, 0, 0, 1, 2])).code).toBe('not_text');
    expect(failure(bytes(`${SQUARE}f 1 2 \u0000 3\n`))).toMatchObject({ code: 'not_text', line: 5, column: 7 });
  });

  it('keeps to its limits', () => {
    const with_ = (limits: Partial<typeof OBJ_LIMITS>, text: string) => () => readObj(bytes(text), { ...OBJ_LIMITS, ...limits });
    expect(with_({ vertices: 3 }, SQUARE)).toThrow(/line 4.*at most 3 vertices/);
    expect(with_({ faces: 1 }, `${SQUARE}f 1 2 3\nf 1 2 3\n`)).toThrow(/line 6.*at most 1 faces/);
    expect(with_({ corners: 4 }, `${SQUARE}f 1 2 3\nf 1 2 3\n`)).toThrow(/line 6.*at most 4 face corners/);
    expect(with_({ lineBytes: 20 }, `${SQUARE}# ${'x'.repeat(30)}\n`)).toThrow(/line 5.*at most 20 bytes/);
    expect(with_({ lineBytes: 20 }, `f 1 2 3 \\\n 4 5 6 7 \\\n 1 2 3\n`)).toThrow(/at most 20 bytes/);
    expect(with_({ nameLength: 5 }, `g abcdef\n${SQUARE}f 1 2 3\n`)).toThrow(/line 1.*at most 5 characters/);
  });

  it('never fails in another way, whatever the bytes are', () => {
    const word = fc.oneof(fc.constantFrom('v', 'f', 'g', 'o', 't', 'crease', '2/1/0', '1', '-1', '/', '1/', '\\', '#', '\r', '1e5', 'nan', '\u0000', '\ufeff'), fc.string({ maxLength: 4 }));
    fc.assert(
      fc.property(fc.array(fc.tuple(word, fc.constantFrom(' ', '\n', '\t')), { maxLength: 40 }), (words) => {
        try {
          readObj(bytes(words.flat().join('')));
        } catch (error) {
          expect(error).toBeInstanceOf(MeshError);
        }
      }),
      { numRuns: 400 },
    );
  });
});
