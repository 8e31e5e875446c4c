import { index, jsonb, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { mails } from './mails';
import { shows } from './shows';
import { users } from './users';

/** What a notice says: a subject and short lines, with the page it is about. */
export interface NoticeText {
  subject: string;
  lines: string[];
  /** Path of the page, without the address of the studio. */
  path: string;
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
