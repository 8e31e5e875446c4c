import { check, index, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import { oneOf } from './checks';

const MAIL_STATES = ['waiting', 'sent', 'local', 'failed'] as const;

/** Messages to people. `local` stays in the mailbox that an admin reads in the product, when no mail server is set. */
export const mails = pgTable(
  'mails',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    toEmail: text('to_email').notNull(),
    subject: text('subject').notNull(),
    text: text('text').notNull(),
    html: text('html').notNull(),
    state: text('state', { enum: MAIL_STATES }).notNull().default('waiting'),
    error: text('error'),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
    sentAt: timestamp('sent_at', { withTimezone: true }),
  },
  (t) => [index('mails_created_idx').on(t.createdAt), check('mails_state', oneOf(t.state, MAIL_STATES))],
);
