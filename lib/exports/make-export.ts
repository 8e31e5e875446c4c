import { createHash } from 'node:crypto';
import { eq } from 'drizzle-orm';
import type { Database, Executor } from '@/db/client';
import { shows } from '@/db/schema/shows';
import { CSV_SCHEMA } from '@/lib/rules/csv-columns';
import { exportCache, spoolExport, type ExportFile } from './export-cache';
import { EXPORT_WRITERS, type ExportFormat } from './export-formats';
import { exportPages } from './export-pages';
import { selectionText, type ExportSelection } from './export-selection';

/**
 * The show's export as a finished file with the hash of its bytes, so that ETag and length are known before the first byte is
 * sent and no database connection waits for a slow reader. Made within one snapshot, a page at a time; while the show's revision
 * stands the same file is handed out again. Answers the key too.
 */
export async function makeExport(db: Database, show: { id: string; code: string }, format: ExportFormat, selection: ExportSelection): Promise<ExportFile & { key: string }> {
  const now = exportKey(show.id, await showRevision(db, show.id), format, selection);
  const ready = exportCache.find(now);
  if (ready) return { ...ready, key: now };
  return db.transaction(
    async (tx) => {
      const key = exportKey(show.id, await showRevision(tx, show.id), format, selection);
      const writer = EXPORT_WRITERS[format];
      const file = await exportCache.keep(key, (path) =>
        spoolExport(path, async (put) => {
          let isFirst = true;
          await put(writer.head(show.code));
          for await (const page of exportPages(tx, show, selection)) {
            await put(writer.rows(page, isFirst, selection.guard === '1'), page);
            isFirst = false;
          }
          await put(writer.tail);
        }),
      );
      return { ...file, key };
    },
    { isolationLevel: 'repeatable read', accessMode: 'read only' },
  );
}

async function showRevision(db: Executor, showId: string): Promise<number> {
  const [show] = await db.select({ revision: shows.revision }).from(shows).where(eq(shows.id, showId));
  return show?.revision ?? 0;
}

function exportKey(showId: string, revision: number, format: ExportFormat, selection: ExportSelection): string {
  return createHash('sha256')
    .update(JSON.stringify([showId, revision, CSV_SCHEMA, format, selectionText(selection)]))
    .digest('hex');
}
