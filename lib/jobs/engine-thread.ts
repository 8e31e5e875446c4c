import type { MessagePort } from 'node:worker_threads';
import { measureCage } from '@/lib/engine/measure';
import type { MeasuredCage, MeasureOptions } from '@/lib/engine/measured';
import { LOSSY_CODES } from '@/lib/formats/lossy-codes';
import { MeshError } from '@/lib/formats/mesh-error';
import { readMesh } from '@/lib/formats/read-mesh';
import { askedOtherwise } from '@/lib/imports/asked-otherwise';
import { besideOfBlobs, type BesideBlob } from '@/lib/imports/beside-blobs';
import { placeOrRefuse, type Placing, type ShowSpace, type StatedSpace } from '@/lib/imports/file-space';
import { placeCage, placingNotes } from '@/lib/imports/place-cage';
import { openBlob } from '@/lib/storage/open-blob';
import { isTransientStorageFault } from '@/lib/storage/storage-fault';
import { LARGE_CAGE_FACES, withPatchHelpers } from './with-patch-helpers';

export interface MeasureTask {
  name: string;
  sha256: string;
  options: MeasureOptions;
  /** The show's unit and up axis, into which a file that states others is brought, unless the show refuses it. */
  space: ShowSpace;
  /** Files that lie beside it, such as skin weights. */
  beside?: BesideBlob[];
  /** Threads that nothing else was using when the task was given. */
  idleThreads: number;
  /** Told `measuring` once the file is read. */
  port: MessagePort | null;
}

/** A measured cage, or why the file cannot be one: then it is the file's fault, and trying again changes nothing. */
export type MeasureOutcome =
  | { ok: true; cage: MeasuredCage; stated: StatedSpace; placing: Placing }
  | { ok: false; code: string; message: string; line: number | null; column: number | null; excerpt: string | null };

/** Reads and measures one file, an OBJ as its bytes come from storage. Throws only where storage fails, which may pass. */
export default async function measureFile(task: MeasureTask): Promise<MeasureOutcome> {
  let storageFailed = false;
  try {
    const stored = await openBlob(task.sha256);
    stored.once('error', () => (storageFailed = true));
    const cage = await readMesh(task.name, stored, besideOfBlobs(task.name, task.beside));
    const stated = { metresPerUnit: cage.metresPerUnit, upAxis: cage.upAxis };
    const placing = placeOrRefuse(stated, task.space);
    placeCage(cage, placing);
    task.port?.postMessage('measuring');
    const isLarge = cage.faceStarts.length > LARGE_CAGE_FACES;
    const measured = withPatchHelpers(isLarge ? task.idleThreads : 0, () => measureCage(cage, { ...task.options, shells: true }));
    const notes = [...placingNotes(stated, task.space, placing), ...askedOtherwise(cage, task.options), ...cage.warnings].map((warning) => ({
      code: warning.code,
      severity: LOSSY_CODES.has(warning.code) ? ('warning' as const) : ('note' as const),
      message: warning.message,
      part: null,
      count: 1,
      places: warning.line === null ? [] : [{ face: null, edge: null, vertex: null, position: null, line: warning.line }],
    }));
    return { ok: true, cage: { ...measured, findings: [...measured.findings, ...notes] }, stated, placing };
  } catch (error) {
    if (error instanceof MeshError) return { ok: false, code: error.code, message: error.detail, line: error.line, column: error.column, excerpt: error.excerpt };
    if (storageFailed || (error instanceof Error && 'syscall' in error) || isTransientStorageFault(error)) throw error;
    return { ok: false, code: 'measuring_failed', message: error instanceof Error ? error.message : 'unknown fault', line: null, column: null, excerpt: null };
  } finally {
    task.port?.close();
  }
}
