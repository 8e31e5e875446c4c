import type { SetValuesItem } from '@/lib/rules/inputs/set-values';
import type { ItemError } from '@/lib/rules/studio-error';
import type { MaterialNow } from '@/lib/values/value-inputs';
import type { ItemPart } from './find-item-parts';

/** What is wrong with the items themselves, whoever changed the rows: at most one error an item. `shots` are ids by lower-case code. */
export function checkItems(items: readonly SetValuesItem[], found: readonly (ItemPart | null)[], materials: ReadonlyMap<string, MaterialNow>, shots: ReadonlyMap<string, string>): ItemError[] {
  const errors: ItemError[] = [];
  const seen = new Map<string, number>();
  items.forEach((item, index) => {
    const add = (code: string, field: string, message: string): void => {
      errors.push({ index, asset: item.asset, part: item.part, code, field, message });
    };
    const row = found[index];
    const key = `${row?.partId} ${item.shot?.toLowerCase() ?? ''}`;
    const twin = row ? seen.get(key) : undefined;
    if (item.body !== undefined) add('not_available', 'body', 'Values of rigid bodies cannot be set yet.');
    else if (item.shot !== undefined && !shots.has(item.shot.toLowerCase())) add('not_found', 'shot', `There is no shot ${item.shot}.`);
    else if (item.shot !== undefined && !item.reason) add('bad_input', 'reason', 'An override says why.');
    else if (item.shot !== undefined && item.left_out !== undefined) add('bad_input', 'left_out', 'A part is left out of the show, not of one shot.');
    else if (item.shot === undefined && item.reason !== undefined) add('bad_input', 'reason', 'A reason belongs to a shot override; leave it out.');
    else if (!row) add('not_found', 'part', `${item.asset} has no part ${item.part ?? ''} in its current version.`);
    else if (twin !== undefined) add('bad_input', 'part', `${item.asset}/${item.part ?? ''} is named twice (items ${twin} and ${index}).`);
    else if (item.material && !materials.has(item.material.toLowerCase())) add('not_found', 'material', `There is no material ${item.material}.`);
    if (row) seen.set(key, twin ?? index);
  });
  return errors;
}
