import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import type { ActorContext } from '@/lib/context';
import { recordEvent, type ChangedField } from '@/lib/history/record-event';
import type { SetValuesItem } from '@/lib/rules/inputs/set-values';
import type { ItemPart } from '@/lib/settings/find-item-parts';
import { insertSettings } from '@/lib/settings/insert-settings';
import { mergeSetting, settingChanges } from '@/lib/settings/merge-setting';
import { computeValue } from '@/lib/values/compute-value';
import { insertValueSetters } from '@/lib/values/insert-value-setters';
import { loadValueInputs, type LoadedPart } from '@/lib/values/load-value-inputs';
import { VALUE_COLUMN_NAMES } from '@/lib/values/value-column-list';
import type { MaterialNow } from '@/lib/values/value-inputs';
import { PART_ROW_TYPES, partRowOf } from '@/lib/values/write-part-rows';
import { dropStanding } from './drop-overrides';
import { loadOverrideSettings } from './load-override-settings';

interface Draft {
  item: SetValuesItem;
  part: ItemPart;
  shotId: string;
}

const NAMES = ['version_id', 'geometry_part_id', ...VALUE_COLUMN_NAMES.filter((name) => name in PART_ROW_TYPES), 'state', 'value_findings', 'faces', 'max_valence'];
const columns = sql.raw(NAMES.join(', '));
const types = sql.raw(NAMES.map((name) => `${name} ${PART_ROW_TYPES[name as keyof typeof PART_ROW_TYPES]}`).join(', '));

/**
 * Drafts a part's own value in a shot: the item's fields over the override that stands there, or else over the part's own setting, with
 * the geometry as it is now. What stood before ends. The part's own row and all other shots stay as they are. Answers how many.
 * The caller holds the show's values and has checked the items.
 */
export async function draftOverrides(tx: Transaction, acting: ActorContext, showId: string, drafts: readonly Draft[], materials: ReadonlyMap<string, MaterialNow>): Promise<number> {
  const loaded = new Map<string, LoadedPart>();
  const assetIds = [...new Set(drafts.map(({ part }) => part.assetId))];
  for (const part of await loadValueInputs(tx, assetIds, drafts.map(({ part }) => part.partId), null, drafts.map(({ part }) => part.partId))) loaded.set(part.partId, part);
  const standing = await loadOverrideSettings(tx, drafts.map(({ part, shotId }) => ({ partId: part.partId, shotId })));
  const history: ChangedField[] = [];
  const made = drafts.map(({ item, part, shotId }) => {
    const own = loaded.get(part.partId);
    if (!own) throw new Error(`Part ${part.partId} has a row but is not in its asset's current version.`);
    const before = standing.get(`${part.partId} ${shotId}`) ?? { ...own.setting, leftOut: false };
    const material = item.material ? materials.get(item.material.toLowerCase()) : item.material;
    const setting = mergeSetting(before, item, material as MaterialNow | null | undefined);
    for (const change of settingChanges(before, setting)) history.push({ partId: part.partId, shotId, ...change, field: `${item.shot}: ${change.field}` });
    const inputs: LoadedPart = { ...own, setting, approvals: [] };
    return { inputs, value: computeValue(inputs), shotId, reason: item.reason ?? '' };
  });
  await dropStanding(tx, made.map(({ inputs, shotId }) => ({ partId: inputs.partId, shotId })), acting.actor.userId);
  for (const one of made) {
    const ids = await insertSettings(tx, [{ ...one.inputs, shotId: one.shotId, reason: one.reason }], { setBy: acting.actor.userId, setFrom: acting.origin });
    const row = { ...partRowOf(one.inputs, one.value), canonical: one.value.canonical, reason: one.reason, setting_id: ids.get(one.inputs.partId) };
    await tx.execute(sql`
      insert into shot_overrides (shot_id, part_id, setting_id, canonical, reason, drafted_by, ${columns})
      select ${one.shotId}::uuid, ${one.inputs.partId}::uuid, setting_id, canonical, reason, ${acting.actor.userId}::uuid, ${columns}
      from json_to_record(${JSON.stringify(row)}::json) as given(setting_id bigint, canonical text, reason text, ${types})`);
    await insertValueSetters(tx, [one.inputs.partId], { userId: acting.actor.userId, act: 'setting', shotId: one.shotId });
  }
  const [first] = drafts;
  const subject = drafts.length === 1 ? `${first.item.asset}/${first.item.part ?? ''} in ${first.item.shot}` : `${drafts.length} overrides`;
  await recordEvent(tx, acting, { showId, act: 'draft-override', subject, reason: first.item.reason ?? null, items: history });
  return drafts.length;
}
