import { boolean, check, integer, pgTable, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { BOUNDARY_WORDS, CREASING_WORDS, PARTITION_WORDS, SCHEME_WORDS, TRIANGLE_WORDS } from '../../lib/rules/measure-words';
import { oneOf } from './checks';

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
      t.engineVersion,
    ),
    check('geometry_records_scheme', oneOf(t.scheme, SCHEME_WORDS)),
    check('geometry_records_boundary', oneOf(t.boundary, BOUNDARY_WORDS)),
    check('geometry_records_triangles', oneOf(t.triangles, TRIANGLE_WORDS)),
    check('geometry_records_creasing', oneOf(t.creasing, CREASING_WORDS)),
    check('geometry_records_parts_by', oneOf(t.partsBy, PARTITION_WORDS)),
  ],
);
