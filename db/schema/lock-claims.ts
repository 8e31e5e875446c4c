import { sql } from 'drizzle-orm';
import { pgTable, primaryKey, text, timestamp, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { locks } from './locks';
import { parts } from './parts';
import { shots } from './shots';

/** What a lock covers: its own part or body, and a body's members. Nobody else may lock those in the same shot and copy while it lives. */
export const lockClaims = pgTable(
  'lock_claims',
  {
    lockId: uuid('lock_id')
      .notNull()
      .references(() => locks.id, { onDelete: 'restrict' }),
    partId: uuid('part_id')
      .notNull()
      .references(() => parts.id, { onDelete: 'restrict' }),
    shotId: uuid('shot_id')
      .notNull()
      .references(() => shots.id, { onDelete: 'restrict' }),
    copy: text('copy').notNull().default(''),
    releasedAt: timestamp('released_at', { withTimezone: true }),
  },
  (t) => [
    primaryKey({ columns: [t.lockId, t.partId] }),
    uniqueIndex('lock_claims_live_key')
      .on(t.shotId, t.copy, t.partId)
      .where(sql`released_at is null`),
  ],
);
