import { check, index, pgTable, primaryKey, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import { ROLES } from '../../lib/rules/roles';
import { oneOf } from './checks';
import { shows } from './shows';
import { users } from './users';

/** Who may do what in a show. A guest is limited to the shots and assets named here, by code. */
export const members = pgTable(
  'members',
  {
    showId: uuid('show_id')
      .notNull()
      .references(() => shows.id, { onDelete: 'restrict' }),
    userId: uuid('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    role: text('role', { enum: ROLES }).notNull(),
    shots: text('shots').array().notNull().default([]),
    assets: text('assets').array().notNull().default([]),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ columns: [t.showId, t.userId] }),
    index('members_user_idx').on(t.userId),
    check('members_role', oneOf(t.role, ROLES)),
  ],
);
