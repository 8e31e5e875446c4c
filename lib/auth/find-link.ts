import { and, eq } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { oneTimeLinks } from '@/db/schema/one-time-links';
import { users } from '@/db/schema/users';
import { secretHash } from './secret-hash';

export type LinkState = 'good' | 'used' | 'expired' | 'unknown';

/** What a link is still good for, and whose it is; an unknown one and one of a disabled user look the same. */
export async function findLink(
  db: Database,
  purpose: 'invite' | 'reset',
  secret: string,
): Promise<{ state: LinkState; email: string; name: string }> {
  const [found] = await db
    .select({ usedAt: oneTimeLinks.usedAt, expiresAt: oneTimeLinks.expiresAt, email: users.email, name: users.name, disabledAt: users.disabledAt })
    .from(oneTimeLinks)
    .innerJoin(users, eq(users.id, oneTimeLinks.userId))
    .where(and(eq(oneTimeLinks.tokenHash, secretHash(secret)), eq(oneTimeLinks.purpose, purpose)));
  if (!found || found.disabledAt) return { state: 'unknown', email: '', name: '' };
  const state = found.usedAt ? 'used' : found.expiresAt <= new Date() ? 'expired' : 'good';
  return { state, email: found.email, name: found.name };
}
