import { bigint, check, index, integer, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import { ORIGINS } from '../../lib/rules/states';
import { oneOf } from './checks';
import { shows } from './shows';
import { users } from './users';

/** One act of one person: who, when, from where. Append-only. */
export const auditEvents = pgTable(
  'audit_events',
  {
    id: bigint('id', { mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    showId: uuid('show_id').references(() => shows.id, { onDelete: 'restrict' }),
    actorId: uuid('actor_id').references(() => users.id, { onDelete: 'restrict' }),
    /** A verb in kebab-case, as the code's own: set-values, create-show, submit-import. */
    act: text('act').notNull(),
    origin: text('origin', { enum: ORIGINS }).notNull(),
    subject: text('subject').notNull(),
    reason: text('reason'),
    items: integer('items').notNull().default(0),
    at: timestamp('at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [index('audit_events_show_idx').on(t.showId, t.id), check('audit_events_origin', oneOf(t.origin, ORIGINS))],
);
