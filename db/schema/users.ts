import { sql } from 'drizzle-orm';
import { boolean, check, integer, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';

/** People. A user is disabled, never deleted, since history and receipts name them. */
export const users = pgTable(
  'users',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    email: text('email').notNull(),
    name: text('name').notNull(),
    /** Argon2id; null until the invitation is accepted. */
    passwordHash: text('password_hash'),
    isAdmin: boolean('is_admin').notNull().default(false),
    /** Raised to end every session of the user. */
    sessionEpoch: integer('session_epoch').notNull().default(0),
    disabledAt: timestamp('disabled_at', { withTimezone: true }),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    uniqueIndex('users_email_key').on(sql`lower(${t.email})`),
    check('users_email_shape', sql`${t.email} ~ '^[^@[:space:]]+@[^@[:space:]]+$'`),
  ],
);
