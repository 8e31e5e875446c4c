import { contextOfUser } from '@/lib/auth/context-of-user';
import { hashPassword } from '@/lib/auth/password';
import { refuseWeakPassword } from '@/lib/auth/refuse-weak-password';
import { spendLink } from '@/lib/auth/spend-link';
import { storePassword } from '@/lib/auth/store-password';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { AcceptInvitationInput } from '@/lib/rules/inputs/accept-invitation';

/** Spends an invitation and gives its user a name and a password. Answers the address to sign in with. */
export async function acceptInvitation(context: Context, input: AcceptInvitationInput): Promise<{ email: string }> {
  const passwordHash = await hashPassword(input.password);
  return context.db.transaction(async (tx) => {
    const user = await spendLink(tx, 'invite', input.secret);
    refuseWeakPassword(input.password, user.email);
    await storePassword(tx, user, passwordHash, input.name);
    const items = user.name === input.name ? [] : [{ field: 'name', before: user.name, after: input.name }];
    await recordEvent(tx, contextOfUser(context, user), { showId: null, act: 'accept-invitation', subject: user.email, items });
    return { email: user.email };
  });
}
