import { sql } from 'drizzle-orm';
import { bigint, boolean, check, doublePrecision, index, integer, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import { CONSTRUCTIONS, ORIGINS } from '../../lib/rules/states';
import { oneOf } from './checks';
import { materials } from './materials';
import { parts } from './parts';
import { shots } from './shots';
import { users } from './users';

/** What somebody decided about a part's mass. Append-only: the newest row counts, the older ones are its history. */
export const settings = pgTable(
  'settings',
  {
    id: bigint('id', { mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    partId: uuid('part_id')
      .notNull()
      .references(() => parts.id, { onDelete: 'restrict' }),
    construction: text('construction', { enum: CONSTRUCTIONS }).notNull().default('solid'),
    targetMassKg: doublePrecision('target_mass_kg'),
    densityKgPerM3: doublePrecision('density_kg_m3'),
    materialId: uuid('material_id').references(() => materials.id, { onDelete: 'restrict' }),
    materialRevision: integer('material_revision'),
    arealDensityKgPerM2: doublePrecision('areal_density_kg_m2'),
    wallM: doublePrecision('wall_m'),
    variant: text('variant'),
    leftOut: boolean('left_out').notNull().default(false),
    /** Of a shot override: the setting counts in that shot alone, with its reason. */
    shotId: uuid('shot_id').references(() => shots.id, { onDelete: 'restrict' }),
    reason: text('reason'),
    setBy: uuid('set_by')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    setFrom: text('set_from', { enum: ORIGINS }).notNull(),
    setAt: timestamp('set_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    index('settings_part_idx').on(t.partId, t.id),
    check('settings_shot_reason', sql`(${t.shotId} is null) = (${t.reason} is null)`),
    check('settings_construction', oneOf(t.construction, CONSTRUCTIONS)),
    check('settings_set_from', oneOf(t.setFrom, ORIGINS)),
    check('settings_target_mass', sql`${t.targetMassKg} > 0 and ${t.targetMassKg} < 'Infinity'`),
    check('settings_density', sql`${t.densityKgPerM3} > 0 and ${t.densityKgPerM3} < 'Infinity'`),
    check('settings_areal_density', sql`${t.arealDensityKgPerM2} > 0 and ${t.arealDensityKgPerM2} < 'Infinity'`),
    check('settings_wall', sql`${t.wallM} > 0 and ${t.wallM} < 'Infinity'`),
    check('settings_material_revision', sql`(${t.materialId} is null) = (${t.materialRevision} is null)`),
  ],
);
