import { bigint, check, index, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import { oneOf } from './checks';
import { parts } from './parts';
import { shots } from './shots';
import { users } from './users';

/** What an input of a value came with. */
export const SETTER_ACTS = ['setting', 'version', 'scale', 'material', 'rule', 'rename'] as const;

/**
 * Who changed a hashed input of a part's value, one row an act and part. Whoever stands here after the last approval cannot
 * approve the value. Append-only.
 */
export const valueSetters = pgTable(
  'value_setters',
  {
    id: bigint('id', { mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    partId: uuid('part_id')
      .notNull()
      .references(() => parts.id, { onDelete: 'restrict' }),
    /** Of a shot override. */
    shotId: uuid('shot_id').references(() => shots.id, { onDelete: 'restrict' }),
    userId: uuid('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    act: text('act', { enum: SETTER_ACTS }).notNull(),
    at: timestamp('at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [index('value_setters_part_idx').on(t.partId, t.id), check('value_setters_act', oneOf(t.act, SETTER_ACTS))],
);
