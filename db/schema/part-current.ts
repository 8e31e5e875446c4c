import { sql } from 'drizzle-orm';
import { bigint, check, index, integer, jsonb, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { ORIGINS, VALUE_STATES } from '../../lib/rules/states';
import { approvals } from './approvals';
import { assets } from './assets';
import { assetVersions } from './asset-versions';
import { oneOf } from './checks';
import { geometryParts } from './geometry-parts';
import { parts } from './parts';
import { settings } from './settings';
import { shows } from './shows';
import { valueChecks, valueColumns } from './value-columns';

export interface ValueFinding {
  code: string;
  severity: 'problem' | 'warning';
  message: string;
}

/**
 * The finished numbers of every part as they are now, one row each with all CSV columns (SI, the asset's axes, inertia about
 * the centre of mass as matrix entries), so that tables sort, filter and page in SQL. Written in the transaction of the change.
 */
export const partCurrent = pgTable(
  'part_current',
  {
    partId: uuid('part_id')
      .primaryKey()
      .references(() => parts.id, { onDelete: 'restrict' }),
    showId: uuid('show_id')
      .notNull()
      .references(() => shows.id, { onDelete: 'restrict' }),
    assetId: uuid('asset_id')
      .notNull()
      .references(() => assets.id, { onDelete: 'restrict' }),
    versionId: uuid('version_id')
      .notNull()
      .references(() => assetVersions.id, { onDelete: 'restrict' }),
    /** Null where the geometry record gave no numbers for the part. */
    geometryPartId: uuid('geometry_part_id').references(() => geometryParts.id, { onDelete: 'restrict' }),
    settingId: bigint('setting_id', { mode: 'number' }).references(() => settings.id, { onDelete: 'restrict' }),
    ...valueColumns(),
    state: text('state', { enum: VALUE_STATES }).notNull(),
    /** The approval whose hash is the current one. */
    valueId: uuid('value_id').references(() => approvals.id, { onDelete: 'restrict' }),
    /** The newest approval that nobody took back, whatever its hash: what a change is compared with. */
    lastApprovalId: uuid('last_approval_id').references(() => approvals.id, { onDelete: 'restrict' }),

    revision: integer('revision').notNull().default(1),
    /** The show's revision at this row's last change, for changed_since. */
    changedRevision: bigint('changed_revision', { mode: 'number' }).notNull(),
    /** Severity problem only, for filters and the counts. */
    problemCodes: text('problem_codes').array().notNull().default([]),
    /** What the setting itself brings up (a wall too thick, a check not passed): code, severity, message. The record's findings are apart. */
    valueFindings: jsonb('value_findings').$type<ValueFinding[]>().notNull().default([]),
    setBy: text('set_by'),
    setFrom: text('set_from', { enum: ORIGINS }),
    setAt: timestamp('set_at', { withTimezone: true }),
    faces: integer('faces').notNull(),
    maxValence: integer('max_valence').notNull(),
    updatedAt: timestamp('updated_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    // Collation C: the same order on every server, whatever its language.
    index('part_current_order_c_idx').on(t.showId, sql`${t.asset} collate "C"`, sql`${t.part} collate "C"`),
    index('part_current_state_idx').on(t.showId, t.state),
    index('part_current_asset_idx').on(t.assetId),
    index('part_current_changed_idx').on(t.showId, t.changedRevision),
    uniqueIndex('part_current_asset_part_key').on(t.assetId, t.part),
    ...valueChecks('part_current', t),
    check('part_current_state', oneOf(t.state, VALUE_STATES)),
    check('part_current_approved', sql`(${t.state} = 'approved') = (${t.valueId} is not null) and (${t.valueId} is null or ${t.lastApprovalId} is not null)`),
    check(
      'part_current_state_fits',
      sql`(${t.state} in ('unset', 'blocked', 'left_out')) = (${t.massKg} is null)`,
    ),
  ],
);
