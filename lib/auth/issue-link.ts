import { and, eq, isNull, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { oneTimeLinks } from '@/db/schema/one-time-links';
import { config } from '@/lib/config';
import { newSecret, secretHash } from './secret-hash';

const HOURS = { invite: 7 * 24, reset: 2 } as const;

/**
 * A link that is good once, in place of the user's earlier ones for this purpose; only its hash is stored.
 * @returns the address to send and how many hours it is good for
 */
export async function issueLink(tx: Transaction, userId: string, purpose: 'invite' | 'reset'): Promise<{ url: string; hours: number }> {
  const secret = newSecret();
  const hours = HOURS[purpose];
  await tx
    .update(oneTimeLinks)
    .set({ expiresAt: sql`least(${oneTimeLinks.expiresAt}, now())` })
    .where(and(eq(oneTimeLinks.userId, userId), eq(oneTimeLinks.purpose, purpose), isNull(oneTimeLinks.usedAt)));
  await tx
    .insert(oneTimeLinks)
    .values({ userId, purpose, tokenHash: secretHash(secret), expiresAt: sql`now() + make_interval(hours => ${hours})` });
  return { url: new URL(`/${purpose}/${secret}`, config().baseUrl).href, hours };
}
