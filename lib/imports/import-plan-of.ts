import { eq, sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { importFiles } from '@/db/schema/import-files';
import { imports } from '@/db/schema/imports';
import { planImport, type PlannedFile } from '@/lib/rules/import-plan';
import { knownAssets } from './known-assets';

export interface PlannedRow extends PlannedFile {
  id: string;
  byteSize: number;
  state: (typeof importFiles.$inferSelect)['state'];
}

/**
 * All files of an import with where each will go. It is decided once, for all of them together and against what the show has, and kept
 * with the files; only a file that no asset was found for is read again, by the pattern as it is then.
 * @param showPattern the show's own pattern, for imports that bring none
 */
export async function planOfImport(db: Executor, importId: string, showPattern: string | null): Promise<PlannedRow[]> {
  const f = importFiles;
  const rows = await db
    .select({ id: f.id, name: f.name, byteSize: f.byteSize, state: f.state, plan: f.plan, asset: f.assetOverride, version: f.versionOverride, category: f.categoryOverride })
    .from(f)
    .where(eq(f.importId, importId));
  const open = rows.filter((row) => row.plan === null || (row.plan.asset === null && row.state === 'queued'));
  if (open.length > 0) {
    const [{ showId, namePattern }] = await db.select({ showId: imports.showId, namePattern: imports.namePattern }).from(imports).where(eq(imports.id, importId));
    // Plans of one show are made one after the other, so that each knows the assets that the others will make.
    await db.execute(sql`select pg_advisory_xact_lock(hashtextextended(${`plan ${showId}`}, 0))`);
    const planned = planImport(open, patternOf(namePattern, showPattern), await knownAssets(db, showId));
    for (const [index, { asset, category, version, qualified, duplicate, readName, place, moved }] of planned.entries()) open[index].plan = { asset, category, version, qualified, duplicate, readName, place, moved };
    const given = open.map(({ id, plan }) => ({ id, plan }));
    await db.execute(sql`
      update import_files set plan = given.plan from json_to_recordset(${JSON.stringify(given)}::json) as given(id uuid, plan jsonb)
      where import_files.id = given.id and import_files.plan is distinct from given.plan`);
  }
  return rows.map(({ id, name, byteSize, state, plan }) => ({ ...plan!, name, id, byteSize, state }));
}

/** The pattern of an import: its own, where empty means the built-in rule, or the show's. */
function patternOf(own: string | null, ofShow: string | null): string | null {
  return own === null ? ofShow : own === '' ? null : own;
}
