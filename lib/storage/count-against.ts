import { eq, sql, type SQL } from 'drizzle-orm';
import type { Executor, Transaction } from '@/db/client';
import { storageUsage } from '@/db/schema/storage-usage';
import { config } from '@/lib/config';
import { byteWords } from '@/lib/rules/byte-words';
import { StudioError } from '@/lib/rules/studio-error';

/** What bytes or files are counted for. Where several are counted in one transaction, in this order, so that no two wait for each other. */
export type UsageScope = { kind: 'show'; showId: string } | { kind: 'import'; importId: string } | { kind: 'files'; importId: string } | { kind: 'studio' };

interface Counted {
  key: string;
  limit: number;
  /** One number: what the scope holds in truth. */
  truth: SQL;
  refusal: (limit: number) => string;
}

const inBytes = (limit: number): string => `${byteWords(limit)} (${limit} bytes)`;

/** Content counts once; an upload that goes on counts from its start, until its content is there. */
function countedOf(scope: UsageScope): Counted {
  const { maxShowBytes, maxStudioBytes, maxImportBytes, maxImportFiles } = config();
  switch (scope.kind) {
    case 'show':
      return {
        key: `show:${scope.showId}`,
        limit: maxShowBytes,
        truth: sql`select coalesce(sum(byte_size), 0) as amount from (
          select distinct f.sha256, f.byte_size from import_files f join imports i on i.id = f.import_id where i.show_id = ${scope.showId}
          union select u.sha256, u.byte_size from uploads u where u.show_id = ${scope.showId} and u.completed_at is null and u.expires_at > now()) held`,
        refusal: (limit) => `This show may hold ${inBytes(limit)}, and this file does not fit in any more. Ask an admin.`,
      };
    case 'studio':
      return {
        key: 'studio',
        limit: maxStudioBytes,
        truth: sql`select (select coalesce(sum(byte_size), 0) from blobs)
          + (select coalesce(sum(byte_size), 0) from uploads u where u.completed_at is null and u.expires_at > now() and not exists (select 1 from blobs b where b.sha256 = u.sha256)) as amount`,
        refusal: () => 'The studio’s storage has no room for this file. Ask an admin.',
      };
    case 'import':
      return {
        key: `import:${scope.importId}`,
        limit: maxImportBytes,
        truth: sql`select coalesce(sum(byte_size), 0) as amount from import_files where import_id = ${scope.importId}`,
        refusal: (limit) => `An import takes at most ${inBytes(limit)}. Put the rest into another one.`,
      };
    case 'files':
      return {
        key: `files:${scope.importId}`,
        limit: maxImportFiles,
        truth: sql`select count(*) as amount from import_files where import_id = ${scope.importId}`,
        refusal: (limit) => `An import takes at most ${limit} files. Put the rest into another one.`,
      };
  }
}

async function truthOf(db: Executor, { truth }: Counted): Promise<number> {
  const { rows } = await db.execute<{ amount: string }>(truth);
  return Number(rows[0].amount);
}

/**
 * Counts bytes (or files) for a scope, within the transaction that writes what is counted; the scope's row stays locked until that ends, so
 * that two cannot pass a limit together. What is counted twice only brings the recount forward. `isWritten`: the transaction has written
 * what is counted already, so that a recount finds it. Errors: too_large.
 */
export async function countAgainst(tx: Transaction, scope: UsageScope, amount: number, isWritten = false): Promise<void> {
  const counted = countedOf(scope);
  const [held] = await tx
    .insert(storageUsage)
    .values({ scope: counted.key, bytes: 0, countedAt: new Date(0) })
    .onConflictDoUpdate({ target: storageUsage.scope, set: { bytes: sql`${storageUsage.bytes}` } })
    .returning();
  const isFresh = held.countedAt.getTime() === 0;
  let total = held.bytes + amount;
  if (isFresh || total > counted.limit) {
    total = (await truthOf(tx, counted)) + (isWritten ? 0 : amount);
    if (total > counted.limit) throw new StudioError('too_large', counted.refusal(counted.limit));
    await tx.update(storageUsage).set({ bytes: total, countedAt: sql`now()` }).where(eq(storageUsage.scope, counted.key));
  } else if (amount > 0) {
    await tx.update(storageUsage).set({ bytes: total }).where(eq(storageUsage.scope, counted.key));
  }
}

/** How much of a scope's limit is left, by its count; what was counted twice makes it less than the truth. Where that is less than `enough`, the truth. */
export async function leftOf(db: Executor, scope: UsageScope, enough = 0): Promise<number> {
  const counted = countedOf(scope);
  const [held] = await db.select().from(storageUsage).where(eq(storageUsage.scope, counted.key));
  const isCounted = held !== undefined && held.countedAt.getTime() !== 0 && counted.limit - held.bytes >= enough;
  const used = isCounted ? held.bytes : await truthOf(db, counted);
  return Math.max(0, counted.limit - used);
}

/** Counts a scope afresh. */
export async function recount(tx: Transaction, scope: UsageScope): Promise<void> {
  const counted = countedOf(scope);
  const [held] = await tx.select().from(storageUsage).where(eq(storageUsage.scope, counted.key)).for('update');
  if (held) await tx.update(storageUsage).set({ bytes: await truthOf(tx, counted), countedAt: sql`now()` }).where(eq(storageUsage.scope, counted.key));
}
