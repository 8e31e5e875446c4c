import { bigint, boolean, index, pgTable, text, timestamp } from 'drizzle-orm/pg-core';

/** Attempts to sign in, kept for a day, so that guessing is slowed for every process alike. */
export const signInAttempts = pgTable(
  'sign_in_attempts',
  {
    id: bigint('id', { mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    email: text('email').notNull(),
    succeeded: boolean('succeeded').notNull(),
    at: timestamp('at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [index('sign_in_attempts_email_idx').on(t.email, t.at)],
);
