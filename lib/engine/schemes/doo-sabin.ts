import type { Boundary } from '../cage';
import { RegularPatches } from '../kernel/regular-patches';
import type { LimitSums } from '../moments/limit-sums';
import { SMOOTH_CENTRE, type Fans } from './classify-vertices';
import { joinSpokes } from './doo-sabin-borders';
import { DOO_SABIN_KIT } from './doo-sabin-fan';
import { FanBatches } from './fan-batches';
import { dooSabinCage, type DooSabinMesh } from './doo-sabin-mesh';
import { addPatch, readRings, type DooSabinRings } from './doo-sabin-patches';
import { refineDooSabin } from './doo-sabin-refine';
import type { LevelMesh } from './level-mesh';
import { EARLIER, finishLevels, OWN } from './refinement-blocks';

/** After the first step n-gons lie apart by one quad, after the second by three, which is enough; the border is regular from the second step on. */
const MOST_LEVELS = 6;

/**
 * Integrates the Doo-Sabin limit surface of the live faces of `cage` about the bodies' origins (x, y, z each, in the cage's frame). A vertex among four
 * quads is an exact biquadratic patch, an n-gon among such vertices a closed level sequence; the rest is refined locally. One refinement makes each
 * vertex belong to one face of the cage, so that a face's region is bounded by sides of patches; it reaches, with the quarters of the patches at its corners,
 * from the middles of its vertices' faces to those of its edges'. Open borders follow the doubled border of [Doo 1978], see `refineDooSabin`: the limit ends
 * in the quadratic B-spline of the border polygon, rounding corners (`edge-only`) or through them (`edge-and-corner`). Sharpness is not read.
 * Returns false where the cage could not be resolved.
 */
export function integrateDooSabin(cage: LevelMesh, boundary: Boundary, origins: Float64Array, sums: LimitSums): boolean {
  const base = dooSabinCage(cage, boundary);
  const patches = new RegularPatches('biquadratic', origins, sums);
  const batches = new FanBatches(DOO_SABIN_KIT, origins, sums);
  const finish = (mesh: DooSabinMesh): { left: number; live: Uint8Array } => {
    const rings = readRings(mesh);
    const bodies = mesh.level === 0 ? bodiesOfVertices(mesh) : mesh.bodyOf;
    const waiting = mesh.level === 0 ? Uint8Array.from(bodies, (body) => (body === NO_BODY ? 0 : OWN)) : mesh.live;
    let left = 0;
    for (let vertex = 0; vertex < mesh.vertices; vertex++) {
      if (waiting[vertex] !== OWN) continue;
      if (bodies[vertex] >= 0 && addPatch(mesh, rings, vertex, bodies[vertex], patches, sums.curves)) waiting[vertex] = 0;
      else left++;
    }
    patches.flush();
    for (let face = 0; face < mesh.faces && left > 0; face++) left -= addOddFace(mesh, rings, bodies, face, waiting, batches);
    batches.flush();
    return { left, live: waiting };
  };
  const refine = (mesh: DooSabinMesh, waiting: Uint8Array): DooSabinMesh => {
    const keep = keptAround(mesh, waiting);
    return refineDooSabin(mesh, waiting.map((state, vertex) => state * keep[vertex]), keep);
  };
  if (!finishLevels(base, { elements: 'vertices', mostLevels: MOST_LEVELS, finish, refine })) return false;
  joinSpokes(base, sums.curves);
  return true;
}

/**
 * 1 for what a refinement of the own waiting vertices keeps: those, and all corners of the n-gons that have one, whose patches are one sequence; those of a
 * body that is not measured too.
 */
function keptAround(mesh: DooSabinMesh, waiting: Uint8Array): Uint8Array {
  const { starts, vertexOf } = mesh;
  const keep = waiting.map((state) => (state === OWN ? 1 : 0));
  for (let face = 0; face < mesh.faces; face++) {
    const [start, end] = [starts[face], starts[face + 1]];
    if (end - start === 4) continue;
    let hasOwn = false;
    for (let h = start; h < end; h++) if (waiting[vertexOf[h]] === OWN) hasOwn = true;
    if (hasOwn) for (let h = start; h < end; h++) keep[vertexOf[h]] = 1;
  }
  return keep;
}

/** Body of a vertex without live faces, and of one whose faces are not all live and of one body. */
const NO_BODY = -2;
const SEVERAL_BODIES = -1;

/** The body that all faces at each of the cage's vertices are of. */
function bodiesOfVertices(mesh: DooSabinMesh): Int32Array {
  const bodies = new Int32Array(mesh.vertices).fill(NO_BODY);
  const anyDead = new Uint8Array(mesh.vertices);
  for (let face = 0; face < mesh.faces; face++) {
    const body = mesh.bodyOf[face];
    for (let h = mesh.starts[face]; h < mesh.starts[face + 1]; h++) {
      const vertex = mesh.vertexOf[h];
      if (mesh.live[face] === 0) anyDead[vertex] = 1;
      else if (bodies[vertex] === NO_BODY) bodies[vertex] = body;
      else if (bodies[vertex] !== body) bodies[vertex] = SEVERAL_BODIES;
    }
  }
  for (let vertex = 0; vertex < mesh.vertices; vertex++) if (anyDead[vertex] === 1 && bodies[vertex] >= 0) bodies[vertex] = SEVERAL_BODIES;
  return bodies;
}

/** Integrates an n-gon whose corners have quads only besides, where it is this block's; returns how many own waiting vertices that settles. */
function addOddFace(mesh: DooSabinMesh, rings: DooSabinRings, bodies: Int32Array, face: number, waiting: Uint8Array, batches: FanBatches): number {
  const start = mesh.starts[face];
  const n = mesh.starts[face + 1] - start;
  if (n === 4) return 0;
  let settled = 0;
  let isEarliers = false;
  for (let h = start; h < start + n; h++) {
    const vertex = mesh.vertexOf[h];
    if (waiting[vertex] === OWN) settled++;
    else if (waiting[vertex] === EARLIER) isEarliers = true;
    if (rings.odd[vertex] !== 1 || rings.border[vertex] === 1 || rings.faces[vertex] !== 4 || bodies[vertex] < 0) return 0;
  }
  if (settled === 0) return 0;
  if (!isEarliers) {
    const fans: Fans = { starts: [0, n], corners: Array.from({ length: n }, (_, i) => start + i), closed: [true], sharpFirst: [false], centre: [SMOOTH_CENTRE] };
    batches.add(mesh, fans, 0);
  }
  for (let h = start; h < start + n; h++) waiting[mesh.vertexOf[h]] = 0;
  return settled;
}
