import { sql } from 'drizzle-orm';
import { check, integer, pgTable, primaryKey, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import { uploads } from './uploads';

/** A part of an upload that lies in storage, whole and checked; numbers count from 1. */
export const uploadParts = pgTable(
  'upload_parts',
  {
    uploadId: uuid('upload_id')
      .notNull()
      .references(() => uploads.id, { onDelete: 'cascade' }),
    number: integer('number').notNull(),
    sha256: text('sha256').notNull(),
    byteSize: integer('byte_size').notNull(),
    storedAt: timestamp('stored_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ columns: [t.uploadId, t.number] }),
    check('upload_parts_sha256_shape', sql`${t.sha256} ~ '^[0-9a-f]{64}$'`),
    check('upload_parts_number', sql`${t.number} >= 1 and ${t.byteSize} > 0`),
  ],
);
