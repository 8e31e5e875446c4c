import type { Cage, FaceLabels, Partition } from '../cage';
import { holeFlags, partsBesideHoles } from './holes';
import type { Topology } from './topology';

/** Name of the part that holds the faces without a label, or all faces where the file has no such labels. */
export const DEFAULT_PART = 'default';
/** Name of the one part of a file measured whole. */
export const WHOLE_PART = 'whole';
/** Name under which holes are kept apart; no file's, since names hold no control characters. */
const HOLE_PART = '\u0000holes';

/** Faces sorted into parts, and each part into bodies: its pieces that hang together over edges. */
export interface Bodies {
  /** Where the cage has holes, the last one is theirs. */
  partNames: string[];
  partOf: Int32Array;
  /** Number of the faces that are holes, which are no part of anything; -1 without holes. Their bodies are never measured, and to other bodies they are the outside. */
  holePart: number;
  /** Part under which what is found at a face is told: its own; a hole's is one that it touches, -1 where there is none. */
  toldOf: Int32Array;
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

/** Sorts faces into named parts (equal names are one part, in the order of their first face) and bodies; holes lie apart from both, and belong to their pieces. */
export function partitionFaces(cage: Cage, mesh: Topology, by: Partition): Bodies {
  const partOf = new Int32Array(mesh.faces);
  const partNames: string[] = [];
  const labels = labelsFor(cage, by);
  const pieces = floodFaces(mesh, null);
  const holes = holeFlags(cage);
  if (by === 'piece') {
    const partOfPiece = new Int32Array(pieces.count).fill(-1);
    for (let face = 0; face < mesh.faces; face++) {
      if (holes?.[face] === 1) continue;
      const piece = pieces.of[face];
      if (partOfPiece[piece] < 0) partOfPiece[piece] = partNames.push(`piece ${partNames.length + 1}`) - 1;
      partOf[face] = partOfPiece[piece];
    }
  } else if (labels === null) {
    if (holes === null || holes.includes(0)) partNames.push(by === 'whole' ? WHOLE_PART : DEFAULT_PART);
  } else {
    const partOfName = new Map<string, number>();
    const partOfLabel = new Int32Array(labels.names.length + 1).fill(-1);
    for (let face = 0; face < mesh.faces; face++) {
      if (holes?.[face] === 1) continue;
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
  const holePart = holes === null ? -1 : partNames.push(HOLE_PART) - 1;
  if (holes !== null) for (let face = 0; face < mesh.faces; face++) if (holes[face] === 1) partOf[face] = holePart;
  const toldOf = holes === null ? partOf : partsBesideHoles(mesh, partOf, holePart);
  const { of: bodyOf, count: bodies } = (by === 'piece' && holes === null) || partNames.length < 2 ? pieces : floodFaces(mesh, partOf);
  const partOfBody = new Int32Array(bodies);
  for (let face = 0; face < mesh.faces; face++) partOfBody[bodyOf[face]] = partOf[face];
  const borders = findBorderEdges(mesh, bodyOf === pieces.of ? null : bodyOf);
  return { partNames, partOf, holePart, toldOf, bodyOf, bodies, partOfBody, pieceOf: pieces.of, pieces: pieces.count, borders };
}

/** Name of the part under which what is found at a face is told; null where the file as a whole is. */
export function partToldAt({ partNames, toldOf }: Bodies, face: number): string | null {
  return toldOf[face] < 0 ? null : partNames[toldOf[face]];
}

/** The half-edges across whose edge another group of faces, or nothing, lies; ascending. Without groups only those with nothing. */
export function findBorderEdges({ twin, faceOf }: Topology, groupOf: Int32Array | null): Int32Array {
  const found: number[] = [];
  for (let h = 0; h < twin.length; h++) if (twin[h] < 0 || (groupOf !== null && groupOf[faceOf[twin[h]]] !== groupOf[faceOf[h]])) found.push(h);
  return Int32Array.from(found);
}
