import type { Cage, FaceLabels, FormatWarning } from '../engine/cage';
import { bareCage, evenStarts, fileNote, trianglesOnlyNote } from './bare-cage';
import { checkCoordinates } from './check-coordinates';
import { MeshError } from './mesh-error';
import { MESH_LIMITS } from './mesh-limits';
import { readStlText } from './stl-text';
import { weldTriangles } from './weld-triangles';

/** Triangles as the file lists them: nine coordinates each, and what sorts them. */
export interface StlTriangles {
  positions: Float64Array;
  /** Names of the solids, text files only. */
  solids: FaceLabels | null;
  /** Line of each triangle, text files only. */
  lines: Uint32Array | null;
}

const HEADER_BYTES = 84;
const TRIANGLE_BYTES = 50;
const COUNT_AT = 80;
const CORNERS_AT = 12;

/** Whether the length is the one that a binary file's triangle count asks for: many binary files begin with "solid" like text. */
export function isBinaryStl(bytes: Uint8Array): boolean {
  return bytes.length >= HEADER_BYTES && bytes.length === HEADER_BYTES + TRIANGLE_BYTES * countOf(bytes);
}

const viewOf = (bytes: Uint8Array) => new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
const countOf = (bytes: Uint8Array) => viewOf(bytes).getUint32(COUNT_AT, true);

/**
 * Reads an STL file, text or binary. Corners with the very same coordinates become one vertex; triangles with two corners in one place are left out
 * and said. The facets' own normals are not used: the corners' order says where outside is. Unit and frame are not in the format.
 * Source: The StL format, fabbers.com (from memory). Errors: MeshError with line and column in text, else with the byte.
 */
export function readStl(bytes: Uint8Array): Cage {
  if (bytes.length === 0) throw new MeshError({ code: 'empty_file', detail: 'the file is empty' });
  const triangles = !isBinaryStl(bytes) && beginsLikeText(bytes) ? readStlText(bytes) : readBinary(bytes);
  const count = triangles.positions.length / 9;
  if (count === 0) throw new MeshError({ code: 'no_faces', expected: 'a triangle', detail: 'expected at least one triangle, found none' });
  const welded = weldTriangles(triangles.positions, evenStarts(3 * count - 1, 1));
  const faces = welded.faceOf.length;
  if (faces === 0) throw new MeshError({ code: 'no_faces', expected: 'a triangle', detail: `expected at least one triangle with three different corners, found none among ${count}` });
  const solids = triangles.solids && { names: triangles.solids.names, labels: welded.faceOf.map((face) => triangles.solids!.labels[face]) };
  const warnings: FormatWarning[] = [trianglesOnlyNote('STL')];
  if (welded.collapsed > 0) warnings.push(collapsedNote(welded.collapsed));
  return {
    ...bareCage({ positions: welded.positions, faceStarts: evenStarts(faces, 3), faceVertices: welded.faceVertices }),
    groups: solids,
    objects: solids,
    faceLines: triangles.lines && Uint32Array.from(welded.faceOf, (face) => triangles.lines![face]),
    warnings,
  };
}

/** That triangles without three different corners were left out. */
export function collapsedNote(count: number): FormatWarning {
  return fileNote('collapsed_triangles', `Left out ${count} triangle${count === 1 ? '' : 's'} with two corners in one place.`);
}

function beginsLikeText(bytes: Uint8Array): boolean {
  const start = bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf ? 3 : 0;
  return /^\s*solid\b/i.test(String.fromCharCode(...bytes.subarray(start, start + 64)));
}

function readBinary(bytes: Uint8Array): StlTriangles {
  if (bytes.length < HEADER_BYTES) {
    throw new MeshError({ code: 'truncated', expected: `a header of ${HEADER_BYTES} bytes`, detail: `expected "solid" or a header of ${HEADER_BYTES} bytes, found ${bytes.length} bytes`, offset: bytes.length });
  }
  const count = countOf(bytes);
  const held = Math.floor((bytes.length - HEADER_BYTES) / TRIANGLE_BYTES);
  if (count > MESH_LIMITS.faces && held > MESH_LIMITS.faces) throw new MeshError({ code: 'too_many_faces', expected: `at most ${MESH_LIMITS.faces} triangles`, found: String(count), detail: `expected at most ${MESH_LIMITS.faces} triangles, found ${count}`, offset: COUNT_AT });
  if (count !== held || !isBinaryStl(bytes)) {
    const expected = `${HEADER_BYTES} + 50 × ${count} = ${HEADER_BYTES + TRIANGLE_BYTES * count} bytes for the ${count} triangles declared`;
    throw new MeshError({ code: 'bad_count', expected, found: String(bytes.length), detail: `expected ${expected}, found ${bytes.length}`, offset: COUNT_AT });
  }
  const view = viewOf(bytes);
  const positions = new Float64Array(9 * count);
  for (let i = 0; i < count; i++) {
    const at = HEADER_BYTES + i * TRIANGLE_BYTES + CORNERS_AT;
    for (let k = 0; k < 9; k++) positions[9 * i + k] = view.getFloat32(at + 4 * k, true);
  }
  checkCoordinates(positions, '', (vertex) => HEADER_BYTES + Math.floor(vertex / 3) * TRIANGLE_BYTES + CORNERS_AT + 12 * (vertex % 3));
  return { positions, solids: null, lines: null };
}
