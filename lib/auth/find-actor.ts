import { and, eq, gt, isNull, or, sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { apiTokens } from '@/db/schema/api-tokens';
import { users } from '@/db/schema/users';
import type { Actor } from '@/lib/context';
import { findSession } from './find-session';
import { secretHash } from './secret-hash';

/** Who sends the request: the bearer token's user, else the signed-in one, else null. A bad token never falls back to the session. */
export async function findActor(db: Database, headers: Pick<Headers, 'get'>): Promise<Actor | null> {
  const authorization = headers.get('authorization');
  if (authorization !== null) return findTokenActor(db, authorization);
  return findSessionActor(db, headers);
}

/** The signed-in user as the database knows them now; null when nobody is, or when the session was ended. */
export async function findSessionActor(db: Database, headers: Pick<Headers, 'get'>): Promise<Actor | null> {
  const session = await findSession(headers.get('cookie'));
  if (!session) return null;
  const [user] = await db
    .select()
    .from(users)
    .where(and(eq(users.id, session.userId), eq(users.sessionEpoch, session.sessionEpoch), isNull(users.disabledAt)));
  if (!user) return null;
  return { userId: user.id, email: user.email, name: user.name, isAdmin: user.isAdmin, via: 'session', tokenId: null };
}

async function findTokenActor(db: Database, authorization: string): Promise<Actor | null> {
  const match = /^Bearer ([A-Za-z0-9_-]{20,200})$/i.exec(authorization.trim());
  if (!match) return null;
  const [found] = await db
    .select({ token: apiTokens, user: users })
    .from(apiTokens)
    .innerJoin(users, eq(users.id, apiTokens.userId))
    .where(
      and(
        eq(apiTokens.tokenHash, secretHash(match[1])),
        isNull(apiTokens.revokedAt),
        isNull(users.disabledAt),
        or(isNull(apiTokens.expiresAt), gt(apiTokens.expiresAt, sql`now()`)),
      ),
    );
  if (!found) return null;
  await db
    .update(apiTokens)
    .set({ lastUsedAt: sql`now()` })
    .where(and(eq(apiTokens.id, found.token.id), or(isNull(apiTokens.lastUsedAt), sql`${apiTokens.lastUsedAt} < now() - interval '1 minute'`)));
  const { user } = found;
  return { userId: user.id, email: user.email, name: user.name, isAdmin: user.isAdmin, via: 'token', tokenId: found.token.id };
}
