import type { Topology } from '../mesh/topology';
import { BLOCK_SIZE } from './block-size';
import type { LevelMesh } from './level-mesh';

/**
 * What `live` says of an element that is left to be measured: the block at hand measures it, or an earlier or a later block does. Those of other blocks are
 * refined along where they share a vertex with one of this block, so that all blocks find the same fans isolated at the same level; a fan belongs to the
 * earliest of its blocks.
 */
export const OWN = 1;
export const EARLIER = 2;
export const LATER = 3;

/** What a scheme does at a level. Its elements are faces; for Doo-Sabin vertices. */
export interface LevelSteps<Mesh extends LevelMesh> {
  elements: 'faces' | 'vertices';
  /** The last level, at which all has to be resolved. */
  mostLevels: number;
  /** Measures what can be measured, and tells how many own elements are left and which elements are. */
  finish(mesh: Mesh): { left: number; live: Uint8Array };
  /** Refines the own elements of `live`, and with them what decides on theirs. */
  refine(mesh: Mesh, live: Uint8Array): Mesh;
}

/**
 * Measures a mesh level by level. Where more than `BLOCK_SIZE` elements are left they are cut into blocks, each brought to its end before the next begins, so
 * that the finer levels of one block at a time take memory. Blocks follow from the mesh alone, so their order and that of the sums does too.
 * Returns false where something is not resolved at the last level.
 */
export function finishLevels<Mesh extends LevelMesh>(mesh: Mesh, steps: LevelSteps<Mesh>): boolean {
  for (;;) {
    const { left, live } = steps.finish(mesh);
    if (left === 0) return true;
    if (mesh.level >= steps.mostLevels) return false;
    if (left > BLOCK_SIZE) return finishBlocks(mesh, live, left, steps);
    mesh = steps.refine(mesh, live);
  }
}

function finishBlocks<Mesh extends LevelMesh>(mesh: Mesh, live: Uint8Array, left: number, steps: LevelSteps<Mesh>): boolean {
  const { blockOf, blocks } = assignBlocks(mesh, live, steps.elements === 'vertices', left);
  for (let block = 0; block < blocks; block++) {
    const own = live.map((state, element) => (state !== OWN || blockOf[element] === block ? state : blockOf[element] < block ? EARLIER : LATER));
    if (!finishLevels(steps.refine(mesh, own), steps)) return false;
  }
  return true;
}

/** The block of each own element. Each grows from the first face that is left over the edges, so that its rim is short whatever the order of the faces. */
function assignBlocks(mesh: Topology, live: Uint8Array, ofVertices: boolean, left: number): { blockOf: Int32Array; blocks: number } {
  const { starts, twin, faceOf, vertexOf } = mesh;
  const size = Math.ceil(left / Math.ceil(left / BLOCK_SIZE));
  const blockOf = new Int32Array(live.length).fill(-1);
  const queue = new Int32Array(mesh.faces);
  let block = 0;
  let filled = 0;
  const take = (element: number): number => {
    if (live[element] !== OWN || blockOf[element] >= 0) return 0;
    blockOf[element] = block;
    return 1;
  };
  let tail = 0;
  const enter = (face: number): void => {
    let taken = 0;
    if (ofVertices) for (let h = starts[face]; h < starts[face + 1]; h++) taken += take(vertexOf[h]);
    else taken = take(face);
    if (taken > 0) queue[tail++] = face;
    filled += taken;
  };
  for (let seed = 0; seed < mesh.faces; seed++) {
    tail = 0;
    enter(seed);
    for (let head = 0; head < tail && filled < size; head++) {
      for (let h = starts[queue[head]]; h < starts[queue[head] + 1] && filled < size; h++) if (twin[h] >= 0) enter(faceOf[twin[h]]);
    }
    if (filled < size) continue;
    block++;
    filled = 0;
  }
  return { blockOf, blocks: filled > 0 ? block + 1 : block };
}

/** Leaves of other blocks' faces only those that share a vertex with an own one. */
export function nearOwn(mesh: Topology, live: Uint8Array): Uint8Array {
  if (!live.includes(EARLIER) && !live.includes(LATER)) return live;
  const { starts, vertexOf } = mesh;
  const marked = new Uint8Array(mesh.vertices);
  for (let face = 0; face < mesh.faces; face++) if (live[face] === OWN) for (let h = starts[face]; h < starts[face + 1]; h++) marked[vertexOf[h]] = 1;
  return live.map((state, face) => {
    if (state <= OWN) return state;
    for (let h = starts[face]; h < starts[face + 1]; h++) if (marked[vertexOf[h]] === 1) return state;
    return 0;
  });
}
