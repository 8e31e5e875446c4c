import { sql } from 'drizzle-orm';
import { check, index, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { approvals } from './approvals';
import { assets } from './assets';
import { parts } from './parts';
import { shots } from './shots';
import { shows } from './shows';
import { users } from './users';

/**
 * What a shot was promised: a part (or body) in one shot and copy, to one approval, with the finished export row. Nothing in it
 * ever changes but the end of the lock, once, from null.
 */
export const locks = pgTable(
  'locks',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    showId: uuid('show_id')
      .notNull()
      .references(() => shows.id, { onDelete: 'restrict' }),
    shotId: uuid('shot_id')
      .notNull()
      .references(() => shots.id, { onDelete: 'restrict' }),
    copy: text('copy').notNull().default(''),
    assetId: uuid('asset_id')
      .notNull()
      .references(() => assets.id, { onDelete: 'restrict' }),
    partId: uuid('part_id')
      .notNull()
      .references(() => parts.id, { onDelete: 'restrict' }),
    approvalId: uuid('approval_id')
      .notNull()
      .references(() => approvals.id, { onDelete: 'restrict' }),
    valueSha256: text('value_sha256').notNull(),
    /** Version of the list of columns that `cells` follows. */
    csvSchema: text('csv_schema').notNull(),
    /** The export row as it was locked: a JSON array of its cells in the order of the columns, as text, since jsonb would write numbers anew. */
    cells: text('cells').notNull(),
    lockedBy: uuid('locked_by')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    lockedAt: timestamp('locked_at', { withTimezone: true }).notNull().defaultNow(),
    unlockedBy: uuid('unlocked_by').references(() => users.id, { onDelete: 'restrict' }),
    unlockReason: text('unlock_reason'),
    unlockedAt: timestamp('unlocked_at', { withTimezone: true }),
  },
  (t) => [
    uniqueIndex('locks_live_key')
      .on(t.shotId, t.copy, t.partId)
      .where(sql`unlocked_at is null`),
    index('locks_shot_idx').on(t.shotId, t.lockedAt),
    index('locks_part_idx').on(t.partId),
    index('locks_show_live_idx')
      .on(t.showId)
      .where(sql`unlocked_at is null`),
    index('locks_approval_idx').on(t.approvalId),
    check('locks_end', sql`num_nulls(${t.unlockedAt}, ${t.unlockedBy}, ${t.unlockReason}) in (0, 3) and length(${t.unlockReason}) > 0`),
  ],
);
