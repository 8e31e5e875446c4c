import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { partRenames } from '@/db/schema/part-renames';
import { requireActor } from '@/lib/auth/require-actor';
import type { ActorContext, Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { DecidePartRenamesInput } from '@/lib/rules/inputs/part-renames';
import { whyNotRenamed, type RenameFit } from '@/lib/rules/part-rename';
import { StudioError, type ItemError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { insertValueSetters } from '@/lib/values/insert-value-setters';
import { lockShowValues } from '@/lib/values/lock-show-values';
import { refreshAssetValues } from '@/lib/values/refresh-asset-values';
import { findRenames, type FoundRenames, type SeenPart } from './find-renames';
import { takeIdentity } from './take-identity';

type Item = DecidePartRenamesInput['items'][number];

/** An item with what it means. */
interface Decided {
  item: Item;
  asset: FoundRenames;
  from: SeenPart;
  to: SeenPart;
  fit: RenameFit;
}

/**
 * Confirms or refuses that a part which the current version lacks is one that came since, under another name: proposed by geometry, or
 * said by hand. Confirmed, the part keeps its identity (settings, approvals, locks) and goes by the new name; locked rows stay as they are.
 * Refused, the two stay two and are not proposed again. All or nothing.
 * Errors: conflict with the failing items under `errors`, where another version is current by now, somebody else decided meanwhile (a pair that was
 * kept apart is confirmed only by who says that they saw that), or the
 * new part has approvals, locks or overrides of its own; bad_input, forbidden, not_found.
 */
export async function decidePartRenames(context: Context, input: DecidePartRenamesInput): Promise<{ items: { asset: string; part: string; decision: Item['decision'] }[] }> {
  const acting = requireActor(context);
  const { show } = await getShowAccess(acting.db, acting.actor, input.show, 'renameParts');
  return acting.db.transaction(async (tx) => {
    const codes = [...new Set(input.items.map((item) => item.asset))];
    // In the order of locks: assets, then the show. An import that brings a version waits, or is seen here.
    const { rows: assets } = await tx.execute<{ id: string }>(sql`
      select id from assets where show_id = ${show.id} and code = any(${sql.param(codes)}::text[]) order by id for no key update`);
    await lockShowValues(tx, show.id);
    const found = new Map((await findRenames(tx, assets.map((asset) => asset.id))).map((one) => [one.asset, one]));
    const decided = input.items.map((item) => resolve(item, found.get(item.asset)));
    refuseDoubtful(decided);
    const good = decided.filter((one): one is Decided => !('code' in one));
    for (const one of good) await decide(tx, acting, show.id, one);
    for (const asset of new Set(good.filter((one) => one.item.decision === 'confirmed').map((one) => one.asset))) await refresh(tx, acting, asset, good);
    return { items: good.map(({ item, to, from }) => ({ asset: item.asset, part: item.decision === 'confirmed' ? to.part : from.part, decision: item.decision })) };
  });
}

/** What an item means now, or why it means nothing. */
function resolve(item: Item, asset: FoundRenames | undefined): Decided | Pick<ItemError, 'code' | 'message'> {
  if (!asset) return { code: 'conflict', message: `${item.asset} has no part to be taken for another one. Somebody may have decided, or a newer version came.` };
  if (asset.version !== item.version) return { code: 'conflict', message: `${asset.version} is the current version of ${item.asset} by now. Look again.` };
  const from = asset.parts.find((part) => part.absent && part.part === item.part);
  const to = asset.parts.find((part) => !part.absent && part.part === item.becomes);
  if (!from) return { code: 'conflict', message: `${item.asset}/${item.part} is not among the parts that ${asset.version} lacks. Somebody may have decided meanwhile.` };
  if (!to) return { code: 'conflict', message: `${item.asset}/${item.becomes} is not among the parts that came since. Somebody may have decided meanwhile.` };
  if (to.first <= from.last) return { code: 'bad_input', message: `${item.asset} had both ${item.part} and ${item.becomes} in one version.` };
  const isApart = asset.kept_apart.some((pair) => pair.part === item.part && pair.becomes === item.becomes);
  if (item.decision === 'confirmed' && isApart && item.kept_apart !== true) return { code: 'conflict', message: `Somebody kept ${item.asset}/${item.part} and ${item.becomes} apart. Look again.` };
  const why = item.decision === 'confirmed' ? whyNotRenamed(to) : null;
  if (why !== null) return { code: 'conflict', message: `${item.asset}/${item.becomes} has values of its own. ${why}` };
  const match = asset.matches.find((one) => one.from === from.part_id && one.to === to.part_id);
  return { item, asset, from, to, fit: match?.fit ?? 'hand' };
}

function refuseDoubtful(decided: readonly (Decided | Pick<ItemError, 'code' | 'message'>)[]): void {
  const used = new Set<string>();
  const errors = decided.flatMap((one, index): ItemError[] => {
    if ('code' in one) return [{ index, ...one }];
    const { item, from, to } = one;
    const named = item.decision === 'confirmed' ? [from.part_id, to.part_id] : [`${from.part_id} ${to.part_id}`];
    const twice = named.some((id) => used.has(id));
    for (const id of named) used.add(id);
    return twice ? [{ index, asset: item.asset, part: item.part, code: 'bad_input', message: `${item.asset}/${item.part} or ${item.becomes} is named twice.` }] : [];
  });
  if (errors.length === 0) return;
  const code = errors.some((error) => error.code === 'conflict') ? 'conflict' : 'bad_input';
  throw new StudioError(code, errors.length === 1 ? errors[0].message : `${errors.length} items cannot be decided. Nothing was changed.`, { errors });
}

async function decide(tx: Transaction, acting: ActorContext, showId: string, { item, asset, from, to, fit }: Decided): Promise<void> {
  const row = { assetId: asset.assetId, versionId: asset.versionId, partId: from.part_id, arrivedId: to.part_id, oldName: from.part, newName: to.part, decision: item.decision, fit, decidedBy: acting.actor.userId };
  const written = await tx.insert(partRenames).values(row).onConflictDoNothing().returning({ id: partRenames.id });
  if (written.length === 0) throw new StudioError('conflict', `${item.asset}/${item.part} and ${item.becomes} were kept apart before.`);
  const isRename = item.decision === 'confirmed';
  if (isRename) await takeIdentity(tx, { id: from.part_id, name: from.part }, { id: to.part_id, name: to.part });
  await recordEvent(tx, acting, {
    showId,
    act: isRename ? 'rename-part' : 'refuse-rename',
    subject: `${item.asset}/${isRename ? to.part : from.part}`,
    items: [{ partId: from.part_id, field: isRename ? 'name' : 'kept_apart_from', before: isRename ? from.part : null, after: to.part }],
  });
}

/** Brings the rows of an asset up to its renamed parts: whoever brought the version and whoever renamed changed what is approved. */
async function refresh(tx: Transaction, acting: ActorContext, asset: FoundRenames, decided: readonly Decided[]): Promise<void> {
  const { rows } = await tx.execute<{ created_by: string }>(sql`select created_by from asset_versions where id = ${asset.versionId}`);
  await refreshAssetValues(tx, { assetId: asset.assetId, importedBy: rows[0].created_by });
  const renamed = decided.filter((one) => one.asset === asset && one.item.decision === 'confirmed').map((one) => one.from.part_id);
  await insertValueSetters(tx, renamed, { userId: acting.actor.userId, act: 'rename' });
}
