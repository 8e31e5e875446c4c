import { integer, jsonb, pgTable, primaryKey, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import { users } from './users';

/** Answers of writes that carried an Idempotency-Key, kept for a day: the same key again gets the same answer. */
export const idempotencyKeys = pgTable(
  'idempotency_keys',
  {
    userId: uuid('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    key: text('key').notNull(),
    /** SHA-256 of method, path and body: another request under the same key is refused. */
    requestHash: text('request_hash').notNull(),
    status: integer('status'),
    body: jsonb('body'),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [primaryKey({ columns: [t.userId, t.key] })],
);
