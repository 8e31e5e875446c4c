import { and, eq, gt, isNull, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { oneTimeLinks } from '@/db/schema/one-time-links';
import { users } from '@/db/schema/users';
import { LINK_WORDS } from '@/lib/rules/link-words';
import { StudioError } from '@/lib/rules/studio-error';
import { secretHash } from './secret-hash';

/** Spends a link and answers its user. Of two at once one wins; a link that is spent, late or unknown is refused. */
export async function spendLink(tx: Transaction, purpose: 'invite' | 'reset', secret: string): Promise<typeof users.$inferSelect> {
  const [spent] = await tx
    .update(oneTimeLinks)
    .set({ usedAt: sql`now()` })
    .where(
      and(
        eq(oneTimeLinks.tokenHash, secretHash(secret)),
        eq(oneTimeLinks.purpose, purpose),
        isNull(oneTimeLinks.usedAt),
        gt(oneTimeLinks.expiresAt, sql`now()`),
      ),
    )
    .returning({ userId: oneTimeLinks.userId });
  if (!spent) throw new StudioError('conflict', LINK_WORDS[purpose].refused);
  const [user] = await tx
    .select()
    .from(users)
    .where(and(eq(users.id, spent.userId), isNull(users.disabledAt)))
    .for('update');
  if (!user) throw new StudioError('conflict', LINK_WORDS[purpose].refused);
  return user;
}
