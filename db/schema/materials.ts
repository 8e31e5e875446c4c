import { sql } from 'drizzle-orm';
import { boolean, check, doublePrecision, integer, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { shows } from './shows';

/** A material with its source; studio-wide when `show_id` is null. An edit raises the revision. */
export const materials = pgTable(
  'materials',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    showId: uuid('show_id').references(() => shows.id, { onDelete: 'restrict' }),
    name: text('name').notNull(),
    category: text('category').notNull(),
    densityKgPerM3: doublePrecision('density_kg_m3'),
    arealDensityKgPerM2: doublePrecision('areal_density_kg_m2'),
    low: doublePrecision('low'),
    high: doublePrecision('high'),
    source: text('source').notNull(),
    fromMemory: boolean('from_memory').notNull(),
    revision: integer('revision').notNull().default(1),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    uniqueIndex('materials_scope_name_key').on(sql`coalesce(${t.showId}, '00000000-0000-0000-0000-000000000000'::uuid)`, sql`lower(${t.name})`),
    check('materials_one_density', sql`num_nonnulls(${t.densityKgPerM3}, ${t.arealDensityKgPerM2}) = 1`),
    check('materials_positive', sql`coalesce(${t.densityKgPerM3}, ${t.arealDensityKgPerM2}) > 0 and coalesce(${t.densityKgPerM3}, ${t.arealDensityKgPerM2}) < 'Infinity'`),
  ],
);
