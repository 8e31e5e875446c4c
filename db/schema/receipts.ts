import { sql } from 'drizzle-orm';
import { bigint, check, date, index, integer, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { apiTokens } from './api-tokens';
import { shots } from './shots';
import { shows } from './shows';
import { users } from './users';

/** A hand-off: who took which rows, when, with which checksum. A token's repeated read of the same bytes counts once a day. */
export const receipts = pgTable(
  'receipts',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    showId: uuid('show_id')
      .notNull()
      .references(() => shows.id, { onDelete: 'restrict' }),
    userId: uuid('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    tokenId: uuid('token_id').references(() => apiTokens.id, { onDelete: 'restrict' }),
    /** Of a shot's export. */
    shotId: uuid('shot_id').references(() => shots.id, { onDelete: 'restrict' }),
    /** csv, json, usda … */
    format: text('format').notNull(),
    /** The selection as a canonical query string. */
    selection: text('selection').notNull(),
    rows: integer('rows').notNull(),
    byteSize: bigint('byte_size', { mode: 'number' }).notNull(),
    sha256: text('sha256').notNull(),
    day: date('day').notNull(),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    index('receipts_shot_idx').on(t.shotId, t.createdAt),
    index('receipts_show_idx').on(t.showId, t.createdAt),
    uniqueIndex('receipts_token_day_key')
      .on(t.tokenId, t.showId, t.format, t.selection, t.sha256, t.day)
      .where(sql`token_id is not null`),
    check('receipts_sha256_shape', sql`${t.sha256} ~ '^[0-9a-f]{64}$'`),
  ],
);
