import { boolean, check, index, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import { BOUNDARY_WORDS, CREASING_WORDS, PARTITION_WORDS, SCHEME_WORDS, TRIANGLE_WORDS } from '../../lib/rules/measure-words';
import { IMPORT_STATES } from '../../lib/rules/states';
import { OTHER_SPACE_WORDS } from '../../lib/rules/units';
import { oneOf } from './checks';
import { shows } from './shows';
import { users } from './users';

/** One act of bringing files in, with the options that its files are measured under. */
export const imports = pgTable(
  'imports',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    showId: uuid('show_id')
      .notNull()
      .references(() => shows.id, { onDelete: 'restrict' }),
    state: text('state', { enum: IMPORT_STATES }).notNull().default('open'),
    scheme: text('scheme', { enum: SCHEME_WORDS }).notNull(),
    boundary: text('boundary', { enum: BOUNDARY_WORDS }).notNull(),
    triangles: text('triangles', { enum: TRIANGLE_WORDS }).notNull().default('catmark'),
    creasing: text('creasing', { enum: CREASING_WORDS }).notNull().default('uniform'),
    partsBy: text('parts_by', { enum: PARTITION_WORDS }).notNull(),
    weld: boolean('weld').notNull().default(false),
    turnFaces: boolean('turn_faces').notNull().default(false),
    /** Name pattern of this import alone; empty for the built-in rule, null for the show's. */
    namePattern: text('name_pattern'),
    otherSpace: text('other_space', { enum: OTHER_SPACE_WORDS }).notNull().default('convert'),
    createdBy: uuid('created_by')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
    submittedAt: timestamp('submitted_at', { withTimezone: true }),
    endedAt: timestamp('ended_at', { withTimezone: true }),
    /** Set while its waiting files are left alone. */
    pausedAt: timestamp('paused_at', { withTimezone: true }),
    /** When the person who opened it was last seen watching it, to some seconds. */
    watchedAt: timestamp('watched_at', { withTimezone: true }),
  },
  (t) => [
    index('imports_show_idx').on(t.showId, t.createdAt),
    check('imports_state', oneOf(t.state, IMPORT_STATES)),
    check('imports_scheme', oneOf(t.scheme, SCHEME_WORDS)),
    check('imports_boundary', oneOf(t.boundary, BOUNDARY_WORDS)),
    check('imports_parts_by', oneOf(t.partsBy, PARTITION_WORDS)),
    check('imports_other_space', oneOf(t.otherSpace, OTHER_SPACE_WORDS)),
  ],
);
