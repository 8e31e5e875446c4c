import { sql } from 'drizzle-orm';
import { check, index, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { assets } from './assets';
import { shots } from './shots';

/** An asset in a shot. `copy` tells two of one asset apart and is empty for the first: '', '2', '3' … */
export const shotAssets = pgTable(
  'shot_assets',
  {
    shotId: uuid('shot_id')
      .notNull()
      .references(() => shots.id, { onDelete: 'restrict' }),
    assetId: uuid('asset_id')
      .notNull()
      .references(() => assets.id, { onDelete: 'restrict' }),
    copy: text('copy').notNull().default(''),
  },
  (t) => [
    primaryKey({ columns: [t.shotId, t.assetId, t.copy] }),
    index('shot_assets_asset_idx').on(t.assetId),
    check('shot_assets_copy_shape', sql`${t.copy} ~ '^[A-Za-z0-9._-]{0,32}$'`),
  ],
);
