import { sql } from 'drizzle-orm';
import { bigint, check, index, integer, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { shows } from './shows';
import { users } from './users';

/**
 * Content that somebody is sending into a show in parts. It belongs to the content and its sender, not to an import, so that the same file
 * dropped again goes on where it stopped, whatever import it is for. Its size counts against the limits from the start.
 */
export const uploads = pgTable(
  'uploads',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    showId: uuid('show_id')
      .notNull()
      .references(() => shows.id, { onDelete: 'restrict' }),
    createdBy: uuid('created_by')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    sha256: text('sha256').notNull(),
    byteSize: bigint('byte_size', { mode: 'number' }).notNull(),
    /** Every part but the last has this many bytes. */
    partBytes: integer('part_bytes').notNull(),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
    /** Moved on by each part; past it the parts are swept. */
    expiresAt: timestamp('expires_at', { withTimezone: true }).notNull(),
    /** A process puts the parts together until then; past it another may. */
    assemblingUntil: timestamp('assembling_until', { withTimezone: true }),
    /** All parts came, and together they are other bytes than announced: they have to come again. */
    refusedAt: timestamp('refused_at', { withTimezone: true }),
    /** The content is a blob; the parts are gone. */
    completedAt: timestamp('completed_at', { withTimezone: true }),
  },
  (t) => [
    uniqueIndex('uploads_content_key').on(t.showId, t.createdBy, t.sha256),
    index('uploads_expires_idx').on(t.expiresAt),
    check('uploads_sha256_shape', sql`${t.sha256} ~ '^[0-9a-f]{64}$'`),
    check('uploads_size', sql`${t.byteSize} > 0 and ${t.partBytes} > 0`),
  ],
);
