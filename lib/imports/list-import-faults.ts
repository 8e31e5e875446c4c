import { asc, eq } from 'drizzle-orm';
import { fileFaults } from '@/db/schema/file-faults';
import { importFiles } from '@/db/schema/import-files';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ImportFault } from '@/lib/rules/import-answer';
import type { ImportRefInput } from '@/lib/rules/inputs/import-ref';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { getImportRow } from './get-import-row';

/** Far more than any import has had: each of its files may have met eight. */
const MOST = 5_000;

/** What an import's files met that was not their own fault, the oldest first: also of files that came to a good end later. */
export async function listImportFaults(context: Context, input: ImportRefInput): Promise<{ items: ImportFault[] }> {
  const { actor } = requireActor(context);
  const { show } = await getShowAccess(context.db, actor, input.show, 'readShow');
  const row = await getImportRow(context.db, show.id, input.import);
  const found = await context.db
    .select({ name: importFiles.name, fault: fileFaults })
    .from(fileFaults)
    .innerJoin(importFiles, eq(importFiles.id, fileFaults.importFileId))
    .where(eq(importFiles.importId, row.id))
    .orderBy(asc(fileFaults.at), asc(fileFaults.id))
    .limit(MOST);
  return {
    items: found.map(({ name, fault }) => ({ name, at: fault.at.toISOString(), attempt: fault.attempt, worker: fault.worker, code: fault.code, message: fault.message, again_at: fault.againAt?.toISOString() ?? null })),
  };
}
