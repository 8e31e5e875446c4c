import { sql } from 'drizzle-orm';
import { users } from '@/db/schema/users';
import { requireAdmin } from '@/lib/auth/require-admin';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { InviteUserInput } from '@/lib/rules/inputs/invite-user';
import { StudioError } from '@/lib/rules/studio-error';
import { sendInvitation } from './send-invitation';

/** Sends the invitation once more, in place of the earlier link. Refused for who has a password or may not sign in. */
export async function inviteUser(context: Context, input: InviteUserInput): Promise<{ email: string }> {
  const known = requireAdmin(context, 'editUsers');
  return known.db.transaction(async (tx) => {
    const [user] = await tx.select().from(users).where(sql`lower(${users.email}) = ${input.email}`).for('update');
    if (!user) throw new StudioError('not_found', `Nobody has the address ${input.email}.`, { field: 'email' });
    if (user.disabledAt) throw new StudioError('conflict', `${user.name} may not sign in. Let them in again first.`, { field: 'email' });
    if (user.passwordHash !== null) throw new StudioError('conflict', `${user.name} has a password already.`, { field: 'email' });
    await sendInvitation(tx, known.actor, user, null);
    await recordEvent(tx, known, { showId: null, act: 'invite-user', subject: user.email });
    return { email: user.email };
  });
}
