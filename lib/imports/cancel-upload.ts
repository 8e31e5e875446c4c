import { and, eq, isNull, lt, or, sql } from 'drizzle-orm';
import { uploads } from '@/db/schema/uploads';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { UploadRefInput } from '@/lib/rules/inputs/upload-ref';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { dropParts } from '@/lib/storage/drop-parts';
import { getImportRow } from './get-import-row';
import { getUploadRow } from './upload-row';

/** Ends the caller's upload and removes its parts. Errors: not_found; conflict while its parts are being put together. */
export async function cancelUpload(context: Context, input: UploadRefInput): Promise<void> {
  const { actor } = requireActor(context);
  const { show } = await getShowAccess(context.db, actor, input.show, 'importCages');
  await getImportRow(context.db, show.id, input.import);
  const upload = await getUploadRow(context.db, show.id, actor.userId, input.upload);
  const dropped = await context.db
    .delete(uploads)
    .where(and(eq(uploads.id, upload.id), or(isNull(uploads.assemblingUntil), lt(uploads.assemblingUntil, sql`now()`))))
    .returning({ id: uploads.id });
  if (dropped.length === 0) throw new StudioError('conflict', 'The parts of this upload are being put together right now.');
  await dropParts(upload.id);
}
