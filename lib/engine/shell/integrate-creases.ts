import { gaussRule } from '../patches/gauss-rule';
import { nextHalfEdge } from '../mesh/topology';
import { isSharpForGood, type LevelMesh } from '../schemes/level-mesh';
import { Corners, TIP_SHARE } from './corners';
import type { CreasePiece, CreaseSides } from './crease-sides';
import { addMitre, mitreTangent, type EdgePoint } from './mitre';
import type { ShellKit } from './shell-kits';
import { emptyShells, type ShellBody } from './shell-sums';
import { JET } from './shell-terms';

const NODES = 6;
const COARSE_NODES = 4;

/** Pieces of an edge from which on a bend across it counts: towards an extraordinary point it may grow without end, over a vanishing length. */
const BEND_SHARE = 1 / 32;

/** Stands for tan(θ/2) where two faces are folded onto each other. */
const MOST_TANGENT = 1e6;

const jet = new Float64Array(JET);

/** One side of a sharp edge at a point: place, unit tangent along the own half-edge, speed, curvature, normal, bend across. */
interface SidePoint extends Pick<EdgePoint, 'tangent' | 'curvature' | 'own' | 'bend'> {
  place: number[];
  speed: number;
  /** Whether the piece is long enough for its bend to count. */
  settled: boolean;
}

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
      const [point, other] = [sideAt(kit, own, end), sideAt(kit, across, 1 - end)];
      corners.count(vertex, point.own, other.own);
      const tangent = mitreTangent({ tangent: point.tangent, own: point.own, across: other.own }) ?? MOST_TANGENT;
      ends.push({ vertex, tangent, outwards: Array.from(point.tangent, (value) => (end === 0 ? -value : value)), bodies });
    }
  }
  // Two edges make a crease that runs on, one a dart, unless the vertex is sharp itself.
  for (const { vertex, tangent, outwards, bodies } of ends) {
    if (corners.ends[vertex] > 2 || cage.vertexSharpness[vertex] === Infinity) corners.estimate(vertex, tangent, outwards, shells[bodies[0]], shells[bodies[1]]);
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
  const unused = emptyShells(1)[0];
  for (let i = 0; i + 1 < ends.length; i++) {
    const sum = (nodes: number, into: ShellBody[]): number => {
      let total = 0;
      const rule = gaussRule(nodes);
      for (let k = 0; k < nodes; k++) {
        const x = (ends[i] + ends[i + 1]) / 2 + (ends[i + 1] - ends[i]) * rule.nodes[k];
        const ds = rule.weights[k] * (ends[i + 1] - ends[i]);
        const points = [sideAt(kit, own, x), sideAt(kit, across, 1 - x)];
        points.forEach((side, s) => {
          const place = side.place.map((value, axis) => value - origins[3 * bodies[s] + axis]);
          const tangent = addMitre({ ...side, bend: side.settled ? side.bend : 0, point: place, across: points[1 - s].own }, ds * side.speed, into[s]);
          total += tangent;
          if (!side.settled) into[s].errors[2] += Math.abs(tangent * side.bend * (tangent / (ds * side.speed)) ** 2);
        });
      }
      return total;
    };
    const fine = sum(NODES, bodies.map((body) => shells[body]));
    const error = Math.abs(fine - sum(COARSE_NODES, [unused, unused]));
    for (const body of bodies) shells[body].errors[1] += error;
  }
}

/** A side of a sharp edge at x, 0 … 1 along its own half-edge. At its ends the sequences towards extraordinary points leave a rest, where their last piece's end stands. */
function sideAt(kit: ShellKit, pieces: readonly CreasePiece[], x: number): SidePoint {
  let piece = pieces[0];
  for (const one of pieces) if (one.from <= x) piece = one;
  const along = Math.max(-0.5, Math.min(0.5, (x - piece.from) / piece.share - 0.5));
  kit.sideJet(piece.powers, piece.side, along, jet);
  const [a, b] = kit.along[piece.side];
  const at = (axis: number): [number, number, number] => [
    jet[axis] + piece.shift[axis], a * jet[3 + axis] + b * jet[6 + axis], a * a * jet[9 + axis] + 2 * a * b * jet[12 + axis] + b * b * jet[15 + axis],
  ];
  const rows = [at(0), at(1), at(2)];
  const speed = Math.hypot(rows[0][1], rows[1][1], rows[2][1]);
  const tangent = rows.map((row) => row[1] / speed);
  const u = jet.subarray(3, 6), v = jet.subarray(6, 9);
  const n = [u[1] * v[2] - u[2] * v[1], u[2] * v[0] - u[0] * v[2], u[0] * v[1] - u[1] * v[0]];
  const area = Math.hypot(n[0], n[1], n[2]);
  const own = n.map((value) => value / area);
  const second = rows.map((row) => row[2]);
  const forth = dot(second, tangent);
  const curvature = second.map((value, axis) => (value - forth * tangent[axis]) / (speed * speed));
  return { place: rows.map((row) => row[0]), speed: speed / piece.share, tangent, own, curvature, bend: bendAcross(tangent, own), settled: piece.share >= BEND_SHARE };
}

/** Normal curvature across the edge of the surface whose jet is in `jet`, positive where it bends inwards: −II(M, M), M = N × T. */
function bendAcross(tangent: number[], n: number[]): number {
  const m = [n[1] * tangent[2] - n[2] * tangent[1], n[2] * tangent[0] - n[0] * tangent[2], n[0] * tangent[1] - n[1] * tangent[0]];
  const u = jet.subarray(3, 6), v = jet.subarray(6, 9);
  const E = dot(u, u), F = dot(u, v), G = dot(v, v), mu = dot(m, u), mv = dot(m, v);
  const square = E * G - F * F;
  const a = (G * mu - F * mv) / square, b = (E * mv - F * mu) / square;
  const bend = -(a * a * dot(jet.subarray(9, 12), n) + 2 * a * b * dot(jet.subarray(12, 15), n) + b * b * dot(jet.subarray(15, 18), n));
  return Number.isFinite(bend) ? bend : 0;
}

function dot(p: ArrayLike<number>, q: ArrayLike<number>): number {
  return p[0] * q[0] + p[1] * q[1] + p[2] * q[2];
}
