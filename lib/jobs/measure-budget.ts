import { extensionOf, type MeshExtension, isMeshExtension } from '@/lib/formats/mesh-extensions';

/** A file that is to be measured; `faces` where it is known from before. */
export interface MeasureSize {
  name: string;
  byteSize: number;
  faces?: number | null;
}

/** What a thread holds before it has read a file: program, compiled code, fan tables. */
const THREAD_BYTES = 160 * 2 ** 20;

/** From a file's arrays to values, at the peak. */
const BYTES_PER_FACE = 1_100;

/** The fewest bytes that a face takes in a file of the format as programs write it, its share of the vertices included. */
const LEAST_FILE_BYTES: Record<MeshExtension, number> = { obj: 36, ply: 19, stl: 50, gltf: 12, glb: 12, usd: 8, usda: 24, usdc: 8, usdz: 8, zip: 6 };

/** Copies of a file's bytes that its reader holds: none of an OBJ, which is read as a stream. */
const COPIES: Record<MeshExtension, number> = { obj: 0, ply: 2, stl: 2, gltf: 3, glb: 2, usd: 4, usda: 4, usdc: 4, usdz: 4, zip: 10 };

const formatOf = (name: string): MeshExtension => {
  const extension = extensionOf(name);
  return isMeshExtension(extension) ? extension : 'zip';
};

/** Faces of a file where they are known, else the most that one of its size and format holds as programs write them. */
export function mostFaces({ name, byteSize, faces = null }: MeasureSize): number {
  return faces ?? byteSize / LEAST_FILE_BYTES[formatOf(name)];
}

/**
 * Bytes of memory that measuring a file takes at the peak, at most, in a thread of its own: what a queue sets aside before it begins. From the face count
 * where that is known, else from the most faces that a file of its size and format holds as programs write them.
 */
export function expectedMeasureBytes(size: MeasureSize): number {
  return THREAD_BYTES + COPIES[formatOf(size.name)] * size.byteSize + BYTES_PER_FACE * mostFaces(size);
}
