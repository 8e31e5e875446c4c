import { users } from '@/db/schema/users';
import { requireAdmin } from '@/lib/auth/require-admin';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { AddUserInput } from '@/lib/rules/inputs/add-user';
import { StudioError } from '@/lib/rules/studio-error';
import { nameFromEmail } from './name-from-email';
import { sendInvitation } from './send-invitation';

/** Adds a person to the studio and mails them an invitation. Throws already_exists for a known address. */
export async function addUser(context: Context, input: AddUserInput): Promise<{ id: string; email: string; name: string; admin: boolean }> {
  const known = requireAdmin(context, 'editUsers');
  const name = input.name ?? nameFromEmail(input.email);
  return known.db.transaction(async (tx) => {
    const [user] = await tx
      .insert(users)
      .values({ email: input.email, name, isAdmin: input.admin })
      .onConflictDoNothing()
      .returning();
    if (!user) throw new StudioError('already_exists', `${input.email} has an account already.`, { field: 'email' });
    await recordEvent(tx, known, {
      showId: null,
      act: 'add-user',
      subject: user.email,
      items: [
        { field: 'name', before: null, after: user.name },
        { field: 'admin', before: null, after: String(user.isAdmin) },
      ],
    });
    await sendInvitation(tx, known.actor, user, null);
    return { id: user.id, email: user.email, name: user.name, admin: user.isAdmin };
  });
}
