import { and, count, eq, ne, sql } from 'drizzle-orm';
import type { Database, Transaction } from '@/db/client';
import { blobs } from '@/db/schema/blobs';
import { importFiles } from '@/db/schema/import-files';
import { imports } from '@/db/schema/imports';
import { requireActor } from '@/lib/auth/require-actor';
import { config } from '@/lib/config';
import type { Context } from '@/lib/context';
import type { StoredFileAnswer } from '@/lib/rules/import-answer';
import type { PutImportFileInput } from '@/lib/rules/inputs/put-import-file';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { storeBlob, type StoredBlob } from '@/lib/storage/store-blob';
import { getImportRow } from './get-import-row';

/**
 * Streams one file into an open import. The same bytes under the same name are a no-op; other bytes replace them, since
 * nothing was read yet. The sender may announce the SHA-256 in `x-content-sha256`.
 */
export async function putImportFile(context: Context, input: PutImportFileInput, request: Request): Promise<StoredFileAnswer> {
  const { actor } = requireActor(context);
  const { show } = await getShowAccess(context.db, actor, input.show, 'importCages');
  const row = await getImportRow(context.db, show.id, input.import);
  if (row.state !== 'open') throw notOpen();
  refuseTooMany(await countOthers(context.db, row.id, input.name));
  const { maxFileBytes } = config();
  if (Number(request.headers.get('content-length') ?? 0) > maxFileBytes) throw new StudioError('too_large', `The file is larger than ${maxFileBytes} bytes, the most that one file may have here.`);
  const blob = await storeBlob(request.body, { maxBytes: maxFileBytes, expectedSha256: announcedHash(request) });
  const stored = await context.db.transaction(async (tx) => {
    // Shared: uploads go on side by side, while a submit waits for those that are being written down.
    const [open] = await tx.select({ id: imports.id }).from(imports).where(and(eq(imports.id, row.id), eq(imports.state, 'open'))).for('share');
    if (!open) throw notOpen();
    return writeFile(tx, row.id, input, blob);
  });
  return { name: input.name, sha256: blob.sha256, bytes: blob.byteSize, stored };
}

const notOpen = () => new StudioError('conflict', 'This import was submitted or cancelled and takes no more files. Open another one.');

function announcedHash(request: Request): string | null {
  const announced = request.headers.get('x-content-sha256')?.trim().toLowerCase() ?? null;
  if (announced !== null && !/^[0-9a-f]{64}$/.test(announced)) throw new StudioError('bad_input', 'x-content-sha256 is 64 hexadecimal digits.', { field: 'x-content-sha256' });
  return announced;
}

async function countOthers(db: Database, importId: string, name: string): Promise<number> {
  const [{ others }] = await db.select({ others: count() }).from(importFiles).where(and(eq(importFiles.importId, importId), ne(importFiles.name, name)));
  return others;
}

function refuseTooMany(others: number): void {
  const { maxImportFiles } = config();
  if (others >= maxImportFiles) throw new StudioError('too_large', `An import takes at most ${maxImportFiles} files. Put the rest into another one.`);
}

/** Whether anything was written: false when name, bytes and what was said beside them are as they were. */
async function writeFile(tx: Transaction, importId: string, input: PutImportFileInput, blob: StoredBlob): Promise<boolean> {
  await tx.insert(blobs).values({ sha256: blob.sha256, byteSize: blob.byteSize }).onConflictDoNothing();
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
