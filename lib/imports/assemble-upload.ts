import { and, eq, isNull, lt, or, sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { uploadParts } from '@/db/schema/upload-parts';
import { uploads } from '@/db/schema/uploads';
import { log } from '@/lib/log';
import { StudioError } from '@/lib/rules/studio-error';
import { disk, partKey } from '@/lib/storage/disk';
import { dropParts } from '@/lib/storage/drop-parts';
import { asStudioError } from '@/lib/storage/storage-fault';
import { storeBlob } from '@/lib/storage/store-blob';
import type { UploadPartRow, UploadRow } from './upload-row';

const LEASE_S = 60;
const BEAT_MS = 15_000;

export const otherBytes = () => new StudioError('bad_input', 'All parts came, but together they are not the file that was announced. Was it changed meanwhile? Send it again.', { field: 'sha256' });

/** Takes the upload for this process; false while another holds it or once it is complete. What a dead process held is free after a minute. */
export async function claimAssembly(db: Database, id: string): Promise<boolean> {
  const claimed = await db
    .update(uploads)
    .set({ assemblingUntil: sql`now() + make_interval(secs => ${LEASE_S})` })
    .where(and(eq(uploads.id, id), isNull(uploads.completedAt), or(isNull(uploads.assemblingUntil), lt(uploads.assemblingUntil, sql`now()`))))
    .returning({ id: uploads.id });
  return claimed.length > 0;
}

/**
 * Puts a claimed upload's parts together as a blob and checks the whole against the hash that was announced. When they are other bytes, they
 * are dropped and have to come again. Errors: bad_input then; storage_full, not_available.
 */
export async function assembleUpload(db: Database, upload: UploadRow, parts: readonly UploadPartRow[]): Promise<void> {
  const mine = eq(uploads.id, upload.id);
  const beat = setInterval(() => {
    const next = sql`greatest(${uploads.expiresAt}, now() + make_interval(secs => ${LEASE_S}))`;
    db.update(uploads)
      .set({ assemblingUntil: sql`now() + make_interval(secs => ${LEASE_S})`, expiresAt: next })
      .where(mine)
      .catch((error: unknown) => log.warn({ err: error, upload: upload.id }, 'the lease of an upload could not be held'));
  }, BEAT_MS);
  try {
    await storeBlob(bytesOf(parts), { maxBytes: upload.byteSize, expectedBytes: upload.byteSize, expectedSha256: upload.sha256, isReserved: true });
  } catch (error) {
    const isOther = error instanceof StudioError && error.code === 'bad_input';
    if (isOther) await db.delete(uploadParts).where(eq(uploadParts.uploadId, upload.id));
    await db.update(uploads).set({ assemblingUntil: null, ...(isOther ? { refusedAt: sql`now()` } : {}) }).where(mine);
    if (!isOther) throw error;
    await dropParts(upload.id);
    throw otherBytes();
  } finally {
    clearInterval(beat);
  }
  await db.transaction(async (tx) => {
    await tx.update(uploads).set({ completedAt: sql`now()`, assemblingUntil: null }).where(mine);
    await tx.delete(uploadParts).where(eq(uploadParts.uploadId, upload.id));
  });
  // Left behind, they would be swept: the content is safe already.
  await dropParts(upload.id).catch((error: unknown) => log.warn({ err: error, upload: upload.id }, 'the parts of a complete upload could not be removed'));
}

/** The parts' bytes, one after the other; a fault in reading them is the storage's, not the sender's. */
async function* bytesOf(parts: readonly UploadPartRow[]): AsyncIterable<Uint8Array> {
  for (const part of parts) {
    try {
      yield* await (await disk()).getStream(partKey(part.uploadId, part.number, part.sha256));
    } catch (error) {
      const known = asStudioError(error);
      if (known instanceof StudioError) throw known;
      log.error({ err: error, upload: part.uploadId, part: part.number }, 'a part could not be read');
      throw new StudioError('not_available', 'A part that had arrived cannot be read from the storage. Try again in a moment, or cancel the upload and send the file again.');
    }
  }
}
