import { and, eq, isNull, sql } from 'drizzle-orm';
import { apiTokens } from '@/db/schema/api-tokens';
import { users } from '@/db/schema/users';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { RevokeTokenInput } from '@/lib/rules/inputs/revoke-token';
import { StudioError } from '@/lib/rules/studio-error';

/** Ends a token at once: one's own, or, for an admin, anybody's. A token that was ended before stays so. */
export async function revokeToken(context: Context, input: RevokeTokenInput): Promise<{ id: string; revoked: true }> {
  const known = requireActor(context);
  const mine = known.actor.isAdmin ? undefined : eq(apiTokens.userId, known.actor.userId);
  return known.db.transaction(async (tx) => {
    const [found] = await tx
      .select({ name: apiTokens.name, email: users.email })
      .from(apiTokens)
      .innerJoin(users, eq(users.id, apiTokens.userId))
      .where(and(eq(apiTokens.id, input.id), mine));
    if (!found) throw new StudioError('not_found', 'You have no such token.', { field: 'id' });
    const ended = await tx
      .update(apiTokens)
      .set({ revokedAt: sql`now()` })
      .where(and(eq(apiTokens.id, input.id), isNull(apiTokens.revokedAt)))
      .returning({ id: apiTokens.id });
    if (ended.length > 0) {
      await recordEvent(tx, known, { showId: null, act: 'revoke-token', subject: found.email, items: [{ field: 'name', before: found.name, after: null }] });
    }
    return { id: input.id, revoked: true as const };
  });
}
