import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ImportSummary } from '@/lib/rules/import-answer';
import type { ImportRefInput } from '@/lib/rules/inputs/import-ref';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { describeImport } from './describe-import';
import { getImportRow } from './get-import-row';
import { readMark } from './read-import-changes';

/** An import without its files, and the mark from which its news can be followed. Errors: not_found, as everywhere. */
export async function getImportSummary(context: Context, input: ImportRefInput): Promise<ImportSummary> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  return db.transaction(
    async (tx) => {
      const mark = await readMark(tx);
      return { ...(await describeImport(tx, await getImportRow(tx, show.id, input.import))), mark: mark.toString() };
    },
    { isolationLevel: 'repeatable read', accessMode: 'read only' },
  );
}
