import { and, inArray, isNull, lt, or, sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { uploads } from '@/db/schema/uploads';
import { disk, PARTS, UNFINISHED } from './disk';
import { dropParts } from './drop-parts';
import { listStored } from './list-stored';

/** Older than any request that could still be writing. */
const DAY_MS = 24 * 3_600_000;

/** Ends uploads that ran out, with their parts. Answers how many. */
export async function sweepExpiredUploads(db: Database): Promise<number> {
  const u = uploads;
  const isHeld = or(isNull(u.assemblingUntil), lt(u.assemblingUntil, sql`now()`));
  const gone = await db.delete(u).where(and(lt(u.expiresAt, sql`now()`), isHeld)).returning({ id: u.id });
  for (const { id } of gone) await dropParts(id);
  return gone.length;
}

/** Removes parts whose upload is no more, and what was being written when its process died, once they are a day old. Answers how many. */
export async function sweepLeftovers(db: Database, now = Date.now()): Promise<number> {
  let removed = 0;
  const lost = new Map<string, string[]>();
  for await (const { key, modified } of listStored(PARTS)) {
    if (now - modified.getTime() < DAY_MS) continue;
    const id = key.split('/')[1];
    lost.set(id, [...(lost.get(id) ?? []), key]);
  }
  const ids = [...lost.keys()].filter((id) => /^[0-9a-f-]{36}$/.test(id));
  const living = ids.length === 0 ? [] : await db.select({ id: uploads.id }).from(uploads).where(and(inArray(uploads.id, ids), isNull(uploads.completedAt)));
  for (const { id } of living) lost.delete(id);
  for (const keys of lost.values()) {
    for (const key of keys) {
      await (await disk()).delete(key);
      removed++;
    }
  }
  for await (const { key, modified } of listStored(UNFINISHED)) {
    if (now - modified.getTime() < DAY_MS) continue;
    await (await disk()).delete(key);
    removed++;
  }
  return removed;
}
