import { eq, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { parts } from '@/db/schema/parts';
import { swapPartNames } from './swap-part-names';

interface OldName extends Record<string, unknown> {
  id: string;
  name: string;
  part_id: string;
  part: string;
  /** The version has the part's present name too. */
  both: boolean;
}

/**
 * Where the current version calls a part by a name that it had before, the part takes that name up again. A version with both names has
 * two parts: then the old name is a part of its own from now on. The caller holds the asset and the show's values.
 */
export async function takeUpOldNames(tx: Transaction, assetId: string): Promise<void> {
  const { rows } = await tx.execute<OldName>(sql`
    with record as (select record_id as id from asset_versions where asset_id = ${assetId} order by number desc, take desc limit 1)
    select n.id, n.name, p.id as part_id, p.name as part,
      exists (select 1 from geometry_parts o join record on record.id = o.record_id where o.name = p.name) as both
    from parts n join parts p on p.id = n.merged_into join geometry_parts g on g.name = n.name join record on record.id = g.record_id
    where n.asset_id = ${assetId} order by n.name collate "C"`);
  const renamed = new Set<string>();
  for (const { id, name, part_id: partId, part, both } of rows) {
    if (both || renamed.has(partId)) await tx.update(parts).set({ mergedInto: null }).where(eq(parts.id, id));
    else await swapPartNames(tx, { id: partId, name: part }, { id, name });
    renamed.add(partId);
  }
}
