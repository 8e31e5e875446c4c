import { sql } from 'drizzle-orm';
import { check, index, pgTable, text, timestamp, uniqueIndex, uuid, type AnyPgColumn } from 'drizzle-orm/pg-core';
import { assets } from './assets';

/** The stable identity of a part: settings, approvals and locks hang on it, across versions. */
export const parts = pgTable(
  'parts',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    assetId: uuid('asset_id')
      .notNull()
      .references(() => assets.id, { onDelete: 'restrict' }),
    name: text('name').notNull(),
    /** Of a name that a part had before (or was taken for another part): the part that it stands for. Such a row has no value of its own. */
    mergedInto: uuid('merged_into').references((): AnyPgColumn => parts.id, { onDelete: 'restrict' }),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    uniqueIndex('parts_asset_name_key').on(t.assetId, t.name),
    index('parts_merged_idx')
      .on(t.mergedInto)
      .where(sql`merged_into is not null`),
    check('parts_name_not_empty', sql`length(${t.name}) > 0`),
    check('parts_merged_into_another', sql`${t.mergedInto} <> ${t.id}`),
  ],
);
