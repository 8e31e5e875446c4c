import { sql } from 'drizzle-orm';
import { check, doublePrecision, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { CATEGORIES } from '../../lib/rules/states';
import { finitePositive, oneOf } from './checks';
import { shows } from './shows';

/** Something of the show that has a cage. Its code is unique in the show and never changes. */
export const assets = pgTable(
  'assets',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    showId: uuid('show_id')
      .notNull()
      .references(() => shows.id, { onDelete: 'restrict' }),
    code: text('code').notNull(),
    category: text('category', { enum: CATEGORIES }).notNull().default('other'),
    /** Id of the asset in the studio's own systems. */
    outsideId: text('outside_id'),
    /** The name and the folders that its first file was read to, before a folder joined the code; null where its sender said the asset. */
    readName: text('read_name'),
    readPlace: text('read_place'),
    /** Uniform scale of the geometry (child, giant): mass by s³ and inertia by s⁵ at equal density. */
    scale: doublePrecision('scale').notNull().default(1),
    archivedAt: timestamp('archived_at', { withTimezone: true }),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    uniqueIndex('assets_show_code_key').on(t.showId, t.code),
    check('assets_code_not_empty', sql`length(${t.code}) between 1 and 128`),
    check('assets_category', oneOf(t.category, CATEGORIES)),
    check('assets_scale', finitePositive(t.scale)),
  ],
);
