import { emptyBox, growBox } from './box-tree';
import type { Topology } from './topology';

/** A box per group that holds nothing. */
export function emptyBoxes(count: number): Float64Array {
  const boxes = new Float64Array(6 * count);
  for (let at = 0; at < boxes.length; at += 6) emptyBox(boxes, at);
  return boxes;
}

/** Enlarges the box at `to` by the point at `from`. */
export function growToPoint(boxes: Float64Array, to: number, positions: Float64Array, from: number): void {
  for (let axis = 0; axis < 3; axis++) {
    const value = positions[from + axis];
    if (value < boxes[to + axis]) boxes[to + axis] = value;
    if (value > boxes[to + 3 + axis]) boxes[to + 3 + axis] = value;
  }
}

/**
 * Boxes (min x, y, z, max x, y, z per face) that hold each face's limit surface. It lies in the hull of the vertices of the faces around it
 * (`smooth`), whatever the scheme; the cage's own faces lie in the hull of their own vertices.
 */
export function faceHulls(mesh: Topology, positions: Float64Array, smooth: boolean): Float64Array {
  const own = emptyBoxes(mesh.faces);
  for (let h = 0; h < mesh.vertexOf.length; h++) growToPoint(own, 6 * mesh.faceOf[h], positions, 3 * mesh.vertexOf[h]);
  if (!smooth) return own;
  const around = emptyBoxes(mesh.vertices);
  for (let h = 0; h < mesh.vertexOf.length; h++) growBox(around, 6 * mesh.vertexOf[h], own, 6 * mesh.faceOf[h]);
  for (let h = 0; h < mesh.vertexOf.length; h++) growBox(own, 6 * mesh.faceOf[h], around, 6 * mesh.vertexOf[h]);
  return own;
}
