import { sql } from 'drizzle-orm';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ShowRefInput } from '@/lib/rules/inputs/show-ref';
import { getShowAccess } from '@/lib/shows/get-show-access';

/** A pattern is tried on the newest names; more of them would say no more. */
const MOST_NAMES = 2_000;

/** Paths of the files that a show imported, each once, the newest first: what a name pattern is tried on. */
export async function listImportedNames(context: Context, input: ShowRefInput): Promise<string[]> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const { rows } = await db.execute<{ name: string }>(sql`
    select f.name from import_files f join imports i on i.id = f.import_id
    where i.show_id = ${show.id} and f.asset_override is null group by f.name order by max(f.uploaded_at) desc, f.name collate "C" limit ${MOST_NAMES}`);
  return rows.map((row) => row.name);
}
