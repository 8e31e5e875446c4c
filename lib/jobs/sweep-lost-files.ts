import { inArray, sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { importFiles } from '@/db/schema/import-files';
import { imports } from '@/db/schema/imports';
import { shows } from '@/db/schema/shows';
import { planOfImport } from '@/lib/imports/import-plan-of';
import { queueFiles } from '@/lib/imports/queue-files';
import { log } from '@/lib/log';

/** A job has claimed its files by then; one that is active longer and left files unclaimed has died. */
const CLAIM_GRACE_S = 30;

/**
 * Queues again the files of submitted imports that nobody works on: those whose lease ran out with their worker, and those
 * that no job of the queue stands for. Answers how many.
 */
export async function sweepLostFiles(db: Database): Promise<number> {
  return db.transaction(async (tx) => {
    const { rows: lost } = await tx.execute<{ id: string; import_id: string }>(sql`
      select f.id, f.import_id from import_files f join imports i on i.id = f.import_id
      where i.state in ('queued', 'running') and f.state in ('queued', 'reading', 'measuring')
        and (f.lease_until < now() or (f.lease_until is null and not exists (
          select 1 from pgboss.job j where j.name = 'import-files' and j.data ->> 'importId' = f.import_id::text
            and (j.state < 'active' or (j.state = 'active' and j.started_on > now() - make_interval(secs => ${CLAIM_GRACE_S}))))))
      for no key update of f skip locked`);
    if (lost.length === 0) return 0;
    await tx
      .update(importFiles)
      .set({ state: 'queued', leaseBy: null, leaseUntil: null })
      .where(inArray(importFiles.id, lost.map((file) => file.id)));
    const importIds = [...new Set(lost.map((file) => file.import_id))];
    const owners = await tx.select({ id: imports.id, pattern: shows.namePattern }).from(imports).innerJoin(shows, sql`${shows.id} = ${imports.showId}`).where(inArray(imports.id, importIds));
    const ids = new Set(lost.map((file) => file.id));
    for (const { id, pattern } of owners) {
      const files = (await planOfImport(tx, id, pattern)).filter((file) => ids.has(file.id));
      await queueFiles(tx, id, files);
      log.warn({ importId: id, files: files.length }, 'files of a lost job are queued again');
    }
    return lost.length;
  });
}
