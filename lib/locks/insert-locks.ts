import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { CSV_COLUMNS, CSV_SCHEMA } from '@/lib/rules/csv-columns';
import type { Lockable } from './find-lockable';

/**
 * Writes locks with their finished export rows and what they claim. The row says what the shot was promised in the words and
 * numbers of this moment: later columns, names and states never touch it. Answers the locks' ids in the order of the wishes.
 * @param now the transaction's time, as PostgreSQL writes it
 */
export async function insertLocks(tx: Transaction, show: { id: string; code: string }, lockedBy: string, now: string, lockables: readonly Lockable[]): Promise<string[]> {
  const lockedAt = new Date(now).toISOString();
  const given = lockables.map((one, ordinal) => ({ ordinal, shot_id: one.shot_id, copy: one.copy, asset_id: one.asset_id, part_id: one.part_id, approval_id: one.approval_id, value_sha256: one.value_sha256, cells: JSON.stringify(cellsOf(show.code, lockedAt, one)) }));
  const { rows } = await tx.execute<{ id: string; shot_id: string; copy: string; part_id: string }>(sql`
    insert into locks (show_id, shot_id, copy, asset_id, part_id, approval_id, value_sha256, csv_schema, cells, locked_by, locked_at)
    select ${show.id}::uuid, shot_id, copy, asset_id, part_id, approval_id, value_sha256, ${CSV_SCHEMA}, cells, ${lockedBy}::uuid, now()
    from json_to_recordset(${JSON.stringify(given)}::json) as given(shot_id uuid, copy text, asset_id uuid, part_id uuid, approval_id uuid, value_sha256 text, cells text)
    returning id, shot_id, copy, part_id`);
  await tx.execute(sql`
    insert into lock_claims (lock_id, part_id, shot_id, copy)
    select id, part_id, shot_id, copy from locks where id = any(${sql.param(rows.map((row) => row.id))}::uuid[])`);
  const ids = new Map(rows.map((row) => [`${row.shot_id} ${row.copy} ${row.part_id}`, row.id]));
  return lockables.map((one) => ids.get(`${one.shot_id} ${one.copy} ${one.part_id}`)!);
}

/** The cells of CSV_COLUMNS in their order. Empty texts are cells that are not given. */
function cellsOf(show: string, lockedAt: string, one: Lockable): (string | number | null)[] {
  const fields: Record<string, unknown> = {
    ...one,
    schema: CSV_SCHEMA,
    show,
    copy: one.copy || null,
    space: one.space ?? one.asset,
    state: 'locked',
    locked_at: lockedAt,
    value_id: one.approval_id,
    free_axes: one.free_axes || null,
    warnings: one.warnings || null,
  };
  return CSV_COLUMNS.map(({ name }) => {
    const cell = fields[name];
    if (cell === undefined) throw new Error(`A locked row has no ${name}.`);
    return cell as string | number | null;
  });
}
