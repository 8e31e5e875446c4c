import { requireActor } from '@/lib/auth/require-actor';
import { config } from '@/lib/config';
import type { Context } from '@/lib/context';
import type { ImportPreparationInput } from '@/lib/rules/inputs/import-preparation';
import { DEFAULT_PART_BYTES, type UploadLimits } from '@/lib/rules/upload-parts';
import { getShowAccess, type Show } from '@/lib/shows/get-show-access';
import { leftOf } from '@/lib/storage/count-against';
import type { Executor } from '@/db/client';

/** Every limit of what may go up into a show, and what there is room for, before anything goes up. */
export async function getUploadLimits(context: Context, input: ImportPreparationInput): Promise<UploadLimits> {
  const { actor } = requireActor(context);
  const { show } = await getShowAccess(context.db, actor, input.show, 'importCages');
  return limitsOf(context.db, show);
}

/** What one person may know of the studio's room is the lesser of it and the show's. */
export async function limitsOf(db: Executor, show: Show): Promise<UploadLimits> {
  const { maxFileBytes, maxImportFiles, maxImportBytes, maxShowBytes } = config();
  const [inShow, inStudio] = await Promise.all([leftOf(db, { kind: 'show', showId: show.id }), leftOf(db, { kind: 'studio' })]);
  return {
    max_file_bytes: maxFileBytes,
    max_files: maxImportFiles,
    max_import_bytes: maxImportBytes,
    max_show_bytes: maxShowBytes,
    left_bytes: Math.min(inShow, inStudio),
    part_bytes: DEFAULT_PART_BYTES,
  };
}
