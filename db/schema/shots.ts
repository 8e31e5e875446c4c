import { sql } from 'drizzle-orm';
import { check, index, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { shows } from './shows';
import { users } from './users';

/** A shot of a sequence. Its code is unique in the show and never changes. */
export const shots = pgTable(
  'shots',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    showId: uuid('show_id')
      .notNull()
      .references(() => shows.id, { onDelete: 'restrict' }),
    code: text('code').notNull(),
    sequence: text('sequence').notNull(),
    title: text('title'),
    createdBy: uuid('created_by')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    uniqueIndex('shots_show_code_key').on(t.showId, sql`lower(${t.code})`),
    index('shots_sequence_idx').on(t.showId, t.sequence),
    check('shots_code_shape', sql`${t.code} ~ '^[A-Za-z0-9][A-Za-z0-9._-]{0,63}$' and ${t.sequence} ~ '^[A-Za-z0-9][A-Za-z0-9._-]{0,63}$'`),
  ],
);
