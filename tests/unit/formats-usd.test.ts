import { BoxGeometry, Mesh, MeshStandardMaterial, Scene } from 'three';
import { USDZExporter } from 'three/examples/jsm/exporters/USDZExporter.js';
import { USDCParser } from 'three/examples/jsm/loaders/usd/USDCParser.js';
import { describe, expect, it } from 'vitest';
import { measureCage } from '@/lib/engine/measure';
import { readMeshArchive } from '@/lib/formats/mesh-archive';
import { NOTHING_BESIDE } from '@/lib/formats/beside';
import { readUsda } from '@/lib/formats/usda';
import { parseUsda } from '@/lib/formats/usda-layer';
import { readUsdMeshes } from '@/lib/formats/usd-meshes';
import { readUsdc } from '@/lib/formats/usdc';
import { facesOf, failureOf, laterFailureOf, measureAs, measureAsIs, namesOf } from '../support/read-cages';
import { writeCrate, type CratePrim } from '../support/write-crate';

// The standard's own documentation of UsdGeomMesh, UsdGeomXformable, UsdGeomSubset and UsdSkel, and of the text and crate forms (from memory).
const text = (value: string) => new TextEncoder().encode(value);
const POINTS = [[0, 0, 0], [2, 0, 0], [2, 3, 0], [0, 3, 0], [0, 0, 4], [2, 0, 4], [2, 3, 4], [0, 3, 4]];
const QUADS = [[0, 3, 2, 1], [4, 5, 6, 7], [0, 1, 5, 4], [1, 2, 6, 5], [2, 3, 7, 6], [3, 0, 4, 7]];
const EDGES = [[0, 1], [1, 2], [2, 3], [3, 0], [4, 5], [5, 6], [6, 7], [7, 4], [0, 4], [1, 5], [2, 6], [3, 7]];
const tuples = (rows: number[][]) => `[${rows.map((row) => `(${row.join(', ')})`).join(', ')}]`;

const BODY = `
        point3f[] points = ${tuples(POINTS)}
        int[] faceVertexCounts = [${QUADS.map(() => 4).join(', ')}]
        int[] faceVertexIndices = [${QUADS.flat().join(', ')}]
`;
const mesh = (more = '', name = 'crate', children = '') => `    def Mesh "${name}" (
        prepend apiSchemas = ["MaterialBindingAPI"]
    )
    {${BODY}${more}
${children}
    }
`;
const layer = (content: string, metadata = 'metersPerUnit = 0.01\n    upAxis = "Y"') => `#usda 1.0
(
    "A comment for the layer"
    ${metadata}
)

def Xform "geo" # of the asset
{
${content}}
`;
const read = (source: string) => readUsdMeshes(parseUsda(source));

describe('USD text', () => {
  it('reads quads, unit and up axis; where a mesh is silent, the standard’s own values hold', () => {
    const cage = read(layer(mesh()));
    expect(facesOf(cage)).toEqual(QUADS);
    expect([cage.metresPerUnit, cage.upAxis, cage.scheme, cage.boundary, cage.triangles]).toEqual([0.01, 'y', 'catmull-clark', 'edge-and-corner', 'catmark']);
    expect(measureAsIs(cage).volume).toBeCloseTo(24, 12);
    expect(cage.warnings).toEqual([]);
  });

  it('reads creases by chain and by edge, corners, holes and what is asked of subdivision', () => {
    const sharp = read(layer(mesh(`
        uniform token subdivisionScheme = "catmullClark"
        uniform token interpolateBoundary = "edgeOnly"
        uniform token triangleSubdivisionRule = "smooth"
        int[] creaseIndices = [${EDGES.flat().join(', ')}]
        int[] creaseLengths = [${EDGES.map(() => 2).join(', ')}]
        float[] creaseSharpnesses = [${EDGES.map(() => 10).join(', ')}]
        int[] cornerIndices = [0, 6]
        float[] cornerSharpnesses = [10, 2.5]`)));
    // All edges infinitely sharp: the limit surface is the box.
    expect(measureAs(sharp, 'catmull-clark').volume).toBeCloseTo(24, 11);
    expect([sharp.boundary, sharp.triangles]).toEqual(['edge-only', 'smooth']);
    expect([Array.from(sharp.cornerVertices), Array.from(sharp.cornerSharpness)]).toEqual([[0, 6], [10, 2.5]]);
    const chained = read(layer(mesh('int[] creaseIndices = [0, 1, 2, 4, 5]\nint[] creaseLengths = [3, 2]\nfloat[] creaseSharpnesses = [1, 2, 3]\nint[] holeIndices = [4]\nuniform token subdivisionScheme = "none"')));
    expect(Array.from(chained.creaseVertices)).toEqual([0, 1, 1, 2, 4, 5]);
    expect(Array.from(chained.creaseSharpness)).toEqual([1, 2, 3]);
    expect([Array.from(chained.holes ?? []), chained.scheme]).toEqual([[4], 'polyhedral']);
    expect(chained.warnings).toEqual([]);
  });

  it('leaves faces marked as holes out of what is measured, in each of several meshes', () => {
    // The standard's UsdGeomMesh: holeIndices name faces that are invisible (from memory). All edges sharp, the limit is the box of 2 × 3 × 4.
    const sharp = `
        int[] creaseIndices = [${EDGES.flat().join(', ')}]
        int[] creaseLengths = [${EDGES.map(() => 2).join(', ')}]
        float[] creaseSharpnesses = [${EDGES.map(() => 10).join(', ')}]`;
    const options = { scheme: 'catmull-clark', boundary: 'edge-and-corner', triangles: 'catmark', creasing: 'uniform', partsBy: 'object' } as const;
    const cage = read(layer(`${mesh(sharp, 'closed')}${mesh(`${sharp}\nint[] holeIndices = [1]`, 'lidless')}${mesh(`${sharp}\nint[] holeIndices = [4, 2]`, 'through')}`));
    const { parts, findings } = measureCage(cage, options);
    expect(parts.map((part) => [part.name, part.faces, part.openEdges])).toEqual([['closed', 6, 0], ['lidless', 5, 4], ['through', 4, 8]]);
    [52, 52 - 6, 52 - 16].forEach((area, i) => expect(parts[i].components[0].surface.area).toBeCloseTo(area, 10));
    for (const part of parts) expect(part.components[0].solid.volume).toBeCloseTo(24, 11);
    expect(findings.filter((finding) => finding.code === 'hole_faces').map((finding) => [finding.severity, finding.part, finding.count, finding.places.map((place) => place.face)]))
      .toEqual([['note', 'lidless', 1, [7]], ['note', 'through', 2, [14, 16]]]);
    expect(failureOf(() => read(layer(mesh('int[] holeIndices = [0, 1, 2, 3, 4, 5]')))).code).toBe('no_faces');
    expect(failureOf(() => read(layer(mesh('int[] holeIndices = [6]')))).code).toBe('bad_index');
  });

  it('goes up the hierarchy, and turns left-handed or mirrored meshes the right way out', () => {
    const placed = (operations: string, orientation: string) => read(layer(mesh(`uniform token orientation = "${orientation}"\n${operations}`)));
    const mirror = 'double3 xformOp:scale = (-1, 1, 1)\nuniform token[] xformOpOrder = ["xformOp:scale"]';
    for (const [operations, orientation, volume] of [['', 'rightHanded', 24], ['', 'leftHanded', -24], [mirror, 'rightHanded', 24], [mirror, 'leftHanded', -24]] as const) {
      // The box's faces run counter-clockwise seen from outside, so that only the left-handed reading has it inside out.
      expect(measureAsIs(placed(operations, orientation)).volume).toBeCloseTo(volume, 12);
    }
    const deep = read(`#usda 1.0
def Xform "a" {
  double3 xformOp:translate = (10, 0, 0)
  float3 xformOp:rotateXYZ = (0, 0, 90)
  uniform token[] xformOpOrder = ["xformOp:translate", "xformOp:rotateXYZ"]
  def Xform "b" {
    matrix4d xformOp:transform = ( (2, 0, 0, 0), (0, 1, 0, 0), (0, 0, 1, 0), (0, 0, 7, 1) )
    uniform token[] xformOpOrder = ["xformOp:transform"]
${mesh()}  }
}`);
    // (2, 3, 4) → doubled x and z + 7: (4, 3, 11) → a quarter turn about z: (−3, 4, 11) → + 10.
    expect(Array.from(deep.positions.subarray(18, 21))).toEqual([7, 4, 11]);
    expect(measureAsIs(deep).volume).toBeCloseTo(48, 11);
    const pivot = read(layer(mesh('double3 xformOp:translate:pivot = (2, 3, 4)\nfloat xformOp:rotateY = 180\nquatf xformOp:orient = (0.70710678, 0, 0, 0.70710678)\nuniform token[] xformOpOrder = ["xformOp:translate:pivot", "xformOp:rotateY", "xformOp:orient", "!invert!xformOp:translate:pivot"]')));
    // The pivot stays where it is.
    expect(Array.from(pivot.positions.subarray(18, 21))).toEqual([2, 3, 4]);
    // (0, 0, 0) − pivot = (−2, −3, −4) → quarter turn about z: (3, −2, −4) → half about y: (−3, −2, 4) → + pivot.
    [-1, 1, 8].forEach((value, axis) => expect(pivot.positions[axis]).toBeCloseTo(value, 6));
    const reset = read(layer(mesh('double3 xformOp:translate = (1, 0, 0)\nuniform token[] xformOpOrder = ["!resetXformStack!", "xformOp:translate"]')).replace('{\n    def', '{\n  double3 xformOp:translate = (50, 0, 0)\n  uniform token[] xformOpOrder = ["xformOp:translate"]\n    def'));
    expect(reset.positions[0]).toBe(1);
  });

  it('takes face subsets for groups, bound materials for materials, and prim names for objects', () => {
    const subset = (name: string, faces: string, more = '') => `      def GeomSubset "${name}" { uniform token elementType = "face"\n uniform token familyName = "parts"\n int[] indices = [${faces}]\n ${more} }\n`;
    const cage = read(layer(mesh('rel material:binding = </mtl/oak>', 'crate', subset('lid', '0, 1', 'rel material:binding = </mtl/iron>') + subset('base', '2')) + mesh('', 'twin')));
    expect(namesOf(cage.groups)).toEqual(['lid', 'lid', 'base', 'crate', 'crate', 'crate', ...Array(6).fill('twin')]);
    expect(namesOf(cage.materials)).toEqual(['iron', 'iron', 'oak', 'oak', 'oak', 'oak', ...Array(6).fill(null)]);
    expect(namesOf(cage.objects)).toEqual([...Array(6).fill('crate'), ...Array(6).fill('twin')]);
    const same = read(`#usda 1.0\ndef Xform "l" {\n${mesh()}}\ndef Xform "r" {\n${mesh()}}`);
    expect([...new Set(namesOf(same.objects))]).toEqual(['l/crate', 'r/crate']);
  });

  it('labels faces by dominant joint, named by the mesh, by its skeleton or not at all', () => {
    const weights = (size: number) => `
        int[] primvars:skel:jointIndices = [${POINTS.flatMap(() => [0, 1].slice(0, size)).join(', ')}] (
            elementSize = ${size}
            interpolation = "vertex"
        )
        float[] primvars:skel:jointWeights = [${POINTS.flatMap(([, , z]) => (z > 0 ? [0.2, 0.8] : [0.9, 0.1]).slice(0, size)).join(', ')}] ( elementSize = ${size} )`;
    const labels = (source: string) => namesOf(read(source).joints);
    const expected = ['hip', 'knee', 'hip', 'hip', 'hip', 'hip'];
    // Sides: two corners of (0.9, 0.1) and two of (0.2, 0.8) add up to 2.2 for the hip and 1.8 for the knee.
    expect(labels(layer(mesh(`${weights(2)}\nuniform token[] skel:joints = ["root/hip", "root/hip/knee"]`)))).toEqual(expected);
    expect(labels(layer(`def Skeleton "bones" { uniform token[] joints = ["hip", "hip/knee"] }\n${mesh(`${weights(2)}\nrel skel:skeleton = </geo/bones>`)}`))).toEqual(expected);
    expect(labels(layer(mesh(weights(2))))).toEqual(expected.map((name) => (name === 'hip' ? 'joint 1' : 'joint 2')));
    const rigid = 'int[] primvars:skel:jointIndices = [1] ( elementSize = 1\n interpolation = "constant" )\nfloat[] primvars:skel:jointWeights = [1]\nuniform token[] skel:joints = ["hip", "knee"]';
    expect(labels(layer(mesh(rigid)))).toEqual(Array(6).fill('knee'));
  });

  it('leaves out what is not shown or not here, and says so', () => {
    const cage = read(layer(`${mesh()}${mesh('token visibility = "invisible"', 'ghost')}${mesh('uniform token purpose = "proxy"', 'proxy')}
    def Sphere "ball" { double radius = 2 }
    class Mesh "template" { }
    over "else" { }
    def "other" ( active = false ) { def Mesh "x" { } }
    def "referring" ( prepend references = @./other.usda@</x> ( offset = 1 ) ) { }
    def "choice" ( variants = { string lod = "high" } prepend variantSets = "lod" ) { variantSet "lod" = { "high" { def Mesh "inner" { } } "low" { } } }
    def PointInstancer "many" { def Mesh "leaf" { } }
    def Mesh "none" { }
    `));
    expect(facesOf(cage)).toEqual(QUADS);
    expect(cage.warnings.map((warning) => warning.code).sort()).toEqual(['empty_mesh', 'hidden', 'hidden', 'instances_ignored', 'not_composed', 'not_polygons', 'variants_ignored']);
    const said = Object.fromEntries(cage.warnings.map((warning) => [warning.code, warning.message]));
    expect(said.variants_ignored).toContain('/geo/choice');
    expect(said.not_composed).toContain('/geo/referring');
    expect(said.instances_ignored).toContain('/geo/many');
    expect(said.not_polygons).toContain('/geo/ball');
  });

  it('names the first prims of a kind and counts the others, and names the layers that it builds on', () => {
    const spheres = Array.from({ length: 6 }, (_, i) => `def Sphere "ball${i}" { }`).join('\n');
    const cage = read(layer(`${mesh()}\n${spheres}`).replace('(\n', '(\n    subLayers = [@./base.usda@]\n'));
    expect(cage.warnings.find((warning) => warning.code === 'not_polygons')?.message).toBe('Left out what is no mesh but a Sphere: /geo/ball0, /geo/ball1, /geo/ball2 and 3 others.');
    expect(cage.warnings.find((warning) => warning.code === 'layers_ignored')?.message).toContain('./base.usda');
  });

  it('takes the default of what moves over time, else the first time, and says so', () => {
    const cage = read(layer(mesh().replace('point3f[] points =', 'point3f[] points.timeSamples = { 24: [(9, 9, 9)], 1:').replace(/(\(0, 3, 4\)\])/, '$1, }')));
    expect(facesOf(cage)).toEqual(QUADS);
    expect(cage.warnings.map((warning) => warning.code)).toEqual(['animated']);
  });

  it.each([
    ['no header', 'def Mesh "a" { }', 'bad_magic', 1],
    ['an open brace', '#usda 1.0\ndef Mesh "a" {\n', 'bad_syntax', 3],
    ['an open string', '#usda 1.0\ndef Mesh "a {\n}', 'bad_syntax', 2],
    ['a prim without a name', '#usda 1.0\n\ndef Mesh { }', 'bad_syntax', 3],
    ['uneven tuples', layer(mesh()).replace('(2, 3, 0)', '(2, 3)'), 'bad_tuple', 14],
    ['a nest of brackets', `#usda 1.0\ndef Mesh "a" {\nint[] x = ${'['.repeat(100_000)}`, 'too_deep', 3],
    ['a nest of prims', `#usda 1.0\n${'def "a" {\n'.repeat(2_000)}`, 'too_deep', 258],
  ])('says where %s is', (_, source, code, line) => {
    expect(failureOf(() => read(source))).toMatchObject({ code, line });
  });

  it.each<[string, [RegExp | string, string], string]>([
    ['counts that do not add up', ['= [4, 4', '= [4, 5'], 'bad_count'],
    ['an index beyond the points', ['= [0, 3, 2, 1', '= [0, 3, 2, 8'], 'vertex_out_of_range'],
    ['a negative index', ['= [0, 3, 2, 1', '= [0, 3, 2, -1'], 'vertex_out_of_range'],
    ['a face of two', ['= [4, 4', '= [2, 6'], 'face_too_small'],
    ['a face of a billion', ['= [4, 4', '= [4, 1000000000'], 'too_many_corners'],
    ['points that are none', ['(2, 3, 4)', '(2, nan, 4)'], 'not_finite'],
    ['points too far', ['(2, 3, 4)', '(2, 1e308, 4)'], 'number_too_large'],
    ['no points', [/point3f\[\] points.*\n/, ''], 'missing_attribute'],
    ['an odd transform', ['int[] faceVertexCounts', 'uniform token[] xformOpOrder = ["xformOp:wobble"]\nint[] faceVertexCounts'], 'bad_transform'],
    ['a crease of one', ['int[] faceVertexCounts', 'int[] creaseIndices = [1]\nint[] creaseLengths = [1]\nfloat[] creaseSharpnesses = [1]\nint[] faceVertexCounts'], 'bad_count'],
    ['a unit of nothing', ['metersPerUnit = 0.01', 'metersPerUnit = 0'], 'bad_unit'],
  ])('refuses %s, naming the mesh', (_, [from, to], code) => {
    const error = failureOf(() => read(layer(mesh()).replace(from, to)));
    expect(error.code).toBe(code);
    if (code !== 'bad_unit') expect(error.detail).toContain('/geo/crate');
  });

  it('says that points lie outside the extent that the file states', () => {
    expect(read(layer(mesh('float3[] extent = [(0, 0, 0), (2, 3, 4)]'))).warnings).toEqual([]);
    expect(read(layer(mesh('float3[] extent = [(0, 0, 0), (2, 3, 3)]'))).warnings.map((warning) => warning.code)).toEqual(['extent_disagrees']);
  });
});

const CRATE: CratePrim = {
  name: 'geo',
  type: 'Xform',
  attributes: { 'xformOp:translate': { doubles3: [0.25, 0, 0] }, xformOpOrder: { tokens: ['xformOp:translate'] } },
  children: [
    {
      name: 'crate',
      type: 'Mesh',
      attributes: {
        points: { points: POINTS.flat() },
        faceVertexCounts: { ints: QUADS.map(() => 4) },
        faceVertexIndices: { ints: QUADS.flat(), packed: true },
        subdivisionScheme: { token: 'catmullClark' },
        creaseIndices: { ints: EDGES.flat(), packed: true },
        creaseLengths: { ints: EDGES.map(() => 2) },
        creaseSharpnesses: { floats: EDGES.map(() => 10) },
        'primvars:skel:jointIndices': { ints: POINTS.flatMap(() => [0, 1]), elementSize: 2, packed: true },
        'primvars:skel:jointWeights': { floats: POINTS.flatMap(([, , z]) => (z > 0 ? [0, 1] : [1, 0])), packed: true },
        'skel:joints': { tokens: ['hip', 'hip/knee'] },
      },
      relationships: { 'material:binding': '/mtl/oak' },
      children: [{ name: 'lid', type: 'GeomSubset', attributes: { elementType: { token: 'face' }, indices: { ints: [1] }, familyName: { token: 'parts' } } }],
    },
    { name: 'twin', type: 'Mesh', attributes: { points: { points: POINTS.flat().map((value) => value + 10) }, faceVertexCounts: { ints: QUADS.map(() => 4) }, faceVertexIndices: { ints: QUADS.flat() }, subdivisionScheme: { token: 'catmullClark' }, 'xformOp:scale': { small3: [1, 1, -2] }, xformOpOrder: { tokens: ['xformOp:scale'] } } },
  ],
};
const STAGE = { metersPerUnit: 0.5, upAxis: 'Z', prims: [CRATE, { name: 'mtl', type: 'Scope', children: [{ name: 'oak', type: 'Material' }] }] };

describe('USD crate', () => {
  it('reads what a text says as well: quads, creases, subsets, joints, materials, transforms, unit and axis', () => {
    const cage = readUsdc(writeCrate(STAGE));
    expect(facesOf(cage).slice(0, 6)).toEqual(QUADS);
    expect([cage.metresPerUnit, cage.upAxis, cage.scheme]).toEqual([0.5, 'z', 'catmull-clark']);
    expect(Array.from(cage.positions.subarray(0, 6))).toEqual([0.25, 0, 0, 2.25, 0, 0]);
    expect(Array.from(cage.creaseVertices)).toEqual(EDGES.flat());
    expect(namesOf(cage.groups)).toEqual(['crate', 'lid', 'crate', 'crate', 'crate', 'crate', ...Array(6).fill('twin')]);
    expect(namesOf(cage.materials).slice(0, 6)).toEqual(Array(6).fill('oak'));
    expect(namesOf(cage.joints).slice(0, 2)).toEqual(['hip', 'knee']);
    // 2 · 3 · 4, and the same doubled; the mirrored one is turned the right way out.
    expect(measureAsIs(cage).volume).toBeCloseTo(24 + 48, 10);
  });

  it('finds in a crate what three’s parser finds', () => {
    const bytes = writeCrate(STAGE);
    const specs = new USDCParser().parseData(bytes.slice().buffer).specsByPath;
    const value = (path: string) => Array.from(specs[path].fields.default as ArrayLike<number>);
    expect(value('/geo/crate.points')).toEqual(POINTS.flat());
    expect(value('/geo/crate.faceVertexIndices')).toEqual(QUADS.flat());
    expect(value('/geo/crate.creaseIndices')).toEqual(EDGES.flat());
    expect(value('/geo/crate.primvars:skel:jointWeights')).toEqual(POINTS.flatMap(([, , z]) => (z > 0 ? [0, 1] : [1, 0])));
    expect(value('/geo/twin.xformOp:scale')).toEqual([1, 1, -2]);
    expect(specs['/geo/crate.material:binding'].fields.targetPaths).toEqual(['/mtl/oak']);
    expect(specs['/'].fields.metersPerUnit).toBe(0.5);
  });

  it('reads a grid large enough for long matches and differences of every width', () => {
    const n = 60;
    const points = Array.from({ length: (n + 1) ** 2 }, (_, i) => [i % (n + 1), Math.floor(i / (n + 1)), 0]).flat();
    const quads = Array.from({ length: n * n }, (_, i) => (Math.floor(i / n) * (n + 1)) + (i % n)).flatMap((at) => [at, at + 1, at + n + 2, at + n + 1]);
    const shuffled = quads.map((_, i) => quads[(i * 4 * 997) % quads.length + (i % 4) - (((i * 4 * 997) % quads.length) % 4)]);
    const grid = (indices: number[]) => readUsdc(writeCrate({ prims: [{ name: 'grid', type: 'Mesh', attributes: { points: { points }, faceVertexCounts: { ints: Array(n * n).fill(4), packed: true }, faceVertexIndices: { ints: indices, packed: true } } }] }));
    expect(Array.from(grid(quads).faceVertices)).toEqual(quads);
    expect(Array.from(grid(shuffled).faceVertices)).toEqual(shuffled);
  });

  it('reads what another library puts into a .usdz: a layer that refers to others in the archive', async () => {
    const scene = new Scene();
    for (const [name, x] of [['left', -5], ['right', 5]] as const) {
      const box = new Mesh(new BoxGeometry(1, 2, 3), new MeshStandardMaterial({ name: 'oak' }));
      box.name = name;
      box.position.set(x, 0, 0);
      scene.add(box);
    }
    scene.updateMatrixWorld(true);
    const cage = await readMeshArchive(await new USDZExporter().parseAsync(scene), 'crate.usdz');
    expect(measureAsIs(cage, true).volume).toBeCloseTo(12, 6);
    const xs = Array.from(cage.positions).filter((_, i) => i % 3 === 0);
    expect([Math.min(...xs), Math.max(...xs)]).toEqual([-5.5, 5.5]);
    expect([cage.metresPerUnit, cage.upAxis, cage.scheme, cage.warnings]).toEqual([1, 'y', 'polyhedral', []]);
  });

  it('follows references within a layer and beside it, keeps what is said over them, and refuses circles', async () => {
    const twice = layer(`class Xform "_kit" {\n${mesh()}}\ndef Xform "a" ( references = </geo/_kit> ) { }\ndef Xform "b" (\n prepend references = </geo/_kit> ) {\n over "crate" { uniform token orientation = "leftHanded" }\n }`);
    const cage = await readUsda(text(twice), NOTHING_BESIDE);
    expect([...new Set(namesOf(cage.objects))]).toEqual(['geo/a/crate', 'geo/b/crate']);
    // The second is turned inside out by what is said over it.
    expect(measureAsIs(cage).volume).toBeCloseTo(0, 12);
    const beside = (files: Record<string, Uint8Array>) => (path: string) => Promise.resolve(files[path] ?? null);
    const outer = text('#usda 1.0\ndef "x" ( payload = @./kit/box.usdc@ ) { }\n');
    expect(measureAsIs(await readUsda(outer, beside({ 'kit/box.usdc': writeCrate(STAGE) }))).volume).toBeCloseTo(72, 10);
    const both = await readUsda(text('#usda 1.0\ndef "x" ( references = [@./kit/box.usdc@, @./kit/lost.usdc@] ) { }\n'), beside({ 'kit/box.usdc': writeCrate(STAGE) }));
    expect(both.warnings.find((warning) => warning.code === 'not_composed')?.message).toContain('/x');
    expect(await laterFailureOf(() => readUsda(outer, NOTHING_BESIDE))).toMatchObject({ code: 'no_faces', detail: expect.stringContaining('/x brings in by payload') });
    const circle = { 'a.usda': text('#usda 1.0\ndef "x" ( references = @b.usda@</x> ) { }'), 'b.usda': text('#usda 1.0\ndef "x" ( references = @a.usda@</x> ) { }') };
    expect((await laterFailureOf(() => readUsda(circle['a.usda'], beside(circle)))).code).toBe('reference_circle');
    expect((await laterFailureOf(() => readUsda(text('#usda 1.0\ndef "x" ( references = </x> ) { }'), NOTHING_BESIDE))).code).toBe('reference_circle');
  });

  it('refuses every crate cut short, with the byte', () => {
    const bytes = writeCrate(STAGE);
    for (let length = 0; length < bytes.length; length += 37) {
      const error = failureOf(() => readUsdc(bytes.subarray(0, length)));
      expect(error.offset).not.toBeNull();
    }
  });
});
