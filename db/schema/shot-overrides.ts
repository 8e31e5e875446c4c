import { sql } from 'drizzle-orm';
import { bigint, check, index, integer, jsonb, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { assetVersions } from './asset-versions';
import { oneOf } from './checks';
import { geometryParts } from './geometry-parts';
import type { ValueFinding } from './part-current';
import { parts } from './parts';
import { settings } from './settings';
import { shots } from './shots';
import { users } from './users';
import { valueChecks, valueColumns } from './value-columns';

const OVERRIDE_STATES = ['unset', 'blocked', 'measured'] as const;

/**
 * A part's own value in one shot (the heavier hammer), with its reason: finished numbers from the geometry as it was when the
 * override was drafted, so that no new version moves it. One stands per shot and part; another draft, or dropping it, ends it.
 */
export const shotOverrides = pgTable(
  'shot_overrides',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    shotId: uuid('shot_id')
      .notNull()
      .references(() => shots.id, { onDelete: 'restrict' }),
    partId: uuid('part_id')
      .notNull()
      .references(() => parts.id, { onDelete: 'restrict' }),
    settingId: bigint('setting_id', { mode: 'number' })
      .notNull()
      .references(() => settings.id, { onDelete: 'restrict' }),
    versionId: uuid('version_id')
      .notNull()
      .references(() => assetVersions.id, { onDelete: 'restrict' }),
    geometryPartId: uuid('geometry_part_id').references(() => geometryParts.id, { onDelete: 'restrict' }),
    ...valueColumns(),
    state: text('state', { enum: OVERRIDE_STATES }).notNull(),
    canonical: text('canonical'),
    valueFindings: jsonb('value_findings').$type<ValueFinding[]>().notNull().default([]),
    faces: integer('faces').notNull(),
    maxValence: integer('max_valence').notNull(),
    reason: text('reason').notNull(),
    draftedBy: uuid('drafted_by')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    draftedAt: timestamp('drafted_at', { withTimezone: true }).notNull().defaultNow(),
    droppedBy: uuid('dropped_by').references(() => users.id, { onDelete: 'restrict' }),
    droppedAt: timestamp('dropped_at', { withTimezone: true }),
  },
  (t) => [
    uniqueIndex('shot_overrides_standing_key')
      .on(t.shotId, t.partId)
      .where(sql`dropped_at is null`),
    index('shot_overrides_part_idx').on(t.partId),
    ...valueChecks('shot_overrides', t),
    check('shot_overrides_state', oneOf(t.state, OVERRIDE_STATES)),
    check('shot_overrides_state_fits', sql`(${t.state} = 'measured') = (${t.massKg} is not null) and (${t.massKg} is null) = (${t.canonical} is null)`),
    check('shot_overrides_reason', sql`length(${t.reason}) > 0`),
    check('shot_overrides_dropped', sql`(${t.droppedAt} is null) = (${t.droppedBy} is null)`),
  ],
);
