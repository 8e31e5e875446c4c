import type { SetValuesItem } from '@/lib/rules/inputs/set-values';
import type { ItemError } from '@/lib/rules/studio-error';
import type { MaterialNow } from '@/lib/values/value-inputs';
import type { ItemPart } from './find-item-parts';

/** What is wrong with the items themselves, whoever changed the rows: at most one error an item. */
export function checkItems(items: readonly SetValuesItem[], found: readonly (ItemPart | null)[], materials: ReadonlyMap<string, MaterialNow>): ItemError[] {
  const errors: ItemError[] = [];
  const seen = new Map<string, number>();
  items.forEach((item, index) => {
    const add = (code: string, field: string, message: string): void => {
      errors.push({ index, asset: item.asset, part: item.part, code, field, message });
    };
    const row = found[index];
    const twin = row ? seen.get(row.partId) : undefined;
    if (item.body !== undefined) add('not_available', 'body', 'Values of rigid bodies cannot be set yet.');
    else if (item.shot !== undefined) add('not_available', 'shot', 'Shot overrides cannot be set yet.');
    else if (item.reason !== undefined) add('bad_input', 'reason', 'A reason belongs to a shot override; leave it out.');
    else if (!row) add('not_found', 'part', `${item.asset} has no part ${item.part ?? ''} in its current version.`);
    else if (twin !== undefined) add('bad_input', 'part', `${item.asset}/${item.part ?? ''} is named twice (items ${twin} and ${index}).`);
    else if (item.material && !materials.has(item.material.toLowerCase())) add('not_found', 'material', `There is no material ${item.material}.`);
    if (row) seen.set(row.partId, twin ?? index);
  });
  return errors;
}
