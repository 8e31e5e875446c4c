import { and, eq, isNull, lt, sql } from 'drizzle-orm';
import { createHash } from 'node:crypto';
import type { Database } from '@/db/client';
import { idempotencyKeys } from '@/db/schema/idempotency-keys';
import { StudioError } from '@/lib/rules/studio-error';

/**
 * Runs a write once per user and key. The same request again gets the stored answer; another request under the key is refused;
 * one that is still running is a conflict. A key whose process died is free again after a minute. Failures are not stored.
 */
export async function answerOnce(
  db: Database,
  userId: string,
  key: string,
  request: Request,
  input: unknown,
  run: () => Promise<Response>,
): Promise<Response> {
  if (key.length > 200) throw new StudioError('bad_request', 'Idempotency-Key may have at most 200 characters.');
  const requestHash = createHash('sha256')
    .update(JSON.stringify([request.method, new URL(request.url).pathname, input]))
    .digest('hex');
  const mine = and(eq(idempotencyKeys.userId, userId), eq(idempotencyKeys.key, key));
  await db.delete(idempotencyKeys).where(lt(idempotencyKeys.createdAt, sql`now() - interval '1 day'`));
  await db.delete(idempotencyKeys).where(and(mine, isNull(idempotencyKeys.status), lt(idempotencyKeys.createdAt, sql`now() - interval '1 minute'`)));
  const claimed = await db
    .insert(idempotencyKeys)
    .values({ userId, key, requestHash })
    .onConflictDoNothing()
    .returning({ key: idempotencyKeys.key });
  if (claimed.length === 0) return storedAnswer(db, userId, key, requestHash);
  try {
    const response = await run();
    const body: unknown = response.status === 204 ? null : await response.clone().json();
    await db.update(idempotencyKeys).set({ status: response.status, body }).where(mine);
    return response;
  } catch (error) {
    await db.delete(idempotencyKeys).where(and(mine, isNull(idempotencyKeys.status)));
    throw error;
  }
}

async function storedAnswer(db: Database, userId: string, key: string, requestHash: string): Promise<Response> {
  const [stored] = await db
    .select()
    .from(idempotencyKeys)
    .where(and(eq(idempotencyKeys.userId, userId), eq(idempotencyKeys.key, key)));
  if (!stored) throw new StudioError('conflict', 'This Idempotency-Key is being used right now. Try again.');
  if (stored.requestHash !== requestHash) {
    throw new StudioError('conflict', 'This Idempotency-Key was used for another request.');
  }
  if (stored.status === null) throw new StudioError('conflict', 'The first request with this Idempotency-Key is still running.');
  const headers = { 'cache-control': 'no-store', 'idempotent-replayed': 'true' };
  if (stored.status === 204) return new Response(null, { status: 204, headers });
  return Response.json(stored.body, { status: stored.status, headers });
}
