import { sql } from 'drizzle-orm';
import { boolean, check, doublePrecision, integer, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { BOUNDARY_WORDS, CREASING_WORDS, PARTITION_WORDS, SCHEME_WORDS, TRIANGLE_WORDS } from '../../lib/rules/measure-words';
import { TURN_WORDS, UP_AXES } from '../../lib/rules/units';
import { finitePositive, oneOf } from './checks';

/** One measurement of one file's bytes under one set of options; immutable, so an equal one is never made twice. */
export const geometryRecords = pgTable(
  'geometry_records',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    contentSha256: text('content_sha256').notNull(),
    scheme: text('scheme', { enum: SCHEME_WORDS }).notNull(),
    boundary: text('boundary', { enum: BOUNDARY_WORDS }).notNull(),
    triangles: text('triangles', { enum: TRIANGLE_WORDS }).notNull(),
    creasing: text('creasing', { enum: CREASING_WORDS }).notNull(),
    partsBy: text('parts_by', { enum: PARTITION_WORDS }).notNull(),
    weld: boolean('weld').notNull().default(false),
    turnFaces: boolean('turn_faces').notNull().default(false),
    /** Hash of the files that were read beside it (skin weights, buffers); empty for a file that was read alone. */
    besideSha256: text('beside_sha256').notNull().default(''),
    /** What was done on reading: the record's lengths are the file's times this … */
    unitScale: doublePrecision('unit_scale').notNull().default(1),
    /** … and its axes the file's, turned so. */
    turn: text('turn', { enum: TURN_WORDS }).notNull().default('none'),
    /** What the bytes state of their unit and up axis, so that another show knows what to do without reading them; null where they are silent. */
    statedMetresPerUnit: doublePrecision('stated_metres_per_unit'),
    statedUpAxis: text('stated_up_axis', { enum: UP_AXES }),
    engineVersion: text('engine_version').notNull(),
    faces: integer('faces').notNull(),
    vertices: integer('vertices').notNull(),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    uniqueIndex('geometry_records_key').on(
      t.contentSha256,
      t.scheme,
      t.boundary,
      t.triangles,
      t.creasing,
      t.partsBy,
      t.weld,
      t.turnFaces,
      t.besideSha256,
      t.unitScale,
      t.turn,
      t.engineVersion,
    ),
    check('geometry_records_unit_scale', finitePositive(t.unitScale)),
    check('geometry_records_turn', oneOf(t.turn, TURN_WORDS)),
    check('geometry_records_stated', sql`(${t.statedMetresPerUnit} is null or ${finitePositive(t.statedMetresPerUnit)}) and (${t.statedUpAxis} is null or ${oneOf(t.statedUpAxis, UP_AXES)})`),
    check('geometry_records_beside', sql`${t.besideSha256} ~ '^([0-9a-f]{64})?$'`),
    check('geometry_records_scheme', oneOf(t.scheme, SCHEME_WORDS)),
    check('geometry_records_boundary', oneOf(t.boundary, BOUNDARY_WORDS)),
    check('geometry_records_triangles', oneOf(t.triangles, TRIANGLE_WORDS)),
    check('geometry_records_creasing', oneOf(t.creasing, CREASING_WORDS)),
    check('geometry_records_parts_by', oneOf(t.partsBy, PARTITION_WORDS)),
  ],
);
