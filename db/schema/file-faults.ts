import { index, integer, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import { importFiles } from './import-files';

/** A fault that may pass, met while a file was in hand: what it was, on which worker, and when the file is tried again (null: given up). */
export const fileFaults = pgTable(
  'file_faults',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    importFileId: uuid('import_file_id')
      .notNull()
      .references(() => importFiles.id, { onDelete: 'restrict' }),
    at: timestamp('at', { withTimezone: true }).notNull().defaultNow(),
    attempt: integer('attempt').notNull(),
    worker: text('worker'),
    code: text('code').notNull(),
    message: text('message').notNull(),
    againAt: timestamp('again_at', { withTimezone: true }),
  },
  (t) => [index('file_faults_file_idx').on(t.importFileId, t.at)],
);
