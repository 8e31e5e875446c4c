import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { compareInProcessingOrder } from '@/lib/rules/import-plan';
import type { PlannedRow } from './import-plan-of';
import { wakeWorkers } from './wake-workers';

/**
 * Lets planned files wait for their turn, within the transaction that submits or retries them. Their places in the import's order are written down, and their
 * faces where the same content was measured before, under whatever options.
 * @param plan all files of the import, since the order is of all of them
 * @param only ids of those that begin to wait; without it all of them
 */
export async function queueFiles(tx: Transaction, importId: string, plan: readonly PlannedRow[], only?: ReadonlySet<string>): Promise<void> {
  const rows = plan.toSorted(compareInProcessingOrder).map(({ id }, ordinal) => ({ id, ordinal, begins: only === undefined || only.has(id) }));
  if (!rows.some((row) => row.begins)) return;
  // Twenty thousand rows against twenty thousand: what was just uploaded is not in the statistics, and a nested loop over it would take minutes.
  await tx.execute(sql`select set_config('enable_nestloop', 'off', true)`);
  await tx.execute(sql`
    update import_files f set ordinal = given.ordinal, queued_at = case when given.begins then now() else f.queued_at end,
      faces = coalesce(f.faces, (select max(r.faces) from geometry_records r where r.content_sha256 = f.sha256))
    from json_to_recordset(${JSON.stringify(rows)}::json) as given(id uuid, ordinal integer, begins boolean)
    where f.id = given.id and f.import_id = ${importId} and (given.begins or f.ordinal is distinct from given.ordinal)`);
  await tx.execute(sql`select set_config('enable_nestloop', 'on', true)`);
  await wakeWorkers(tx, importId);
}
