import { sql } from 'drizzle-orm';
import { check, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import { approvals } from './approvals';
import { users } from './users';

/** An approval that was taken back, by whom and why. Append-only, one an approval. */
export const withdrawals = pgTable(
  'withdrawals',
  {
    approvalId: uuid('approval_id')
      .primaryKey()
      .references(() => approvals.id, { onDelete: 'restrict' }),
    reason: text('reason').notNull(),
    withdrawnBy: uuid('withdrawn_by')
      .notNull()
      .references(() => users.id, { onDelete: 'restrict' }),
    withdrawnAt: timestamp('withdrawn_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [check('withdrawals_reason', sql`length(${t.reason}) > 0`)],
);
