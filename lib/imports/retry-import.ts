import { and, eq, inArray } from 'drizzle-orm';
import { importFiles } from '@/db/schema/import-files';
import { imports } from '@/db/schema/imports';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import { ensureQueues } from '@/lib/jobs/send-jobs';
import type { ImportAnswer } from '@/lib/rules/import-answer';
import type { RetryImportInput } from '@/lib/rules/inputs/retry-import';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { describeImport } from './describe-import';
import { getImportRow } from './get-import-row';
import { planOfImport } from './import-plan-of';
import { notifyImport } from './notify-import';
import { queueFiles } from './queue-files';

/** Queues the files that failed, and only those; of them only the named ones where some are named. Without any it changes nothing. */
export async function retryImport(context: Context, input: RetryImportInput): Promise<ImportAnswer> {
  const known = requireActor(context);
  const { show } = await getShowAccess(context.db, known.actor, input.show, 'importCages');
  const row = await getImportRow(context.db, show.id, input.import);
  if (row.state === 'open') throw new StudioError('conflict', 'This import was not submitted yet.');
  if (row.state === 'cancelled') throw new StudioError('conflict', 'This import was cancelled. Open another one.');
  await ensureQueues(context.db);
  await context.db.transaction(async (tx) => {
    const reset = await tx
      .update(importFiles)
      .set({ state: 'queued', attempts: 0, errorCode: null, errorMessage: null, errorLine: null, errorColumn: null, errorExcerpt: null, endedAt: null, tryAfter: null, isAlone: false, leaseBy: null, leaseUntil: null, worker: null, startedAt: null })
      .where(and(eq(importFiles.importId, row.id), eq(importFiles.state, 'failed'), input.files === undefined ? undefined : inArray(importFiles.name, input.files)))
      .returning({ id: importFiles.id });
    if (reset.length === 0) return;
    const [again] = await tx
      .update(imports)
      .set({ state: 'queued', endedAt: null })
      .where(and(eq(imports.id, row.id), inArray(imports.state, ['queued', 'running', 'done'])))
      .returning({ id: imports.id });
    if (!again) throw new StudioError('conflict', 'This import was cancelled meanwhile.');
    const ids = new Set(reset.map((file) => file.id));
    const files = await planOfImport(tx, row.id, show.namePattern);
    await queueFiles(tx, row.id, files, ids);
    await recordEvent(tx, known, { showId: show.id, act: 'retry-import', subject: row.id, items: [{ field: 'files', before: null, after: String(ids.size) }] });
    await notifyImport(tx, row.id);
  });
  return describeImport(context.db, await getImportRow(context.db, show.id, row.id));
}
