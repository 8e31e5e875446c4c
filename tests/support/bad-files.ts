import { zipSync, type ZippableFile } from 'three/examples/jsm/libs/fflate.module.js';
import { joinBytes } from '@/lib/formats/join-bytes';
import { packBlock, packIntegers, writeCrate } from './write-crate';

/** A file that must end in a sentence, never in a crash, a hang or a number. */
export interface BadFile {
  /** What is wrong with it. */
  fault: string;
  name: string;
  bytes: Uint8Array;
}

const TRIANGLES = [[[0, 0, 0], [0, 1, 0], [1, 0, 0]], [[0, 0, 0], [1, 0, 0], [0, 0, 1]], [[0, 0, 0], [0, 0, 1], [0, 1, 0]], [[1, 0, 0], [0, 1, 0], [0, 0, 1]]];
const text = (value: string) => new TextEncoder().encode(value);
const latin1 = (value: string) => Uint8Array.from(value, (c) => c.charCodeAt(0) & 255);

/** A closed tetrahedron in each format: the mould that faults are cast in. */
export const GOOD: { name: string; bytes: Uint8Array }[] = [
  { name: 'a.obj', bytes: text('o tet\nv 0 0 0\nv 1 0 0\nv 0 1 0\nv 0 0 1\nf 1 3 2\nf 1 2 4\nf 1 4 3\nf 2 3 4\nt crease 2/1/0 0 1 2.5\n') },
  { name: 'a.ply', bytes: text(plyText()) },
  { name: 'b.ply', bytes: plyBinary(true) },
  { name: 'c.ply', bytes: plyBinary(false) },
  { name: 'a.stl', bytes: text(stlText()) },
  { name: 'b.stl', bytes: stlBinary() },
  { name: 'a.gltf', bytes: text(JSON.stringify(gltf())) },
  { name: 'a.glb', bytes: glb(gltf(false)) },
  { name: 'a.usda', bytes: text(usda()) },
  { name: 'a.usdc', bytes: crate() },
  { name: 'a.zip', bytes: zip({ 'a.obj': text('v 0 0 0\nv 1 0 0\nv 0 1 0\nv 0 0 1\nf 1 3 2\nf 1 2 4\nf 1 4 3\nf 2 3 4\n'), 'a.weights.csv': text('vertex,joint,weight\n1,hip,1\n2,knee,1\n') }) },
  { name: 'a.usdz', bytes: zip({ 'a.usdc': [crate(), { level: 0 }] }) },
];

function plyText(): string {
  return 'ply\nformat ascii 1.0\nelement vertex 4\nproperty float x\nproperty float y\nproperty float z\nelement face 4\nproperty list uchar int vertex_indices\nend_header\n0 0 0\n1 0 0\n0 1 0\n0 0 1\n3 0 2 1\n3 0 1 3\n3 0 3 2\n3 1 2 3\n';
}

function plyBinary(little: boolean): Uint8Array {
  const header = text(plyText().split('0 0 0\n')[0].replace('ascii', little ? 'binary_little_endian' : 'binary_big_endian'));
  const body = new DataView(new ArrayBuffer(48 + 4 * 13));
  [0, 0, 0, 1, 0, 0, 0, 1, 0, 0, 0, 1].forEach((value, i) => body.setFloat32(4 * i, value, little));
  [[0, 2, 1], [0, 1, 3], [0, 3, 2], [1, 2, 3]].forEach((face, f) => {
    body.setUint8(48 + 13 * f, 3);
    face.forEach((vertex, k) => body.setInt32(49 + 13 * f + 4 * k, vertex, little));
  });
  return join(header, new Uint8Array(body.buffer));
}


function stlText(): string {
  return `solid tet\n${TRIANGLES.map((corners) => `facet normal 0 0 0\nouter loop\n${corners.map((corner) => `vertex ${corner.join(' ')}\n`).join('')}endloop\nendfacet\n`).join('')}endsolid tet\n`;
}

function stlBinary(): Uint8Array {
  const view = new DataView(new ArrayBuffer(84 + 50 * 4));
  view.setUint32(80, 4, true);
  TRIANGLES.forEach((corners, t) => corners.flat().forEach((value, k) => view.setFloat32(84 + 50 * t + 12 + 4 * k, value, true)));
  return new Uint8Array(view.buffer);
}

function gltfBuffer(): Uint8Array {
  const view = new DataView(new ArrayBuffer(48 + 24));
  [0, 0, 0, 1, 0, 0, 0, 1, 0, 0, 0, 1].forEach((value, i) => view.setFloat32(4 * i, value, true));
  [0, 2, 1, 0, 1, 3, 0, 3, 2, 1, 2, 3].forEach((value, i) => view.setUint16(48 + 2 * i, value, true));
  return new Uint8Array(view.buffer);
}

function gltf(inside = true) {
  return {
    asset: { version: '2.0' },
    scene: 0,
    scenes: [{ nodes: [0] }],
    nodes: [{ mesh: 0, name: 'tet' }],
    meshes: [{ primitives: [{ attributes: { POSITION: 0 }, indices: 1 }] }],
    accessors: [{ bufferView: 0, componentType: 5126, count: 4, type: 'VEC3' }, { bufferView: 1, componentType: 5123, count: 12, type: 'SCALAR' }],
    bufferViews: [{ buffer: 0, byteOffset: 0, byteLength: 48 }, { buffer: 0, byteOffset: 48, byteLength: 24 }],
    buffers: [{ byteLength: 72, ...(inside ? { uri: `data:application/octet-stream;base64,${Buffer.from(gltfBuffer()).toString('base64')}` } : {}) }],
  };
}

function glb(document: object, buffer = gltfBuffer()): Uint8Array {
  const json = text(JSON.stringify(document));
  const padded = new Uint8Array(Math.ceil(json.length / 4) * 4).fill(0x20);
  padded.set(json);
  const words = (...values: number[]) => new Uint8Array(Uint32Array.from(values).buffer);
  return join(words(0x46546c67, 2, 12 + 8 + padded.length + 8 + buffer.length, padded.length, 0x4e4f534a), padded, words(buffer.length, 0x004e4942), buffer);
}

function usda(): string {
  return '#usda 1.0\n(\n    metersPerUnit = 0.01\n    upAxis = "Y"\n)\n\ndef Xform "geo"\n{\n    double3 xformOp:translate = (1, 2, 3)\n    uniform token[] xformOpOrder = ["xformOp:translate"]\n    def Mesh "tet"\n    {\n        point3f[] points = [(0, 0, 0), (1, 0, 0), (0, 1, 0), (0, 0, 1)]\n        int[] faceVertexCounts = [3, 3, 3, 3]\n        int[] faceVertexIndices = [0, 2, 1, 0, 1, 3, 0, 3, 2, 1, 2, 3]\n        uniform token subdivisionScheme = "loop"\n        int[] creaseIndices = [0, 1]\n        int[] creaseLengths = [2]\n        float[] creaseSharpnesses = [3]\n    }\n}\n';
}

function crate(): Uint8Array {
  return writeCrate({ metersPerUnit: 1, upAxis: 'Y', prims: [{ name: 'tet', type: 'Mesh', attributes: { points: { points: [0, 0, 0, 1, 0, 0, 0, 1, 0, 0, 0, 1] }, faceVertexCounts: { ints: [3, 3, 3, 3] }, faceVertexIndices: { ints: [0, 2, 1, 0, 1, 3, 0, 3, 2, 1, 2, 3] }, subdivisionScheme: { token: 'loop' } } }] });
}

/** Sections of a crate with one of them rewritten; its bytes go to the end, and the table points there. */
function crateWith(section: string, content: Uint8Array): Uint8Array {
  const good = crate();
  const view = new DataView(good.buffer);
  const toc = view.getUint32(16, true);
  const bytes = join(good, content);
  const out = new DataView(bytes.buffer);
  for (let i = 0; i < view.getUint32(toc, true); i++) {
    const at = toc + 8 + 32 * i;
    if (new TextDecoder().decode(good.subarray(at, at + section.length)) !== section) continue;
    out.setUint32(at + 16, good.length, true);
    out.setUint32(at + 24, content.length, true);
  }
  return bytes;
}

const u64 = (value: number) => new Uint8Array(Uint32Array.of(value % 2 ** 32, Math.floor(value / 2 ** 32)).buffer);
const sized = (block: Uint8Array) => join(u64(block.length), block);

function join(...pieces: Uint8Array[]): Uint8Array {
  return joinBytes(pieces);
}

function zip(files: Record<string, ZippableFile>): Uint8Array {
  return zipSync(files);
}

/** A ZIP whose central directory was changed after it was written. */
function zipWith(files: Record<string, ZippableFile>, change: (view: DataView, directory: number) => void): Uint8Array {
  const bytes = zip(files);
  const view = new DataView(bytes.buffer);
  change(view, view.getUint32(bytes.length - 22 + 16, true));
  return bytes;
}

const replaced = (name: string, fault: string, from: string | RegExp, to: string): BadFile => {
  const good = new TextDecoder('latin1').decode(GOOD.find((one) => one.name === name)!.bytes);
  const bad = good.replace(from, () => to);
  if (bad === good) throw new Error(`"${fault}" changes nothing`);
  return { fault, name, bytes: latin1(bad) };
};

const good = (name: string) => GOOD.find((one) => one.name === name)!.bytes;

/** Every good file cut off at eight places, the last byte included where that matters. */
function* truncated(): Generator<BadFile> {
  for (const { name, bytes } of GOOD) {
    // A text may be cut where it is still whole: only where its grammar needs what follows.
    const shares = /\.(obj|csv)$/.test(name) ? [0, 0.1, 0.3, 0.45, 0.55] : [0, 0.1, 0.25, 0.4, 0.55, 0.7, 0.85, 0.95];
    for (const share of shares) yield { fault: `cut off at ${100 * share} %`, name, bytes: bytes.slice(0, Math.floor(share * bytes.length)) };
  }
}

/** Every good file under every other name, and noise under each. */
function* misnamed(): Generator<BadFile> {
  for (const { name, bytes } of GOOD) {
    const kind = name.slice(2);
    for (const other of ['obj', 'ply', 'glb', 'usda', 'zip']) if (other !== kind && !(kind === 'usdc' && other === 'usda') && !(kind === 'usdz' && other === 'zip') && !(kind === 'gltf' && other === 'glb')) yield { fault: `${kind} under the name of ${other}`, name: `a.${other}`, bytes };
    yield { fault: 'nothing but zeros', name, bytes: new Uint8Array(300) };
    yield { fault: 'noise', name, bytes: Uint8Array.from({ length: 500 }, (_, i) => (Math.imul(i + 7, 2654435761) >>> 13) & 255) };
  }
}

function* faults(): Generator<BadFile> {
  yield replaced('a.obj', 'not a number', 'v 1 0 0', 'v 1 nan 0');
  yield replaced('a.obj', 'a number beyond a double', 'v 1 0 0', 'v 1e999 0 0');
  yield replaced('a.obj', '1e308', 'v 1 0 0', 'v 1e308 0 0');
  yield replaced('a.obj', 'an index out of range', 'f 2 3 4', 'f 2 3 5');
  yield replaced('a.obj', 'index zero', 'f 2 3 4', 'f 0 3 4');
  yield replaced('a.obj', 'a negative index too far', 'f 2 3 4', 'f -5 3 4');
  yield replaced('a.obj', 'a huge index', 'f 2 3 4', 'f 2 3 99999999999999999999');
  yield replaced('a.obj', 'a decimal index', 'f 2 3 4', 'f 2 3 4.5');
  yield replaced('a.obj', 'two corners', 'f 2 3 4', 'f 2 3');
  yield replaced('a.obj', 'control characters', 'o tet', 'o t\u0000e\u0001t');
  yield replaced('a.obj', 'a name of 64 kB', 'o tet', `o ${'x'.repeat(65_536)}`);
  yield replaced('a.obj', 'a line of 5 MB', 'o tet', `# ${'x'.repeat(5_000_000)}`);
  yield replaced('a.obj', 'a crease without end', 't crease 2/1/0 0 1 2.5', 't crease 2/1/0 0 1');
  yield replaced('a.obj', 'a crease of a million', 't crease 2/1/0 0 1 2.5', 't crease 1000000/1/0 0 1 2.5');
  yield replaced('a.obj', 'a negative sharpness', '2.5', '-1');
  yield replaced('a.obj', 'decimal commas', 'v 1 0 0', 'v 1,5 0 0');
  yield { fault: 'UTF-16 cut in the middle of a face', name: 'a.obj', bytes: join(Uint8Array.of(0xff, 0xfe), ...Array.from('v 0 0 0\nv 1 0 0\nf 1 2', (c) => Uint8Array.of(c.charCodeAt(0), 0))) };
  for (const name of ['a.ply', 'b.ply', 'c.ply']) {
    yield replaced(name, 'a billion vertices', 'element vertex 4', 'element vertex 1000000000');
    yield replaced(name, 'a billion faces', 'element face 4', 'element face 1000000000');
    yield replaced(name, 'a count beyond integers', 'element face 4', 'element face 99999999999999999999999');
    yield replaced(name, 'a negative count', 'element face 4', 'element face -4');
    yield replaced(name, 'more vertices than faces leave', 'element vertex 4', 'element vertex 5');
    yield replaced(name, 'an unknown type', 'property float x', 'property complex x');
    yield replaced(name, 'no x', 'property float x', 'property float u');
    yield replaced(name, 'no corners', 'vertex_indices', 'colours');
    yield replaced(name, 'a decimal length of lists', 'list uchar', 'list float');
    yield replaced(name, 'a format that is none', /format \S+/, 'format binary_middle_endian');
    yield replaced(name, 'a property before any element', 'element vertex 4\n', '');
    yield replaced(name, 'a thousand elements', 'element vertex 4\n', `${'element camera 1\nproperty float focal\n'.repeat(1000)}element vertex 4\n`);
  }
  yield replaced('a.ply', 'not a number', '1 0 0', '1 nan 0');
  yield replaced('a.ply', '1e308', '1 0 0', '1e308 0 0');
  yield replaced('a.ply', 'an index out of range', '3 1 2 3', '3 1 2 4');
  yield replaced('a.ply', 'a list of a billion', '3 1 2 3', '1000000000 1 2 3');
  yield replaced('b.ply', 'a corner count of 255', '\u0003\u0001\u0000\u0000\u0000', '\u00ff\u0001\u0000\u0000\u0000');
  yield replaced('a.stl', 'not a number', 'vertex 1 0 0', 'vertex 1 inf 0');
  yield replaced('a.stl', '1e308', 'vertex 1 0 0', 'vertex 1e308 0 0');
  yield replaced('a.stl', 'two vertices', 'vertex 1 0 0\n', '');
  yield replaced('a.stl', 'a vertex outside a loop', 'outer loop\n', '');
  yield replaced('a.stl', 'a name of 64 kB', 'solid tet', `solid ${'x'.repeat(65_536)}`);
  for (const count of [0, 3, 5, 1e9, 4294967295]) {
    const bytes = good('b.stl').slice();
    new DataView(bytes.buffer).setUint32(80, count, true);
    yield { fault: `${count} triangles declared`, name: 'b.stl', bytes };
  }
  yield* binaryFaults();
  yield* gltfFaults();
  yield* usdFaults();
  yield* zipFaults();
}

/** Numbers that are none and corners that are not there, in the forms that hold them as bytes. */
function* binaryFaults(): Generator<BadFile> {
  const changed = (name: string, fault: string, change: (view: DataView) => void): BadFile => {
    const bytes = good(name).slice();
    change(new DataView(bytes.buffer));
    return { fault, name, bytes };
  };
  for (const name of ['b.ply', 'c.ply']) {
    const little = name === 'b.ply';
    const body = good(name).length - 100;
    for (const [fault, value] of [['NaN', NaN], ['infinity', Infinity]] as const) yield changed(name, `${fault} as bytes`, (view) => view.setFloat32(body + 16, value, little));
    for (const [fault, value] of [['one corner too far', 4], ['a negative corner', -1], ['a corner at two billion', 2_000_000_000]] as const) yield changed(name, fault, (view) => view.setInt32(body + 49, value, little));
  }
  for (const [fault, value] of [['NaN', NaN], ['infinity', -Infinity]] as const) yield changed('b.stl', `${fault} as bytes`, (view) => view.setFloat32(84 + 12, value, true));
  for (const [fault, at, write] of [
    ['NaN as bytes', 4, (view: DataView, offset: number) => view.setFloat32(offset, NaN, true)],
    ['a corner too far as bytes', 48, (view: DataView, offset: number) => view.setUint16(offset, 4, true)],
  ] as const) {
    const buffer = gltfBuffer();
    write(new DataView(buffer.buffer), at);
    yield { fault, name: 'a.glb', bytes: glb(gltf(false), buffer) };
  }
  yield replaced('a.obj', 'two encodings in one line', 'v 1 0 0', 'v 1\u0000 \u00000\u0000 \u00000\u0000');
}

function* gltfFaults(): Generator<BadFile> {
  type Json = ReturnType<typeof gltf> & Record<string, unknown>;
  const changed = (fault: string, change: (json: Json) => unknown): BadFile => {
    const json = gltf(false) as Json;
    change(json);
    return { fault, name: 'a.glb', bytes: glb(json) };
  };
  yield changed('a billion vertices', (json) => (json.accessors[0].count = 1e9));
  yield changed('a count that is no whole number', (json) => (json.accessors[0].count = 3.5));
  yield changed('a negative count', (json) => (json.accessors[0].count = -4));
  yield changed('a view beyond the buffer', (json) => (json.bufferViews[0].byteLength = 1e12));
  yield changed('a buffer longer than its bytes', (json) => (json.buffers[0].byteLength = 1e12));
  yield changed('a view of no buffer', (json) => (json.bufferViews[0].buffer = 3));
  yield changed('an accessor of no view', (json) => (json.accessors[0].bufferView = 9));
  yield changed('an accessor type that is none', (json) => (json.accessors[0].type = 'VEC9'));
  yield changed('a component type that is none', (json) => (json.accessors[0].componentType = 1));
  yield changed('a mesh that is not there', (json) => (json.nodes[0].mesh = 5));
  yield changed('a node in itself', (json) => Object.assign(json.nodes[0], { children: [0] }));
  yield changed('nodes in a circle', (json) => json.nodes.push({ children: [2] } as never, { children: [1] } as never));
  yield changed('a skin on joints that are not there', (json) => Object.assign(json, { skins: [{ joints: [7] }] }));
  yield changed('a scene of nodes that are not there', (json) => (json.scenes[0].nodes = [4]));
  yield changed('no meshes', (json) => Object.assign(json, { meshes: [], nodes: [{}] }));
  yield changed('nothing at all', (json) => Object.keys(json).forEach((key) => delete (json as Record<string, unknown>)[key]));
  yield changed('version 1', (json) => (json.asset.version = '1.0'));
  yield changed('a scale of 1e308', (json) => Object.assign(json.nodes[0], { scale: [1e308, 1e308, 1e308] }));
  yield changed('a name of 64 kB', (json) => (json.nodes[0].name = 'x'.repeat(65_536)));
  yield changed('meshopt', (json) => Object.assign(json, { extensionsRequired: ['EXT_meshopt_compression'] }));
  yield changed('sparse beyond the vertices', (json) => Object.assign(json.accessors[0], { sparse: { count: 1e9, indices: { bufferView: 1, componentType: 5123 }, values: { bufferView: 0 } } }));
  yield { fault: 'JSON that nests without end', name: 'a.gltf', bytes: text(`{"a":${'['.repeat(200_000)}`) };
  yield { fault: 'an external buffer', name: 'a.gltf', bytes: text(JSON.stringify({ ...gltf(), buffers: [{ byteLength: 72, uri: '../../secret.bin' }] })) };
  yield { fault: 'a buffer from the network', name: 'a.gltf', bytes: text(JSON.stringify({ ...gltf(), buffers: [{ byteLength: 72, uri: 'http://127.0.0.1/x.bin' }] })) };
}

function* usdFaults(): Generator<BadFile> {
  yield replaced('a.usda', 'counts that do not add up', '[3, 3, 3, 3]', '[3, 3, 3, 4]');
  yield replaced('a.usda', 'a face of a billion', '[3, 3, 3, 3]', '[3, 3, 3, 1000000000]');
  yield replaced('a.usda', 'a negative index', '0, 2, 1,', '0, 2, -1,');
  yield replaced('a.usda', 'an index out of range', '0, 2, 1,', '0, 2, 4,');
  yield replaced('a.usda', 'a decimal index', '0, 2, 1,', '0, 2, 1.5,');
  yield replaced('a.usda', 'infinite points', '(1, 0, 0)', '(inf, 0, 0)');
  yield replaced('a.usda', 'uneven tuples', '(1, 0, 0)', '(1, 0)');
  yield replaced('a.usda', 'an open list', '(0, 0, 1)]', '(0, 0, 1)');
  yield replaced('a.usda', 'a crease out of range', 'creaseIndices = [0, 1]', 'creaseIndices = [0, 9]');
  yield replaced('a.usda', 'a sharpness that is none', '= [3]\n', '= [nan]\n');
  yield replaced('a.usda', 'an infinite scale', '(1, 2, 3)', '(inf, 2, 3)');
  yield replaced('a.usda', 'prims without end', 'def Xform "geo"', `${'def "a" { '.repeat(50_000)}`);
  yield replaced('a.usda', 'brackets without end', 'point3f[] points = ', `point3f[] points = ${'('.repeat(100_000)}`);
  yield replaced('a.usda', 'a string without end', 'def Xform "geo"', 'def Xform "geo');
  yield replaced('a.usda', 'a unit below zero', '0.01', '-1');
  yield replaced('a.usda', 'control characters', 'def Xform', 'd\u0007ef Xform');
  yield { fault: 'references that multiply', name: 'a.usda', bytes: text(`#usda 1.0\n${Array.from({ length: 9 }, (_, level) => `def "l${level}" {\n${Array.from({ length: 12 }, (_, i) => `def "c${i}" ( references = </l${level + 1}> ) { }\n`).join('')}}\n`).join('')}def "l9" { def Mesh "m" { point3f[] points = [(0, 0, 0), (1, 0, 0), (0, 1, 0)]\n int[] faceVertexCounts = [3]\n int[] faceVertexIndices = [0, 1, 2] } }\n`) };
  yield { fault: 'references in a circle', name: 'a.usda', bytes: text('#usda 1.0\ndef "a" ( references = </b> ) { }\ndef "b" ( references = </a> ) { }\n') };
  yield { fault: 'a reference out of the archive', name: 'a.usda', bytes: text('#usda 1.0\ndef "a" ( references = @../../etc/passwd.usda@</b> ) { }\n') };
  yield { fault: 'only another layer', name: 'a.usda', bytes: text('#usda 1.0\n(\n subLayers = [ @/etc/passwd@ ]\n)\n') };
  const at = (offset: number, value: number, fault: string): BadFile => {
    const bytes = crate();
    new DataView(bytes.buffer).setUint32(offset, value, true);
    return { fault, name: 'a.usdc', bytes };
  };
  yield at(8, 0x0300, 'a crate of version 0.3');
  yield at(16, 0xffffffff, 'a table of contents beyond the end');
  yield at(20, 0xffffffff, 'a table of contents at 2⁶⁴');
  yield at(new DataView(crate().buffer).getUint32(16, true), 0xffffffff, 'four billion sections');
  const ints = (...values: number[]) => sized(packIntegers(values));
  yield { fault: 'a billion tokens', name: 'a.usdc', bytes: crateWith('TOKENS', join(u64(1e9), u64(4), sized(packBlock(text('a\0b\0'))))) };
  yield { fault: 'tokens of a terabyte', name: 'a.usdc', bytes: crateWith('TOKENS', join(u64(2), u64(2 ** 40), sized(packBlock(text('a\0b\0'))))) };
  yield { fault: 'a million paths in a few bytes', name: 'a.usdc', bytes: crateWith('PATHS', join(u64(1e6), u64(1e6), ints(0), ints(0), ints(-2))) };
  yield { fault: 'paths in a circle', name: 'a.usdc', bytes: crateWith('PATHS', join(u64(3), u64(3), ints(0, 1, 2), ints(0, 1, 2), ints(-1, 0, 1))) };
  yield { fault: 'paths that jump away', name: 'a.usdc', bytes: crateWith('PATHS', join(u64(2), u64(2), ints(0, 1), ints(0, 1), ints(-1, 1_000_000))) };
  yield { fault: 'specs of paths that are not there', name: 'a.usdc', bytes: crateWith('SPECS', join(u64(2), ints(0, 99), ints(0, 0), ints(7, 6))) };
  yield { fault: 'fields of tokens that are not there', name: 'a.usdc', bytes: crateWith('FIELDS', join(u64(1), ints(5000), sized(packBlock(new Uint8Array(8))))) };
  yield { fault: 'LZ4 that points before its beginning', name: 'a.usdc', bytes: crateWith('FIELDSETS', join(u64(8), u64(6), Uint8Array.of(0, 0x10, 0x41, 0xff, 0xff, 0x00))) };
  yield { fault: 'LZ4 whose length never ends', name: 'a.usdc', bytes: crateWith('FIELDSETS', join(u64(8), u64(6), Uint8Array.of(0, 0xf0, 0xff, 0xff, 0xff, 0xff))) };
}

function* zipFaults(): Generator<BadFile> {
  const obj = good('a.obj');
  const inZip = (fault: string, files: Record<string, ZippableFile>): BadFile => ({ fault, name: 'a.zip', bytes: zip(files) });
  yield inZip('a path upwards', { '../a.obj': obj });
  yield inZip('a path upwards inside', { 'x/../../a.obj': obj });
  yield inZip('an absolute path', { '/etc/a.obj': obj });
  yield inZip('a drive', { 'C:/a.obj': obj });
  yield inZip('backslashes', { '..\\a.obj': obj });
  yield inZip('control characters in a name', { 'a\u0007\n.obj': obj });
  yield inZip('a name of 60 kB', { [`${'x'.repeat(60_000)}.obj`]: obj });
  yield inZip('a link', { 'a.obj': [text('/etc/passwd'), { os: 3, attrs: (0xa1ff << 16) >>> 0 }] });
  yield inZip('an archive in the archive', { 'a.zip': zip({ 'a.obj': obj }) });
  yield inZip('an archive under another name', { 'a.obj': zip({ 'a.obj': obj }) });
  yield inZip('a bomb', { 'a.obj': new Uint8Array(64_000_000) });
  yield inZip('no mesh', { 'readme.txt': text('hello') });
  yield inZip('only a folder', { 'a/': new Uint8Array(0) });
  yield inZip('a formula for a name', { '=cmd|x.txt': text('1') });
  yield inZip('an empty mesh', { 'a.obj': new Uint8Array(0) });
  yield inZip('a broken mesh', { 'a.obj': obj, 'b.ply': text('ply\n') });
  yield inZip('units that differ', { 'a.usda': text(usda()), 'b.glb': good('a.glb') });
  yield inZip('weights of vertices that are not there', { 'a.obj': obj, 'a.weights.csv': text('vertex,joint,weight\n5,hip,1\n') });
  yield inZip('weights without a header', { 'a.obj': obj, 'a.weights.csv': text('1,hip,1\n') });
  yield inZip('weights that are none', { 'a.obj': obj, 'a.weights.csv': text('vertex,joint,weight\n1,hip,heavy\n') });
  yield inZip('weights of a joint with a name of 64 kB', { 'a.obj': obj, 'a.weights.csv': text(`vertex,joint,weight\n1,${'x'.repeat(65_536)},1\n`) });
  yield inZip('a billion vertices', { 'a.ply': text(plyText().replace('element vertex 4', 'element vertex 1000000000')) });
  yield inZip('negative weights', { 'a.obj': obj, 'a.weights.csv': text('vertex,joint,weight\n1,hip,-1\n') });
  yield inZip('twelve thousand entries', Object.fromEntries(Array.from({ length: 12_000 }, (_, i) => [`${i}.txt`, new Uint8Array(0)])));
  yield { fault: 'a checksum that is wrong', name: 'a.zip', bytes: zipWith({ 'a.obj': [obj, { level: 0 }] }, (view, at) => view.setUint32(at + 16, 12345, true)) };
  yield { fault: 'a size that is wrong', name: 'a.zip', bytes: zipWith({ 'a.obj': obj }, (view, at) => view.setUint32(at + 24, 10, true)) };
  yield { fault: 'a size of 3 GB', name: 'a.zip', bytes: zipWith({ 'a.obj': obj }, (view, at) => view.setUint32(at + 24, 3e9, true)) };
  yield { fault: 'a password', name: 'a.zip', bytes: zipWith({ 'a.obj': obj }, (view, at) => view.setUint16(at + 8, 1, true)) };
  yield { fault: 'a way of packing that is none', name: 'a.zip', bytes: zipWith({ 'a.obj': obj }, (view, at) => view.setUint16(at + 10, 99, true)) };
  yield { fault: 'an offset beyond the end', name: 'a.zip', bytes: zipWith({ 'a.obj': obj }, (view, at) => view.setUint32(at + 42, 1e9, true)) };
  yield { fault: 'entries that overlap', name: 'a.zip', bytes: zipWith({ 'a.obj': [obj, { level: 0 }], 'b.obj': [obj, { level: 0 }] }, (view, at) => view.setUint32(at + 20, 1e6, true)) };
}

function* odd(): Generator<BadFile> {
  for (const name of ['a.obj', 'a.ply', 'a.stl', 'a.gltf', 'a.usda']) {
    yield { fault: 'UTF-16 without a mark, and no mesh', name, bytes: latin1(Array.from('hello there', (c) => `${c}\0`).join('')) };
    yield { fault: 'only blanks', name, bytes: text(' \n'.repeat(1000)) };
  }
  yield { fault: 'an unknown extension', name: 'a.fbx', bytes: text('Kaydara') };
  yield { fault: 'no extension', name: 'mesh', bytes: text('v 0 0 0\n') };
  yield { fault: 'an extension of 64 kB', name: `a.${'x'.repeat(65_536)}`, bytes: text('v 0 0 0\n') };
  yield { fault: 'a formula for a name', name: '=HYPERLINK("a").csv', bytes: text('1,2\n') };
}

/** At least 150 files, each with one fault. The list is the same at every call. */
export function badFiles(): BadFile[] {
  return [...faults(), ...truncated(), ...misnamed(), ...odd()];
}
