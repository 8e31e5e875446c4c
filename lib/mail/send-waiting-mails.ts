import { and, asc, eq, notInArray, sql } from 'drizzle-orm';
import { createTransport, type Transporter } from 'nodemailer';
import type { Database } from '@/db/client';
import { mails } from '@/db/schema/mails';
import { config } from '@/lib/config';
import { log } from '@/lib/log';

/** What a claimed message says until its end is known; whoever reads it later knows that nobody knows. */
const UNKNOWN_END = 'Sending began and its end is not known: the message may have arrived.';
const NO_ANSWER = 'The mail server does not answer. It is tried again.';

export interface SentMails {
  sent: number;
  failed: number;
  /** Put back to be tried again: the server said "not now". */
  waiting: number;
  /** False where the server could not be reached or did not let us in; then nothing was tried. */
  reached: boolean;
}

/**
 * Sends what waits, the oldest first, each at most once: a message is claimed as failed before the first byte goes out, and
 * becomes `sent` or goes back to `waiting` only on the server's own word. Without a mail server there is nothing to do.
 */
export async function sendWaitingMails(db: Database, most = 50): Promise<SentMails> {
  const outcome: SentMails = { sent: 0, failed: 0, waiting: 0, reached: true };
  const { smtpUrl } = config();
  if (!smtpUrl || (await db.$count(mails, eq(mails.state, 'waiting'))) === 0) return outcome;
  const transport = createTransport({ url: smtpUrl, pool: true, maxConnections: 1, connectionTimeout: 15_000, greetingTimeout: 15_000, socketTimeout: 60_000 });
  try {
    if (!(await reaches(transport))) {
      await db.update(mails).set({ error: NO_ANSWER }).where(eq(mails.state, 'waiting'));
      return { ...outcome, reached: false };
    }
    const tried: string[] = [];
    for (let mail = await claim(db, tried); mail && tried.length < most; mail = await claim(db, tried)) {
      tried.push(mail.id);
      outcome[await send(db, transport, mail)] += 1;
    }
    return outcome;
  } finally {
    transport.close();
  }
}

type Mail = typeof mails.$inferSelect;
type Transport = Pick<Transporter, 'sendMail' | 'verify'>;

async function reaches(transport: Transport): Promise<boolean> {
  try {
    await transport.verify();
    return true;
  } catch (error) {
    log.warn({ err: error }, 'the mail server cannot be used');
    return false;
  }
}

async function claim(db: Database, tried: string[]): Promise<Mail | null> {
  const next = db
    .select({ id: mails.id })
    .from(mails)
    .where(and(eq(mails.state, 'waiting'), tried.length > 0 ? notInArray(mails.id, tried) : undefined))
    .orderBy(asc(mails.createdAt))
    .limit(1)
    .for('update', { skipLocked: true });
  const [claimed] = await db
    .update(mails)
    .set({ state: 'failed', error: UNKNOWN_END })
    .where(and(eq(mails.id, next), eq(mails.state, 'waiting')))
    .returning();
  return claimed ?? null;
}

async function send(db: Database, transport: Transport, mail: Mail): Promise<'sent' | 'failed' | 'waiting'> {
  try {
    await transport.sendMail({
      from: config().mailFrom,
      to: { name: '', address: mail.toEmail },
      subject: mail.subject,
      text: mail.text,
      html: mail.html,
      messageId: `<${mail.id}@weighhouse>`,
      headers: { 'Auto-Submitted': 'auto-generated' },
    });
  } catch (error) {
    const refusal = refusalOf(error);
    log.warn({ mailId: mail.id, responseCode: refusal.responseCode }, 'a message was not taken');
    if (refusal.responseCode === null) return 'failed';
    const isLater = refusal.responseCode < 500;
    await end(db, mail, { state: isLater ? 'waiting' : 'failed', error: `The mail server refused it: ${refusal.response}` });
    return isLater ? 'waiting' : 'failed';
  }
  // What was sent may hold a link that is good once: it is not kept in the clear beside its hash.
  await end(db, mail, { state: 'sent', error: null, sentAt: sql`now()`, text: '', html: '' });
  return 'sent';
}

async function end(db: Database, mail: Mail, change: Omit<Parameters<ReturnType<typeof db.update<typeof mails>>['set']>[0], 'id'>): Promise<void> {
  await db
    .update(mails)
    .set(change)
    .where(and(eq(mails.id, mail.id), eq(mails.state, 'failed'), eq(mails.error, UNKNOWN_END)));
}

/** The server's own reply, if it gave one: only then is it known that it has not taken the message. */
function refusalOf(error: unknown): { responseCode: number | null; response: string } {
  const known = error as { responseCode?: unknown; response?: unknown };
  const responseCode = typeof known.responseCode === 'number' ? known.responseCode : null;
  return { responseCode, response: String(known.response ?? '').slice(0, 300) };
}
