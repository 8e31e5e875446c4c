import { and, asc, eq, inArray, isNull, lt, or, sql } from 'drizzle-orm';
import type { Database, Transaction } from '@/db/client';
import { members } from '@/db/schema/members';
import { notices, type NoticeText } from '@/db/schema/notices';
import { shows } from '@/db/schema/shows';
import { users } from '@/db/schema/users';
import { config } from '@/lib/config';
import { queueMail } from '@/lib/mail/queue-mail';
import { digestMail } from '@/lib/mail/templates/notice';
import { digestDue } from '@/lib/rules/digest-due';

/**
 * Sends everybody what waits for them since before the last digest hour, in one message, at most one between two such hours.
 * Several workers may do it side by side: a person is claimed by a guarded update, in the transaction that writes the message and
 * marks what it told. Answers how many messages were queued.
 */
export async function sendDigests(db: Database, now: Date): Promise<number> {
  const due = digestDue(now, config().digestHour);
  const people = await db
    .selectDistinct({ id: users.id })
    .from(notices)
    .innerJoin(users, eq(users.id, notices.userId))
    .where(and(isNull(notices.mailId), lt(notices.createdAt, due), mayGet(due)));
  let sent = 0;
  for (const { id } of people) if (await db.transaction((tx) => sendDigest(tx, id, { due, now }))) sent += 1;
  return sent;
}

async function sendDigest(tx: Transaction, userId: string, { due, now }: { due: Date; now: Date }): Promise<boolean> {
  const [person] = await tx
    .update(users)
    .set({ digestAt: now })
    .where(and(eq(users.id, userId), mayGet(due)))
    .returning({ email: users.email, name: users.name, isAdmin: users.isAdmin });
  if (!person) return false;
  const waiting = and(eq(notices.userId, userId), isNull(notices.mailId), lt(notices.createdAt, due));
  if (!person.isAdmin) await tx.delete(notices).where(and(waiting, sql`not exists (select 1 from ${members} where ${members.userId} = ${notices.userId} and ${members.showId} = ${notices.showId})`));
  const rows = await tx
    .select({ id: notices.id, text: notices.text, title: shows.title, showId: shows.id })
    .from(notices)
    .innerJoin(shows, eq(shows.id, notices.showId))
    .where(waiting)
    .orderBy(asc(shows.title), asc(shows.id), asc(notices.createdAt), asc(notices.id));
  if (rows.length === 0) return false;
  const byShow = new Map<string, { title: string; texts: NoticeText[] }>();
  for (const { showId, title, text } of rows) {
    const show = byShow.get(showId) ?? { title, texts: [] };
    show.texts.push(text);
    byShow.set(showId, show);
  }
  const mailId = await queueMail(tx, person.email, digestMail({ name: person.name, shows: [...byShow.values()], baseUrl: config().baseUrl }));
  const told = await tx
    .update(notices)
    .set({ mailId })
    .where(and(inArray(notices.id, rows.map((row) => row.id)), isNull(notices.mailId)))
    .returning({ id: notices.id });
  if (told.length !== rows.length) throw new Error(`${told.length} of ${rows.length} notices of a digest were still waiting.`);
  return true;
}

function mayGet(due: Date) {
  return and(isNull(users.disabledAt), sql`${users.mailChoice} <> 'none'`, or(isNull(users.digestAt), lt(users.digestAt, due)));
}
