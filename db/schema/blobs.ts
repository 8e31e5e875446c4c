import { bigint, check, pgTable, text, timestamp } from 'drizzle-orm/pg-core';
import { sql } from 'drizzle-orm';

/** Files in storage, by content: the same bytes are stored once in the studio. */
export const blobs = pgTable(
  'blobs',
  {
    sha256: text('sha256').primaryKey(),
    byteSize: bigint('byte_size', { mode: 'number' }).notNull(),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
    /** When these bytes came last. A blob that nothing refers to stays for a grace time after it, so that none is swept while it is being registered. */
    seenAt: timestamp('seen_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [check('blobs_sha256_shape', sql`${t.sha256} ~ '^[0-9a-f]{64}$'`), check('blobs_size', sql`${t.byteSize} >= 0`)],
);
