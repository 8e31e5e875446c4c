import { and, eq } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { blobs } from '@/db/schema/blobs';
import { importFiles } from '@/db/schema/import-files';
import { config } from '@/lib/config';
import { leftOf } from '@/lib/storage/count-against';
import type { ImportRow } from './get-import-row';

/**
 * The most bytes that may come for one file, by the smallest limit that applies: of a file, of its import, of show and studio. A sender need not say how much
 * comes, and what is refused in the end would fill the storage until then. Content that is stored already, and a file that comes again, take no room anew.
 */
export async function roomForBytes(db: Database, row: ImportRow, name: string, sha256: string | null): Promise<number> {
  const { maxFileBytes } = config();
  const known = sha256 === null ? [] : await db.select({ sha256: blobs.sha256 }).from(blobs).where(eq(blobs.sha256, sha256));
  if (known.length > 0) return maxFileBytes;
  const f = importFiles;
  const [before] = await db.select({ byteSize: f.byteSize }).from(f).where(and(eq(f.importId, row.id), eq(f.name, name)));
  const taken = before?.byteSize ?? 0;
  const ofImport = (await leftOf(db, { kind: 'import', importId: row.id }, maxFileBytes)) + taken;
  const ofShow = await leftOf(db, { kind: 'show', showId: row.showId }, maxFileBytes);
  const ofStudio = await leftOf(db, { kind: 'studio' }, maxFileBytes);
  return Math.min(maxFileBytes, ofImport, Math.max(taken, Math.min(ofShow, ofStudio)));
}
