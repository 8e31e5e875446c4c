import { afterAll, beforeEach, expect, test } from 'vitest';
import { asOwner } from '../support/database';
import { refusal, startSmtp } from '../support/smtp';

// The mail server has to be set before lib/config is read.
const smtp = await startSmtp();
process.env.SMTP_URL = smtp.url;
process.env.MAIL_FROM = 'Weighhouse <weighhouse@oxbarrow.example>';
const { database } = await import('@/db/client');
const { queueMail } = await import('@/lib/mail/queue-mail');
const { sendWaitingMails } = await import('@/lib/mail/send-waiting-mails');
const { sendMailAgain } = await import('@/lib/mail/send-mail-again');
const { invitationMail } = await import('@/lib/mail/templates/invitation');
const { contextOf, createUser } = await import('../support/cast');

afterAll(() => smtp.close());
beforeEach(async () => {
  await asOwner('delete from mails');
  smtp.taken.length = 0;
  smtp.onRecipient = () => undefined;
  smtp.onMessage = () => undefined;
});

const message = (name = 'Hesta') => invitationMail({ name, invitedBy: 'Odrun Vask', show: { title: 'The Bell', role: 'lead' }, url: 'http://127.0.0.1:3000/invite/abc', hours: 168 });

async function queue(...addresses: string[]): Promise<void> {
  for (const address of addresses) await database().transaction((tx) => queueMail(tx, address, message()));
}

async function states(): Promise<Record<string, { state: string; error: string | null }>> {
  const rows = await asOwner<{ to_email: string; state: string; error: string | null }>('select to_email, state, error from mails');
  return Object.fromEntries(rows.map(({ to_email: to, state, error }) => [to, { state, error }]));
}

test('a message goes out in full, as text and as HTML, and is marked', async () => {
  await queue('hesta@oxbarrow.example');
  expect(await states()).toEqual({ 'hesta@oxbarrow.example': { state: 'waiting', error: null } });
  expect(await sendWaitingMails(database())).toEqual({ sent: 1, failed: 0, waiting: 0, reached: true });
  expect(smtp.taken).toHaveLength(1);
  const [mail] = smtp.taken;
  expect([mail.from, mail.to]).toEqual(['weighhouse@oxbarrow.example', ['hesta@oxbarrow.example']]);
  expect(mail.source).toMatch(/^Subject: Invitation to The Bell\r$/m);
  expect(mail.source).toContain('text/plain');
  expect(mail.source).toContain('text/html');
  expect(mail.source.replaceAll('=\r\n', '').match(/http:\/\/127\.0\.0\.1:3000\/invite\/abc/g)).toHaveLength(2);
  const [row] = await asOwner<{ state: string; error: null; sent_at: Date | null }>('select state, error, sent_at from mails');
  expect(row).toMatchObject({ state: 'sent', error: null });
  expect(row.sent_at).toBeInstanceOf(Date);
  // The link that went out is nowhere in the clear any more.
  expect(await asOwner('select text, html from mails')).toEqual([{ text: '', html: '' }]);
});

test('many senders at once send each message once', async () => {
  const addresses = Array.from({ length: 12 }, (_, index) => `person${index}@oxbarrow.example`);
  await queue(...addresses);
  const outcomes = await Promise.all([1, 2, 3, 4].map(() => sendWaitingMails(database())));
  expect(outcomes.reduce((sum, outcome) => sum + outcome.sent, 0)).toBe(12);
  expect(smtp.taken.map((mail) => mail.to[0]).sort()).toEqual([...addresses].sort());
  await sendWaitingMails(database());
  expect(smtp.taken).toHaveLength(12);
});

test('a rolled-back change sends nothing', async () => {
  await expect(
    database().transaction(async (tx) => {
      await queueMail(tx, 'hesta@oxbarrow.example', message());
      throw new Error('the change failed');
    }),
  ).rejects.toThrow('the change failed');
  await sendWaitingMails(database());
  expect(smtp.taken).toHaveLength(0);
});

test('a refusal for good fails one message and not the others', async () => {
  smtp.onRecipient = (address) => {
    if (address.startsWith('gone')) throw refusal(550, 'No such person');
  };
  await queue('gone@oxbarrow.example', 'hesta@oxbarrow.example');
  expect(await sendWaitingMails(database())).toEqual({ sent: 1, failed: 1, waiting: 0, reached: true });
  const found = await states();
  expect(found['hesta@oxbarrow.example'].state).toBe('sent');
  expect(found['gone@oxbarrow.example'].state).toBe('failed');
  expect(found['gone@oxbarrow.example'].error).toContain('No such person');
});

test('"not now" keeps the message waiting, and it goes out later', async () => {
  smtp.onMessage = () => {
    throw refusal(451, 'Busy, try later');
  };
  await queue('hesta@oxbarrow.example');
  expect(await sendWaitingMails(database())).toEqual({ sent: 0, failed: 0, waiting: 1, reached: true });
  expect((await states())['hesta@oxbarrow.example']).toMatchObject({ state: 'waiting', error: expect.stringContaining('try later') as string });
  smtp.onMessage = () => undefined;
  expect(await sendWaitingMails(database())).toMatchObject({ sent: 1 });
  expect((await states())['hesta@oxbarrow.example']).toEqual({ state: 'sent', error: null });
});

test('a message whose end is not known is not sent again by itself, only by a person', async () => {
  // As a process that died between the first byte and the server's word leaves it.
  await queue('hesta@oxbarrow.example');
  let seen = '';
  smtp.onMessage = async () => {
    seen = JSON.stringify(await states());
  };
  await sendWaitingMails(database());
  expect(seen).toContain('"state":"failed"');
  expect(seen).toContain('may have arrived');
  await asOwner(`update mails set text = 'a', html = '<p>a</p>', state = 'failed', error = 'Sending began and its end is not known: the message may have arrived.', sent_at = null`);
  smtp.taken.length = 0;
  expect(await sendWaitingMails(database())).toMatchObject({ sent: 0 });
  expect(smtp.taken).toHaveLength(0);
  const [{ id }] = await asOwner<{ id: string }>('select id from mails');
  await expect(sendMailAgain(contextOf(await createUser()), { id })).rejects.toMatchObject({ code: 'forbidden' });
  const admin = await createUser({ isAdmin: true });
  await sendMailAgain(contextOf(admin), { id });
  await expect(sendMailAgain(contextOf(admin), { id })).rejects.toMatchObject({ code: 'conflict' });
  await sendWaitingMails(database());
  expect(smtp.taken).toHaveLength(1);
});

test('an address cannot smuggle in another recipient, nor a name another header', async () => {
  await database().transaction((tx) => queueMail(tx, 'hesta,pell@oxbarrow.example', message('Hesta\r\nBcc: pell@oxbarrow.example')));
  await sendWaitingMails(database());
  expect(smtp.taken.flatMap((mail) => mail.to)).not.toContain('pell@oxbarrow.example');
  for (const mail of smtp.taken) expect(mail.source.split('\r\n\r\n')[0]).not.toMatch(/^bcc:/im);
});

test('HTML of a name is text', () => {
  const { html } = message('<img src=x onerror=alert(1)>');
  expect(html).not.toContain('<img');
  expect(html).toContain('&lt;img');
});
