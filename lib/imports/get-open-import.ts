import { requireActor } from '@/lib/auth/require-actor';
import type { ActorContext, Context } from '@/lib/context';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess, type Show } from '@/lib/shows/get-show-access';
import { getImportRow, type ImportRow } from './get-import-row';

export const notOpen = () => new StudioError('conflict', 'This import was submitted or cancelled and takes no more files. Open another one.');

/** The import that the caller may put files into. Errors: not_found, forbidden, frozen; conflict when it takes no more. */
export async function getOpenImport(context: Context, ref: { show: string; import: string }): Promise<{ known: ActorContext; show: Show; row: ImportRow }> {
  const known = requireActor(context);
  const { show } = await getShowAccess(context.db, known.actor, ref.show, 'importCages');
  const row = await getImportRow(context.db, show.id, ref.import);
  if (row.state !== 'open') throw notOpen();
  return { known, show, row };
}
