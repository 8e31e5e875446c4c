import { eq } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { importFiles } from '@/db/schema/import-files';
import { planImport, type PlannedFile } from '@/lib/rules/import-plan';

export interface PlannedRow extends PlannedFile {
  id: string;
  byteSize: number;
  state: (typeof importFiles.$inferSelect)['state'];
}

/** All files of an import with where each will go; read together, since a name can depend on the others. */
export async function planOfImport(db: Executor, importId: string, pattern: string | null): Promise<PlannedRow[]> {
  const f = importFiles;
  const rows = await db
    .select({ id: f.id, name: f.name, byteSize: f.byteSize, state: f.state, asset: f.assetOverride, version: f.versionOverride, category: f.categoryOverride })
    .from(f)
    .where(eq(f.importId, importId));
  return planImport(rows, pattern).map((planned, index) => ({ ...planned, id: rows[index].id, byteSize: rows[index].byteSize, state: rows[index].state }));
}
