import type { Cage } from '../engine/cage';
import { bareCage, fileNote } from './bare-cage';
import { growingFloat64, growingUint32 } from './growing-array';
import { MeshError, type MeshErrorFields } from './mesh-error';
import { MAX_COORDINATE, MESH_LIMITS, MIN_CORNERS } from './mesh-limits';
import type { PlyElement, PlyHeader } from './ply-header';

/** Where the reader stands: a line and column in text, an offset in binary. */
export type PlyPlace = Pick<MeshErrorFields, 'place' | 'offset'>;

const INDEX_LISTS = new Set(['vertex_indices', 'vertex_index']);
/** Properties that sort faces, which the format does not define; where one has another name it goes unnoticed. */
const SORTS_FACES = /material|part|group|object|segment|label/i;
const FACES_OTHERWISE = new Set(['tristrips', 'trifan', 'trifans']);
const AXES = ['x', 'y', 'z'];

/** Numbers of the properties that say something: of the coordinates in a vertex, of the corner list in a face. */
export interface PlyPlan {
  element: PlyElement;
  /** For each property: 0, 1, 2 for x, y, z; 3 for the list of corners; -1 for what is read over. */
  roles: Int8Array;
}

/** What is to be read of each element that has properties. Errors: missing_property, bad_header. */
export function planPly(header: PlyHeader): PlyPlan[] {
  return header.elements
    .filter((element) => element.properties.length > 0 && element.count > 0)
    .map((element) => {
      const roles = new Int8Array(element.properties.length).fill(-1);
      if (element.name === 'vertex') planVertex(element, roles);
      else if (element.name === 'face') planFace(element, roles);
      return { element, roles };
    });
}

function planVertex(element: PlyElement, roles: Int8Array): void {
  AXES.forEach((axis, i) => {
    const index = element.properties.findIndex((property) => property.name === axis && property.countType === null);
    if (index < 0) throw new MeshError({ code: 'missing_property', expected: axis, detail: `expected a property "${axis}" of the vertices` });
    roles[index] = i;
  });
}

function planFace(element: PlyElement, roles: Int8Array): void {
  const index = element.properties.findIndex((property) => property.countType !== null && INDEX_LISTS.has(property.name));
  if (index < 0) throw new MeshError({ code: 'missing_property', expected: 'vertex_indices', detail: 'expected a list property "vertex_indices" of the faces' });
  if (element.properties[index].type.startsWith('float')) throw new MeshError({ code: 'bad_header', expected: 'whole numbers', detail: 'expected whole numbers in the list of vertex indices, found a decimal type' });
  roles[index] = 3;
}

/** Collects the vertices and faces of a PLY file in the order they come. */
export class PlyPolygons {
  private readonly positions = growingFloat64();
  private readonly faceStarts = growingUint32();
  private readonly faceVertices = growingUint32();
  private readonly faceLines = growingUint32();
  /** Corner with the highest index so far, the place of its face and whether that was text: judged at the end, since vertices may follow the faces. */
  private highest = -1;
  private highestPlace: PlyPlace = {};

  constructor(private readonly header: PlyHeader) {
    this.faceStarts.push(0);
  }

  coordinate(axis: number, value: number, place: () => PlyPlace): void {
    if (!(value >= -MAX_COORDINATE && value <= MAX_COORDINATE)) {
      const expected = `a finite number between −1e50 and 1e50 for ${AXES[axis]}`;
      throw new MeshError({ code: Number.isFinite(value) ? 'number_too_large' : 'not_finite', expected, found: String(value), detail: `expected ${expected}, found ${value}`, ...place() });
    }
    this.positions.push(value);
  }

  corner(index: number, place: () => PlyPlace): void {
    if (index < 0) throw new MeshError({ code: 'vertex_out_of_range', expected: 'a vertex index from 0', found: String(index), detail: `expected a vertex index from 0, found ${index}`, ...place() });
    if (index > this.highest) {
      this.highest = index;
      this.highestPlace = place();
    }
    this.faceVertices.push(index);
  }

  /** Corners that a face is about to bring. */
  face(corners: number, line: number, place: () => PlyPlace): void {
    if (corners < MIN_CORNERS) throw new MeshError({ code: 'face_too_small', expected: `a face of at least ${MIN_CORNERS} vertices`, found: String(corners), detail: `expected a face of at least ${MIN_CORNERS} vertices, found ${corners}`, ...place() });
    const most = MESH_LIMITS.corners;
    if (this.faceVertices.length + corners > most) throw new MeshError({ code: 'too_many_corners', expected: `at most ${most} face corners`, detail: `expected at most ${most} face corners, found more`, ...place() });
    this.faceStarts.push(this.faceVertices.length + corners);
    this.faceLines.push(line);
  }

  finish(): Cage {
    const vertices = this.positions.length / 3;
    const faces = this.faceLines.length;
    if (faces === 0) throw new MeshError({ code: 'no_faces', expected: 'a face', detail: `expected at least one face; the file has ${vertices} vertices` });
    if (this.highest >= vertices) {
      const expected = vertices === 0 ? 'a vertex of this file (it has none)' : `a vertex index from 0 to ${vertices - 1}`;
      throw new MeshError({ code: 'vertex_out_of_range', expected, found: String(this.highest), detail: `expected ${expected}, found ${this.highest}`, ...this.highestPlace });
    }
    const text = this.header.format === 'ascii';
    return {
      ...bareCage({ positions: this.positions.take(), faceStarts: this.faceStarts.take(), faceVertices: this.faceVertices.take() }),
      faceLines: text ? this.faceLines.take() : null,
      warnings: this.notes(),
    };
  }

  private notes() {
    const sorting = this.header.elements.filter((element) => element.name === 'face').flatMap((element) => element.properties.filter((property) => SORTS_FACES.test(property.name)));
    const otherwise = this.header.elements.filter((element) => FACES_OTHERWISE.has(element.name) && element.count > 0);
    return [
      ...sorting.map((property) => fileNote('property_ignored', `Left out the face property "${property.name.slice(0, 40)}": the format does not say what its numbers mean, so it makes no parts.`)),
      ...otherwise.map((element) => fileNote('not_polygons', `Left out the element "${element.name}": only polygons are read.`)),
    ];
  }
}
