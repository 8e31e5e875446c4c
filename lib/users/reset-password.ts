import { contextOfUser } from '@/lib/auth/context-of-user';
import { hashPassword } from '@/lib/auth/password';
import { refuseWeakPassword } from '@/lib/auth/refuse-weak-password';
import { spendLink } from '@/lib/auth/spend-link';
import { storePassword } from '@/lib/auth/store-password';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { ResetPasswordInput } from '@/lib/rules/inputs/reset-password';

/** Spends a reset link and sets the new password; every session of the user ends. Answers the address to sign in with. */
export async function resetPassword(context: Context, input: ResetPasswordInput): Promise<{ email: string }> {
  const passwordHash = await hashPassword(input.password);
  return context.db.transaction(async (tx) => {
    const user = await spendLink(tx, 'reset', input.secret);
    refuseWeakPassword(input.password, user.email);
    await storePassword(tx, user, passwordHash);
    await recordEvent(tx, contextOfUser(context, user), { showId: null, act: 'reset-password', subject: user.email });
    return { email: user.email };
  });
}
