import { sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import type { Actor } from '@/lib/context';
import { ROLES, may } from '@/lib/rules/roles';
import { blobKey } from '@/lib/storage/disk';
import { sizeInStorage } from '@/lib/storage/size-in-storage';

/** How many sizes are asked of the storage at a time. */
const AT_ONCE = 16;

/**
 * Of these contents, the ones that need not be sent. A hash alone proves nothing: somebody could claim that of a file which he does not
 * have, and would get it measured as his. So only what lies in a show that the actor reads whole counts as known to him; whatever else the
 * studio holds has to come as bytes like anything new (and is then not stored twice). A size that does not go with its hash is not known.
 */
export async function findKnownContent(db: Database, actor: Actor, contents: readonly { sha256: string; bytes: number }[]): Promise<Set<string>> {
  const readers = ROLES.filter((role) => may(role, 'readShow'));
  const { rows } = await db.execute<{ sha256: string; byte_size: string }>(sql`
    select distinct f.sha256, f.byte_size from import_files f join imports i on i.id = f.import_id
    where f.sha256 = any(${sql.param(contents.map((one) => one.sha256))}::text[])
      and (${actor.isAdmin} or exists (select 1 from members m where m.show_id = i.show_id and m.user_id = ${actor.userId} and m.role = any(${sql.param(readers)}::text[])))`);
  const sizes = new Map(rows.map((row) => [row.sha256, Number(row.byte_size)]));
  const waiting = [...new Set(contents.filter((one) => sizes.get(one.sha256) === one.bytes).map((one) => one.sha256))];
  const known = new Set<string>();
  const lane = async () => {
    for (let next = waiting.shift(); next; next = waiting.shift()) if ((await sizeInStorage(blobKey(next))) === sizes.get(next)) known.add(next);
  };
  await Promise.all(Array.from({ length: AT_ONCE }, lane));
  return known;
}
