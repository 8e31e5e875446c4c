import { check, integer, pgTable, text, timestamp, uniqueIndex, uuid, type AnyPgColumn } from 'drizzle-orm/pg-core';
import { sql } from 'drizzle-orm';
import { assets } from './assets';
import { geometryRecords } from './geometry-records';
import { importFiles } from './import-files';
import { users } from './users';

/** A version of an asset: number and take. The current one has the highest number, then the highest take. */
export const assetVersions = pgTable(
  'asset_versions',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    assetId: uuid('asset_id')
      .notNull()
      .references(() => assets.id, { onDelete: 'restrict' }),
    number: integer('number').notNull(),
    take: integer('take').notNull().default(1),
    /** As shown: v012, v012-2. */
    label: text('label').notNull(),
    recordId: uuid('record_id')
      .notNull()
      .references(() => geometryRecords.id, { onDelete: 'restrict' }),
    importFileId: uuid('import_file_id').references((): AnyPgColumn => importFiles.id, { onDelete: 'restrict' }),
    createdBy: uuid('created_by')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    uniqueIndex('asset_versions_number_take_key').on(t.assetId, t.number, t.take),
    check('asset_versions_number', sql`${t.number} >= 0 and ${t.take} >= 1`),
  ],
);
