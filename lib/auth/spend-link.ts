import { and, eq, getTableColumns, gt, isNull, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { oneTimeLinks } from '@/db/schema/one-time-links';
import { users } from '@/db/schema/users';
import { LINK_WORDS } from '@/lib/rules/link-words';
import { StudioError } from '@/lib/rules/studio-error';
import { secretHash } from './secret-hash';

/** Spends a link and answers its user. Of two at once one wins; a link that is spent, late or unknown is refused. */
export async function spendLink(tx: Transaction, purpose: 'invite' | 'reset', secret: string): Promise<typeof users.$inferSelect> {
  const hash = secretHash(secret);
  // The user's row first, as whoever issues a link locks it: the other order could wait for one another.
  const [user] = await tx
    .select(getTableColumns(users))
    .from(users)
    .innerJoin(oneTimeLinks, eq(oneTimeLinks.userId, users.id))
    .where(and(eq(oneTimeLinks.tokenHash, hash), eq(oneTimeLinks.purpose, purpose), isNull(users.disabledAt)))
    .for('update', { of: users });
  if (!user) throw new StudioError('conflict', LINK_WORDS[purpose].refused);
  const spent = await tx
    .update(oneTimeLinks)
    .set({ usedAt: sql`now()` })
    .where(and(eq(oneTimeLinks.tokenHash, hash), eq(oneTimeLinks.purpose, purpose), isNull(oneTimeLinks.usedAt), gt(oneTimeLinks.expiresAt, sql`now()`)))
    .returning({ id: oneTimeLinks.id });
  if (spent.length === 0) throw new StudioError('conflict', LINK_WORDS[purpose].refused);
  return user;
}
