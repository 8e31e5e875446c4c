import { and, eq, isNotNull } from 'drizzle-orm';
import { imports } from '@/db/schema/imports';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import { ensureQueues } from '@/lib/jobs/send-jobs';
import type { ImportAnswer } from '@/lib/rules/import-answer';
import type { ImportRefInput } from '@/lib/rules/inputs/import-ref';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { describeImport } from './describe-import';
import { getImportRow } from './get-import-row';
import { notifyImport } from './notify-import';
import { wakeWorkers } from './wake-workers';

/** Lets a paused import go on. One that is not paused stays as it is. */
export async function resumeImport(context: Context, input: ImportRefInput): Promise<ImportAnswer> {
  const known = requireActor(context);
  const { show } = await getShowAccess(context.db, known.actor, input.show, 'importCages');
  const row = await getImportRow(context.db, show.id, input.import);
  await ensureQueues(context.db);
  await context.db.transaction(async (tx) => {
    const [resumed] = await tx
      .update(imports)
      .set({ pausedAt: null })
      .where(and(eq(imports.id, row.id), isNotNull(imports.pausedAt)))
      .returning({ id: imports.id, state: imports.state });
    if (!resumed) return;
    await recordEvent(tx, known, { showId: show.id, act: 'resume-import', subject: row.id });
    await wakeWorkers(tx, row.id);
    await notifyImport(tx, row.id);
  });
  return describeImport(context.db, await getImportRow(context.db, show.id, row.id));
}
