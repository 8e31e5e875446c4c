import type { Cage, FaceLabels, Partition } from '../cage';
import type { Topology } from './topology';

/** Name of the part that holds the faces without a label, or all faces where the file has no such labels. */
export const DEFAULT_PART = 'default';
/** Name of the one part of a file measured whole. */
export const WHOLE_PART = 'whole';

/** Faces sorted into parts, and each part into bodies: its pieces that hang together over edges. */
export interface Bodies {
  partNames: string[];
  partOf: Int32Array;
  bodyOf: Int32Array;
  bodies: number;
  /** Part of each body; bodies are numbered by their first face. */
  partOfBody: Int32Array;
  /** Piece of each face, whatever its part: what hangs together over edges. */
  pieceOf: Int32Array;
  pieces: number;
  /** Half-edges across whose edge another body, or nothing, lies; ascending. */
  borders: Int32Array;
}

function labelsFor(cage: Cage, by: Partition): FaceLabels | null {
  if (by === 'group') return cage.groups;
  if (by === 'object') return cage.objects;
  if (by === 'material') return cage.materials;
  if (by === 'joint') return cage.joints;
  return null;
}

/** Numbers the pieces that hang together over edges whose two faces have the same key. */
export function floodFaces(mesh: Topology, key: Int32Array | null): { of: Int32Array; count: number } {
  const of = new Int32Array(mesh.faces).fill(-1);
  const stack = new Int32Array(mesh.faces);
  let count = 0;
  for (let seed = 0; seed < mesh.faces; seed++) {
    if (of[seed] >= 0) continue;
    let top = 0;
    stack[top++] = seed;
    of[seed] = count;
    while (top > 0) {
      const face = stack[--top];
      for (let h = mesh.starts[face]; h < mesh.starts[face + 1]; h++) {
        const twin = mesh.twin[h];
        if (twin < 0) continue;
        const other = mesh.faceOf[twin];
        if (of[other] >= 0 || (key !== null && key[other] !== key[face])) continue;
        of[other] = count;
        stack[top++] = other;
      }
    }
    count++;
  }
  return { of, count };
}

/** Sorts faces into named parts (equal names are one part, in the order of their first face) and bodies. */
export function partitionFaces(cage: Cage, mesh: Topology, by: Partition): Bodies {
  const partOf = new Int32Array(mesh.faces);
  const partNames: string[] = [];
  const labels = labelsFor(cage, by);
  const pieces = floodFaces(mesh, null);
  if (by === 'piece') {
    partOf.set(pieces.of);
    for (let i = 0; i < pieces.count; i++) partNames.push(`piece ${i + 1}`);
  } else if (labels === null) {
    partNames.push(by === 'whole' ? WHOLE_PART : DEFAULT_PART);
  } else {
    const partOfName = new Map<string, number>();
    const partOfLabel = new Int32Array(labels.names.length + 1).fill(-1);
    for (let face = 0; face < mesh.faces; face++) {
      const label = labels.labels[face];
      const slot = label < 0 ? labels.names.length : label;
      if (partOfLabel[slot] < 0) {
        const name = label < 0 ? DEFAULT_PART : labels.names[label];
        const known = partOfName.get(name);
        partOfLabel[slot] = known ?? partNames.length;
        if (known === undefined) {
          partOfName.set(name, partNames.length);
          partNames.push(name);
        }
      }
      partOf[face] = partOfLabel[slot];
    }
  }
  const { of: bodyOf, count: bodies } = by === 'piece' || partNames.length < 2 ? pieces : floodFaces(mesh, partOf);
  const partOfBody = new Int32Array(bodies);
  for (let face = 0; face < mesh.faces; face++) partOfBody[bodyOf[face]] = partOf[face];
  return { partNames, partOf, bodyOf, bodies, partOfBody, pieceOf: pieces.of, pieces: pieces.count, borders: findBorderEdges(mesh, bodyOf === pieces.of ? null : bodyOf) };
}

/** The half-edges across whose edge another group of faces, or nothing, lies; ascending. Without groups only those with nothing. */
export function findBorderEdges({ twin, faceOf }: Topology, groupOf: Int32Array | null): Int32Array {
  const found: number[] = [];
  for (let h = 0; h < twin.length; h++) if (twin[h] < 0 || (groupOf !== null && groupOf[faceOf[twin[h]]] !== groupOf[faceOf[h]])) found.push(h);
  return Int32Array.from(found);
}
