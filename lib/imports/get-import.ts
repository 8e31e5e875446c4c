import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ImportDetail } from '@/lib/rules/import-answer';
import type { GetImportInput } from '@/lib/rules/inputs/get-import';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { parseMark, readImportChanges } from './read-import-changes';

/** An import with every file's state and end, or with the files alone that changed since a mark of an earlier answer. `done` once every file has ended, whatever its end. */
export async function getImport(context: Context, input: GetImportInput): Promise<ImportDetail> {
  const { actor } = requireActor(context);
  const { show } = await getShowAccess(context.db, actor, input.show, 'readShow');
  return (await readImportChanges(context.db, show.id, input.import, parseMark(input.since))).detail;
}
