import { gaussRule } from '../patches/gauss-rule';
import { nextHalfEdge } from '../mesh/topology';
import { isSharpForGood, type LevelMesh } from '../schemes/level-mesh';
import { Corners, TIP_SHARE } from './corners';
import type { CreasePiece, CreaseSides } from './crease-sides';
import { addMitre, mitreTangent, type EdgePoint } from './mitre';
import type { ShellKit } from './shell-kits';
import type { ShellBody } from './shell-sums';
import { JET } from './shell-terms';

/** Gauss nodes on a stretch of an edge and fewer to compare with, by its share of the edge: towards an extraordinary point stretches halve, and so does what they turn. */
const STRETCH_NODES: readonly (readonly [share: number, nodes: number, coarse: number])[] = [[1 / 16, 6, 4], [1 / 256, 4, 3], [0, 3, 2]];

/** Pieces of an edge from which on a bend across it counts: towards an extraordinary point it may grow without end, over a vanishing length. */
const BEND_SHARE = 1 / 32;

/** Walls as thick as this share of an edge are those that the estimate is made for. */
const WALL_SHARE = 1 / 64;

/** Stands for tan(θ/2) where two faces are folded onto each other. */
const MOST_TANGENT = 1e6;

const jet = new Float64Array(JET);

/** One side of a sharp edge at a point: place (`point`, in the cage's frame), unit tangent along the own half-edge, speed, curvature, normal, bend across. */
interface SidePoint extends EdgePoint {
  point: Float64Array;
  tangent: Float64Array;
  curvature: Float64Array;
  own: Float64Array;
  speed: number;
  /** Whether the piece is long enough for its bend to count. */
  settled: boolean;
}

function makeSide(): SidePoint {
  const vector = (): Float64Array => new Float64Array(3);
  const across = vector();
  return { point: vector(), tangent: vector(), curvature: vector(), own: vector(), across, bend: 0, speed: 0, settled: true };
}

/** The two sides of the edge that is looked at, each across from the other. */
const SIDES = [makeSide(), makeSide()] as const;
SIDES[0].across = SIDES[1].own;
SIDES[1].across = SIDES[0].own;

/** An edge's end at a vertex: tan(θ/2) there, the tangent that leaves the edge, and the bodies on both sides. */
interface EdgeEnd {
  vertex: number;
  tangent: number;
  outwards: number[];
  bodies: number[];
}

/** Adds the mitres along the sharp edges of `cage`, whose patches' sides are `sides`, and what is known about corners. */
export function integrateCreases(kit: ShellKit, cage: LevelMesh, sides: CreaseSides, origins: Float64Array, shells: ShellBody[]): void {
  const corners = new Corners(cage.vertices);
  const ends: EdgeEnd[] = [];
  for (const [edge, pieces] of sides) {
    const twin = cage.twin[edge];
    const others = sides.get(twin);
    if (others === undefined || edge > twin) continue;
    const byStart = (a: CreasePiece, b: CreasePiece): number => a.from - b.from;
    const own = pieces.sort(byStart), across = others.sort(byStart);
    const bodies = [cage.bodyOf[cage.faceOf[edge]], cage.bodyOf[cage.faceOf[twin]]];
    integrateEdge(kit, own, across, bodies, origins, shells);
    for (const [end, vertex] of [cage.vertexOf[edge], cage.vertexOf[twin]].entries()) {
      const [point, other] = SIDES;
      lookAt(kit, own, across, end);
      corners.addNormal(vertex, point.own[0], point.own[1], point.own[2]);
      corners.addNormal(vertex, other.own[0], other.own[1], other.own[2]);
      corners.ends[vertex]++;
      const tangent = mitreTangent(point) ?? MOST_TANGENT;
      ends.push({ vertex, tangent, outwards: Array.from(point.tangent, (value) => (end === 0 ? -value : value)), bodies });
    }
  }
  corners.solve();
  // Two edges make a crease that runs on, one a dart, unless the vertex is sharp itself.
  for (const { vertex, tangent, outwards, bodies } of ends) {
    if (corners.ends[vertex] > 2 || cage.vertexSharpness[vertex] === Infinity) corners.estimate(vertex, tangent, outwards[0], outwards[1], outwards[2], shells[bodies[0]], shells[bodies[1]]);
  }
}

/** Adds what is known about sharp vertices without sharp edges: tips of cones. */
export function estimateTips(cage: LevelMesh, shells: ShellBody[]): void {
  const sharpEdge = new Uint8Array(cage.vertices);
  for (let h = 0; h < cage.twin.length; h++) if (isSharpForGood(cage, h)) sharpEdge[cage.vertexOf[h]] = sharpEdge[cage.vertexOf[nextHalfEdge(cage, h)]] = 1;
  for (let h = 0; h < cage.twin.length; h++) {
    const vertex = cage.vertexOf[h];
    if (cage.vertexSharpness[vertex] !== Infinity || sharpEdge[vertex] === 1) continue;
    sharpEdge[vertex] = 1;
    shells[cage.bodyOf[cage.faceOf[h]]].corners += TIP_SHARE;
  }
}

function integrateEdge(kit: ShellKit, own: CreasePiece[], across: CreasePiece[], bodies: number[], origins: Float64Array, shells: ShellBody[]): void {
  const breaks = new Set([0, 1]);
  for (const { from, share } of own) breaks.add(from).add(from + share);
  for (const { from, share } of across) breaks.add(1 - from).add(1 - from - share);
  const ends = [...breaks].sort((a, b) => a - b);
  for (let i = 0; i + 1 < ends.length; i++) {
    const share = ends[i + 1] - ends[i];
    const middle = (ends[i] + ends[i + 1]) / 2;
    const [, nodes, coarse] = STRETCH_NODES.find(([least]) => share >= least) ?? STRETCH_NODES[0];
    const rule = gaussRule(nodes);
    let fine = 0;
    for (let k = 0; k < nodes; k++) {
      lookAt(kit, own, across, middle + share * rule.nodes[k]);
      const ds = rule.weights[k] * share;
      for (let s = 0; s < 2; s++) fine += addSide(SIDES[s], ds, origins, bodies[s], shells[bodies[s]]);
    }
    const error = Math.abs(fine - turning(kit, own, across, middle, share, coarse));
    for (const body of bodies) shells[body].errors[1] += error;
  }
}

/** Adds a side's half of the mitre over `ds` of the edge's parameter; returns ∫ tan(θ/2) ds. */
function addSide(side: SidePoint, ds: number, origins: Float64Array, body: number, shell: ShellBody): number {
  const { bend, point } = side;
  for (let axis = 0; axis < 3; axis++) point[axis] -= origins[3 * body + axis];
  if (!side.settled) side.bend = 0;
  const length = ds * side.speed;
  const tangent = addMitre(side, length, shell);
  if (!side.settled) {
    const cubic = Math.abs(tangent * bend * (tangent / length) ** 2);
    // Where the bend grows without end its t³ bounds nothing: for walls of some thickness the whole mitre there, of t², does.
    if (cubic * WALL_SHARE * side.speed > Math.abs(tangent)) shell.errors[1] += Math.abs(tangent);
    else shell.errors[2] += cubic;
  }
  return tangent;
}

/** ∫ tan(θ/2) ds of both sides over a stretch of the edge by so many nodes. */
function turning(kit: ShellKit, own: CreasePiece[], across: CreasePiece[], middle: number, share: number, nodes: number): number {
  const rule = gaussRule(nodes);
  let total = 0;
  for (let k = 0; k < nodes; k++) {
    lookAt(kit, own, across, middle + share * rule.nodes[k]);
    for (let s = 0; s < 2; s++) total += (mitreTangent(SIDES[s]) ?? 0) * rule.weights[k] * share * SIDES[s].speed;
  }
  return total;
}

/** Sets both SIDES to x, 0 … 1 along the own half-edge. */
function lookAt(kit: ShellKit, own: readonly CreasePiece[], across: readonly CreasePiece[], x: number): void {
  fillSide(kit, own, x, SIDES[0]);
  fillSide(kit, across, 1 - x, SIDES[1]);
}

/** A side of a sharp edge at x, 0 … 1 along its own half-edge. At its ends the sequences towards extraordinary points leave a rest, where their last piece's end stands. */
function fillSide(kit: ShellKit, pieces: readonly CreasePiece[], x: number, out: SidePoint): void {
  let piece = pieces[0];
  for (const one of pieces) if (one.from <= x) piece = one;
  const along = Math.max(-0.5, Math.min(0.5, (x - piece.from) / piece.share - 0.5));
  kit.sideJet(piece.powers, piece.side, along, jet);
  const [a, b] = kit.along[piece.side];
  const { point, tangent, curvature, own } = out;
  for (let axis = 0; axis < 3; axis++) {
    point[axis] = jet[axis] + piece.shift[axis];
    tangent[axis] = a * jet[3 + axis] + b * jet[6 + axis];
    curvature[axis] = a * a * jet[9 + axis] + 2 * a * b * jet[12 + axis] + b * b * jet[15 + axis];
  }
  const speed = Math.sqrt(dot(tangent, tangent));
  own[0] = jet[4] * jet[8] - jet[5] * jet[7];
  own[1] = jet[5] * jet[6] - jet[3] * jet[8];
  own[2] = jet[3] * jet[7] - jet[4] * jet[6];
  const area = Math.sqrt(dot(own, own));
  for (let axis = 0; axis < 3; axis++) {
    tangent[axis] /= speed;
    own[axis] /= area;
  }
  const forth = dot(curvature, tangent);
  for (let axis = 0; axis < 3; axis++) curvature[axis] = (curvature[axis] - forth * tangent[axis]) / (speed * speed);
  out.speed = speed / piece.share;
  out.bend = bendAcross(tangent, own);
  out.settled = piece.share >= BEND_SHARE;
}

/** Normal curvature across the edge of the surface whose jet is in `jet`, positive where it bends inwards: −II(M, M), M = N × T. */
function bendAcross(t: Float64Array, n: Float64Array): number {
  const mx = n[1] * t[2] - n[2] * t[1], my = n[2] * t[0] - n[0] * t[2], mz = n[0] * t[1] - n[1] * t[0];
  const ux = jet[3], uy = jet[4], uz = jet[5], vx = jet[6], vy = jet[7], vz = jet[8];
  const E = ux * ux + uy * uy + uz * uz, F = ux * vx + uy * vy + uz * vz, G = vx * vx + vy * vy + vz * vz;
  const mu = mx * ux + my * uy + mz * uz, mv = mx * vx + my * vy + mz * vz;
  const square = E * G - F * F;
  const a = (G * mu - F * mv) / square, b = (E * mv - F * mu) / square;
  const L = jet[9] * n[0] + jet[10] * n[1] + jet[11] * n[2];
  const M = jet[12] * n[0] + jet[13] * n[1] + jet[14] * n[2];
  const P = jet[15] * n[0] + jet[16] * n[1] + jet[17] * n[2];
  const bend = -(a * a * L + 2 * a * b * M + b * b * P);
  return Number.isFinite(bend) ? bend : 0;
}

function dot(p: ArrayLike<number>, q: ArrayLike<number>): number {
  return p[0] * q[0] + p[1] * q[1] + p[2] * q[2];
}
