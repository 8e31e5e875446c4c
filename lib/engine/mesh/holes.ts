import type { Cage } from '../cage';
import type { Bodies } from './partition';
import type { Topology } from './topology';

/** 1 for each face that the cage marks as a hole; null where it marks none. */
export function holeFlags({ holes, faceStarts }: Cage): Uint8Array | null {
  if (holes === undefined || holes.length === 0) return null;
  const flags = new Uint8Array(faceStarts.length - 1);
  for (const face of holes) flags[face] = 1;
  return flags.includes(1) ? flags : null;
}

/** `partOf` with, for each hole, the first part of a face that it shares a vertex with; -1 where it touches holes alone. */
export function partsBesideHoles({ starts, vertexOf, vertices }: Topology, partOf: Int32Array, holePart: number): Int32Array {
  const partAt = new Int32Array(vertices).fill(-1);
  for (let face = 0; face < partOf.length; face++) {
    if (partOf[face] === holePart) continue;
    for (let h = starts[face]; h < starts[face + 1]; h++) if (partAt[vertexOf[h]] < 0 || partOf[face] < partAt[vertexOf[h]]) partAt[vertexOf[h]] = partOf[face];
  }
  return partOf.map((part, face) => {
    if (part !== holePart) return part;
    let beside = -1;
    for (let h = starts[face]; h < starts[face + 1]; h++) {
      const found = partAt[vertexOf[h]];
      if (found >= 0 && (beside < 0 || found < beside)) beside = found;
    }
    return beside;
  });
}

/** Whether a part is open along a half-edge of its faces: nothing lies across the edge, or a hole. */
export function isOpenEdge(mesh: Topology, { partOf, holePart }: Pick<Bodies, 'partOf' | 'holePart'>, h: number): boolean {
  if (partOf[mesh.faceOf[h]] === holePart) return false;
  const twin = mesh.twin[h];
  return twin < 0 || partOf[mesh.faceOf[twin]] === holePart;
}

/** The mesh with nothing across the edges of its holes, as the faces beside them see it. */
export function openAtHoles(mesh: Topology, { partOf, holePart }: Pick<Bodies, 'partOf' | 'holePart'>): Topology {
  if (holePart < 0) return mesh;
  const isHole = (h: number): boolean => partOf[mesh.faceOf[h]] === holePart;
  return { ...mesh, twin: mesh.twin.map((twin, h) => (twin < 0 || isHole(h) || isHole(twin) ? -1 : twin)) };
}
