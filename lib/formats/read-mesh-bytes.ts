import type { Cage } from '../engine/cage';
import type { Beside } from './beside';
import { detectMeshKind, type MeshKind } from './detect-mesh-kind';
import { readJointWeights, weightsName } from './joint-weights';
import { labelByJoint } from './label-by-joint';
import { MeshError } from './mesh-error';
import { readObj } from './obj';

/** Readers of single files. Each but OBJ's is loaded when a file asks for it, so that a process that measures OBJ files loads no other. */
const READERS: Record<Exclude<MeshKind, 'archive'>, (bytes: Uint8Array, beside: Beside) => Cage | Promise<Cage>> = {
  obj: (bytes) => readObj(bytes),
  ply: async (bytes) => (await import('./ply')).readPly(bytes),
  stl: async (bytes) => (await import('./stl')).readStl(bytes),
  glb: async (bytes, beside) => (await import('./gltf')).readGltf(bytes, beside),
  gltf: async (bytes, beside) => (await import('./gltf')).readGltf(bytes, beside),
  usda: async (bytes, beside) => (await import('./usda')).readUsda(bytes, beside),
  usdc: async (bytes) => (await import('./usdc')).readUsdc(bytes),
};

/** Reads one mesh file that is no archive from its bytes. Errors: MeshError. */
export async function readMeshBytes(name: string, bytes: Uint8Array, beside: Beside): Promise<Cage> {
  const kind = detectMeshKind(name, bytes);
  if (kind === 'archive') throw new MeshError({ code: 'nested_archive', detail: 'expected a mesh file, found an archive in the archive' });
  const cage = await READERS[kind](bytes, beside);
  return kind === 'obj' ? withJointsBeside(cage, name, beside) : cage;
}

/** The cage with the joints that a CSV of weights beside it gives its faces. Errors: MeshError that begins with the CSV's name. */
export async function withJointsBeside(cage: Cage, name: string, beside: Beside): Promise<Cage> {
  const weights = weightsName(name);
  const bytes = await beside(weights);
  if (!bytes) return cage;
  try {
    return { ...cage, joints: labelByJoint(cage.faceStarts, cage.faceVertices, readJointWeights(bytes, cage.positions.length / 3)) };
  } catch (error) {
    throw error instanceof MeshError ? error.within(weights.slice(0, 200)) : error;
  }
}
