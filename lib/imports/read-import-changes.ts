import { sql } from 'drizzle-orm';
import type { Database, Executor } from '@/db/client';
import type { ImportDetail } from '@/lib/rules/import-answer';
import { describeImport } from './describe-import';
import { getImportRow } from './get-import-row';
import { listImportFiles } from './list-import-files';

/** How far a reader has read: what every transaction before this number brought is known to them. */
export type ChangeMark = bigint;

/** A reader's mark as it was sent to them; null where it is none of ours, so that they are told the whole. */
export function parseMark(text: string | null | undefined): ChangeMark | null {
  return text && /^\d{1,18}$/.test(text) ? BigInt(text) : null;
}

/**
 * The oldest transaction that this snapshot may not see. A file's `changed` is the number of the transaction that changed it, so that
 * every change this snapshot does not show has a number from here on, in whatever order transactions commit.
 */
export async function readMark(tx: Executor): Promise<ChangeMark> {
  const { rows } = await tx.execute<{ mark: string }>(sql`select pg_snapshot_xmin(pg_current_snapshot())::text as mark`);
  return BigInt(rows[0].mark);
}

/**
 * An import with the files that changed since a mark (all of them without one), and the mark to go on from. One snapshot. A file may
 * be told again that is known already, none is missed. A mark from another database's time counts as none.
 * Errors: not_found for an import of another show.
 */
export async function readImportChanges(db: Database, showId: string, importId: string, since: ChangeMark | null): Promise<{ detail: ImportDetail; mark: ChangeMark }> {
  return db.transaction(
    async (tx) => {
      const mark = await readMark(tx);
      const row = await getImportRow(tx, showId, importId);
      const only = since !== null && since <= mark ? sql`f.changed >= ${since.toString()}::bigint` : sql`true`;
      return { mark, detail: { ...(await describeImport(tx, row)), mark: mark.toString(), files: await listImportFiles(tx, importId, only) } };
    },
    { isolationLevel: 'repeatable read', accessMode: 'read only' },
  );
}
