import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { MESH_EXTENSIONS } from '@/lib/formats/mesh-extensions';
import type { ImportPreparation } from '@/lib/rules/import-answer';
import type { ImportPreparationInput } from '@/lib/rules/inputs/import-preparation';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { limitsOf } from './get-upload-limits';
import { knownAssets } from './known-assets';
import { openImportsOf } from './open-imports-of';

/** What the import page has to know before anything goes up: how names are read, what the show has, and every limit. */
export async function getImportPreparation(context: Context, input: ImportPreparationInput): Promise<ImportPreparation> {
  const { actor } = requireActor(context);
  const { show } = await getShowAccess(context.db, actor, input.show, 'importCages');
  const { max_file_bytes, max_files, max_import_bytes, left_bytes } = await limitsOf(context.db, show);
  return {
    show: show.code,
    name_pattern: show.namePattern,
    scheme: show.scheme,
    boundary: show.boundary,
    parts_by: show.partsBy,
    linear_unit: show.linearUnit,
    up_axis: show.upAxis,
    frozen: show.frozenAt !== null,
    extensions: [...MESH_EXTENSIONS],
    max_file_bytes,
    max_files,
    max_import_bytes,
    left_bytes,
    assets: await knownAssets(context.db, show.id),
    open: await openImportsOf(context.db, show, actor.userId),
  };
}
