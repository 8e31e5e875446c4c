import { and, eq, isNull, ne } from 'drizzle-orm';
import { notices } from '@/db/schema/notices';
import { users } from '@/db/schema/users';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { SetMailChoiceInput } from '@/lib/rules/inputs/set-mail-choice';
import type { MailChoice } from '@/lib/rules/mail-choices';

/** The caller chooses to be told of each thing at once, once a day, or not at all. Whoever chooses the last is not told what waits either. */
export async function setMailChoice(context: Context, { choice }: SetMailChoiceInput): Promise<{ choice: MailChoice }> {
  const acting = requireActor(context);
  const { userId, email } = acting.actor;
  return acting.db.transaction(async (tx) => {
    const [before] = await tx.select({ choice: users.mailChoice }).from(users).where(eq(users.id, userId)).for('no key update');
    await tx.update(users).set({ mailChoice: choice }).where(and(eq(users.id, userId), ne(users.mailChoice, choice)));
    if (choice === 'none') await tx.delete(notices).where(and(eq(notices.userId, userId), isNull(notices.mailId)));
    if (before && before.choice !== choice) await recordEvent(tx, acting, { showId: null, act: 'set-mail-choice', subject: email, items: [{ field: 'mail', before: before.choice, after: choice }] });
    return { choice };
  });
}
