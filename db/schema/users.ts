import { sql } from 'drizzle-orm';
import { boolean, check, integer, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { MAIL_CHOICES } from '../../lib/rules/mail-choices';
import { oneOf } from './checks';

/** People. A user is disabled, never deleted, since history and receipts name them. */
export const users = pgTable(
  'users',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    email: text('email').notNull(),
    name: text('name').notNull(),
    /** Argon2id; null until the invitation is accepted. */
    passwordHash: text('password_hash'),
    /** How the person wants to be told: each thing at once, once a day, or not at all. */
    mailChoice: text('mail_choice', { enum: MAIL_CHOICES }).notNull().default('at_once'),
    /** When the person was last sent a digest. */
    digestAt: timestamp('digest_at', { withTimezone: true }),
    isAdmin: boolean('is_admin').notNull().default(false),
    /** Raised to end every session of the user. */
    sessionEpoch: integer('session_epoch').notNull().default(0),
    disabledAt: timestamp('disabled_at', { withTimezone: true }),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    uniqueIndex('users_email_key').on(sql`lower(${t.email})`),
    check('users_mail_choice', oneOf(t.mailChoice, MAIL_CHOICES)),
    check('users_email_shape', sql`${t.email} ~ '^[^@[:space:]]+@[^@[:space:]]+$'`),
  ],
);
