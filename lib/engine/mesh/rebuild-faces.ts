import type { Cage, FaceLabels } from '../cage';
import { holeFlags } from './holes';

/** The cage with the given faces (its own numbers, ascending) and their corners, no more than it had; labels, holes and lines go along. */
export function rebuildFaces(cage: Cage, faces: readonly number[], cornersOf: (face: number) => readonly number[]): Cage {
  const faceStarts = new Uint32Array(faces.length + 1);
  const corners = new Uint32Array(cage.faceVertices.length);
  let count = 0;
  faces.forEach((face, i) => {
    for (const vertex of cornersOf(face)) corners[count++] = vertex;
    faceStarts[i + 1] = count;
  });
  const pick = (labels: FaceLabels | null): FaceLabels | null => labels && { names: labels.names, labels: Int32Array.from(faces, (face) => labels.labels[face]) };
  const flags = holeFlags(cage);
  return {
    ...cage,
    ...(flags === null ? {} : { holes: Uint32Array.from(faces.keys()).filter((i) => flags[faces[i]] === 1) }),
    faceStarts,
    faceVertices: corners.slice(0, count),
    groups: pick(cage.groups),
    objects: pick(cage.objects),
    materials: pick(cage.materials),
    joints: pick(cage.joints),
    faceLines: cage.faceLines && Uint32Array.from(faces, (face) => cage.faceLines?.[face] ?? 0),
  };
}
