import { and, count, eq, ne, sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { importFiles } from '@/db/schema/import-files';
import { config } from '@/lib/config';
import { byteWords } from '@/lib/rules/byte-words';
import { StudioError } from '@/lib/rules/studio-error';
import type { ImportRow } from './get-import-row';

/**
 * Refuses a file by its announced size before any byte comes: too large itself, or too much for its import with what is there. Show and
 * studio, and what comes at the same time, are held to when the bytes are written down. Errors: too_large.
 */
export async function refuseBeyond(db: Database, row: ImportRow, name: string, bytes: number): Promise<void> {
  refuseLargeFile(bytes);
  const { maxImportFiles, maxImportBytes } = config();
  const f = importFiles;
  const [others] = await db
    .select({ files: count(), bytes: sql<string>`coalesce(sum(${f.byteSize}), 0)` })
    .from(f)
    .where(and(eq(f.importId, row.id), ne(f.name, name)));
  if (others.files >= maxImportFiles) throw new StudioError('too_large', `An import takes at most ${maxImportFiles} files. Put the rest into another one.`);
  if (Number(others.bytes) + bytes > maxImportBytes) {
    throw new StudioError('too_large', `An import takes at most ${byteWords(maxImportBytes)} (${maxImportBytes} bytes). Put the rest into another one.`, { field: 'bytes' });
  }
}

/** Refuses a file that is larger than any may be. Errors: too_large. */
export function refuseLargeFile(bytes: number): void {
  const { maxFileBytes } = config();
  if (bytes > maxFileBytes) throw new StudioError('too_large', `The file is larger than ${byteWords(maxFileBytes)} (${maxFileBytes} bytes), the most that one file may have here.`, { field: 'bytes' });
}
