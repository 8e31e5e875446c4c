import { and, eq, isNull, sql } from 'drizzle-orm';
import { users } from '@/db/schema/users';
import { requireAdmin } from '@/lib/auth/require-admin';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { DisableUserInput } from '@/lib/rules/inputs/disable-user';
import { StudioError } from '@/lib/rules/studio-error';
import { showsLedAlone } from '@/lib/shows/refuse-last-lead';
import { lockAdmins } from './lock-admins';
import { refuseLastAdmin } from './refuse-last-admin';

/**
 * Ends a person's sessions and tokens at once; what they did stands under their name. Refused for the last admin and for
 * whoever leads a show alone. Somebody who is disabled already stays so.
 */
export async function disableUser(context: Context, input: DisableUserInput): Promise<{ email: string; disabled: true }> {
  const known = requireAdmin(context, 'editUsers');
  return known.db.transaction(async (tx) => {
    await lockAdmins(tx);
    const [user] = await tx.select().from(users).where(sql`lower(${users.email}) = ${input.email}`);
    if (!user) throw new StudioError('not_found', `Nobody has the address ${input.email}.`, { field: 'email' });
    if (user.disabledAt) return { email: user.email, disabled: true as const };
    if (user.isAdmin) await refuseLastAdmin(tx, user.id);
    const alone = await showsLedAlone(tx, user.id);
    if (alone.length > 0) {
      throw new StudioError('conflict', `${user.name} leads ${alone.join(', ')} alone. Make somebody else lead there first.`, { field: 'email' });
    }
    await tx
      .update(users)
      .set({ disabledAt: sql`now()`, sessionEpoch: sql`${users.sessionEpoch} + 1` })
      .where(and(eq(users.id, user.id), isNull(users.disabledAt)));
    await recordEvent(tx, known, { showId: null, act: 'disable-user', subject: user.email, items: [{ field: 'disabled', before: 'false', after: 'true' }] });
    return { email: user.email, disabled: true as const };
  });
}
