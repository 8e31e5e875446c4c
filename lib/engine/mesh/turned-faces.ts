import type { Cage } from '../cage';
import { nextHalfEdge, type Topology } from './topology';

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
export function findTurnedFaces(mesh: Topology, cage: Cage): TurnedFaces {
  const neighbours = pairFaces(mesh, cage);
  const side = new Int8Array(mesh.faces).fill(-1);
  const turned: number[] = [];
  const oneSided: number[] = [];
  for (let seed = 0; seed < mesh.faces; seed++) {
    if (side[seed] >= 0) continue;
    side[seed] = 0;
    const piece = [seed];
    for (let i = 0; i < piece.length; i++) {
      const face = piece[i];
      for (let h = mesh.starts[face]; h < mesh.starts[face + 1]; h++) {
        const other = neighbours[h];
        if (other < 0) continue;
        const face2 = mesh.faceOf[other];
        const wanted = mesh.vertexOf[other] === mesh.vertexOf[h] ? 1 - side[face] : side[face];
        if (side[face2] < 0) {
          side[face2] = wanted;
          piece.push(face2);
        } else if (side[face2] !== wanted && h < other) oneSided.push(h);
      }
    }
    const reversed = piece.filter((face) => side[face] === 1);
    const minority = 2 * reversed.length <= piece.length ? reversed : piece.filter((face) => side[face] === 0);
    turned.push(...minority);
  }
  return { faces: turned.sort((a, b) => a - b), oneSided };
}

/** The other half-edge of each edge with exactly two faces, whichever way it runs; -1 elsewhere. Rare path, so a map is fine here. */
function pairFaces(mesh: Topology, cage: Cage): Int32Array {
  const vertices = cage.positions.length / 3;
  const byEdge = new Map<number, number[]>();
  for (let h = 0; h < mesh.vertexOf.length; h++) {
    const a = mesh.vertexOf[h];
    const b = mesh.vertexOf[nextHalfEdge(mesh, h)];
    const key = Math.min(a, b) * vertices + Math.max(a, b);
    const list = byEdge.get(key);
    if (list === undefined) byEdge.set(key, [h]);
    else list.push(h);
  }
  const pair = new Int32Array(mesh.vertexOf.length).fill(-1);
  for (const list of byEdge.values()) {
    if (list.length !== 2) continue;
    pair[list[0]] = list[1];
    pair[list[1]] = list[0];
  }
  return pair;
}
