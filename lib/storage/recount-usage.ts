import { sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { recount, type UsageScope } from './count-against';

/** Counts afresh what shows and the studio hold, and forgets the counts of imports that take nothing more. */
export async function recountUsage(db: Database): Promise<void> {
  await db.execute(sql`delete from storage_usage where split_part(scope, ':', 1) in ('import', 'files')
    and not exists (select 1 from imports i where i.id::text = split_part(storage_usage.scope, ':', 2) and i.state = 'open')`);
  const { rows } = await db.execute<{ scope: string }>(sql`select scope from storage_usage where scope = 'studio' or scope like 'show:%'`);
  const scopes = rows.map(({ scope }): UsageScope => (scope === 'studio' ? { kind: 'studio' } : { kind: 'show', showId: scope.slice('show:'.length) }));
  for (const scope of scopes) await db.transaction((tx) => recount(tx, scope));
}
