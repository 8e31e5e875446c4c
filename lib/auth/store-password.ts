import { and, eq, isNull, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { oneTimeLinks } from '@/db/schema/one-time-links';
import { signInAttempts } from '@/db/schema/sign-in-attempts';
import { users } from '@/db/schema/users';

/**
 * Sets a user's password: their sessions end, links that are still out lead nowhere, and earlier failures to sign in
 * count no longer.
 */
export async function storePassword(tx: Transaction, user: { id: string; email: string }, passwordHash: string, name?: string): Promise<void> {
  await tx
    .update(users)
    .set({ passwordHash, sessionEpoch: sql`${users.sessionEpoch} + 1`, ...(name ? { name } : {}) })
    .where(eq(users.id, user.id));
  await tx
    .update(oneTimeLinks)
    .set({ expiresAt: sql`least(${oneTimeLinks.expiresAt}, now())` })
    .where(and(eq(oneTimeLinks.userId, user.id), isNull(oneTimeLinks.usedAt)));
  await tx.delete(signInAttempts).where(and(eq(signInAttempts.email, user.email.toLowerCase()), eq(signInAttempts.succeeded, false)));
}
