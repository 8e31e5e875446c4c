import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ImportDetail } from '@/lib/rules/import-answer';
import type { ImportRefInput } from '@/lib/rules/inputs/import-ref';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { describeImport } from './describe-import';
import { getImportRow } from './get-import-row';
import { listImportFiles } from './list-import-files';

/** An import with every file's state and end. `done` once every file has ended, whatever its end. */
export async function getImport(context: Context, input: ImportRefInput): Promise<ImportDetail> {
  const { actor } = requireActor(context);
  const { show } = await getShowAccess(context.db, actor, input.show, 'readShow');
  // One snapshot: an import that is said to be done must not show a file that has not ended.
  return context.db.transaction(
    async (tx) => {
      const row = await getImportRow(tx, show.id, input.import);
      return { ...(await describeImport(tx, row)), files: await listImportFiles(tx, row.id) };
    },
    { isolationLevel: 'repeatable read', accessMode: 'read only' },
  );
}
