import { count, eq } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { importFiles } from '@/db/schema/import-files';
import { users } from '@/db/schema/users';
import type { ImportAnswer, ImportCounts } from '@/lib/rules/import-answer';
import type { ImportRow } from './get-import-row';
import { importSecondsLeft } from './import-pace';

/** An import as the API answers it, without its files. */
export async function describeImport(db: Executor, row: ImportRow): Promise<ImportAnswer> {
  const counts: ImportCounts = { queued: 0, reading: 0, measuring: 0, done: 0, failed: 0, total: 0 };
  const states = await db.select({ state: importFiles.state, files: count() }).from(importFiles).where(eq(importFiles.importId, row.id)).groupBy(importFiles.state);
  for (const { state, files } of states) {
    counts[state] = files;
    counts.total += files;
  }
  const [creator] = await db.select({ name: users.name }).from(users).where(eq(users.id, row.createdBy));
  const left = row.pausedAt === null && (row.state === 'queued' || row.state === 'running') ? await importSecondsLeft(db, row.id) : null;
  return { ...answerOf(row, counts, creator?.name ?? ''), seconds_left: left };
}

export function answerOf(row: ImportRow, counts: ImportCounts, createdBy: string): ImportAnswer {
  return {
    id: row.id,
    state: row.state,
    paused: row.pausedAt !== null,
    scheme: row.scheme,
    boundary: row.boundary,
    parts_by: row.partsBy,
    weld: row.weld,
    turn_faces: row.turnFaces,
    created_by: createdBy,
    created_at: row.createdAt.toISOString(),
    submitted_at: row.submittedAt?.toISOString() ?? null,
    ended_at: row.endedAt?.toISOString() ?? null,
    counts,
  };
}
