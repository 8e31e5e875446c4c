import type { Database } from '@/db/client';
import type { Context } from '@/lib/context';
import type { CompleteUploadInput } from '@/lib/rules/inputs/upload-ref';
import { StudioError } from '@/lib/rules/studio-error';
import { partCount, type UploadAnswer } from '@/lib/rules/upload-parts';
import { assembleUpload, claimAssembly, otherBytes } from './assemble-upload';
import { getOpenImport } from './get-open-import';
import { registerFile } from './register-file';
import { describeUpload, getUploadRow, listUploadParts, partedOf, type UploadRow } from './upload-row';

/** A proxy in between gives up on an answer after a while: past this we say that it goes on, and are asked again. */
const ANSWER_WITHIN_MS = 20_000;
const LOOK_AGAIN_MS = 250;

/** What this process is putting together. */
const running = new Map<string, Promise<void>>();

/**
 * Ends an upload: puts the parts together, checks the whole, and writes it into the import under a name. Asking again is as once; of a long
 * file it may answer `assembling`, which means to ask again. Errors: conflict when parts are missing or the import is closed; bad_input
 * when the whole is not what was announced; too_large, storage_full, not_available.
 */
export async function completeUpload(context: Context, input: CompleteUploadInput): Promise<UploadAnswer> {
  const { known, show, row } = await getOpenImport(context, input);
  const find = () => getUploadRow(context.db, show.id, known.actor.userId, input.upload);
  let upload = await find();
  const until = Date.now() + ANSWER_WITHIN_MS;
  while (!upload.completedAt) {
    await begin(context.db, upload, find);
    const work = running.get(upload.id);
    await Promise.race([work ?? Promise.resolve(), pause(work ? Math.max(0, until - Date.now()) : LOOK_AGAIN_MS)]);
    upload = await find();
    if (!upload.completedAt && Date.now() >= until) return describeUpload(upload, await listUploadParts(context.db, upload.id), 'assembling');
  }
  const blob = { sha256: upload.sha256, byteSize: upload.byteSize };
  await context.db.transaction((tx) => registerFile(tx, row, input, blob, true));
  return describeUpload(upload, [], 'stored');
}

/** Begins to put an upload together, unless somebody does already. */
async function begin(db: Database, upload: UploadRow, find: () => Promise<UploadRow>): Promise<void> {
  if (running.has(upload.id)) return;
  const parts = await listUploadParts(db, upload.id);
  const missing = partCount(partedOf(upload)) - parts.length;
  if (missing > 0) {
    // Another process may have ended it between the two looks.
    const now = await find();
    if (now.completedAt || now.assemblingUntil) return;
    if (now.refusedAt && parts.length === 0) throw otherBytes();
    throw new StudioError('conflict', missing === 1 ? 'One part has not arrived yet.' : `${missing} parts have not arrived yet.`);
  }
  if (!(await claimAssembly(db, upload.id))) return;
  const work = assembleUpload(db, upload, parts).finally(() => running.delete(upload.id));
  // Whoever waits for it hears of a failure; nobody may be waiting any more.
  work.catch(() => undefined);
  running.set(upload.id, work);
}

const pause = (ms: number): Promise<void> => new Promise((resolve) => setTimeout(resolve, ms));
