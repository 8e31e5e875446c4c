import { bigint, integer, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core';

/** A worker process that was seen lately, wherever it runs. */
export const workers = pgTable('workers', {
  id: uuid('id').primaryKey(),
  name: text('name').notNull(),
  threads: integer('threads').notNull(),
  /** Bytes that it sets aside for measuring. */
  memoryBytes: bigint('memory_bytes', { mode: 'number' }).notNull(),
  startedAt: timestamp('started_at', { withTimezone: true }).notNull().defaultNow(),
  seenAt: timestamp('seen_at', { withTimezone: true }).notNull().defaultNow(),
});
