import { sql } from 'drizzle-orm';
import { index, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { parts } from './parts';
import { shows } from './shows';
import { users } from './users';

/** Somebody asks for a part's value to be approved. Closed by an approval, by taking the question back, or by asking anew. */
export const approvalRequests = pgTable(
  'approval_requests',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    showId: uuid('show_id')
      .notNull()
      .references(() => shows.id, { onDelete: 'restrict' }),
    partId: uuid('part_id')
      .notNull()
      .references(() => parts.id, { onDelete: 'restrict' }),
    /** The value as it was when it was asked for. */
    valueSha256: text('value_sha256').notNull(),
    note: text('note'),
    askedBy: uuid('asked_by')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    askedAt: timestamp('asked_at', { withTimezone: true }).notNull().defaultNow(),
    closedAt: timestamp('closed_at', { withTimezone: true }),
  },
  (t) => [
    index('approval_requests_show_idx').on(t.showId, t.askedAt),
    uniqueIndex('approval_requests_open_key')
      .on(t.partId)
      .where(sql`closed_at is null`),
  ],
);
