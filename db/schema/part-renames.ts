import { sql } from 'drizzle-orm';
import { check, index, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { RENAME_DECISIONS, RENAME_FITS } from '../../lib/rules/part-rename';
import { assetVersions } from './asset-versions';
import { assets } from './assets';
import { oneOf } from './checks';
import { parts } from './parts';
import { users } from './users';

/** What somebody decided of a part that a version lacks and one that it brought: the same part under another name, or two. Append-only. */
export const partRenames = pgTable(
  'part_renames',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    assetId: uuid('asset_id')
      .notNull()
      .references(() => assets.id, { onDelete: 'restrict' }),
    /** The asset's current version at the time. */
    versionId: uuid('version_id')
      .notNull()
      .references(() => assetVersions.id, { onDelete: 'restrict' }),
    /** The part that was there before: its identity goes on. */
    partId: uuid('part_id')
      .notNull()
      .references(() => parts.id, { onDelete: 'restrict' }),
    /** The part that the version brought. */
    arrivedId: uuid('arrived_id')
      .notNull()
      .references(() => parts.id, { onDelete: 'restrict' }),
    oldName: text('old_name').notNull(),
    newName: text('new_name').notNull(),
    decision: text('decision', { enum: RENAME_DECISIONS }).notNull(),
    /** How the two fitted: in place, in shape alone, or because a person said so. */
    fit: text('fit', { enum: RENAME_FITS }).notNull(),
    decidedBy: uuid('decided_by')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    decidedAt: timestamp('decided_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    index('part_renames_asset_idx').on(t.assetId, t.decidedAt),
    uniqueIndex('part_renames_refused_key')
      .on(t.partId, t.arrivedId)
      .where(sql`decision = 'refused'`),
    check('part_renames_decision', oneOf(t.decision, RENAME_DECISIONS)),
    check('part_renames_fit', oneOf(t.fit, RENAME_FITS)),
    check('part_renames_two', sql`${t.partId} <> ${t.arrivedId}`),
  ],
);
