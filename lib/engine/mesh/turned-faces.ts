import { pairEdges } from './match-edges';
import type { Topology } from './topology';

/** What has to be reversed so that every piece is turned one way. */
export interface TurnedFaces {
  /** Faces to reverse, ascending. */
  faces: number[];
  /** Half-edges, one for each edge that no reversal puts right: the surface there has one side only, as a Möbius strip has. */
  oneSided: number[];
}

/**
 * Finds the faces that are turned against their neighbours: sides are spread over the edges with exactly two faces,
 * and in each piece the smaller side (the later one where they are equal) is the turned one.
 */
export function findTurnedFaces(mesh: Topology): TurnedFaces {
  const neighbours = pairEdges(mesh);
  const side = new Int8Array(mesh.faces).fill(-1);
  const turned: number[] = [];
  const oneSided: number[] = [];
  const piece = new Int32Array(mesh.faces);
  for (let seed = 0; seed < mesh.faces; seed++) {
    if (side[seed] >= 0) continue;
    side[seed] = 0;
    let found = 0;
    let reversed = 0;
    piece[found++] = seed;
    for (let i = 0; i < found; i++) {
      const face = piece[i];
      reversed += side[face];
      for (let h = mesh.starts[face]; h < mesh.starts[face + 1]; h++) {
        const other = neighbours[h];
        if (other < 0) continue;
        const face2 = mesh.faceOf[other];
        const wanted = mesh.vertexOf[other] === mesh.vertexOf[h] ? 1 - side[face] : side[face];
        if (side[face2] < 0) {
          side[face2] = wanted;
          piece[found++] = face2;
        } else if (side[face2] !== wanted && h < other) oneSided.push(h);
      }
    }
    const minority = 2 * reversed <= found ? 1 : 0;
    for (let i = 0; i < found; i++) if (side[piece[i]] === minority) turned.push(piece[i]);
  }
  return { faces: turned.sort((a, b) => a - b), oneSided };
}
