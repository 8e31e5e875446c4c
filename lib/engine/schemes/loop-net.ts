import { isSharpForGood, type LevelMesh } from './level-mesh';

/** Net entries of TRIANGLE_NET around each corner, counter-clockwise from what lies across the side that arrives there to what lies across the side that leaves. */
const ACROSS = [3, 6, 9];
const AROUND: readonly (readonly [afterArriving: number, beforeLeaving: number])[] = [[10, 11], [4, 5], [7, 8]];

function turn(mesh: LevelMesh, h: number, steps: number): number {
  const start = mesh.starts[mesh.faceOf[h]];
  return start + ((h - start + steps) % 3);
}

/** The vertex opposite to an edge on its other side. */
function opposite(mesh: LevelMesh, h: number): number {
  return mesh.vertexOf[turn(mesh, mesh.twin[h], 2)];
}

function put(mesh: LevelMesh, net: Float64Array, entry: number, vertex: number): void {
  for (let axis = 0; axis < 3; axis++) net[3 * entry + axis] = mesh.positions[3 * vertex + axis];
}

/** The phantom point a + b − c across a crease from a to b, c on this side. */
function phantom(net: Float64Array, to: number, a: number, b: number, c: number): void {
  for (let axis = 0; axis < 3; axis++) net[3 * to + axis] = net[3 * a + axis] + net[3 * b + axis] - net[3 * c + axis];
}

/**
 * Fills the twelve points of TRIANGLE_NET around the triangle whose corner 0 is half-edge `first`; across creases and borders stand phantom points.
 * What hangs on an extraordinary corner is not meaningful.
 */
export function fillTriangleNet(mesh: LevelMesh, first: number, net: Float64Array): void {
  const sharp = [0, 1, 2].map((i) => isSharpForGood(mesh, turn(mesh, first, i)));
  for (let i = 0; i < 3; i++) put(mesh, net, i, mesh.vertexOf[turn(mesh, first, i)]);
  for (let i = 0; i < 3; i++) {
    const j = (i + 1) % 3;
    if (sharp[i]) phantom(net, ACROSS[i], i, j, 3 - i - j);
    else put(mesh, net, ACROSS[i], opposite(mesh, turn(mesh, first, i)));
  }
  for (let i = 0; i < 3; i++) fillAround(mesh, first, i, sharp, net);
}

/**
 * The two points around corner i that no side of the triangle faces: `far` follows the face across the arriving side, `near` goes before the face
 * across the leaving side. Each is reached over the edge between corner and outer point, or by phantoms from the crease that is met.
 */
function fillAround(mesh: LevelMesh, first: number, i: number, sharp: boolean[], net: Float64Array): void {
  const arriving = (i + 2) % 3;
  const next = (i + 1) % 3;
  const [far, near] = AROUND[i];
  const [outerArriving, outerLeaving] = [ACROSS[arriving], ACROSS[i]];
  if (sharp[i] && sharp[arriving]) {
    // A corner with one face: its curves go on straight.
    phantom(net, far, i, i, next);
    phantom(net, near, i, i, arriving);
    return;
  }
  if (!sharp[arriving]) {
    const edge = turn(mesh, mesh.twin[turn(mesh, first, arriving)], 2);
    if (isSharpForGood(mesh, edge)) phantom(net, far, i, outerArriving, arriving);
    else put(mesh, net, far, opposite(mesh, edge));
  }
  if (!sharp[i]) {
    const edge = turn(mesh, mesh.twin[turn(mesh, first, i)], 1);
    if (isSharpForGood(mesh, edge)) phantom(net, near, i, outerLeaving, next);
    else put(mesh, net, near, opposite(mesh, edge));
  }
  if (sharp[i]) phantom(net, near, i, far, outerArriving);
  if (sharp[arriving]) phantom(net, far, i, near, outerLeaving);
}
