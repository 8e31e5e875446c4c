import type { Cage, FaceLabels, FormatWarning } from '../engine/cage';
import { MeshError } from './mesh-error';
import { MESH_LIMITS } from './mesh-limits';
import { WARNINGS_KEPT } from './warning-list';

type LabelKind = 'groups' | 'objects' | 'materials' | 'joints';

/**
 * One cage of several that lie in the same frame and unit: vertices and faces follow one another, equal names become one label, and nothing is welded.
 * Boundary, scheme and triangle rule are kept where all that name one name the same; units and up axis are those of the first.
 * Errors: too_many_vertices, too_many_faces, too_many_corners, too_many_names.
 */
export function mergeCages(cages: Cage[]): Cage {
  if (cages.length === 1) return cages[0];
  const totals = new CageTotals();
  for (const cage of cages) totals.add(cage);
  const first = cages[0];
  const shared = <T>(values: (T | null | undefined)[]): T | null => {
    const named = new Set(values.filter((value): value is T => value !== null && value !== undefined));
    return named.size === 1 ? [...named][0] : null;
  };
  const withHoles = cages.some((cage) => cage.holes !== undefined);
  return {
    positions: joinFloats(cages.map((cage) => cage.positions)),
    faceStarts: joinStarts(cages),
    faceVertices: joinShifted(cages, (cage) => cage.faceVertices, vertexShift),
    groups: joinLabels(cages, 'groups'),
    objects: joinLabels(cages, 'objects'),
    materials: joinLabels(cages, 'materials'),
    joints: joinLabels(cages, 'joints'),
    creaseVertices: joinShifted(cages, (cage) => cage.creaseVertices, vertexShift),
    creaseSharpness: joinSharpness(cages.map((cage) => cage.creaseSharpness)),
    cornerVertices: joinShifted(cages, (cage) => cage.cornerVertices, vertexShift),
    cornerSharpness: joinSharpness(cages.map((cage) => cage.cornerSharpness)),
    ...(withHoles ? { holes: joinShifted(cages, (cage) => cage.holes ?? new Uint32Array(0), faceShift) } : {}),
    boundary: shared(cages.map((cage) => cage.boundary)),
    scheme: shared(cages.map((cage) => cage.scheme)),
    triangles: shared(cages.map((cage) => cage.triangles)),
    faceLines: null,
    metresPerUnit: first.metresPerUnit,
    upAxis: first.upAxis,
    warnings: keepWarnings(cages.flatMap((cage) => cage.warnings)),
  };
}

/** Sums up cages that are to be one, and refuses the one that makes them too many. Errors: too_many_vertices, too_many_faces, too_many_corners. */
export class CageTotals {
  private vertices = 0;
  private faces = 0;
  private corners = 0;

  add(cage: Cage): void {
    bound('vertices', (this.vertices += vertexShift(cage)));
    bound('faces', (this.faces += faceShift(cage)));
    bound('corners', (this.corners += cage.faceVertices.length));
  }
}

/** Each sentence once, and not more than a reader takes in. */
function keepWarnings(warnings: FormatWarning[]): FormatWarning[] {
  return [...new Map(warnings.map((warning) => [`${warning.code} ${warning.message}`, warning])).values()].slice(0, WARNINGS_KEPT);
}

function bound(kind: 'vertices' | 'faces' | 'corners', found: number): void {
  const most = MESH_LIMITS[kind];
  if (found > most) throw new MeshError({ code: `too_many_${kind}`, expected: `at most ${most} ${kind}`, found: String(found), detail: `expected at most ${most} ${kind} in all meshes, found ${found}` });
}

const vertexShift = (cage: Cage) => cage.positions.length / 3;
const faceShift = (cage: Cage) => cage.faceStarts.length - 1;

function joinFloats(pieces: Float64Array[]): Float64Array {
  const joined = new Float64Array(pieces.reduce((sum, piece) => sum + piece.length, 0));
  let at = 0;
  for (const piece of pieces) {
    joined.set(piece, at);
    at += piece.length;
  }
  return joined;
}

function joinSharpness(pieces: Float32Array[]): Float32Array {
  return Float32Array.from(joinFloats(pieces.map((piece) => Float64Array.from(piece))));
}

function joinShifted(cages: Cage[], pick: (cage: Cage) => Uint32Array, shiftOf: (cage: Cage) => number): Uint32Array {
  const joined = new Uint32Array(cages.reduce((sum, cage) => sum + pick(cage).length, 0));
  let at = 0;
  let shift = 0;
  for (const cage of cages) {
    for (const index of pick(cage)) joined[at++] = index + shift;
    shift += shiftOf(cage);
  }
  return joined;
}

function joinStarts(cages: Cage[]): Uint32Array {
  const joined = new Uint32Array(cages.reduce((sum, cage) => sum + faceShift(cage), 1));
  let at = 0;
  let shift = 0;
  for (const cage of cages) {
    for (let face = 0; face < faceShift(cage); face++) joined[at++] = shift + cage.faceStarts[face];
    shift += cage.faceVertices.length;
  }
  joined[at] = shift;
  return joined;
}

function joinLabels(cages: Cage[], kind: LabelKind): FaceLabels | null {
  if (cages.every((cage) => cage[kind] === null)) return null;
  const names: string[] = [];
  const numberOf = new Map<string, number>();
  const labels = new Int32Array(cages.reduce((sum, cage) => sum + faceShift(cage), 0)).fill(-1);
  let at = 0;
  for (const cage of cages) {
    const given = cage[kind];
    const map = given?.names.map((name) => {
      const known = numberOf.get(name);
      if (known !== undefined) return known;
      numberOf.set(name, names.length);
      return names.push(name) - 1;
    });
    if (names.length > MESH_LIMITS.names) throw new MeshError({ code: 'too_many_names', expected: `at most ${MESH_LIMITS.names} names`, detail: `expected at most ${MESH_LIMITS.names} ${kind} in all meshes, found more` });
    if (given && map) for (let face = 0; face < given.labels.length; face++) labels[at + face] = given.labels[face] < 0 ? -1 : map[given.labels[face]];
    at += faceShift(cage);
  }
  return { names, labels };
}
