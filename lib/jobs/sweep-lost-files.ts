import { inArray, sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { importFiles } from '@/db/schema/import-files';
import { shows } from '@/db/schema/shows';
import { planOfImport } from '@/lib/imports/import-plan-of';
import { meetFault } from '@/lib/imports/meet-fault';
import { queueFiles } from '@/lib/imports/queue-files';
import { log } from '@/lib/log';
import { wakeAnother } from './handlers/import-files';
import { LOST_WORKER } from './passing-fault';

/**
 * Sees to it that nothing that was submitted lies about: files whose worker fell silent go back, those that it had begun with that in their history; files
 * that were submitted before they could wait for a turn get their place; and where files wait, a turn is queued for them. Answers how many files it moved.
 */
export async function sweepLostFiles(db: Database): Promise<number> {
  const moved = (await giveBackSilent(db)) + (await queueUnplaced(db));
  await wakeAnother(db);
  return moved;
}

async function giveBackSilent(db: Database): Promise<number> {
  return db.transaction(async (tx) => {
    const silent = await tx
      .select()
      .from(importFiles)
      .where(sql`${importFiles.leaseUntil} < now() and ${importFiles.state} in ('queued', 'reading', 'measuring')`)
      .orderBy(importFiles.id)
      .for('no key update', { skipLocked: true });
    const untouched = silent.filter((file) => file.state === 'queued').map((file) => file.id);
    if (untouched.length > 0) await tx.update(importFiles).set({ leaseBy: null, leaseUntil: null, worker: null }).where(inArray(importFiles.id, untouched));
    for (const file of silent.filter((one) => one.state !== 'queued')) {
      log.warn({ fileId: file.id, importId: file.importId, worker: file.worker, attempt: file.attempts }, 'a worker fell silent with a file in hand');
      await meetFault(tx, file, LOST_WORKER);
    }
    return silent.length;
  });
}

/** Of imports that were submitted before there were turns. */
async function queueUnplaced(db: Database): Promise<number> {
  const { rows } = await db.execute<{ id: string; import_id: string; pattern: string | null }>(sql`
    select f.id, f.import_id, s.name_pattern as pattern from import_files f join imports i on i.id = f.import_id join ${shows} s on s.id = i.show_id
    where i.state in ('queued', 'running') and f.state in ('queued', 'reading', 'measuring') and f.queued_at is null`);
  for (const importId of new Set(rows.map((row) => row.import_id))) {
    const mine = rows.filter((row) => row.import_id === importId);
    await db.transaction(async (tx) => queueFiles(tx, importId, await planOfImport(tx, importId, mine[0].pattern), new Set(mine.map((row) => row.id))));
  }
  return rows.length;
}
