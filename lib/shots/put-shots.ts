import { sql } from 'drizzle-orm';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent, type ChangedField } from '@/lib/history/record-event';
import type { PutShotsInput } from '@/lib/rules/inputs/put-shots';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { lockShowValues } from '@/lib/values/lock-show-values';
import { assetsThere, checkShots, copiesOf, shotsThere, toWanted, type ShotThere } from './wanted-shots';

export interface PutShotsAnswer {
  items: { code: string; sequence: string; title: string | null; assets: { asset: string; copies: number }[] }[];
}

/**
 * Makes shots and puts assets into them, all items or none. A shot that is there keeps what it has and gets what it lacks, so the
 * same list may be sent again. Errors per item: bad_input (named twice, an asset that the show does not have), already_exists (the
 * shot is in another sequence).
 */
export async function putShots(context: Context, input: PutShotsInput): Promise<PutShotsAnswer> {
  const acting = requireActor(context);
  const { show } = await getShowAccess(acting.db, acting.actor, input.show, 'editShots');
  const wanted = input.items.map(toWanted);
  return acting.db.transaction(async (tx) => {
    await lockShowValues(tx, show.id);
    const there = await shotsThere(tx, show.id, wanted);
    const assetIds = await assetsThere(tx, show.id, wanted);
    const errors = checkShots(wanted, there, assetIds);
    if (errors.length > 0) throw new StudioError('bad_input', `${errors[0].message} Nothing was changed.`, { field: `items.${errors[0].index}`, errors });
    const fresh = wanted.filter((shot) => !there.has(shot.code.toLowerCase()));
    const { rows: made } = await tx.execute<{ id: string; code: string }>(sql`
      insert into shots (show_id, code, sequence, title, created_by)
      select ${show.id}::uuid, code, sequence, title, ${acting.actor.userId}::uuid
      from json_to_recordset(${JSON.stringify(fresh.map(({ code, sequence, title }) => ({ code, sequence, title })))}::json) as given(code text, sequence text, title text)
      returning id, code`);
    for (const row of made) there.set(row.code.toLowerCase(), { id: row.id, code: row.code, sequence: '' });
    const rows = wanted.flatMap((shot) => copiesOf(shot).map(([asset, copy]) => ({ shot_id: there.get(shot.code.toLowerCase())!.id, asset_id: assetIds.get(asset)!, copy })));
    const added = await tx.execute<{ shot_id: string; asset_id: string }>(sql`
      insert into shot_assets (shot_id, asset_id, copy)
      select shot_id, asset_id, copy from json_to_recordset(${JSON.stringify(rows)}::json) as given(shot_id uuid, asset_id uuid, copy text)
      on conflict do nothing returning shot_id, asset_id`);
    const history: ChangedField[] = [
      ...fresh.map((shot) => ({ shotId: there.get(shot.code.toLowerCase())!.id, field: 'shot', before: null, after: `${shot.sequence}/${shot.code}` })),
      ...inShots(added.rows, there, assetIds).map((one) => ({ field: 'in_shot', before: null, ...one })),
    ];
    if (history.length > 0) await recordEvent(tx, acting, { showId: show.id, act: 'put-shots', subject: wanted.length === 1 ? wanted[0].code : `${wanted.length} shots`, items: history });
    return { items: wanted.map((shot) => ({ code: shot.code, sequence: shot.sequence, title: shot.title, assets: [...shot.assets].map(([asset, copies]) => ({ asset, copies })) })) };
  });
}

function inShots(added: readonly { shot_id: string; asset_id: string }[], there: ReadonlyMap<string, ShotThere>, assetIds: ReadonlyMap<string, string>): { shotId: string; after: string }[] {
  const codeOf = new Map([...there.values()].map((shot) => [shot.id, shot.code]));
  const assetOf = new Map([...assetIds].map(([code, id]) => [id, code]));
  const unique = new Map(added.map((row) => [`${codeOf.get(row.shot_id)}: ${assetOf.get(row.asset_id)}`, row.shot_id]));
  return [...unique].map(([after, shotId]) => ({ shotId, after }));
}
