import type { Boundary, Cage, Scheme, TriangleRule } from '../engine/cage';
import { bareCage, fileNote } from './bare-cage';
import { checkCoordinates } from './check-coordinates';
import { MeshError } from './mesh-error';
import { MESH_LIMITS, MIN_CORNERS } from './mesh-limits';
import { numbersOf, textOf, type UsdPrim } from './usd-prim';

const SCHEMES = new Map<string, Scheme>([['catmullClark', 'catmull-clark'], ['loop', 'loop'], ['none', 'polyhedral'], ['bilinear', 'polyhedral']]);
const BOUNDARIES = new Map<string, Boundary>([['edgeAndCorner', 'edge-and-corner'], ['edgeOnly', 'edge-only']]);
const TRIANGLES = new Map<string, TriangleRule>([['catmullClark', 'catmark'], ['smooth', 'smooth']]);

function bad(path: string, code: string, expected: string, found: string | number): MeshError {
  return new MeshError({ code, expected, found: String(found), detail: `mesh ${path.slice(0, 200)}: expected ${expected}, found ${found}` });
}

/** An attribute as whole numbers from 0 below `bound`; empty where it is not authored. */
function indices(prim: UsdPrim, name: string, bound: number, path: string, code = 'bad_index'): Uint32Array {
  const given = numbersOf(prim, name) ?? [];
  const whole = new Uint32Array(given.length);
  for (let i = 0; i < given.length; i++) {
    const value = given[i];
    if (!Number.isInteger(value) || value < 0 || value >= bound) throw bad(path, code, `whole numbers from 0 to ${bound - 1} in ${name}`, `${value} at place ${i}`);
    whole[i] = value;
  }
  return whole;
}

/** The numbers of an attribute that has to be there. */
function required(prim: UsdPrim, name: string, path: string): ArrayLike<number> {
  const given = numbersOf(prim, name);
  if (given === null) throw bad(path, 'missing_attribute', `numbers in ${name}`, 'none');
  return given;
}

function sharpnesses(prim: UsdPrim, name: string, counts: number[], path: string): Float32Array {
  const given = numbersOf(prim, name) ?? [];
  if (!counts.includes(given.length)) throw bad(path, 'bad_count', `${counts.join(' or ')} numbers in ${name}`, given.length);
  for (let i = 0; i < given.length; i++) if (!(given[i] >= 0) || given[i] > 3.4e38) throw bad(path, 'bad_sharpness', `a sharpness of 0 or more in ${name}`, given[i]);
  return Float32Array.from(given);
}

/** Edges and their sharpness from chains of vertices, with one sharpness a chain or one an edge. */
function readCreases(prim: UsdPrim, vertices: number, path: string): Pick<Cage, 'creaseVertices' | 'creaseSharpness'> {
  const chain = indices(prim, 'creaseIndices', vertices, path);
  const lengths = indices(prim, 'creaseLengths', MESH_LIMITS.corners, path);
  let total = 0;
  for (const length of lengths) {
    if (length < 2) throw bad(path, 'bad_count', 'creases of at least two vertices in creaseLengths', length);
    total += length;
  }
  if (total !== chain.length) throw bad(path, 'bad_count', `${total} vertices in creaseIndices, as creaseLengths adds up to`, chain.length);
  const edges = total - lengths.length;
  const given = sharpnesses(prim, 'creaseSharpnesses', [lengths.length, edges], path);
  const creaseVertices = new Uint32Array(2 * edges);
  const creaseSharpness = new Float32Array(edges);
  let [at, edge] = [0, 0];
  lengths.forEach((length, crease) => {
    for (let k = 1; k < length; k++, edge++) {
      creaseVertices[2 * edge] = chain[at + k - 1];
      creaseVertices[2 * edge + 1] = chain[at + k];
      creaseSharpness[edge] = given[given.length === edges ? edge : crease];
    }
    at += length;
  });
  return { creaseVertices, creaseSharpness };
}

function readFaces(prim: UsdPrim, vertices: number, path: string): Pick<Cage, 'faceStarts' | 'faceVertices'> {
  const counts = required(prim, 'faceVertexCounts', path);
  if (counts.length > MESH_LIMITS.faces) throw bad(path, 'too_many_faces', `at most ${MESH_LIMITS.faces} faces`, counts.length);
  const faceStarts = new Uint32Array(counts.length + 1);
  let corners = 0;
  for (let face = 0; face < counts.length; face++) {
    if (!Number.isInteger(counts[face]) || counts[face] < MIN_CORNERS) throw bad(path, 'face_too_small', `faces of at least ${MIN_CORNERS} vertices in faceVertexCounts`, `${counts[face]} at place ${face}`);
    corners += counts[face];
    if (corners > MESH_LIMITS.corners) throw bad(path, 'too_many_corners', `at most ${MESH_LIMITS.corners} face corners`, corners);
    faceStarts[face + 1] = corners;
  }
  const held = required(prim, 'faceVertexIndices', path).length;
  if (held !== corners) throw bad(path, 'bad_count', `${corners} vertices in faceVertexIndices, as faceVertexCounts adds up to`, held);
  return { faceStarts, faceVertices: indices(prim, 'faceVertexIndices', vertices, path, 'vertex_out_of_range') };
}

/**
 * The polygons of a mesh prim in its own space, with the tags that shape its surface and what it asks of subdivision; where it is silent, the standard's
 * own values (Catmull-Clark, edge and corner). Source: the standard's UsdGeomMesh (from memory). Errors: MeshError with the prim's path.
 */
export function usdPolygons(prim: UsdPrim, path: string): Cage {
  const points = required(prim, 'points', path);
  if (points.length % 3 !== 0) throw bad(path, 'bad_count', 'three numbers a point in points', points.length);
  const vertices = points.length / 3;
  if (vertices > MESH_LIMITS.vertices) throw bad(path, 'too_many_vertices', `at most ${MESH_LIMITS.vertices} points`, vertices);
  const positions = new Float64Array(points);
  checkCoordinates(positions, `mesh ${path.slice(0, 200)}: `, null);
  const { faceStarts, faceVertices } = readFaces(prim, vertices, path);
  const cornerVertices = indices(prim, 'cornerIndices', vertices, path);
  const holes = indices(prim, 'holeIndices', faceStarts.length - 1, path);
  const boundary = textOf(prim, 'interpolateBoundary');
  const warnings = [];
  if (boundary === 'none') warnings.push(fileNote('boundary_none', `Mesh ${path} asks to leave out faces at open borders; they are measured.`));
  return {
    ...bareCage({ positions, faceStarts, faceVertices }),
    ...readCreases(prim, vertices, path),
    cornerVertices,
    cornerSharpness: sharpnesses(prim, 'cornerSharpnesses', [cornerVertices.length], path),
    ...(holes.length > 0 ? { holes } : {}),
    boundary: BOUNDARIES.get(boundary ?? 'edgeAndCorner') ?? null,
    scheme: SCHEMES.get(textOf(prim, 'subdivisionScheme') ?? 'catmullClark') ?? null,
    triangles: TRIANGLES.get(textOf(prim, 'triangleSubdivisionRule') ?? 'catmullClark') ?? null,
    warnings,
  };
}
