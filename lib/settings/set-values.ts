import { eq } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { shows } from '@/db/schema/shows';
import { requireActor } from '@/lib/auth/require-actor';
import type { ActorContext, Context } from '@/lib/context';
import { recordEvent, type ChangedField } from '@/lib/history/record-event';
import { findMaterials } from '@/lib/materials/find-materials';
import { assetTotals } from '@/lib/parts/asset-totals';
import { draftOverrides } from '@/lib/overrides/draft-overrides';
import { partCounts } from '@/lib/parts/part-counts';
import { partRowsById } from '@/lib/parts/part-rows-by-id';
import type { SetValuesInput, SetValuesItem } from '@/lib/rules/inputs/set-values';
import type { AssetTotal, PartCounts, PartRow } from '@/lib/rules/part-row';
import { StudioError } from '@/lib/rules/studio-error';
import { findShotIds } from '@/lib/shots/find-shot';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { insertValueSetters } from '@/lib/values/insert-value-setters';
import { loadValueInputs, type LoadedPart } from '@/lib/values/load-value-inputs';
import { lockShowValues } from '@/lib/values/lock-show-values';
import type { MaterialNow } from '@/lib/values/value-inputs';
import { updatePartRows } from '@/lib/values/write-part-rows';
import { checkItems } from './check-items';
import { findItemParts, type ItemPart } from './find-item-parts';
import { insertSettings } from './insert-settings';
import { mergeSetting, settingChanges } from './merge-setting';
import { changedMeanwhile } from './changed-meanwhile';

/** Totals of more assets than these are left to the next reading of the list. */
const MOST_TOTALS = 40;

/** The rows as they are after the call; where few assets are concerned, their totals and the show's counts too. */
export interface SetValuesAnswer {
  items: PartRow[];
  assets?: AssetTotal[];
  counts?: PartCounts;
}

/**
 * Sets what parts' masses come from, in bulk: all items or none. Each item carries the revision of the row as it was read;
 * a row that changed since is a conflict, listed with the row as it is now. An item that changes nothing writes nothing.
 * Answers the rows as they are after the call, in the order of the items.
 * An item with a shot drafts the part's override in that shot (artists may do that too); the row then stays as it is.
 * Errors: bad_input (unknown part or material, named per item), conflict (`changed_meanwhile` per item), not_found, forbidden, frozen.
 */
export async function setValues(context: Context, input: SetValuesInput): Promise<SetValuesAnswer> {
  const acting = requireActor(context);
  const onlyOverrides = input.items.every((item) => item.shot !== undefined);
  const { show } = await getShowAccess(acting.db, acting.actor, input.show, onlyOverrides ? 'draftOverride' : 'setValues');
  return acting.db.transaction(async (tx) => {
    const { revision, now } = await lockShowValues(tx, show.id);
    const found = await findItemParts(tx, show.id, input.items);
    const materials = await findMaterials(tx, show.id, input.items.flatMap((item) => (item.material ? [item.material] : [])));
    const shots = await findShotIds(tx, show.id, input.items.flatMap((item) => item.shot ?? []));
    const errors = checkItems(input.items, found, materials, shots);
    const stale = await changedMeanwhile(tx, show.code, input.items, found);
    if (errors.length > 0) {
      const [first] = errors;
      const more = errors.length > 1 ? ` ${errors.length} items cannot be set; nothing was changed.` : ' Nothing was changed.';
      throw new StudioError('bad_input', first.message + more, { field: `items.${first.index}${first.field ? `.${first.field}` : ''}`, errors: [...errors, ...stale] });
    }
    if (stale.length > 0) throw new StudioError('conflict', `${stale.length === 1 ? stale[0].message : `${stale.length} rows changed meanwhile.`} Nothing was overwritten.`, { errors: stale });
    const parts = found.filter((part): part is ItemPart => part !== null);
    const own = input.items.flatMap((item, i) => (item.shot === undefined ? [{ item, part: parts[i] }] : []));
    const ofShots = input.items.flatMap((item, i) => (item.shot === undefined ? [] : [{ item, part: parts[i], shotId: shots.get(item.shot.toLowerCase())! }]));
    const changed =
      (own.length === 0 ? 0 : await applyItems(tx, acting, { showId: show.id, revision: revision + 1, now, items: own.map(({ item }) => item), parts: own.map(({ part }) => part), materials })) +
      (ofShots.length === 0 ? 0 : await draftOverrides(tx, acting, show.id, ofShots, materials));
    if (changed > 0) await tx.update(shows).set({ revision: revision + 1 }).where(eq(shows.id, show.id));
    const items = await partRowsById(tx, show.code, parts.map((part) => part.partId));
    const assetIds = [...new Set(parts.map((part) => part.assetId))];
    if (assetIds.length > MOST_TOTALS) return { items };
    return { items, assets: await assetTotals(tx, assetIds), counts: await partCounts(tx, show.id) };
  });
}

interface Application {
  showId: string;
  revision: number;
  now: string;
  items: readonly SetValuesItem[];
  parts: readonly ItemPart[];
  materials: ReadonlyMap<string, MaterialNow>;
}

async function applyItems(tx: Transaction, acting: ActorContext, { showId, revision, now, items, parts, materials }: Application): Promise<number> {
  const loaded = new Map<string, LoadedPart>();
  const assetIds = [...new Set(parts.map((part) => part.assetId))];
  const becomingHollow = parts.filter((_, index) => items[index].construction === 'hollow').map((one) => one.partId);
  for (const part of await loadValueInputs(tx, assetIds, parts.map((one) => one.partId), null, becomingHollow)) loaded.set(part.partId, part);
  const changed: LoadedPart[] = [];
  const history: ChangedField[] = [];
  items.forEach((item, index) => {
    const part = loaded.get(parts[index].partId);
    if (!part) throw new Error(`Part ${parts[index].partId} has a row but is not in its asset's current version.`);
    const material = item.material ? materials.get(item.material.toLowerCase()) : item.material;
    const setting = mergeSetting(part.setting, item, material as MaterialNow | null | undefined);
    const changes = settingChanges(part.setting, setting);
    if (changes.length === 0) return;
    changed.push({ ...part, setting, setBy: acting.actor.name, setFrom: acting.origin, setAt: now });
    for (const change of changes) history.push({ partId: part.partId, ...change });
  });
  if (changed.length === 0) return 0;
  const ids = await insertSettings(tx, changed, { setBy: acting.actor.userId, setFrom: acting.origin });
  const written = await updatePartRows(tx, changed.map((part) => ({ ...part, settingId: ids.get(part.partId) ?? null })), revision);
  if (written.size !== changed.length) throw new StudioError('conflict', 'Rows changed while they were being set. Nothing was overwritten; try again.');
  await insertValueSetters(tx, [...written], { userId: acting.actor.userId, act: 'setting' });
  const [first] = changed;
  const subject = changed.length === 1 ? `${first.asset}/${first.part}` : `${changed.length} parts`;
  await recordEvent(tx, acting, { showId, act: 'set-values', subject, items: history });
  return changed.length;
}
