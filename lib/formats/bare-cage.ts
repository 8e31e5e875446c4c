import type { Cage, FaceLabels, FormatWarning } from '../engine/cage';

/** A cage of these polygons of which the file says nothing else. */
export function bareCage(polygons: Pick<Cage, 'positions' | 'faceStarts' | 'faceVertices'>): Cage {
  return {
    ...polygons,
    groups: null,
    objects: null,
    materials: null,
    joints: null,
    creaseVertices: new Uint32Array(0),
    creaseSharpness: new Float32Array(0),
    cornerVertices: new Uint32Array(0),
    cornerSharpness: new Float32Array(0),
    boundary: null,
    faceLines: null,
    metresPerUnit: null,
    upAxis: null,
    warnings: [],
  };
}

/** One name for all faces. */
export function oneLabel(name: string, faces: number): FaceLabels {
  return { names: [name], labels: new Int32Array(faces) };
}

/** Row starts of faces that all have the same number of corners; length `faces` + 1. */
export function evenStarts(faces: number, corners: number): Uint32Array {
  const starts = new Uint32Array(faces + 1);
  for (let face = 1; face <= faces; face++) starts[face] = face * corners;
  return starts;
}

/** A warning about the file as a whole. */
export function fileNote(code: string, message: string): FormatWarning {
  return { code, message, line: null, column: null };
}

/** What formats that carry triangles alone say of themselves. */
export function trianglesOnlyNote(format: string): FormatWarning {
  return fileNote('triangles_only', `${format} carries triangles without creases: measure it under Loop, or as it is (polyhedral). Catmull-Clark would take the triangles for the control cage.`);
}
