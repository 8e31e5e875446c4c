import { bigint, index, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { auditEvents } from './audit-events';
import { parts } from './parts';
import { shots } from './shots';

/** One field that an act changed, before and after, as text; null means not given. Append-only. */
export const auditItems = pgTable(
  'audit_items',
  {
    id: bigint('id', { mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    eventId: bigint('event_id', { mode: 'number' })
      .notNull()
      .references(() => auditEvents.id, { onDelete: 'restrict' }),
    partId: uuid('part_id').references(() => parts.id, { onDelete: 'restrict' }),
    /** Of a lock, an override, or what is in a shot. */
    shotId: uuid('shot_id').references(() => shots.id, { onDelete: 'restrict' }),
    field: text('field').notNull(),
    before: text('before'),
    after: text('after'),
  },
  (t) => [index('audit_items_event_idx').on(t.eventId), index('audit_items_part_idx').on(t.partId, t.id), index('audit_items_shot_idx').on(t.shotId, t.eventId)],
);
