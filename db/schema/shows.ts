import { sql } from 'drizzle-orm';
import { bigint, boolean, check, doublePrecision, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { BOUNDARY_WORDS, PARTITION_WORDS, SCHEME_WORDS } from '../../lib/rules/measure-words';
import { LINEAR_UNITS, OTHER_SPACE_WORDS, UP_AXES } from '../../lib/rules/units';
import { finiteNotNegative, oneOf } from './checks';

/** A show. Units, up axis and default scheme are frozen at its first import; the code never changes. */
export const shows = pgTable(
  'shows',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    code: text('code').notNull(),
    title: text('title').notNull(),
    linearUnit: text('linear_unit', { enum: LINEAR_UNITS }).notNull(),
    upAxis: text('up_axis', { enum: UP_AXES }).notNull(),
    /** What becomes of a file that states another unit or up axis; acts on later imports only. */
    otherSpace: text('other_space', { enum: OTHER_SPACE_WORDS }).notNull().default('convert'),
    scheme: text('scheme', { enum: SCHEME_WORDS }).notNull(),
    boundary: text('boundary', { enum: BOUNDARY_WORDS }).notNull().default('edge-and-corner'),
    partsBy: text('parts_by', { enum: PARTITION_WORDS }).notNull().default('group'),
    /** Pattern over path and file name that gives asset, category and version; null takes the built-in one. */
    namePattern: text('name_pattern'),
    /** Whether somebody may approve a value that they set themselves. */
    selfApproval: boolean('self_approval').notNull().default(false),
    /** A value that differs by no more from what was approved is carried over in one act, and nobody is told: percent of the mass … */
    toleranceMassPercent: doublePrecision('tolerance_mass_percent').notNull().default(0.5),
    /** … percent of the part's size for its centre of mass … */
    toleranceComPercent: doublePrecision('tolerance_com_percent').notNull().default(0.5),
    /** … and percent of the largest principal moment for its inertia. */
    toleranceMomentsPercent: doublePrecision('tolerance_moments_percent').notNull().default(1),
    frozenAt: timestamp('frozen_at', { withTimezone: true }),
    archivedAt: timestamp('archived_at', { withTimezone: true }),
    /** Counts every change of a value in the show, for ETags and changed_since. */
    revision: bigint('revision', { mode: 'number' }).notNull().default(0),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    uniqueIndex('shows_code_key').on(sql`lower(${t.code})`),
    check('shows_code_shape', sql`${t.code} ~ '^[A-Za-z0-9][A-Za-z0-9_-]{0,31}$'`),
    check('shows_tolerances', sql`${finiteNotNegative(t.toleranceMassPercent)} and ${finiteNotNegative(t.toleranceComPercent)} and ${finiteNotNegative(t.toleranceMomentsPercent)}`),
    check('shows_linear_unit', oneOf(t.linearUnit, LINEAR_UNITS)),
    check('shows_up_axis', oneOf(t.upAxis, UP_AXES)),
    check('shows_other_space', oneOf(t.otherSpace, OTHER_SPACE_WORDS)),
    check('shows_scheme', oneOf(t.scheme, SCHEME_WORDS)),
    check('shows_boundary', oneOf(t.boundary, BOUNDARY_WORDS)),
    check('shows_parts_by', oneOf(t.partsBy, PARTITION_WORDS)),
  ],
);
