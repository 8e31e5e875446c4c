import { and, eq, isNull, sql } from 'drizzle-orm';
import { uploadParts } from '@/db/schema/upload-parts';
import { uploads } from '@/db/schema/uploads';
import { config } from '@/lib/config';
import type { Context } from '@/lib/context';
import type { PutUploadPartInput } from '@/lib/rules/inputs/upload-ref';
import { StudioError } from '@/lib/rules/studio-error';
import { partCount, partLength, type UploadPartAnswer } from '@/lib/rules/upload-parts';
import { disk, partKey } from '@/lib/storage/disk';
import { receiveBytes } from '@/lib/storage/receive-bytes';
import { announcedHash } from './announced-hash';
import { getOpenImport } from './get-open-import';
import { getUploadRow, noUpload, partedOf } from './upload-row';

/**
 * Takes one part, in any order and beside others. Its SHA-256 stands in `x-content-sha256`; the same part again is a no-op, other bytes in its
 * place replace it, for the whole's hash decides in the end. Errors: bad_input, bad_request, conflict, not_found, storage_full, not_available.
 */
export async function putUploadPart(context: Context, input: PutUploadPartInput, request: Request): Promise<UploadPartAnswer> {
  const { known, show } = await getOpenImport(context, input);
  const upload = await getUploadRow(context.db, show.id, known.actor.userId, input.upload);
  if (upload.completedAt) throw new StudioError('conflict', 'All parts of this upload have come already.');
  const parted = partedOf(upload);
  if (input.part > partCount(parted)) throw new StudioError('bad_input', `This upload has ${partCount(parted)} parts of ${upload.partBytes} bytes.`, { field: 'part' });
  const expectedSha256 = announcedHash(request);
  if (expectedSha256 === null) throw new StudioError('bad_input', 'Give the part’s SHA-256 in x-content-sha256.', { field: 'x-content-sha256' });
  const expectedBytes = partLength(parted, input.part);
  const received = await receiveBytes(request.body, { maxBytes: expectedBytes, expectedBytes, expectedSha256 });
  try {
    const key = partKey(upload.id, input.part, received.sha256);
    await received.place(key);
    const stored = await context.db.transaction(async (tx) => {
      const [still] = await tx
        .update(uploads)
        .set({ expiresAt: sql`now() + make_interval(secs => ${config().uploadHours * 3600})` })
        .where(and(eq(uploads.id, upload.id), isNull(uploads.completedAt), eq(uploads.partBytes, upload.partBytes)))
        .returning({ id: uploads.id });
      if (!still) return null;
      const p = uploadParts;
      const written = await tx
        .insert(p)
        .values({ uploadId: upload.id, number: input.part, sha256: received.sha256, byteSize: received.byteSize })
        .onConflictDoUpdate({ target: [p.uploadId, p.number], set: { sha256: received.sha256, storedAt: sql`now()` }, setWhere: sql`${p.sha256} <> excluded.sha256` })
        .returning({ number: p.number });
      return written.length > 0;
    });
    if (stored === null) {
      // It was completed, cancelled or swept while the part was on its way.
      await (await disk()).delete(key);
      throw noUpload();
    }
    return { part: input.part, sha256: received.sha256, bytes: received.byteSize, stored };
  } finally {
    await received.discard().catch(() => undefined);
  }
}
