import { and, eq } from 'drizzle-orm';
import { mails } from '@/db/schema/mails';
import { requireAdmin } from '@/lib/auth/require-admin';
import { config } from '@/lib/config';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { SendMailAgainInput } from '@/lib/rules/inputs/send-mail-again';
import { StudioError } from '@/lib/rules/studio-error';

/** Puts a message that failed back among those that wait: a person's decision, since it may have arrived. */
export async function sendMailAgain(context: Context, input: SendMailAgainInput): Promise<{ id: string }> {
  const known = requireAdmin(context, 'readStudio');
  if (!config().smtpUrl) throw new StudioError('not_available', 'No mail server is set, so messages stay in this mailbox.');
  return known.db.transaction(async (tx) => {
    const [mail] = await tx
      .update(mails)
      .set({ state: 'waiting', error: null })
      .where(and(eq(mails.id, input.id), eq(mails.state, 'failed')))
      .returning();
    if (!mail) throw new StudioError('conflict', 'Only a message that failed can be sent again.');
    await recordEvent(tx, known, { showId: null, act: 'send-mail-again', subject: mail.toEmail });
    return { id: mail.id };
  });
}
