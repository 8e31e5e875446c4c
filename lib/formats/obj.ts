import type { Cage } from '../engine/cage';
import { FaceLabeller } from './face-labeller';
import { LineCursor } from './line-cursor';
import { MeshError } from './mesh-error';
import { MAX_COORDINATE, MESH_LIMITS, MIN_CORNERS, MOST_LINE_BYTES, type MeshLimits } from './mesh-limits';
import { ObjPlainLines } from './obj-plain-lines';
import { ObjPolygons } from './obj-polygons';
import { ObjTags } from './obj-tags';
import { TextLines, type LineJoint } from './text-lines';
import { outOfRange, VertexReferences } from './vertex-references';
import { WarningList } from './warning-list';

export interface ObjLimits extends MeshLimits {
  lineBytes: number;
}

export const OBJ_LIMITS: ObjLimits = { ...MESH_LIMITS, lineBytes: MOST_LINE_BYTES };

const LETTER_F = 0x66;
const LETTER_V = 0x76;
const SLASH = 0x2f;
const SPACE = 0x20;
const COORDINATE = ['a number for x', 'a number for y', 'a number for z'];

/** Geometry that is no polygon, and what it is called in the warning. */
const NOT_POLYGONS = new Map([
  ['p', 'points'],
  ['l', 'lines'],
  ['curv', 'free-form curves'],
  ['curv2', 'free-form curves'],
  ['surf', 'free-form surfaces'],
  ['call', 'another file called from this one'],
]);

/** Second letters of vt, vn and vp: texture coordinates, normals, parameter points. */
const WITHOUT_EFFECT_AFTER_V = new Set([0x74, 0x6e, 0x70]);

/** Words of the format that say nothing about polygons. */
const WITHOUT_EFFECT = new Set(
  ('s mg mtllib usemap maplib cstype deg bmat step parm trim hole scrv sp end con bevel c_interp d_interp lod ' +
    'shadow_obj trace_obj ctech stech csh bsp bzp cdc cdp res vw').split(' '),
);

/** Reads the polygons, names and sharpness tags of a Wavefront OBJ text, piece by piece. */
class ObjReader {
  private readonly cursor = new LineCursor();
  private readonly warnings = new WarningList();
  private readonly polygons = new ObjPolygons();
  private readonly references = new VertexReferences(1);
  private readonly tags = new ObjTags(this.warnings);
  private readonly groups = new FaceLabeller();
  private readonly objects = new FaceLabeller();
  private readonly materials = new FaceLabeller();
  private readonly lines: TextLines;

  constructor(private readonly limits: ObjLimits) {
    const plain = new ObjPlainLines(this.polygons, limits);
    this.lines = new TextLines((bytes, start, end, line, joints) => this.readLine(bytes, start, end, line, joints), limits.lineBytes, plain);
  }

  push(chunk: Uint8Array): void {
    this.lines.push(chunk);
  }

  finish(): Cage {
    this.lines.end();
    if (this.lines.bytesSeen === 0) throw new MeshError({ code: 'empty_file', detail: 'the file is empty' });
    const { vertices, faces, positions, faceStarts, faceVertices, faceLines } = this.polygons;
    if (faces === 0) {
      const has = vertices > 0 ? `it has ${vertices} vertices` : 'it has no vertices either';
      throw new MeshError({ code: 'no_faces', detail: `expected at least one face (a line "f 1 2 3 …"); ${has}`, expected: 'a face' });
    }
    this.references.settle(vertices);
    this.tags.references.settle(vertices);
    return {
      positions: positions.take(),
      faceStarts: faceStarts.take(),
      faceVertices: faceVertices.take(),
      groups: this.groups.take(faces),
      objects: this.objects.take(faces),
      materials: this.materials.take(faces),
      joints: null,
      creaseVertices: this.tags.creaseVertices.take(),
      creaseSharpness: this.tags.creaseSharpness.take(),
      cornerVertices: this.tags.cornerVertices.take(),
      cornerSharpness: this.tags.cornerSharpness.take(),
      boundary: this.tags.boundary,
      faceLines: faceLines.take(),
      metresPerUnit: null,
      upAxis: null,
      warnings: this.warnings.items,
    };
  }

  private readLine(bytes: Uint8Array, start: number, end: number, line: number, joints: LineJoint[] | null): void {
    const cursor = this.cursor;
    cursor.open(bytes, start, end, line, joints);
    if (!cursor.nextWord()) return;
    const keyword = cursor.at;
    const length = cursor.wordEnd() - keyword;
    // The words that make up nearly all of a file (v, f; vt, vn, vp) are told apart without making a string.
    if (length === 1 && bytes[keyword] === LETTER_V) {
      cursor.at++;
      this.readVertex();
    } else if (length === 1 && bytes[keyword] === LETTER_F) {
      cursor.at++;
      this.readFace(keyword);
    } else if (length !== 2 || bytes[keyword] !== LETTER_V || !WITHOUT_EFFECT_AFTER_V.has(bytes[keyword + 1])) this.readOther(cursor.word(), keyword);
  }

  private readOther(word: string, at: number): void {
    const cursor = this.cursor;
    if (word === 't') this.tags.read(cursor, this.polygons.vertices);
    else if (word === 'g') this.setName(this.groups, cursor.rest().replace(/\s+/g, ' ') || 'default');
    else if (word === 'o') this.setName(this.objects, cursor.rest() || null);
    else if (word === 'usemtl') this.setName(this.materials, cursor.rest() || null);
    else if (word === 'fo') this.readFace(at);
    else if (!WITHOUT_EFFECT.has(word) && !this.warnings.has(word)) {
      const geometry = NOT_POLYGONS.get(word);
      const shown = word.length > 40 ? `${word.slice(0, 40)}…` : word;
      if (geometry) this.warnings.add(word, 'not_polygons', `Left out ${geometry} ("${word}"): only polygons enclose a volume.`, cursor.place(at));
      else this.warnings.add(word, 'unknown_keyword', `Skipped lines that begin with "${shown}", which is no keyword of the format.`, cursor.place(at));
    }
  }

  private setName(labeller: FaceLabeller, name: string | null): void {
    const { names, nameLength } = this.limits;
    if (name !== null && name.length > nameLength) throw this.cursor.fail('name_too_long', `a name of at most ${nameLength} characters`);
    if (labeller.count > names) throw this.cursor.fail('too_many_names', `at most ${names} names`);
    labeller.set(name, this.polygons.faces);
  }

  /** `v x y z`, optionally followed by a weight, a colour, or both; these act on nothing that is measured. */
  private readVertex(): void {
    const { cursor, limits } = this;
    const { positions, vertices } = this.polygons;
    if (vertices >= limits.vertices) throw cursor.fail('too_many_vertices', `at most ${limits.vertices} vertices`);
    for (let axis = 0; axis < 3; axis++) {
      const expected = COORDINATE[axis];
      if (!cursor.nextWord()) throw cursor.fail('missing_coordinate', expected);
      const at = cursor.at;
      const value = cursor.number(expected);
      if (value > MAX_COORDINATE || value < -MAX_COORDINATE) throw cursor.fail('number_too_large', `${expected} between −1e50 and 1e50`, at);
      positions.push(value);
    }
    this.polygons.vertices++;
    if (cursor.nextWord()) this.readVertexExtras();
  }

  private readVertexExtras(): void {
    const cursor = this.cursor;
    const at = cursor.at;
    const first = cursor.number('a number for the weight or a colour');
    let extras = 1;
    while (cursor.nextWord()) {
      cursor.number('a number for a colour');
      extras++;
    }
    const weighted = (extras === 1 || extras === 4) && first !== 1;
    if (weighted && !this.warnings.has('weight')) {
      this.warnings.add('weight', 'weight_ignored', 'Left out vertex weights: they act on free-form geometry, not on polygons.', cursor.place(at));
    }
  }

  /** `f` with references v, v/vt, v//vn or v/vt/vn; those to texture coordinates and normals are read over. */
  private readFace(keyword: number): void {
    const { cursor, limits } = this;
    const { faceVertices, faces } = this.polygons;
    const first = faceVertices.length;
    while (cursor.nextWord()) faceVertices.push(this.readReference());
    const corners = faceVertices.length - first;
    if (corners < MIN_CORNERS) {
      const expected = `a face of at least ${MIN_CORNERS} vertices`;
      throw new MeshError({ code: 'face_too_small', expected, found: String(corners), detail: `expected ${expected}, found ${corners}`, place: cursor.place(keyword) });
    }
    if (faces >= limits.faces) throw cursor.fail('too_many_faces', `at most ${limits.faces} faces`, keyword);
    if (faceVertices.length > limits.corners) throw cursor.fail('too_many_corners', `at most ${limits.corners} face corners`, keyword);
    this.polygons.endFace(cursor.line);
  }

  private readReference(): number {
    const cursor = this.cursor;
    const { vertices } = this.polygons;
    const at = cursor.at;
    const number = cursor.integer(SLASH);
    if (number === null) throw cursor.fail('bad_vertex_reference', 'a vertex number such as 5, 5/2, 5//3 or -1', at);
    for (let part = 0; part < 2 && cursor.at < cursor.end && cursor.bytes[cursor.at] === SLASH; part++) {
      cursor.at++;
      const next = cursor.at < cursor.end ? cursor.bytes[cursor.at] : SPACE;
      if (next > SPACE && next !== SLASH && cursor.integer(SLASH) === null) throw cursor.fail('bad_vertex_reference', 'a whole number behind the slash');
    }
    if (cursor.at < cursor.end && cursor.bytes[cursor.at] > SPACE) throw cursor.fail('bad_vertex_reference', 'a blank behind the reference', cursor.at);
    const index = number < 0 ? vertices + number : number - 1;
    if (index < 0 || number > 0xffffffff) throw outOfRange(number, vertices, 1, cursor.place(at));
    if (index >= vertices) this.references.await(index, cursor, at);
    return index;
  }
}

/**
 * Reads a whole OBJ file. Positions and indices are those of the file, in its own unit and frame; nothing is welded, flipped or triangulated.
 * Positive references may name vertices that come later in the file (concatenated files do so); negative ones count from the vertices so far.
 * Several names on one `g` line are one group, joined by blanks. Errors: MeshError with line and column.
 */
export function readObj(bytes: Uint8Array, limits: ObjLimits = OBJ_LIMITS): Cage {
  const reader = new ObjReader(limits);
  reader.push(bytes);
  return reader.finish();
}

/** The same from a stream of chunks of any size; holds one chunk and one line besides the cage. */
export async function readObjStream(chunks: AsyncIterable<Uint8Array>, limits: ObjLimits = OBJ_LIMITS): Promise<Cage> {
  const reader = new ObjReader(limits);
  for await (const chunk of chunks) reader.push(chunk);
  return reader.finish();
}
