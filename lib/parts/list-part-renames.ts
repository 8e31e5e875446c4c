import { sql } from 'drizzle-orm';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ListPartRenamesInput } from '@/lib/rules/inputs/part-renames';
import type { AssetRenames } from '@/lib/rules/part-rename';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { findRenames } from './find-renames';

/**
 * Assets whose current version lacks parts and brought new ones, with the renames that their geometry proposes: of the show, of one asset,
 * or of what an import brought. Errors: bad_input, not_found for a show that the caller is not in.
 */
export async function listPartRenames(context: Context, input: ListPartRenamesInput): Promise<{ items: AssetRenames[] }> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const ofAsset = input.asset === undefined ? sql`` : sql`and a.code = ${input.asset}`;
  const ofImport = input.import === undefined ? sql`` : sql`and a.id in (select v.asset_id from asset_versions v join import_files f on f.id = v.import_file_id where f.import_id = ${input.import})`;
  const { rows } = await db.execute<{ id: string }>(sql`select a.id from assets a where a.show_id = ${show.id} and a.archived_at is null ${ofAsset} ${ofImport}`);
  const found = await findRenames(db, rows.map((row) => row.id));
  return { items: found.map(({ asset, version, proposals, absent, arrived, kept_apart }) => ({ asset, version, proposals, absent, arrived, kept_apart })) };
}
