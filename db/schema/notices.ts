import { index, jsonb, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { mails } from './mails';
import { shows } from './shows';
import { users } from './users';

/** What a notice says. */
export interface NoticeText {
  /** What happened where, in a few words. */
  subject: string;
  /** Who did what, the reason if there is one: a sentence each. */
  lines: string[];
  /** What it is about, one a line. */
  list: string[];
  /** Label of the link, and the path of its page without the address of the studio. */
  label: string;
  path: string;
  /** Why this person is told. */
  why: string;
}

/** Something that a person is to be told, at once or in the daily digest, as they chose. `key` keeps one thing from being told twice. */
export const notices = pgTable(
  'notices',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    userId: uuid('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    showId: uuid('show_id')
      .notNull()
      .references(() => shows.id, { onDelete: 'restrict' }),
    key: text('key').notNull(),
    text: jsonb('text').$type<NoticeText>().notNull(),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
    /** The message that told it; null while it waits for the digest. */
    mailId: uuid('mail_id').references(() => mails.id, { onDelete: 'restrict' }),
  },
  (t) => [uniqueIndex('notices_key').on(t.userId, t.key), index('notices_waiting_idx').on(t.mailId, t.createdAt)],
);
