import { extensionOf, isMeshExtension, type MeshExtension } from '@/lib/formats/mesh-extensions';
import { MESH_LIMITS } from '@/lib/formats/mesh-limits';

/** A file that is to be measured; `faces` where it is known from before. */
export interface MeasureSize {
  name: string;
  byteSize: number;
  faces?: number | null;
}

/** What a thread holds before it has read a file: program, compiled code, and the fan tables of an irregular cage. */
const THREAD_BYTES = 160 * 2 ** 20;

/**
 * From a file to values at the peak, shells included: a cage without a regular vertex, made of triangles, takes 2,900 bytes a face under Catmull-Clark, 2,200 under Doo-Sabin
 * and 930 under Loop. A regular one takes 190, one with an irregular face in a hundred 590. Only semi-sharp creases on every edge take more, up to 12,000.
 */
const BYTES_PER_FACE = 3_000;

/** The fewest bytes that a face takes in a file of the format as programs write it, its share of the vertices included. */
const LEAST_FILE_BYTES: Record<MeshExtension, number> = { obj: 34, ply: 19, stl: 50, gltf: 12, glb: 12, usd: 8, usda: 24, usdc: 8, usdz: 8, zip: 8 };

/** An OBJ of so irregular a cage, its coordinates with all digits, takes 46 bytes of memory for each of its own; only one with few digits and no regular vertex takes more. */
const BYTES_PER_OBJ_BYTE = 48;

/** Bytes that a reader holds at once for each of the file's: the file, its text and what is unpacked. An OBJ is read as a stream. */
const HELD_PER_BYTE: Record<MeshExtension, number> = { obj: 0, ply: 2, stl: 2, gltf: 4, glb: 2, usd: 4, usda: 4, usdc: 4, usdz: 4, zip: 12 };

function formatOf(name: string): MeshExtension {
  const extension = extensionOf(name);
  return isMeshExtension(extension) ? extension : 'zip';
}

/** The most faces that a file of its size and format holds as programs write them, where the count is not known; a zip stands for what cannot be told. */
export function mostFaces({ name, byteSize, faces = null }: MeasureSize): number {
  return faces ?? Math.ceil(Math.min(MESH_LIMITS.faces, byteSize / LEAST_FILE_BYTES[formatOf(name)]));
}

/**
 * Bytes of memory that measuring a file takes at the peak, at most, in a thread of its own: what a queue sets aside before it begins. From the face count
 * where that is known, else from the file's size.
 */
export function expectedMeasureBytes(size: MeasureSize): number {
  const { byteSize, faces = null } = size;
  const format = formatOf(size.name);
  const measuring = BYTES_PER_FACE * mostFaces(size);
  const bounded = format === 'obj' && faces === null ? Math.min(measuring, BYTES_PER_OBJ_BYTE * byteSize) : measuring;
  return Math.ceil(THREAD_BYTES + HELD_PER_BYTE[format] * byteSize + bounded);
}
