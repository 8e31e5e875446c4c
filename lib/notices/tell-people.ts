import { and, eq, inArray, isNull, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { members } from '@/db/schema/members';
import { notices, type NoticeText } from '@/db/schema/notices';
import { users } from '@/db/schema/users';
import { config } from '@/lib/config';
import { queueMail } from '@/lib/mail/queue-mail';
import { noticeMail } from '@/lib/mail/templates/notice';

/** Something to be told: the same words to each of these people. */
export interface Telling {
  userIds: readonly string[];
  text: NoticeText;
}

/**
 * Tells people of something in a show, within the transaction of the change: as they chose, by a message at once, with the next
 * digest, or not at all. Nobody is told twice under one key, nobody of their own act, nobody who is disabled or out of the show.
 * Answers how many are told.
 * @param actorId whose act it was; null where it was nobody's, such as an end that came by itself
 */
export async function tellPeople(tx: Transaction, { showId, actorId, key, tellings }: { showId: string; actorId: string | null; key: string; tellings: readonly Telling[] }): Promise<number> {
  const texts = new Map<string, NoticeText>();
  for (const { userIds, text } of tellings) for (const id of userIds) if (id !== actorId && !texts.has(id)) texts.set(id, text);
  if (texts.size === 0) return 0;
  const people = await tx
    .select({ id: users.id, email: users.email, name: users.name, choice: users.mailChoice })
    .from(users)
    .where(
      and(
        inArray(users.id, [...texts.keys()]),
        isNull(users.disabledAt),
        sql`${users.mailChoice} <> 'none'`,
        sql`(${users.isAdmin} or exists (select 1 from ${members} where ${members.userId} = ${users.id} and ${members.showId} = ${showId}))`,
      ),
    )
    .orderBy(users.id);
  if (people.length === 0) return 0;
  const fresh = await tx
    .insert(notices)
    .values(people.map((person) => ({ userId: person.id, showId, key, text: texts.get(person.id)! })))
    .onConflictDoNothing()
    .returning({ id: notices.id, userId: notices.userId });
  const byId = new Map(people.map((person) => [person.id, person]));
  for (const notice of fresh) {
    const person = byId.get(notice.userId)!;
    if (person.choice !== 'at_once') continue;
    const mailId = await queueMail(tx, person.email, noticeMail({ name: person.name, text: texts.get(person.id)!, baseUrl: config().baseUrl }));
    await tx.update(notices).set({ mailId }).where(eq(notices.id, notice.id));
  }
  return fresh.length;
}
