import { BoxGeometry, Mesh, SphereGeometry } from 'three';
import { STLExporter } from 'three/examples/jsm/exporters/STLExporter.js';
import { STLLoader } from 'three/examples/jsm/loaders/STLLoader.js';
import { describe, expect, it } from 'vitest';
import { readStl } from '@/lib/formats/stl';
import { facesOf, failureOf, measureAs, measureAsIs, namesOf } from '../support/read-cages';

// The format: The StL format, fabbers.com (from memory).
const text = (value: string) => new TextEncoder().encode(value);

function exported(geometry: BoxGeometry | SphereGeometry, binary: boolean): Uint8Array {
  const mesh = new Mesh(geometry);
  if (!binary) return text(new STLExporter().parse(mesh));
  const view = new STLExporter().parse(mesh, { binary: true });
  return new Uint8Array(view.buffer, view.byteOffset, view.byteLength);
}

const TETRAHEDRON = [[[0, 0, 0], [0, 1, 0], [1, 0, 0]], [[0, 0, 0], [1, 0, 0], [0, 0, 1]], [[0, 0, 0], [0, 0, 1], [0, 1, 0]], [[1, 0, 0], [0, 1, 0], [0, 0, 1]]];
const facet = (corners: number[][]) => ['facet normal 0 0 0', 'outer loop', ...corners.map((corner) => `vertex ${corner.join(' ')}`), 'endloop', 'endfacet'];
const solid = (name: string, facets: number[][][]) => [`solid ${name}`, ...facets.flatMap(facet), `endsolid ${name}`];

describe('STL', () => {
  it.each([true, false])('welds what another library writes into one closed box (binary %s)', (binary) => {
    const cage = readStl(exported(new BoxGeometry(1.5, 2, 2.5), binary));
    expect([cage.positions.length / 3, cage.faceStarts.length - 1]).toEqual([8, 12]);
    const measured = measureAsIs(cage);
    expect(measured.volume).toBeCloseTo(7.5, 12);
    expect(measured.findings).toEqual([]);
    expect(cage.warnings.map((warning) => warning.code)).toEqual(['triangles_only']);
  });

  it('has the triangles that another reader finds, and Loop takes them', () => {
    const bytes = exported(new SphereGeometry(1, 16, 12), true);
    const cage = readStl(bytes);
    const other = new STLLoader().parse(bytes.slice().buffer).getAttribute('position');
    const collapsed = cage.warnings.find((warning) => warning.code === 'collapsed_triangles');
    expect(collapsed).toBeUndefined();
    expect(3 * facesOf(cage).length).toBe(other.count);
    facesOf(cage).flat().forEach((vertex, corner) => expect(cage.positions[3 * vertex]).toBe(other.getX(corner)));
    const loop = measureAs(cage, 'loop');
    expect(loop.volume).toBeGreaterThan(0.8 * measureAsIs(cage).volume);
    expect(loop.volume).toBeLessThan(measureAsIs(cage).volume);
  });

  it('reads a binary file whose header begins with "solid"', () => {
    const bytes = exported(new BoxGeometry(1, 1, 1), true);
    bytes.set(text('solid looks like text'));
    expect(readStl(bytes).faceStarts.length - 1).toBe(12);
  });

  it('takes solids for groups and objects, and gives lines', () => {
    const cage = readStl(text([...solid('left ear', TETRAHEDRON), ...solid('right', TETRAHEDRON.slice(0, 1).map((one) => one.map(([x, y, z]) => [x + 5, y, z])))].join('\n')));
    expect(namesOf(cage.groups)).toEqual(['left ear', 'left ear', 'left ear', 'left ear', 'right']);
    expect(namesOf(cage.objects)).toEqual(namesOf(cage.groups));
    expect(Array.from(cage.faceLines ?? []).slice(0, 2)).toEqual([3, 10]);
    // Four of the five triangles close a corner of the unit cube: 1/6.
    expect(measureAsIs(readStl(text(solid('', TETRAHEDRON).join('\r\n')))).volume).toBeCloseTo(1 / 6, 15);
  });

  it('welds −0 and 0, and leaves out triangles with two corners in one place, saying how many', () => {
    const cage = readStl(text(solid('a', [[[-0, 0, 0], [1, 0, 0], [0, 1, 0]], [[0, 0, 0], [0, 1, 0], [0, 0, 1]], [[0, 0, 0], [0, 0, 0], [0, 1, 0]]]).join('\n').replace('vertex 0 0 0', 'vertex -0.0 0 0')));
    expect([cage.positions.length / 3, cage.faceStarts.length - 1]).toEqual([4, 2]);
    expect(cage.warnings.at(-1)?.message).toContain('1 triangle ');
  });

  it.each([
    ['solid a\nfacet normal 0 0 1\nouter loop\nvertex 0 0 0\nvertex 1 0 0\nendloop', 'bad_loop', 6],
    ['solid a\nouter loop\nvertex 0 0 0\nvertex 1 0 0\nvertex 0 1 0\nvertex 1 1 0\nendloop', 'bad_loop', 6],
    ['solid a\nouter loop\nvertex 0 0 nan', 'not_finite', 3],
    ['solid a\nouter loop\nvertex 0 0 1e308', 'number_too_large', 3],
    ['solid a\nouter loop\nvertex 0 0', 'missing_coordinate', 3],
    ['solid a\nouter loop\nvertex 0 0 0', 'truncated', 3],
    ['solid a\nwobble', 'bad_keyword', 2],
    ['solid a\nouter loop\nouter loop', 'bad_keyword', 3],
  ])('says where %j is wrong', (source, code, line) => {
    const error = failureOf(() => readStl(text(source)));
    expect([error.code, error.line]).toEqual([code, line]);
  });

  it('refuses counts that are not the file’s, an empty solid and numbers that are none, with the byte', () => {
    const bytes = exported(new BoxGeometry(1, 1, 1), true);
    expect(failureOf(() => readStl(bytes.subarray(0, bytes.length - 1)))).toMatchObject({ code: 'bad_count', offset: 80 });
    const million = bytes.slice();
    new DataView(million.buffer).setUint32(80, 4_000_000_000, true);
    expect(failureOf(() => readStl(million))).toMatchObject({ code: 'bad_count', offset: 80 });
    const nan = bytes.slice();
    new DataView(nan.buffer).setFloat32(84 + 50 + 12 + 4, NaN, true);
    expect(failureOf(() => readStl(nan))).toMatchObject({ code: 'not_finite', offset: 84 + 50 + 12 });
    expect(failureOf(() => readStl(text('solid nothing\nendsolid nothing'))).code).toBe('no_faces');
    expect(failureOf(() => readStl(bytes.subarray(0, 40))).code).toBe('truncated');
  });
});
