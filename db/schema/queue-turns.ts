import { bigint, check, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { LANES } from '../../lib/rules/fair-turns';
import { oneOf } from './checks';
import { shows } from './shows';

/**
 * How much work each show was given, and within it its large and its small files: the start and the end of its last turn on a clock that counts work
 * (bytes, about) instead of time. Who has been given least is next.
 */
export const queueTurns = pgTable(
  'queue_turns',
  {
    showId: uuid('show_id')
      .notNull()
      .references(() => shows.id, { onDelete: 'restrict' }),
    lane: text('lane', { enum: LANES }).notNull(),
    began: bigint('began', { mode: 'number' }).notNull(),
    ended: bigint('ended', { mode: 'number' }).notNull(),
  },
  (t) => [primaryKey({ columns: [t.showId, t.lane] }), check('queue_turns_lane', oneOf(t.lane, LANES))],
);
