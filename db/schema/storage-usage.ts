import { bigint, pgTable, text, timestamp } from 'drizzle-orm/pg-core';

/**
 * Bytes of content that count against a limit, by `studio` or a show's id. Never less than the truth; counted afresh before anything is
 * refused for it. Its row lock is what keeps two uploads from passing a limit together.
 */
export const storageUsage = pgTable('storage_usage', {
  scope: text('scope').primaryKey(),
  bytes: bigint('bytes', { mode: 'number' }).notNull(),
  countedAt: timestamp('counted_at', { withTimezone: true }).notNull().defaultNow(),
});
