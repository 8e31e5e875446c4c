import type { MessagePort } from 'node:worker_threads';
import { measureCage } from '@/lib/engine/measure';
import type { MeasuredCage, MeasureOptions } from '@/lib/engine/measured';
import { MeshError } from '@/lib/formats/mesh-error';
import { readMesh } from '@/lib/formats/read-mesh';
import { askedOtherwise } from '@/lib/imports/asked-otherwise';
import { refuseOtherSpace, type ShowSpace } from '@/lib/imports/refuse-other-space';
import { readBlob } from '@/lib/storage/read-blob';
import { LARGE_CAGE_FACES, withPatchHelpers } from './with-patch-helpers';

export interface MeasureTask {
  name: string;
  sha256: string;
  options: MeasureOptions;
  /** The show's unit and up axis, which a file that states its own has to agree with. */
  space: ShowSpace;
  /** Threads that nothing else was using when the task was given. */
  idleThreads: number;
  /** Told `measuring` once the file is read. */
  port: MessagePort | null;
}

/** A measured cage, or why the file cannot be one: then it is the file's fault, and trying again changes nothing. */
export type MeasureOutcome =
  | { ok: true; cage: MeasuredCage }
  | { ok: false; code: string; message: string; line: number | null; column: number | null; excerpt: string | null };

/** Reads and measures one file. Throws only where storage fails, which may pass. */
export default async function measureFile(task: MeasureTask): Promise<MeasureOutcome> {
  try {
    const cage = await readMesh(task.name, await readBlob(task.sha256));
    refuseOtherSpace(cage, task.space);
    task.port?.postMessage('measuring');
    const isLarge = cage.faceStarts.length > LARGE_CAGE_FACES;
    const measured = withPatchHelpers(isLarge ? task.idleThreads : 0, () => measureCage(cage, { ...task.options, shells: true }));
    const notes = [...askedOtherwise(cage, task.options), ...cage.warnings].map((warning) => ({
      code: warning.code,
      severity: 'note' as const,
      message: warning.message,
      part: null,
      count: 1,
      places: warning.line === null ? [] : [{ face: null, edge: null, vertex: null, position: null, line: warning.line }],
    }));
    return { ok: true, cage: { ...measured, findings: [...measured.findings, ...notes] } };
  } catch (error) {
    if (error instanceof MeshError) return { ok: false, code: error.code, message: error.detail, line: error.line, column: error.column, excerpt: error.excerpt };
    if (error instanceof Error && 'syscall' in error) throw error;
    return { ok: false, code: 'measuring_failed', message: error instanceof Error ? error.message : 'unknown fault', line: null, column: null, excerpt: null };
  } finally {
    task.port?.close();
  }
}
