import { and, eq, isNull, sql } from 'drizzle-orm';
import { imports } from '@/db/schema/imports';
import { shows } from '@/db/schema/shows';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import { ensureQueues } from '@/lib/jobs/send-jobs';
import type { ImportAnswer } from '@/lib/rules/import-answer';
import type { ImportRefInput } from '@/lib/rules/inputs/import-ref';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { describeImport } from './describe-import';
import { getImportRow } from './get-import-row';
import { planOfImport } from './import-plan-of';
import { notifyImport } from './notify-import';
import { queueFiles } from './queue-files';

/**
 * Queues an open import; a second submit changes nothing and answers the same. A show's first submitted import freezes its
 * unit, up axis and scheme.
 */
export async function submitImport(context: Context, input: ImportRefInput): Promise<ImportAnswer> {
  const known = requireActor(context);
  const { show } = await getShowAccess(context.db, known.actor, input.show, 'importCages');
  const row = await getImportRow(context.db, show.id, input.import);
  if (row.state === 'open') {
    await ensureQueues(context.db);
    await context.db.transaction(async (tx) => {
      const [queued] = await tx
        .update(imports)
        .set({ state: 'queued', submittedAt: sql`now()` })
        .where(and(eq(imports.id, row.id), eq(imports.state, 'open')))
        .returning({ id: imports.id });
      if (!queued) return;
      const files = await planOfImport(tx, row.id, show.namePattern);
      if (files.length === 0) throw new StudioError('bad_input', 'This import has no files yet. Put at least one into it.');
      await queueFiles(tx, row.id, files);
      await tx.update(shows).set({ frozenAt: sql`now()` }).where(and(eq(shows.id, show.id), isNull(shows.frozenAt)));
      await recordEvent(tx, known, { showId: show.id, act: 'submit-import', subject: row.id, items: [{ field: 'files', before: null, after: String(files.length) }] });
      await notifyImport(tx, row.id);
    });
  }
  const now = await getImportRow(context.db, show.id, row.id);
  if (now.state === 'cancelled') throw new StudioError('conflict', 'This import was cancelled. Open another one.');
  return describeImport(context.db, now);
}
