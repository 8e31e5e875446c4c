import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { UploadRefInput } from '@/lib/rules/inputs/upload-ref';
import type { UploadAnswer } from '@/lib/rules/upload-parts';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { getImportRow } from './get-import-row';
import { describeUpload, getUploadRow, listUploadParts } from './upload-row';

/** Which parts of the caller's upload are there. Errors: not_found. */
export async function getUpload(context: Context, input: UploadRefInput): Promise<UploadAnswer> {
  const { actor } = requireActor(context);
  const { show } = await getShowAccess(context.db, actor, input.show, 'importCages');
  await getImportRow(context.db, show.id, input.import);
  const upload = await getUploadRow(context.db, show.id, actor.userId, input.upload);
  return describeUpload(upload, await listUploadParts(context.db, upload.id), upload.completedAt ? 'stored' : 'open');
}
