import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent, type ChangedField } from '@/lib/history/record-event';
import type { PutShotsInput } from '@/lib/rules/inputs/put-shots';
import { StudioError, type ItemError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { lockShowValues } from '@/lib/values/lock-show-values';

export interface PutShotsAnswer {
  items: { code: string; sequence: string; title: string | null; assets: { asset: string; copies: number }[] }[];
}

interface WantedShot {
  code: string;
  sequence: string;
  title: string | null;
  /** Number of copies by asset. */
  assets: Map<string, number>;
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
      ...fresh.map((shot) => ({ field: 'shot', before: null, after: `${shot.sequence}/${shot.code}` })),
      ...inShots(added.rows, there, assetIds).map((after) => ({ field: 'in_shot', before: null, after })),
    ];
    if (history.length > 0) await recordEvent(tx, acting, { showId: show.id, act: 'put-shots', subject: wanted.length === 1 ? wanted[0].code : `${wanted.length} shots`, items: history });
    return { items: wanted.map((shot) => ({ code: shot.code, sequence: shot.sequence, title: shot.title, assets: [...shot.assets].map(([asset, copies]) => ({ asset, copies })) })) };
  });
}

function toWanted({ code, sequence, title, assets }: PutShotsInput['items'][number]): WantedShot {
  const copies = new Map<string, number>();
  for (const one of assets) {
    const [asset, count] = typeof one === 'string' ? [one, 1] : [one.asset, one.copies];
    copies.set(asset, (copies.get(asset) ?? 0) + count);
  }
  return { code, sequence, title: title || null, assets: copies };
}

/** Asset and copy of each thing in a shot: the first copy has no name, the others count from 2. */
function copiesOf(shot: WantedShot): [asset: string, copy: string][] {
  return [...shot.assets].flatMap(([asset, copies]) => Array.from({ length: copies }, (_, i): [string, string] => [asset, i === 0 ? '' : String(i + 1)]));
}

interface ShotThere extends Record<string, unknown> {
  id: string;
  code: string;
  sequence: string;
}

async function shotsThere(tx: Transaction, showId: string, wanted: readonly WantedShot[]): Promise<Map<string, ShotThere>> {
  const codes = wanted.map((shot) => shot.code.toLowerCase());
  const { rows } = await tx.execute<ShotThere>(sql`select id, code, sequence from shots where show_id = ${showId} and lower(code) = any(${sql.param(codes)}::text[])`);
  return new Map(rows.map((row) => [row.code.toLowerCase(), row]));
}

async function assetsThere(tx: Transaction, showId: string, wanted: readonly WantedShot[]): Promise<Map<string, string>> {
  const codes = [...new Set(wanted.flatMap((shot) => [...shot.assets.keys()]))];
  const { rows } = await tx.execute<{ id: string; code: string }>(sql`select id, code from assets where show_id = ${showId} and code = any(${sql.param(codes)}::text[])`);
  return new Map(rows.map((row) => [row.code, row.id]));
}

function checkShots(wanted: readonly WantedShot[], there: ReadonlyMap<string, ShotThere>, assetIds: ReadonlyMap<string, string>): ItemError[] {
  const errors: ItemError[] = [];
  const seen = new Set<string>();
  wanted.forEach((shot, index) => {
    const known = there.get(shot.code.toLowerCase());
    const strange = [...shot.assets.keys()].filter((asset) => !assetIds.has(asset));
    if (seen.has(shot.code.toLowerCase())) errors.push({ index, code: 'bad_input', field: 'code', message: `${shot.code} is named twice.` });
    else if (known && known.sequence !== shot.sequence) errors.push({ index, code: 'already_exists', field: 'sequence', message: `${known.code} is in sequence ${known.sequence}, not ${shot.sequence}.` });
    else if (strange.length > 0) errors.push({ index, code: 'not_found', field: 'assets', asset: strange[0], message: `${shot.code}: the show has no asset ${strange.join(', ')}.` });
    seen.add(shot.code.toLowerCase());
  });
  return errors;
}

function inShots(added: readonly { shot_id: string; asset_id: string }[], there: ReadonlyMap<string, ShotThere>, assetIds: ReadonlyMap<string, string>): string[] {
  const codeOf = new Map([...there.values()].map((shot) => [shot.id, shot.code]));
  const assetOf = new Map([...assetIds].map(([code, id]) => [id, code]));
  return [...new Set(added.map((row) => `${codeOf.get(row.shot_id)}: ${assetOf.get(row.asset_id)}`))];
}
