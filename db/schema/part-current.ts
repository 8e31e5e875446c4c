import { sql } from 'drizzle-orm';
import { bigint, check, doublePrecision, index, integer, jsonb, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { CATEGORIES, CONSTRUCTIONS, MASS_SOURCES, ORIGINS, ROW_KINDS, VALUE_STATES } from '../../lib/rules/states';
import { assets } from './assets';
import { assetVersions } from './asset-versions';
import { finite, finiteNotNegative, finitePositive, oneOf } from './checks';
import { geometryParts } from './geometry-parts';
import { parts } from './parts';
import { settings } from './settings';
import { shows } from './shows';

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
    asset: text('asset').notNull(),
    outsideId: text('outside_id'),
    category: text('category', { enum: CATEGORIES }).notNull(),
    version: text('version').notNull(),
    row: text('row', { enum: ROW_KINDS }).notNull().default('part'),
    part: text('part').notNull(),
    body: text('body'),
    joint: text('joint'),
    variant: text('variant'),
    scale: doublePrecision('scale').notNull(),
    construction: text('construction', { enum: CONSTRUCTIONS }).notNull(),
    material: text('material'),
    densityKgPerM3: doublePrecision('density_kg_m3'),
    arealDensityKgPerM2: doublePrecision('areal_density_kg_m2'),
    wallM: doublePrecision('wall_m'),
    targetMassKg: doublePrecision('target_mass_kg'),
    areaM2: doublePrecision('area_m2'),
    volumeM3: doublePrecision('volume_m3'),
    massKg: doublePrecision('mass_kg'),
    comXM: doublePrecision('com_x_m'),
    comYM: doublePrecision('com_y_m'),
    comZM: doublePrecision('com_z_m'),
    ixxKgM2: doublePrecision('ixx_kg_m2'),
    iyyKgM2: doublePrecision('iyy_kg_m2'),
    izzKgM2: doublePrecision('izz_kg_m2'),
    ixyKgM2: doublePrecision('ixy_kg_m2'),
    ixzKgM2: doublePrecision('ixz_kg_m2'),
    iyzKgM2: doublePrecision('iyz_kg_m2'),
    i1KgM2: doublePrecision('i1_kg_m2'),
    i2KgM2: doublePrecision('i2_kg_m2'),
    i3KgM2: doublePrecision('i3_kg_m2'),
    axesQuatW: doublePrecision('axes_quat_w'),
    axesQuatX: doublePrecision('axes_quat_x'),
    axesQuatY: doublePrecision('axes_quat_y'),
    axesQuatZ: doublePrecision('axes_quat_z'),
    freeAxes: text('free_axes', { enum: ['', '12', '23', '123'] }).notNull().default(''),
    space: text('space').notNull(),
    upAxis: text('up_axis', { enum: ['y', 'z'] }).notNull(),
    numericError: doublePrecision('numeric_error'),
    adjusted: text('adjusted'),
    /** Codes of warnings, joined by spaces. */
    warnings: text('warnings').notNull().default(''),
    state: text('state', { enum: VALUE_STATES }).notNull(),
    valueId: uuid('value_id'),
    valueSha256: text('value_sha256'),

    revision: integer('revision').notNull().default(1),
    /** The show's revision at this row's last change, for changed_since. */
    changedRevision: bigint('changed_revision', { mode: 'number' }).notNull(),
    /** Severity problem only, for filters and the counts. */
    problemCodes: text('problem_codes').array().notNull().default([]),
    /** What the setting itself brings up (a wall too thick, a check not passed): code, severity, message. The record's findings are apart. */
    valueFindings: jsonb('value_findings').$type<ValueFinding[]>().notNull().default([]),
    massSource: text('mass_source', { enum: MASS_SOURCES }),
    setBy: text('set_by'),
    setFrom: text('set_from', { enum: ORIGINS }),
    setAt: timestamp('set_at', { withTimezone: true }),
    /** Box in the asset's axes, metres: min xyz, max xyz. */
    boundsM: doublePrecision('bounds_m').array(),
    cageVolumeM3: doublePrecision('cage_volume_m3'),
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
    check('part_current_row', oneOf(t.row, ROW_KINDS)),
    check('part_current_state', oneOf(t.state, VALUE_STATES)),
    check('part_current_construction', oneOf(t.construction, CONSTRUCTIONS)),
    check('part_current_free_axes', oneOf(t.freeAxes, ['', '12', '23', '123'])),
    check('part_current_mass', finitePositive(t.massKg)),
    check('part_current_density', finitePositive(t.densityKgPerM3)),
    check('part_current_areal_density', finitePositive(t.arealDensityKgPerM2)),
    check('part_current_wall', finitePositive(t.wallM)),
    check('part_current_target', finitePositive(t.targetMassKg)),
    check('part_current_area', finiteNotNegative(t.areaM2)),
    check('part_current_volume', finitePositive(t.volumeM3)),
    check('part_current_scale', finitePositive(t.scale)),
    check('part_current_cage_volume', finite(t.cageVolumeM3)),
    check(
      'part_current_bounds',
      sql`cardinality(${t.boundsM}) = 6 and not ('NaN'::float8 = any (${t.boundsM}) or 'Infinity'::float8 = any (${t.boundsM}) or '-Infinity'::float8 = any (${t.boundsM}))`,
    ),
    check('part_current_error', finiteNotNegative(t.numericError)),
    check(
      'part_current_com_finite',
      sql`abs(${t.comXM}) < 'Infinity' and abs(${t.comYM}) < 'Infinity' and abs(${t.comZM}) < 'Infinity'`,
    ),
    check(
      'part_current_inertia_finite',
      sql`abs(${t.ixxKgM2}) < 'Infinity' and abs(${t.iyyKgM2}) < 'Infinity' and abs(${t.izzKgM2}) < 'Infinity' and abs(${t.ixyKgM2}) < 'Infinity' and abs(${t.ixzKgM2}) < 'Infinity' and abs(${t.iyzKgM2}) < 'Infinity'`,
    ),
    check(
      'part_current_moments',
      sql`${t.i1KgM2} >= 0 and ${t.i1KgM2} <= ${t.i2KgM2} and ${t.i2KgM2} <= ${t.i3KgM2} and ${t.i3KgM2} > 0 and ${t.i3KgM2} < 'Infinity' and ${t.i1KgM2} + ${t.i2KgM2} >= ${t.i3KgM2} - 1e-13 * ${t.i3KgM2}`,
    ),
    check(
      'part_current_quaternion',
      sql`${t.axesQuatW} >= 0 and abs(${t.axesQuatW} * ${t.axesQuatW} + ${t.axesQuatX} * ${t.axesQuatX} + ${t.axesQuatY} * ${t.axesQuatY} + ${t.axesQuatZ} * ${t.axesQuatZ} - 1) < 1e-12`,
    ),
    check(
      'part_current_all_or_none',
      sql`num_nulls(${t.massKg}, ${t.comXM}, ${t.comYM}, ${t.comZM}, ${t.ixxKgM2}, ${t.iyyKgM2}, ${t.izzKgM2}, ${t.ixyKgM2}, ${t.ixzKgM2}, ${t.iyzKgM2}, ${t.i1KgM2}, ${t.i2KgM2}, ${t.i3KgM2}, ${t.axesQuatW}, ${t.axesQuatX}, ${t.axesQuatY}, ${t.axesQuatZ}, ${t.valueSha256}) in (0, 18)`,
    ),
    check(
      'part_current_state_fits',
      sql`(${t.state} in ('unset', 'blocked', 'left_out')) = (${t.massKg} is null)`,
    ),
  ],
);
