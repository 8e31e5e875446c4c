import { sql } from 'drizzle-orm';
import { check, index, pgTable, timestamp, unique, uuid } from 'drizzle-orm/pg-core';
import { assets } from './assets';
import { shots } from './shots';
import { shows } from './shows';
import { users } from './users';

/** Who asked to be told of what happens to a show, or to one shot or asset of it. */
export const peopleTold = pgTable(
  'people_told',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    showId: uuid('show_id')
      .notNull()
      .references(() => shows.id, { onDelete: 'restrict' }),
    userId: uuid('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    shotId: uuid('shot_id').references(() => shots.id, { onDelete: 'restrict' }),
    assetId: uuid('asset_id').references(() => assets.id, { onDelete: 'restrict' }),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    unique('people_told_key').on(t.showId, t.userId, t.shotId, t.assetId).nullsNotDistinct(),
    index('people_told_user_idx').on(t.userId),
    check('people_told_one', sql`${t.shotId} is null or ${t.assetId} is null`),
  ],
);
