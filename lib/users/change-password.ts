import { eq } from 'drizzle-orm';
import { users } from '@/db/schema/users';
import { hashPassword } from '@/lib/auth/password';
import { refuseWeakPassword } from '@/lib/auth/refuse-weak-password';
import { requireActor } from '@/lib/auth/require-actor';
import { storePassword } from '@/lib/auth/store-password';
import { verifyCredentials } from '@/lib/auth/verify-credentials';
import { config } from '@/lib/config';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import { queueMail } from '@/lib/mail/queue-mail';
import { passwordChangedMail } from '@/lib/mail/templates/password-changed';
import type { ChangePasswordInput } from '@/lib/rules/inputs/change-password';
import { StudioError } from '@/lib/rules/studio-error';

/** Changes one's own password, given the one that stands; every session ends, the one that asks included. Tokens may not do it. */
export async function changePassword(context: Context, input: ChangePasswordInput): Promise<{ email: string }> {
  const known = requireActor(context);
  if (known.actor.via !== 'session') throw new StudioError('forbidden', 'A password is changed on the account page.');
  refuseWeakPassword(input.password, known.actor.email);
  const outcome = await verifyCredentials(known.db, known.actor.email, input.current);
  if (outcome.state === 'too_many') {
    const minutes = Math.max(1, Math.ceil((outcome.until.getTime() - Date.now()) / 60_000));
    throw new StudioError('too_many_requests', `Too many attempts. Try again in ${minutes} min.`, { field: 'current' });
  }
  if (outcome.state === 'refused') throw new StudioError('bad_input', 'This is not your password.', { field: 'current' });
  const passwordHash = await hashPassword(input.password);
  return known.db.transaction(async (tx) => {
    const [user] = await tx.select().from(users).where(eq(users.id, known.actor.userId)).for('update');
    await storePassword(tx, user, passwordHash);
    await recordEvent(tx, known, { showId: null, act: 'change-password', subject: user.email });
    await queueMail(tx, user.email, passwordChangedMail({ name: user.name, url: new URL('/reset', config().baseUrl).href }));
    return { email: user.email };
  });
}
