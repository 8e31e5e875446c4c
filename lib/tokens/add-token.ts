import { and, isNull, sql } from 'drizzle-orm';
import { apiTokens } from '@/db/schema/api-tokens';
import { users } from '@/db/schema/users';
import { requireActor } from '@/lib/auth/require-actor';
import { newSecret, secretHash } from '@/lib/auth/secret-hash';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { AddTokenInput } from '@/lib/rules/inputs/add-token';
import { StudioError } from '@/lib/rules/studio-error';

export interface NewToken {
  id: string;
  name: string;
  /** The secret itself: shown now and never again. */
  token: string;
  expires_at: string | null;
}

/** A token of one's own that may do what its user may. The command line makes one for the user it names; nobody else does. */
export async function addToken(context: Context, input: AddTokenInput): Promise<NewToken> {
  const known = requireActor(context);
  const email = input.user ?? known.actor.email;
  if (email !== known.actor.email && known.actor.via !== 'system') {
    throw new StudioError('forbidden', 'You can only make tokens of your own.', { field: 'user' });
  }
  return known.db.transaction(async (tx) => {
    const [user] = await tx
      .select()
      .from(users)
      .where(and(sql`lower(${users.email}) = lower(${email})`, isNull(users.disabledAt)));
    if (!user) throw new StudioError('not_found', `Nobody who may sign in has the address ${email}.`, { field: 'user' });
    const token = newSecret('wh_');
    const [row] = await tx
      .insert(apiTokens)
      .values({
        userId: user.id,
        name: input.name,
        tokenHash: secretHash(token),
        expiresAt: input.days ? sql`now() + make_interval(days => ${input.days})` : null,
      })
      .returning();
    await recordEvent(tx, known, { showId: null, act: 'add-token', subject: user.email, items: [{ field: 'name', before: null, after: row.name }] });
    return { id: row.id, name: row.name, token, expires_at: row.expiresAt?.toISOString() ?? null };
  });
}
