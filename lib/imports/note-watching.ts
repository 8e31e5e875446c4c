import { and, eq, isNull, lt, or, sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { imports } from '@/db/schema/imports';
import type { Actor } from '@/lib/context';

/** Seconds after which somebody who was not seen again has left. Streams note their readers every 15 s. */
export const LEFT_AFTER_S = 40;

/** Notes that the person who opened an import is looking at it, so that its end need not be written to them. Scripts do not look. */
export async function noteWatching(db: Database, actor: Actor, importId: string): Promise<void> {
  if (actor.via !== 'session') return;
  await db
    .update(imports)
    .set({ watchedAt: sql`now()` })
    .where(and(eq(imports.id, importId), eq(imports.createdBy, actor.userId), or(isNull(imports.watchedAt), lt(imports.watchedAt, sql`now() - interval '5 seconds'`))));
}
