import type { Transaction } from '@/db/client';
import { mails } from '@/db/schema/mails';
import { config } from '@/lib/config';
import type { Message } from './message';

/**
 * Writes a message within the change's own transaction, so that neither is there without the other. The worker sends what
 * waits; where no mail server is set, it stays in the mailbox that an admin reads in the product. Answers the message's id.
 */
export async function queueMail(tx: Transaction, toEmail: string, message: Message): Promise<string> {
  const [mail] = await tx.insert(mails).values({ toEmail, ...message, state: config().smtpUrl ? 'waiting' : 'local' }).returning({ id: mails.id });
  return mail.id;
}
