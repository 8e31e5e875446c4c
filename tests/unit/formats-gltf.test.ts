import { Document, NodeIO } from '@gltf-transform/core';
import { BoxGeometry } from 'three';
import { describe, expect, it } from 'vitest';
import { NOTHING_BESIDE } from '@/lib/formats/beside';
import { readGltf } from '@/lib/formats/gltf';
import { laterFailureOf, measureAsIs, namesOf } from '../support/read-cages';

// The format: Khronos Group, glTF 2.0 Specification (sections from memory). The files are written by @gltf-transform/core.
const read = (bytes: Uint8Array) => readGltf(bytes, NOTHING_BESIDE);
const text = (value: unknown) => new TextEncoder().encode(JSON.stringify(value));

interface Corner {
  joints: number[];
  weights: number[];
}

/** A box of three's, with the vertices repeated on each side, as primitive of a document. */
function boxPrimitive(document: Document, [a, b, c]: number[], skin: ((x: number) => Corner) | null = null, cuts = 1) {
  const buffer = document.getRoot().listBuffers()[0] ?? document.createBuffer();
  const geometry = new BoxGeometry(a, b, c, cuts, cuts, cuts);
  const positions = new Float32Array(geometry.getAttribute('position').array);
  const primitive = document.createPrimitive()
    .setAttribute('POSITION', document.createAccessor().setType('VEC3').setArray(positions).setBuffer(buffer))
    .setAttribute('NORMAL', document.createAccessor().setType('VEC3').setArray(new Float32Array(geometry.getAttribute('normal').array)).setBuffer(buffer))
    .setIndices(document.createAccessor().setType('SCALAR').setArray(new Uint16Array(geometry.index!.array)).setBuffer(buffer));
  if (skin) {
    const corners = Array.from({ length: positions.length / 3 }, (_, v) => skin(positions[3 * v]));
    primitive.setAttribute('JOINTS_0', document.createAccessor().setType('VEC4').setArray(new Uint8Array(corners.flatMap((corner) => corner.joints))).setBuffer(buffer));
    primitive.setAttribute('WEIGHTS_0', document.createAccessor().setType('VEC4').setArray(new Float32Array(corners.flatMap((corner) => corner.weights))).setBuffer(buffer));
  }
  return primitive;
}

function glb(document: Document): Promise<Uint8Array> {
  return new NodeIO().writeBinary(document);
}

/** The JSON and the binary chunk of a GLB put together again with a changed document. */
async function changed(document: Document, change: (json: Record<string, never[]>) => void): Promise<Uint8Array> {
  const bytes = await glb(document);
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const jsonLength = view.getUint32(12, true);
  const json = JSON.parse(new TextDecoder().decode(bytes.subarray(20, 20 + jsonLength)));
  change(json);
  const body = text(json);
  const padded = new Uint8Array(Math.ceil(body.length / 4) * 4).fill(0x20);
  padded.set(body);
  const rest = bytes.subarray(20 + jsonLength);
  const out = new Uint8Array(20 + padded.length + rest.length);
  out.set(bytes.subarray(0, 12));
  const header = new DataView(out.buffer);
  header.setUint32(8, out.length, true);
  header.setUint32(12, padded.length, true);
  header.setUint32(16, 0x4e4f534a, true);
  out.set(padded, 20);
  out.set(rest, 20 + padded.length);
  return out;
}

function oneBox(): Document {
  const document = new Document();
  const mesh = document.createMesh('box').addPrimitive(boxPrimitive(document, [1, 2, 3]));
  document.createScene().addChild(document.createNode('crate').setMesh(mesh));
  return document;
}

describe('glTF', () => {
  it('welds a box into a closed one, in metres and Y up, and says that triangles are all there is', async () => {
    const cage = await read(await glb(oneBox()));
    expect([cage.positions.length / 3, cage.faceStarts.length - 1]).toEqual([8, 12]);
    expect(measureAsIs(cage)).toMatchObject({ volume: expect.closeTo(6, 12), findings: [] });
    expect([cage.metresPerUnit, cage.upAxis]).toEqual([1, 'y']);
    expect(cage.warnings.map((warning) => warning.code)).toEqual(['triangles_only']);
  });

  it('places every mesh by its nodes, mirrored ones the right way out, and names objects and materials', async () => {
    const document = oneBox();
    const [scene] = document.getRoot().listScenes();
    const [mesh] = document.getRoot().listMeshes();
    mesh.listPrimitives()[0].setMaterial(document.createMaterial('oak'));
    const inner = document.createNode('twin').setMesh(mesh).setScale([-2, 1, 1]).setTranslation([5, 0, 0]);
    scene.addChild(document.createNode('holder').setRotation([0, 0, Math.SQRT1_2, Math.SQRT1_2]).setScale([1, 1, 3]).addChild(inner));
    const cage = await read(await glb(document));
    expect([...new Set(namesOf(cage.objects))]).toEqual(['crate', 'twin']);
    expect([...new Set(namesOf(cage.materials))]).toEqual(['oak']);
    // 1·2·3 and the same scaled by 2 · 3.
    expect(measureAsIs(cage)).toMatchObject({ volume: expect.closeTo(6 + 36, 12), components: 2 });
    // A quarter turn about z takes (5, 0, 0) to (0, 5, 0).
    const ys = Array.from(cage.positions.subarray(24)).filter((_, i) => i % 3 === 1);
    expect((Math.min(...ys) + Math.max(...ys)) / 2).toBeCloseTo(5, 6);
  });

  it('joins the primitives of one mesh into one surface', async () => {
    const document = new Document();
    const buffer = document.createBuffer();
    const geometry = new BoxGeometry(1, 1, 1);
    const position = document.createAccessor().setType('VEC3').setArray(new Float32Array(geometry.getAttribute('position').array)).setBuffer(buffer);
    const index = Array.from(geometry.index!.array);
    const mesh = document.createMesh('two-tone');
    for (const [name, part] of [['red', index.slice(0, 18)], ['blue', index.slice(18)]] as const) {
      mesh.addPrimitive(document.createPrimitive().setAttribute('POSITION', position).setIndices(document.createAccessor().setType('SCALAR').setArray(new Uint16Array(part)).setBuffer(buffer)).setMaterial(document.createMaterial(name)));
    }
    document.createScene().addChild(document.createNode().setMesh(mesh));
    const cage = await read(await glb(document));
    expect(cage.positions.length / 3).toBe(8);
    expect(measureAsIs(cage)).toMatchObject({ volume: expect.closeTo(1, 12), components: 1, findings: [] });
    expect(namesOf(cage.materials).filter((name) => name === 'blue')).toHaveLength(6);
  });

  it('labels faces by the joint that they follow most, and moves skinned points by their joints, not by their node', async () => {
    const document = new Document();
    const primitive = boxPrimitive(document, [2, 1, 1], (x) => ({ joints: [0, 1, 0, 0], weights: x < 0 ? [0.9, 0.1, 0, 0] : [0.2, 0.8, 0, 0] }));
    const [buffer] = document.getRoot().listBuffers();
    const matrix = (x: number) => [1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0, -x, 0, 0, 1];
    const [hip, knee] = [document.createNode('hip'), document.createNode('knee').setTranslation([1, 0, 0])];
    hip.addChild(knee);
    const skin = document.createSkin().addJoint(hip).addJoint(knee).setInverseBindMatrices(document.createAccessor().setType('MAT4').setArray(new Float32Array([...matrix(0), ...matrix(1)])).setBuffer(buffer));
    const node = document.createNode('leg').setMesh(document.createMesh().addPrimitive(primitive)).setSkin(skin).setTranslation([100, 0, 0]);
    document.createScene().addChild(hip).addChild(node);
    const cage = await read(await glb(document));
    const names = namesOf(cage.joints);
    cage.faceStarts.subarray(0, -1).forEach((start, face) => {
      const xs = [0, 1, 2].map((k) => cage.positions[3 * cage.faceVertices[start + k]]);
      if (xs.every((x) => x > 0)) expect(names[face]).toBe('knee');
      if (xs.every((x) => x < 0)) expect(names[face]).toBe('hip');
    });
    expect(new Set(names)).toEqual(new Set(['hip', 'knee']));
    expect(Math.max(...cage.positions)).toBe(1);
    // Both joints moved by the same: the box goes along, unrounded.
    hip.setTranslation([0, 4, 0]);
    const moved = await read(await glb(document));
    expect(Math.max(...Array.from(moved.positions).filter((_, i) => i % 3 === 1))).toBe(4.5);
    expect(moved.warnings.map((warning) => warning.code)).toEqual(['triangles_only']);
    // One joint moved against the other: said.
    knee.setTranslation([2, 0, 0]);
    const posed = await read(await glb(document));
    expect(posed.warnings.map((warning) => warning.code)).toContain('posed_skin');
    // x' = x + 0.8 · 1 at the far side.
    expect(Math.max(...Array.from(posed.positions).filter((_, i) => i % 3 === 0))).toBeCloseTo(1.8, 6);
  });

  it('reads the text form with buffers inside or beside it, and nothing from elsewhere', async () => {
    const { json, resources } = await new NodeIO().writeJSON(oneBox(), { basename: 'box' });
    const bin = Object.values(resources)[0];
    const beside = await readGltf(text(json), (path) => Promise.resolve(path === 'box.bin' ? bin : null));
    expect(measureAsIs(beside).volume).toBeCloseTo(6, 12);
    const inside = { ...json, buffers: [{ byteLength: bin.length, uri: `data:application/octet-stream;base64,${Buffer.from(bin).toString('base64')}` }] };
    expect(measureAsIs(await read(text(inside))).volume).toBeCloseTo(6, 12);
    for (const uri of ['box.bin', 'https://example.com/box.bin', 'file:///etc/passwd', '/etc/passwd']) {
      expect((await laterFailureOf(() => readGltf(text({ ...json, buffers: [{ byteLength: bin.length, uri }] }), NOTHING_BESIDE))).code).toBe('missing_buffer');
    }
  });

  it.each<[string, (json: never) => void, string, RegExp]>([
    ['nodes in a circle', (json: { nodes: object[] }) => json.nodes.push({ children: [2] }, { children: [1] }), 'bad_gltf', /nodes\.\d.*circle/],
    ['a node under two parents', (json: { nodes: object[] }) => json.nodes.push({ children: [0] }, { children: [0] }), 'bad_gltf', /one parent/],
    ['a billion vertices', (json: { accessors: { count: number }[] }) => (json.accessors[0].count = 1e9), 'bad_gltf', /accessors\.0/],
    ['a billion vertices without bytes', (json: { accessors: object[] }) => (json.accessors[0] = { componentType: 5126, type: 'VEC3', count: 1e9 }), 'too_large', /accessors\.0/],
    ['a mesh that is not there', (json: { nodes: object[] }) => (json.nodes[0] = { mesh: 7 }), 'bad_gltf', /nodes\.0\.mesh.*7/],
    ['an infinite place', (json: { nodes: object[] }) => (json.nodes[0] = { mesh: 0, translation: [1e308, 0, 0] }), 'number_too_large', /1e\+308/],
    ['compressed corners', (json: { extensionsRequired: string[] }) => (json.extensionsRequired = ['KHR_draco_mesh_compression']), 'compressed', /without compression/],
    ['no version', (json: { asset: object }) => (json.asset = {}), 'bad_gltf', /asset\.version/],
    ['a view beyond the buffer', (json: { bufferViews: { byteLength: number }[] }) => (json.bufferViews[0].byteLength = 1e9), 'bad_gltf', /bufferViews\.0/],
  ] as [string, (json: never) => void, string, RegExp][])('refuses %s by name of the place', async (_, change, code, message) => {
    const error = await laterFailureOf(async () => read(await changed(oneBox(), change as never)));
    expect(error.code).toBe(code);
    expect(error.detail).toMatch(message);
  });

  it('refuses a chain of nodes too deep, a mesh placed too often, and an index beyond the vertices', async () => {
    const deep = await changed(oneBox(), (json: Record<string, object[]>) => {
      for (let i = 0; i < 2000; i++) json.nodes.push(i < 1999 ? { children: [i + 2] } : {});
    });
    expect((await laterFailureOf(() => read(deep))).code).toBe('too_deep');
    const dense = new Document();
    dense.createScene().addChild(dense.createNode().setMesh(dense.createMesh().addPrimitive(boxPrimitive(dense, [1, 1, 1], null, 50))));
    const often = await changed(dense, (json: Record<string, object[]>) => {
      for (let i = 0; i < 1_100; i++) json.nodes.push({ mesh: 0 });
      delete (json as { scenes?: unknown }).scenes;
      delete (json as { scene?: unknown }).scene;
    });
    expect((await laterFailureOf(() => read(often))).code).toBe('too_many_faces');
    const document = oneBox();
    document.getRoot().listMeshes()[0].listPrimitives()[0].getIndices()!.setScalar(4, 24);
    expect(await laterFailureOf(async () => read(await glb(document)))).toMatchObject({ code: 'vertex_out_of_range', found: '24' });
  });

  it('gives the byte where a GLB’s frame breaks', async () => {
    const bytes = await glb(oneBox());
    expect(await laterFailureOf(() => read(bytes.subarray(0, bytes.length - 4)))).toMatchObject({ code: 'truncated', offset: 8 });
    expect((await laterFailureOf(() => read(bytes.subarray(0, 10)))).code).toBe('truncated');
    const other = bytes.slice();
    other[4] = 1;
    expect(await laterFailureOf(() => read(other))).toMatchObject({ code: 'bad_gltf', offset: 4 });
  });
});
