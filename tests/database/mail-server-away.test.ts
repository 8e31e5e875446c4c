import { expect, test } from 'vitest';
import { asOwner } from '../support/database';
import { startSmtp } from '../support/smtp';

// An address where a mail server was and is no longer.
const gone = await startSmtp();
await gone.close();
process.env.SMTP_URL = gone.url;
const { database } = await import('@/db/client');
const { queueMail } = await import('@/lib/mail/queue-mail');
const { sendWaitingMails } = await import('@/lib/mail/send-waiting-mails');

test('without an answer nothing is tried, all of it waits, and says why', async () => {
  await database().transaction((tx) => queueMail(tx, 'hesta@oxbarrow.example', { subject: 'A', text: 'a', html: '<p>a</p>' }));
  expect(await sendWaitingMails(database())).toEqual({ sent: 0, failed: 0, waiting: 0, reached: false });
  expect(await asOwner('select state, error from mails')).toEqual([{ state: 'waiting', error: 'The mail server does not answer. It is tried again.' }]);
});
