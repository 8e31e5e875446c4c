import { and, asc, eq, inArray, sql } from 'drizzle-orm';
import { importFiles } from '@/db/schema/import-files';
import { imports } from '@/db/schema/imports';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import { ensureQueues } from '@/lib/jobs/send-jobs';
import type { ImportAnswer } from '@/lib/rules/import-answer';
import type { ImportRefInput } from '@/lib/rules/inputs/import-ref';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { describeImport } from './describe-import';
import { sendTelling } from './end-file';
import { getImportRow } from './get-import-row';
import { UNFINISHED } from './lease';
import { notifyImport } from './notify-import';

/** Ends an import that is not done: what was measured stays, what was not is failed as `cancelled`. Twice is as once. */
export async function cancelImport(context: Context, input: ImportRefInput): Promise<ImportAnswer> {
  const known = requireActor(context);
  const { show } = await getShowAccess(context.db, known.actor, input.show, 'importCages');
  const row = await getImportRow(context.db, show.id, input.import);
  if (row.state === 'done') throw new StudioError('conflict', 'This import is done already.');
  await ensureQueues(context.db);
  await context.db.transaction(async (tx) => {
    // Files first, as everywhere: a worker that is ending one holds its row and then wants the import's.
    const waiting = await tx
      .select({ id: importFiles.id })
      .from(importFiles)
      .where(and(eq(importFiles.importId, row.id), inArray(importFiles.state, UNFINISHED)))
      .orderBy(asc(importFiles.id))
      .for('no key update');
    const [cancelled] = await tx
      .update(imports)
      .set({ state: 'cancelled', endedAt: sql`now()`, pausedAt: null })
      .where(and(eq(imports.id, row.id), inArray(imports.state, ['open', 'queued', 'running'])))
      .returning({ id: imports.id });
    if (!cancelled) return;
    await tx
      .update(importFiles)
      .set({ state: 'failed', errorCode: 'cancelled', errorMessage: 'The import was cancelled before this file was measured.', endedAt: sql`now()`, leaseBy: null, leaseUntil: null, worker: null })
      .where(and(eq(importFiles.importId, row.id), inArray(importFiles.state, UNFINISHED)));
    await recordEvent(tx, known, { showId: show.id, act: 'cancel-import', subject: row.id, items: [{ field: 'files', before: null, after: String(waiting.length) }] });
    await sendTelling(tx, row.id);
    await notifyImport(tx, row.id);
  });
  const now = await getImportRow(context.db, show.id, row.id);
  if (now.state === 'done') throw new StudioError('conflict', 'This import is done already.');
  return describeImport(context.db, now);
}
