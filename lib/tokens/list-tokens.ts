import { and, desc, eq, isNull } from 'drizzle-orm';
import { apiTokens } from '@/db/schema/api-tokens';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';

export interface ListedToken {
  id: string;
  name: string;
  created_at: string;
  last_used_at: string | null;
  expires_at: string | null;
  expired: boolean;
}

/** One's own tokens that were not revoked, the newest first; never their secrets. */
export async function listTokens(context: Context): Promise<ListedToken[]> {
  const { actor, db } = requireActor(context);
  const rows = await db
    .select()
    .from(apiTokens)
    .where(and(eq(apiTokens.userId, actor.userId), isNull(apiTokens.revokedAt)))
    .orderBy(desc(apiTokens.createdAt));
  return rows.map((row) => ({
    id: row.id,
    name: row.name,
    created_at: row.createdAt.toISOString(),
    last_used_at: row.lastUsedAt?.toISOString() ?? null,
    expires_at: row.expiresAt?.toISOString() ?? null,
    expired: row.expiresAt !== null && row.expiresAt <= new Date(),
  }));
}
