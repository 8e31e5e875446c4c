import { nextHalfEdge } from '../mesh/topology';
import type { LimitSums } from '../moments/limit-sums';
import { RegularPatches } from '../kernel/regular-patches';
import { collectRing, SMOOTH_CENTRE, type Fans } from './classify-vertices';
import { DOO_SABIN_KIT, raiseNet } from './doo-sabin-fan';
import { refineDooSabin } from './doo-sabin-refine';
import { integrateFan } from './integrate-fan';
import type { LevelMesh } from './level-mesh';

/** After the first step n-gons lie apart by one quad, after the second by three, which is enough. */
const MOST_LEVELS = 6;

const small = new Float64Array(27);
const net = new Float64Array(48);

/**
 * Integrates the Doo-Sabin limit surface of the closed live pieces of `cage` about the bodies' origins. One refinement makes each new vertex belong to one
 * face of the cage; a vertex among four quads is an exact biquadratic patch, an n-gon a closed level sequence. Returns false where it did not come apart.
 */
export function integrateDooSabin(cage: LevelMesh, origins: Float64Array, sums: LimitSums): boolean {
  let mesh = refineDooSabin(cage, true);
  const patches = new RegularPatches(origins, sums);
  for (let level = 1; level <= MOST_LEVELS; level++) {
    const oddCorners = markOddFaces(mesh);
    let left = addRegularVertices(mesh, oddCorners, patches);
    patches.flush();
    for (let face = 0; face < mesh.faces && left > 0; face++) left -= addOddFace(mesh, face, oddCorners, origins, sums);
    if (left === 0) return true;
    mesh = refineDooSabin(mesh, false);
  }
  return false;
}

/** Number of faces with other than four corners around each vertex. */
function markOddFaces(mesh: LevelMesh): Uint8Array {
  const odd = new Uint8Array(mesh.vertices);
  for (let h = 0; h < mesh.vertexOf.length; h++) {
    const face = mesh.faceOf[h];
    if (mesh.starts[face + 1] - mesh.starts[face] !== 4) odd[mesh.vertexOf[h]]++;
  }
  return odd;
}

/** Hands the vertices among four quads to `patches`; returns how many live ones are left. */
function addRegularVertices(mesh: LevelMesh, odd: Uint8Array, patches: RegularPatches): number {
  const ring: number[] = [];
  let left = 0;
  const seen = new Uint8Array(mesh.vertices);
  for (let h = 0; h < mesh.vertexOf.length; h++) {
    const vertex = mesh.vertexOf[h];
    if (mesh.live[vertex] === 0 || seen[vertex] === 1) continue;
    seen[vertex] = 1;
    if (odd[vertex] > 0) {
      left++;
      continue;
    }
    collectRing(mesh, h, ring);
    put(mesh, 4, vertex);
    for (let i = 0; i < 4; i++) {
      const next = nextHalfEdge(mesh, ring[i]);
      put(mesh, NEIGHBOURS[i], mesh.vertexOf[next]);
      put(mesh, DIAGONALS[i], mesh.vertexOf[nextHalfEdge(mesh, next)]);
    }
    raiseNet(small, net);
    patches.add(mesh.bodyOf[vertex], net);
    mesh.live[vertex] = 0;
  }
  return left;
}

/** Net entries (3 row + column) of the neighbours and diagonals, counter-clockwise. */
const NEIGHBOURS = [7, 5, 1, 3];
const DIAGONALS = [8, 2, 0, 6];

function put(mesh: LevelMesh, entry: number, vertex: number): void {
  small.set(mesh.positions.subarray(3 * vertex, 3 * vertex + 3), 3 * entry);
}

/** Integrates an n-gon whose corners have quads only besides; returns how many live vertices that settles. */
function addOddFace(mesh: LevelMesh, face: number, odd: Uint8Array, origins: Float64Array, sums: LimitSums): number {
  const start = mesh.starts[face];
  const n = mesh.starts[face + 1] - start;
  if (n === 4) return 0;
  for (let h = start; h < start + n; h++) if (mesh.live[mesh.vertexOf[h]] === 0 || odd[mesh.vertexOf[h]] !== 1) return 0;
  const fans: Fans = { starts: [0, n], corners: Array.from({ length: n }, (_, i) => start + i), closed: [true], sharpFirst: [false], centre: [SMOOTH_CENTRE] };
  integrateFan(DOO_SABIN_KIT, mesh, fans, 0, origins, sums);
  for (let h = start; h < start + n; h++) mesh.live[mesh.vertexOf[h]] = 0;
  return n;
}
