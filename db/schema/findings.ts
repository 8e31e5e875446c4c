import { check, index, integer, jsonb, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { oneOf } from './checks';
import { geometryRecords } from './geometry-records';

const SEVERITIES = ['problem', 'warning', 'note'] as const;

/** What the diagnosis of a geometry record found: code, severity, sentence, and the first places of `count`. */
export const findings = pgTable(
  'findings',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    recordId: uuid('record_id')
      .notNull()
      .references(() => geometryRecords.id, { onDelete: 'restrict' }),
    ordinal: integer('ordinal').notNull(),
    code: text('code').notNull(),
    severity: text('severity', { enum: SEVERITIES }).notNull(),
    message: text('message').notNull(),
    /** Name of the part concerned; null when the whole file is. */
    part: text('part'),
    count: integer('count').notNull(),
    places: jsonb('places').notNull(),
  },
  (t) => [index('findings_record_part_idx').on(t.recordId, t.part), index('findings_code_idx').on(t.code), check('findings_severity', oneOf(t.severity, SEVERITIES))],
);
