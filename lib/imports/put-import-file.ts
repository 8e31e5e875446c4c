import type { Context } from '@/lib/context';
import type { StoredFileAnswer } from '@/lib/rules/import-answer';
import type { PutImportFileInput } from '@/lib/rules/inputs/put-import-file';
import { storeBlob } from '@/lib/storage/store-blob';
import { announcedHash } from './announced-hash';
import { getOpenImport } from './get-open-import';
import { refuseBeyond } from './refuse-beyond';
import { registerFile } from './register-file';
import { roomForBytes } from './room-for-bytes';

/**
 * Streams one file into an open import. The same bytes under the same name are a no-op; other bytes replace them, since
 * nothing was read yet. The sender may announce the SHA-256 in `x-content-sha256`.
 */
export async function putImportFile(context: Context, input: PutImportFileInput, request: Request): Promise<StoredFileAnswer> {
  const { row } = await getOpenImport(context, input);
  const announcedBytes = Number(request.headers.get('content-length') ?? 0);
  await refuseBeyond(context.db, row, input.name, announcedBytes);
  const expectedSha256 = announcedHash(request);
  const blob = await storeBlob(request.body, { maxBytes: await roomForBytes(context.db, row, input.name, expectedSha256), expectedSha256 });
  const stored = await context.db.transaction((tx) => registerFile(tx, row, input, blob));
  return { name: input.name, sha256: blob.sha256, bytes: blob.byteSize, stored };
}
