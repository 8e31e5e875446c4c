import { boolean, check, doublePrecision, integer, pgTable, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { sql } from 'drizzle-orm';
import { finite, finiteNotNegative } from './checks';
import { geometryRecords } from './geometry-records';

/** A part as one geometry record found it. Lengths in the file's own unit times the record's unit scale. */
export const geometryParts = pgTable(
  'geometry_parts',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    recordId: uuid('record_id')
      .notNull()
      .references(() => geometryRecords.id, { onDelete: 'restrict' }),
    name: text('name').notNull(),
    ordinal: integer('ordinal').notNull(),
    faces: integer('faces').notNull(),
    maxValence: integer('max_valence').notNull(),
    openEdges: integer('open_edges').notNull(),
    looksLikeSheet: boolean('looks_like_sheet').notNull(),
    capAreaShare: doublePrecision('cap_area_share').notNull(),
    capVolumeShare: doublePrecision('cap_volume_share').notNull(),
    minX: doublePrecision('min_x').notNull(),
    minY: doublePrecision('min_y').notNull(),
    minZ: doublePrecision('min_z').notNull(),
    maxX: doublePrecision('max_x').notNull(),
    maxY: doublePrecision('max_y').notNull(),
    maxZ: doublePrecision('max_z').notNull(),
  },
  (t) => [
    uniqueIndex('geometry_parts_record_name_key').on(t.recordId, t.name),
    check('geometry_parts_box', sql`${finite(t.minX)} and ${finite(t.minY)} and ${finite(t.minZ)} and ${finite(t.maxX)} and ${finite(t.maxY)} and ${finite(t.maxZ)} and ${t.minX} <= ${t.maxX} and ${t.minY} <= ${t.maxY} and ${t.minZ} <= ${t.maxZ}`),
    check('geometry_parts_caps', sql`${finiteNotNegative(t.capAreaShare)} and ${finiteNotNegative(t.capVolumeShare)}`),
  ],
);
