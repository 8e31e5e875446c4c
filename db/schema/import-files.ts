import { sql } from 'drizzle-orm';
import { bigint, boolean, check, index, integer, jsonb, pgTable, text, timestamp, uniqueIndex, uuid, type AnyPgColumn } from 'drizzle-orm/pg-core';
import type { StoredPlan } from '../../lib/rules/import-plan';
import { IMPORT_FILE_STATES } from '../../lib/rules/states';
import { assetVersions } from './asset-versions';
import { assets } from './assets';
import { blobs } from './blobs';
import { oneOf } from './checks';
import { imports } from './imports';

/** One file of an import, from its upload to its end. Ends once: done or failed. */
export const importFiles = pgTable(
  'import_files',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    importId: uuid('import_id')
      .notNull()
      .references(() => imports.id, { onDelete: 'restrict' }),
    /** Path as it was dropped, with forward slashes. */
    name: text('name').notNull(),
    state: text('state', { enum: IMPORT_FILE_STATES }).notNull().default('queued'),
    sha256: text('sha256')
      .notNull()
      .references(() => blobs.sha256, { onDelete: 'restrict' }),
    byteSize: bigint('byte_size', { mode: 'number' }).notNull(),
    /** What the script or the person said instead of the name pattern. */
    assetOverride: text('asset_override'),
    versionOverride: integer('version_override'),
    outsideIdOverride: text('outside_id_override'),
    categoryOverride: text('category_override'),
    /** Where the names put the file, decided for all files together when the import was submitted; null before. */
    plan: jsonb('plan').$type<StoredPlan>(),
    assetId: uuid('asset_id').references(() => assets.id, { onDelete: 'restrict' }),
    versionId: uuid('version_id').references((): AnyPgColumn => assetVersions.id, { onDelete: 'restrict' }),
    parts: integer('parts'),
    problems: integer('problems'),
    /** The archive of this import that the file came out of, and the path that it had there; null for a file that was dropped itself. */
    archiveId: uuid('archive_id').references((): AnyPgColumn => importFiles.id, { onDelete: 'restrict' }),
    archiveEntry: text('archive_entry'),
    /** Of an archive that became files of its own: how many. */
    unpackedInto: integer('unpacked_into'),
    /** Warnings of the version rules: another take, a gap, unchanged. */
    remark: text('remark'),
    errorCode: text('error_code'),
    errorMessage: text('error_message'),
    errorLine: integer('error_line'),
    errorColumn: integer('error_column'),
    /** The line with a caret under the column, cut to a window; null where the whole file is meant. */
    errorExcerpt: text('error_excerpt'),
    attempts: integer('attempts').notNull().default(0),
    /** Its place in its import's order, and when it began to wait for a turn; null before that. */
    ordinal: integer('ordinal'),
    queuedAt: timestamp('queued_at', { withTimezone: true }),
    /** Faces, where they were counted before measuring. */
    faces: integer('faces'),
    /** After a passing fault: when it may be tried again, and whether with nothing beside it, since it may have taken its neighbours down. */
    tryAfter: timestamp('try_after', { withTimezone: true }),
    isAlone: boolean('is_alone').notNull().default(false),
    /** The worker that has it in hand, and since when. */
    worker: text('worker'),
    startedAt: timestamp('started_at', { withTimezone: true }),
    /** A worker holds the file until then; past it another may take it. */
    leaseUntil: timestamp('lease_until', { withTimezone: true }),
    leaseBy: uuid('lease_by'),
    uploadedAt: timestamp('uploaded_at', { withTimezone: true }).notNull().defaultNow(),
    endedAt: timestamp('ended_at', { withTimezone: true }),
    /** Number of the transaction that changed last what readers see of the file; a trigger keeps it, leases do not move it. */
    changed: bigint('changed', { mode: 'number' })
      .notNull()
      .default(sql`pg_current_xact_id()::text::bigint`),
  },
  (t) => [
    uniqueIndex('import_files_import_name_key').on(t.importId, t.name),
    index('import_files_open_idx')
      .on(t.importId, t.state)
      .where(sql`state in ('queued', 'reading', 'measuring')`),
    index('import_files_waiting_idx')
      .on(t.importId, t.ordinal)
      .where(sql`state in ('queued', 'reading', 'measuring') and queued_at is not null`),
    index('import_files_sha256_idx').on(t.sha256),
    index('import_files_changed_idx').on(t.importId, t.changed),
    check('import_files_state', oneOf(t.state, IMPORT_FILE_STATES)),
    check('import_files_end', sql`(${t.state} in ('done', 'failed')) = (${t.endedAt} is not null)`),
    check('import_files_archive', sql`(${t.archiveId} is null) = (${t.archiveEntry} is null) and (${t.unpackedInto} is null or (${t.unpackedInto} >= 1 and ${t.state} = 'done'))`),
    check('import_files_error', sql`(${t.state} = 'failed') = (${t.errorCode} is not null)`),
  ],
);
