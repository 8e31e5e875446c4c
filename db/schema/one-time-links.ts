import { index, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { check } from 'drizzle-orm/pg-core';
import { oneOf } from './checks';
import { users } from './users';

/** Invitation and password-reset links: stored hashed, good once, until they expire. */
export const oneTimeLinks = pgTable(
  'one_time_links',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    userId: uuid('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    purpose: text('purpose', { enum: ['invite', 'reset'] }).notNull(),
    tokenHash: text('token_hash').notNull(),
    expiresAt: timestamp('expires_at', { withTimezone: true }).notNull(),
    usedAt: timestamp('used_at', { withTimezone: true }),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    uniqueIndex('one_time_links_token_key').on(t.tokenHash),
    index('one_time_links_user_idx').on(t.userId),
    check('one_time_links_purpose', oneOf(t.purpose, ['invite', 'reset'])),
  ],
);
