import { and, desc, eq, inArray } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { importFiles } from '@/db/schema/import-files';
import { imports } from '@/db/schema/imports';
import type { OpenImport } from '@/lib/rules/import-answer';
import type { Show } from '@/lib/shows/get-show-access';

/** So many are told of; whoever left more behind finds them in the list of imports. */
const MOST_TOLD = 5;

/** The imports of a show that this person opened and neither submitted nor cancelled, newest first, with what arrived in each. */
export async function openImportsOf(db: Executor, show: Show, userId: string): Promise<OpenImport[]> {
  const open = await db
    .select()
    .from(imports)
    .where(and(eq(imports.showId, show.id), eq(imports.createdBy, userId), eq(imports.state, 'open')))
    .orderBy(desc(imports.createdAt))
    .limit(MOST_TOLD);
  if (open.length === 0) return [];
  const files = await db
    .select({ id: importFiles.importId, name: importFiles.name })
    .from(importFiles)
    .where(inArray(importFiles.importId, open.map(({ id }) => id)));
  return open.map((row) => ({
    id: row.id,
    created_at: row.createdAt.toISOString(),
    scheme: row.scheme,
    boundary: row.boundary,
    parts_by: row.partsBy,
    weld: row.weld,
    turn_faces: row.turnFaces,
    name_pattern: row.namePattern,
    standard: row.triangles === 'catmark' && row.creasing === 'uniform' && row.otherSpace === show.otherSpace,
    names: files.filter(({ id }) => id === row.id).map(({ name }) => name),
  }));
}
