import { and, eq, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { blobs } from '@/db/schema/blobs';
import { importFiles } from '@/db/schema/import-files';
import { imports } from '@/db/schema/imports';
import type { PutImportFileInput } from '@/lib/rules/inputs/put-import-file';
import { StudioError } from '@/lib/rules/studio-error';
import { countAgainst } from '@/lib/storage/count-against';
import type { StoredBlob } from '@/lib/storage/store-blob';
import type { ImportRow } from './get-import-row';
import { notOpen } from './get-open-import';
import { notifyImport } from './notify-import';
import { refuseLargeFile } from './refuse-beyond';

export type SaidOfFile = Omit<PutImportFileInput, 'show' | 'import'>;

/**
 * Writes a stored blob down as a file of an open import, within its limits and the show's; other bytes under the name are replaced, since
 * nothing was read yet. Whether anything was written: false when name, bytes and what was said beside them are as they were.
 * `isReserved`: the bytes were counted for the show when their upload was announced. Errors: conflict, too_large, not_available.
 */
export async function registerFile(tx: Transaction, row: ImportRow, said: SaidOfFile, blob: StoredBlob, isReserved = false): Promise<boolean> {
  refuseLargeFile(blob.byteSize);
  // Shared: uploads go on side by side, while a submit waits for those that are being written down.
  const [open] = await tx.select({ id: imports.id }).from(imports).where(and(eq(imports.id, row.id), eq(imports.state, 'open'))).for('share');
  if (!open) throw notOpen();
  const [held] = await tx.select({ sha256: blobs.sha256 }).from(blobs).where(eq(blobs.sha256, blob.sha256)).for('key share');
  if (!held) throw new StudioError('not_available', 'The stored bytes of this file were removed meanwhile. Send it again.');
  const [before] = await tx.select({ sha256: importFiles.sha256 }).from(importFiles).where(and(eq(importFiles.importId, row.id), eq(importFiles.name, said.name)));
  if (before?.sha256 !== blob.sha256) {
    await countAgainst(tx, { kind: 'show', showId: row.showId }, isReserved || (await isInShow(tx, row.showId, blob.sha256)) ? 0 : blob.byteSize);
    await countAgainst(tx, { kind: 'import', importId: row.id }, blob.byteSize);
    await countAgainst(tx, { kind: 'files', importId: row.id }, before ? 0 : 1);
  }
  const isWritten = await writeFile(tx, row.id, said, blob);
  if (isWritten) await notifyImport(tx, row.id);
  return isWritten;
}

async function isInShow(tx: Transaction, showId: string, sha256: string): Promise<boolean> {
  const { rows } = await tx.execute(sql`select 1 from import_files f join imports i on i.id = f.import_id where f.sha256 = ${sha256} and i.show_id = ${showId} limit 1`);
  return rows.length > 0;
}

async function writeFile(tx: Transaction, importId: string, input: SaidOfFile, blob: StoredBlob): Promise<boolean> {
  const said = {
    sha256: blob.sha256,
    byteSize: blob.byteSize,
    assetOverride: input.asset ?? null,
    versionOverride: input.version ?? null,
    outsideIdOverride: input.outside_id ?? null,
    categoryOverride: input.category ?? null,
  };
  const f = importFiles;
  const written = await tx
    .insert(f)
    .values({ importId, name: input.name, ...said })
    .onConflictDoUpdate({
      target: [f.importId, f.name],
      set: { ...said, uploadedAt: sql`now()` },
      setWhere: sql`(${f.sha256}, ${f.assetOverride}, ${f.versionOverride}, ${f.outsideIdOverride}, ${f.categoryOverride})
        is distinct from (excluded.sha256, excluded.asset_override, excluded.version_override, excluded.outside_id_override, excluded.category_override)`,
    })
    .returning({ id: f.id });
  return written.length > 0;
}
