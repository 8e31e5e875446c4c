import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ImportDetail } from '@/lib/rules/import-answer';
import type { ImportRefInput } from '@/lib/rules/inputs/import-ref';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { readImportChanges } from './read-import-changes';

/** An import with every file's state and end. `done` once every file has ended, whatever its end. */
export async function getImport(context: Context, input: ImportRefInput): Promise<ImportDetail> {
  const { actor } = requireActor(context);
  const { show } = await getShowAccess(context.db, actor, input.show, 'readShow');
  return (await readImportChanges(context.db, show.id, input.import, null)).detail;
}
