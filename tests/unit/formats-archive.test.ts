import Papa from 'papaparse';
import { BoxGeometry, Mesh } from 'three';
import { STLExporter } from 'three/examples/jsm/exporters/STLExporter.js';
import { zipSync } from 'three/examples/jsm/libs/fflate.module.js';
import { describe, expect, it } from 'vitest';
import { measureCage } from '@/lib/engine/measure';
import { detectMeshKind } from '@/lib/formats/detect-mesh-kind';
import { readJointWeights, weightsName } from '@/lib/formats/joint-weights';
import { MESH_EXTENSIONS } from '@/lib/formats/mesh-extensions';
import { ARCHIVE_LIMITS } from '@/lib/formats/open-archive';
import { readMesh } from '@/lib/formats/read-mesh';
import { failureOf, laterFailureOf, measureAsIs, namesOf } from '../support/read-cages';

const text = (value: string) => new TextEncoder().encode(value);

async function* stream(...pieces: Uint8Array[]): AsyncGenerator<Uint8Array> {
  yield* pieces;
}

const read = (name: string, bytes: Uint8Array) => readMesh(name, stream(bytes));

/** A box of a × b × c with its corner at (x, 0, 0), of quads. */
function boxObj([a, b, c]: number[], x = 0): string {
  const corners = [[0, 0, 0], [1, 0, 0], [1, 1, 0], [0, 1, 0], [0, 0, 1], [1, 0, 1], [1, 1, 1], [0, 1, 1]];
  return [...corners.map(([i, j, k]) => `v ${x + i * a} ${j * b} ${k * c}`), 'f 1 4 3 2', 'f 5 6 7 8', 'f 1 2 6 5', 'f 2 3 7 6', 'f 3 4 8 7', 'f 4 1 5 8'].join('\n');
}

describe('archives', () => {
  it('read as one cage, each file an object', async () => {
    const stl = new STLExporter().parse(new Mesh(new BoxGeometry(1, 1, 1).translate(20, 0, 0)), { binary: true });
    const cage = await read('props.zip', zipSync({ 'set/crate.obj': text(boxObj([2, 3, 4])), 'set/lid.stl': new Uint8Array(stl.buffer), 'set/readme.txt': text('hello'), '__MACOSX/set/._crate.obj': text('junk'), 'set/': new Uint8Array(0) }));
    expect(measureAsIs(cage)).toMatchObject({ volume: expect.closeTo(24 + 1, 10), components: 2 });
    expect([...new Set(namesOf(cage.objects))]).toEqual(['crate', 'lid']);
  });

  it('keep the objects of each file apart', async () => {
    const cage = await read('two.zip', zipSync({ 'a.obj': text(`o body\n${boxObj([1, 1, 1])}`), 'b.obj': text(`o body\n${boxObj([1, 1, 1], 5)}`) }));
    expect([...new Set(namesOf(cage.objects))]).toEqual(['a/body', 'b/body']);
    const single = await read('one.zip', zipSync({ 'a.obj': text(`o body\n${boxObj([1, 1, 1])}`) }));
    expect([...new Set(namesOf(single.objects))]).toEqual(['body']);
  });

  it('say in which file and at which line a fault is', async () => {
    const error = await laterFailureOf(() => read('a.zip', zipSync({ 'x/good.obj': text(boxObj([1, 1, 1])), 'x/wrong.obj': text('v 0 0 0\nv 1 0 0\nf 1 2 7\n') })));
    expect(error).toMatchObject({ code: 'vertex_out_of_range', line: 3, column: 7 });
    expect(error.detail).toMatch(/^x\/wrong\.obj: expected/);
    expect(error.message).toMatch(/^x\/wrong\.obj: line 3, column 7/);
  });

  it('are refused where they unpack to more than their limits, before it is unpacked', async () => {
    const bomb = zipSync({ 'a.obj': new Uint8Array(100_000_000) });
    expect(bomb.length).toBeLessThan(100_000_000 / ARCHIVE_LIMITS.ratio);
    expect((await laterFailureOf(() => read('a.zip', bomb))).code).toBe('bomb');
  });
});

describe('skin weights beside an OBJ', () => {
  it('give each face the joint that its corners follow most, and parts by joint add up to the whole', async () => {
    const rows = [1, 2, 3, 4, 5, 6, 7, 8].flatMap((vertex) => (vertex > 4 ? [{ vertex, joint: 'knee, left', weight: 0.75 }, { vertex, joint: 'hip', weight: 0.25 }] : [{ vertex, joint: 'hip', weight: 1 }]));
    const cage = await read('leg.zip', zipSync({ 'leg.obj': text(boxObj([1, 1, 2])), 'leg.weights.csv': text(Papa.unparse(rows)) }));
    // Sides have two corners of each kind: hip 1 + 1 + 0.25 + 0.25, knee 1.5.
    expect(namesOf(cage.joints)).toEqual(['hip', 'knee, left', 'hip', 'hip', 'hip', 'hip']);
    const options = { scheme: 'catmull-clark', boundary: 'edge-and-corner', triangles: 'catmark', creasing: 'uniform' } as const;
    const volumes = (partsBy: 'joint' | 'whole') => measureCage(cage, { ...options, partsBy }).parts.map((part) => part.components.reduce((sum, one) => sum + one.solid.volume, 0));
    const parts = volumes('joint');
    expect(measureCage(cage, { ...options, partsBy: 'joint' }).parts.map((part) => part.name)).toEqual(['hip', 'knee, left']);
    expect(parts[0] + parts[1]).toBeCloseTo(volumes('whole')[0], 13);
  });

  it('are read as another CSV library writes them, quoted names included', () => {
    const rows = [{ weight: 0.5, joint: 'a "b", c', vertex: 2, note: 'x' }, { weight: 0.25, joint: 'plain', vertex: 1, note: '' }, { weight: 1e-3, joint: 'plain', vertex: 2, note: '' }];
    for (const newline of ['\r\n', '\n']) {
      const skin = readJointWeights(text(Papa.unparse(rows, { newline })), 3);
      expect(skin.names).toEqual(['a "b", c', 'plain']);
      expect([Array.from(skin.starts), Array.from(skin.joints), Array.from(skin.weights)]).toEqual([[0, 1, 3, 3], [1, 0, 1], [0.25, 0.5, 1e-3]]);
    }
    expect(weightsName('a/b/ox_v012.obj')).toBe('ox_v012.weights.csv');
  });

  it.each([
    ['vertex,weight\n1,1', 'bad_header', 1, 1],
    ['vertex,joint,weight\n1,hip,1\n0,hip,1', 'vertex_out_of_range', 3, 1],
    ['vertex,joint,weight\n1,,1', 'bad_name', 2, 3],
    ['vertex,joint,weight\n1,hip,x', 'bad_number', 2, 7],
    ['vertex,joint,weight\n1,hip', 'bad_number', 2, 3],
    ['vertex,joint,weight\n', 'empty_file', null, null],
  ])('%j is refused with its place', (source, code, line, column) => {
    expect(failureOf(() => readJointWeights(text(source), 2))).toMatchObject({ code, line, column });
  });
});

describe('how a file is read', () => {
  it('goes by the name, and by the bytes where the name says nothing', () => {
    expect(detectMeshKind('a/B.OBJ', text('# hi'))).toBe('obj');
    expect(detectMeshKind('a.usd', text('#usda 1.0'))).toBe('usda');
    expect(detectMeshKind('a.usd', text('PXR-USDC'))).toBe('usdc');
    expect(detectMeshKind('download', text('ply\nformat'))).toBe('ply');
    expect(detectMeshKind('a.stl', text('PK\u0003\u0004 in a header of eighty bytes'))).toBe('stl');
    expect(failureOf(() => detectMeshKind('a.fbx', text('Kaydara'))).detail).toContain(MESH_EXTENSIONS.map((one) => `.${one}`).join(', '));
    expect(failureOf(() => detectMeshKind('a.obj', text('PK\u0003\u0004')))).toMatchObject({ code: 'wrong_format', offset: 0 });
    expect(failureOf(() => detectMeshKind('a.obj', new Uint8Array(0))).code).toBe('empty_file');
  });

  it('closes the stream that it was given, whether it reads or refuses it', async () => {
    for (const [name, bytes] of [['a.obj', text(boxObj([1, 1, 1]))], ['a.zip', text('PK\u0003\u0004')], ['a.fbx', text('x'.repeat(1000))]] as const) {
      let open = true;
      const source = (async function* () {
        try {
          for (let at = 0; at < bytes.length; at += 10) yield bytes.slice(at, at + 10);
        } finally {
          open = false;
        }
      })();
      await readMesh(name, source).catch(() => null);
      expect(open).toBe(false);
    }
  });

  it('passes on what the stream itself fails with', async () => {
    const broken = (async function* () {
      yield text('v 0 0 0\n');
      throw new Error('disk gone');
    })();
    await expect(readMesh('a.obj', broken)).rejects.toThrow('disk gone');
  });
});
