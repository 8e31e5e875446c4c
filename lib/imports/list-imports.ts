import { and, desc, eq, lt, sql } from 'drizzle-orm';
import { imports } from '@/db/schema/imports';
import { users } from '@/db/schema/users';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ImportCounts, ImportPage } from '@/lib/rules/import-answer';
import type { ListImportsInput } from '@/lib/rules/inputs/list-imports';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { answerOf } from './describe-import';
import { readMark } from './read-import-changes';

const NONE: ImportCounts = { queued: 0, reading: 0, measuring: 0, done: 0, failed: 0, total: 0 };

/** A show's imports, newest first, without their files, and the mark from which their news can be followed. The cursor is a time of the database with its microseconds. */
export async function listImports(context: Context, input: ListImportsInput): Promise<ImportPage> {
  const { actor } = requireActor(context);
  const { show } = await getShowAccess(context.db, actor, input.show, 'readShow');
  if (input.cursor && !/^\d{4}-\d\d-\d\d[T ][\d:.]+(Z|[+-]\d\d(:?\d\d)?)$/.test(input.cursor)) throw new StudioError('bad_input', 'This cursor is not one of ours.', { field: 'cursor' });
  // Before the list is read: what changes meanwhile is told again rather than missed.
  const mark = await readMark(context.db);
  const found = await context.db
    .select({
      row: imports,
      createdBy: users.name,
      at: sql<string>`${imports.createdAt}::text`,
      counts: sql<Partial<ImportCounts> | null>`(select jsonb_object_agg(state, files) from (
        select state, count(*) as files from import_files where import_id = ${imports.id} group by state) by_state)`,
    })
    .from(imports)
    .innerJoin(users, eq(users.id, imports.createdBy))
    .where(and(eq(imports.showId, show.id), input.cursor ? lt(imports.createdAt, sql`${input.cursor}::timestamptz`) : undefined))
    .orderBy(desc(imports.createdAt))
    .limit(input.limit + 1);
  const page = found.slice(0, input.limit);
  const items = page.map(({ row, createdBy, counts }) => {
    const total = Object.values(counts ?? {}).reduce((sum, files) => sum + files, 0);
    return answerOf(row, { ...NONE, ...counts, total }, createdBy);
  });
  return { items, mark: mark.toString(), next_cursor: found.length > input.limit ? page[page.length - 1].at.replace(' ', 'T') : null };
}
