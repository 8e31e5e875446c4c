import { imports } from '@/db/schema/imports';
import { requireActor } from '@/lib/auth/require-actor';
import { config } from '@/lib/config';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { OpenImportInput } from '@/lib/rules/inputs/open-import';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { describeImport } from './describe-import';
import type { ImportAnswer } from '@/lib/rules/import-answer';

/** Opens an import that files can be put into. Answers its id, its options and the limits of what it takes. */
export async function openImport(context: Context, input: OpenImportInput): Promise<ImportAnswer & { max_file_bytes: number; max_files: number }> {
  const known = requireActor(context);
  const { show } = await getShowAccess(context.db, known.actor, input.show, 'importCages');
  const row = await context.db.transaction(async (tx) => {
    const [opened] = await tx
      .insert(imports)
      .values({
        showId: show.id,
        scheme: input.scheme ?? show.scheme,
        boundary: input.boundary ?? show.boundary,
        triangles: input.triangles,
        creasing: input.creasing,
        partsBy: input.parts_by ?? show.partsBy,
        weld: input.weld ?? false,
        turnFaces: input.turn_faces ?? false,
        namePattern: input.name_pattern === undefined ? null : (input.name_pattern ?? ''),
        otherSpace: show.otherSpace,
        createdBy: known.actor.userId,
      })
      .returning();
    await recordEvent(tx, known, { showId: show.id, act: 'open-import', subject: opened.id });
    return opened;
  });
  const { maxFileBytes, maxImportFiles } = config();
  return { ...(await describeImport(context.db, row)), max_file_bytes: maxFileBytes, max_files: maxImportFiles };
}
