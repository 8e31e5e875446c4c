import type { Executor } from '@/db/client';
import { partRowsById } from '@/lib/parts/part-rows-by-id';
import type { SetValuesItem } from '@/lib/rules/inputs/set-values';
import type { PartRow } from '@/lib/rules/part-row';
import type { ItemError } from '@/lib/rules/studio-error';
import type { ItemPart } from './find-item-parts';

/** Items whose row is no longer at the revision that they were made against, each with who changed it, when, and the row as it is now. */
export async function changedMeanwhile(db: Executor, show: string, items: readonly SetValuesItem[], found: readonly (ItemPart | null)[]): Promise<ItemError[]> {
  const stale = items.flatMap((item, index) => {
    const row = found[index];
    return row && row.revision !== item.revision ? [{ item, index, row }] : [];
  });
  const current = await partRowsById(db, show, stale.map(({ row }) => row.partId));
  return stale.map(({ item, index, row }, i) => ({
    index,
    asset: item.asset,
    part: item.part,
    code: 'changed_meanwhile',
    message: whoChanged(current[i], row.updatedAt),
    current: current[i],
  }));
}

function whoChanged(row: PartRow, updatedAt: string): string {
  const name = `${row.asset}/${row.part ?? ''}`;
  const when = `${updatedAt.slice(0, 16).replace('T', ' ')} UTC`;
  // A setting and the row that follows from it carry the time of one transaction; any other change came with the geometry.
  if (row.set_by !== null && row.set_at === updatedAt) return `${row.set_by} changed ${name} at ${when}.`;
  return `${name} changed with version ${row.version} at ${when}.`;
}
