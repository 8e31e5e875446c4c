import { bigint, index, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { locks } from './locks';
import { parts } from './parts';
import { receipts } from './receipts';

/** The rows of a hand-off: which value of which part somebody took, and under which lock. Append-only. */
export const receiptRows = pgTable(
  'receipt_rows',
  {
    id: bigint('id', { mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    receiptId: uuid('receipt_id')
      .notNull()
      .references(() => receipts.id, { onDelete: 'restrict' }),
    partId: uuid('part_id')
      .notNull()
      .references(() => parts.id, { onDelete: 'restrict' }),
    lockId: uuid('lock_id').references(() => locks.id, { onDelete: 'restrict' }),
    valueSha256: text('value_sha256'),
  },
  (t) => [index('receipt_rows_receipt_idx').on(t.receiptId), index('receipt_rows_part_idx').on(t.partId), index('receipt_rows_lock_idx').on(t.lockId)],
);
