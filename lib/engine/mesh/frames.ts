import type { Bodies } from './partition';
import type { Topology } from './topology';

/** Local frames: all work happens about the box centres of connected pieces and bodies, so that a far origin costs no digits. */
export interface Frames {
  /** The cage's positions less the box centre of their piece. */
  positions: Float64Array;
  /** x, y, z per body: box centre of its piece in the file's frame. */
  pieceCentres: Float64Array;
  /** x, y, z per body: box centre of the body in its piece's frame; the apex of its cones. */
  origins: Float64Array;
  /** Min x, y, z, max x, y, z per body: box of its control points in the file's frame. */
  boxes: Float64Array;
}

const NO_GROUP = -1;

/** Boxes of the vertices of each group's faces; `groupAt` receives a group of each vertex, NO_GROUP where it belongs to no face. */
function boxesOf(mesh: Topology, positions: Float64Array, groupOf: Int32Array, groups: number, groupAt: Int32Array): Float64Array {
  const boxes = new Float64Array(6 * groups);
  for (let group = 0; group < groups; group++) boxes.fill(Infinity, 6 * group, 6 * group + 3).fill(-Infinity, 6 * group + 3, 6 * group + 6);
  groupAt.fill(NO_GROUP);
  const { vertexOf, starts } = mesh;
  for (let face = 0; face < mesh.faces; face++) {
    const group = groupOf[face];
    const at = 6 * group;
    for (let h = starts[face]; h < starts[face + 1]; h++) {
      const vertex = vertexOf[h];
      if (groupAt[vertex] === group) continue;
      groupAt[vertex] = group;
      for (let axis = 0; axis < 3; axis++) {
        const value = positions[3 * vertex + axis];
        if (value < boxes[at + axis]) boxes[at + axis] = value;
        if (value > boxes[at + 3 + axis]) boxes[at + 3 + axis] = value;
      }
    }
  }
  return boxes;
}

/** Gives pieces that share a vertex, as they do beside a defect, the box of all of them: a vertex has one position, so they need one frame. */
function joinTouching(mesh: Topology, pieceOf: Int32Array, boxes: Float64Array): void {
  const rootOf = Int32Array.from({ length: boxes.length / 6 }, (_, piece) => piece);
  const find = (piece: number): number => {
    while (rootOf[piece] !== piece) piece = rootOf[piece] = rootOf[rootOf[piece]];
    return piece;
  };
  const pieceAt = new Int32Array(mesh.vertices).fill(NO_GROUP);
  let joined = false;
  for (let face = 0; face < mesh.faces; face++) {
    for (let h = mesh.starts[face]; h < mesh.starts[face + 1]; h++) {
      const known = pieceAt[mesh.vertexOf[h]];
      pieceAt[mesh.vertexOf[h]] = pieceOf[face];
      if (known === NO_GROUP || known === pieceOf[face]) continue;
      rootOf[find(known)] = find(pieceOf[face]);
      joined = true;
    }
  }
  if (!joined) return;
  for (let piece = 0; piece < rootOf.length; piece++) {
    const [from, to] = [6 * piece, 6 * find(piece)];
    for (let axis = 0; axis < 3; axis++) {
      boxes[to + axis] = Math.min(boxes[to + axis], boxes[from + axis]);
      boxes[to + 3 + axis] = Math.max(boxes[to + 3 + axis], boxes[from + 3 + axis]);
    }
  }
  for (let piece = 0; piece < rootOf.length; piece++) boxes.copyWithin(6 * piece, 6 * find(piece), 6 * find(piece) + 6);
}

/** Makes the local frames of a cage. */
export function makeFrames(mesh: Topology, positions: Float64Array, bodies: Bodies): Frames {
  const { pieceOf } = bodies;
  const groupAt = new Int32Array(mesh.vertices);
  const boxes = bodies.bodyOf === pieceOf ? null : boxesOf(mesh, positions, bodies.bodyOf, bodies.bodies, groupAt);
  const pieceBoxes = boxesOf(mesh, positions, pieceOf, bodies.pieces, groupAt);
  const bodyBoxes = boxes ?? pieceBoxes.slice();
  if (bodies.pieces > 1) joinTouching(mesh, pieceOf, pieceBoxes);
  const pieceOfBody = new Int32Array(bodies.bodies);
  const local = new Float64Array(positions.length);
  const centre = (all: Float64Array, group: number, axis: number): number => all[6 * group + axis] / 2 + all[6 * group + 3 + axis] / 2;
  const centres = Float64Array.from({ length: 3 * bodies.pieces }, (_, i) => centre(pieceBoxes, Math.floor(i / 3), i % 3));
  for (let vertex = 0; vertex < mesh.vertices; vertex++) {
    if (groupAt[vertex] === NO_GROUP) continue;
    const v = 3 * vertex;
    const at = 3 * groupAt[vertex];
    local[v] = positions[v] - centres[at];
    local[v + 1] = positions[v + 1] - centres[at + 1];
    local[v + 2] = positions[v + 2] - centres[at + 2];
  }
  for (let face = 0; face < mesh.faces; face++) pieceOfBody[bodies.bodyOf[face]] = pieceOf[face];
  const pieceCentres = new Float64Array(3 * bodies.bodies);
  const origins = new Float64Array(3 * bodies.bodies);
  for (let body = 0; body < bodies.bodies; body++) {
    for (let axis = 0; axis < 3; axis++) {
      pieceCentres[3 * body + axis] = centre(pieceBoxes, pieceOfBody[body], axis);
      origins[3 * body + axis] = centre(bodyBoxes, body, axis) - pieceCentres[3 * body + axis];
    }
  }
  return { positions: local, pieceCentres, origins, boxes: bodyBoxes };
}
