import { createHash } from 'node:crypto';
import { writeFile } from 'node:fs/promises';
import { displayMesh } from '@/lib/engine/display';
import type { MeasureOptions } from '@/lib/engine/measured';
import { assetGlb } from '@/lib/exports/asset-glb';
import { readMesh } from '@/lib/formats/read-mesh';
import { besideOfBlobs, type BesideBlob } from '@/lib/imports/beside-blobs';
import type { Placing } from '@/lib/imports/file-space';
import { placeCage } from '@/lib/imports/place-cage';
import { openBlob } from '@/lib/storage/open-blob';

export interface MeshTask {
  /** Name of the cage's file, for its format, and the hash of its bytes. */
  name: string;
  sha256: string;
  options: MeasureOptions;
  /** Files that it is read with. */
  beside: BesideBlob[];
  /** What was done to the cage before it was measured. */
  placing: Placing;
  /** Refinements of the limit surface. */
  level: number;
  /** Metres per unit of the placed cage at the asset's scale. */
  metresPerUnit: number;
  /** Where the GLB goes. */
  path: string;
}

/** Makes the display mesh of a stored cage as a GLB file; answers hash and size of its bytes. */
export default async function makeMesh(task: MeshTask): Promise<{ sha256: string; byteSize: number }> {
  const cage = await readMesh(task.name, await openBlob(task.sha256), besideOfBlobs(task.name, task.beside));
  placeCage(cage, task.placing);
  const mesh = displayMesh(cage, task.options, task.level);
  const bytes = await assetGlb(cage, mesh, task.options.partsBy, task.metresPerUnit);
  await writeFile(task.path, bytes);
  return { sha256: createHash('sha256').update(bytes).digest('hex'), byteSize: bytes.byteLength };
}
