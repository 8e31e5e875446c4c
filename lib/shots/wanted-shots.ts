import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import type { PutShotsInput } from '@/lib/rules/inputs/put-shots';
import type { ItemError } from '@/lib/rules/studio-error';

/** A shot as it is asked for. */
export interface WantedShot {
  code: string;
  sequence: string;
  title: string | null;
  /** Number of copies by asset. */
  assets: Map<string, number>;
}

export function toWanted({ code, sequence, title, assets }: PutShotsInput['items'][number]): WantedShot {
  const copies = new Map<string, number>();
  for (const one of assets) {
    const [asset, count] = typeof one === 'string' ? [one, 1] : [one.asset, one.copies];
    copies.set(asset, (copies.get(asset) ?? 0) + count);
  }
  return { code, sequence, title: title || null, assets: copies };
}

/** Asset and copy of each thing in a shot: the first copy has no name, the others count from 2. */
export function copiesOf(shot: WantedShot): [asset: string, copy: string][] {
  return [...shot.assets].flatMap(([asset, copies]) => Array.from({ length: copies }, (_, i): [string, string] => [asset, i === 0 ? '' : String(i + 1)]));
}

/** A shot that the show has. */
export interface ShotThere extends Record<string, unknown> {
  id: string;
  code: string;
  sequence: string;
}

/** The wanted shots that the show has, by lower-case code. */
export async function shotsThere(db: Executor, showId: string, wanted: readonly WantedShot[]): Promise<Map<string, ShotThere>> {
  const codes = wanted.map((shot) => shot.code.toLowerCase());
  const { rows } = await db.execute<ShotThere>(sql`select id, code, sequence from shots where show_id = ${showId} and lower(code) = any(${sql.param(codes)}::text[])`);
  return new Map(rows.map((row) => [row.code.toLowerCase(), row]));
}

/** Ids of the wanted assets that the show has, by code. */
export async function assetsThere(db: Executor, showId: string, wanted: readonly WantedShot[]): Promise<Map<string, string>> {
  const codes = [...new Set(wanted.flatMap((shot) => [...shot.assets.keys()]))];
  const { rows } = await db.execute<{ id: string; code: string }>(sql`select id, code from assets where show_id = ${showId} and code = any(${sql.param(codes)}::text[])`);
  return new Map(rows.map((row) => [row.code, row.id]));
}

/** Why shots cannot be made as they are asked for: at most one error an item. */
export function checkShots(wanted: readonly WantedShot[], there: ReadonlyMap<string, ShotThere>, assetIds: ReadonlyMap<string, string>): ItemError[] {
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
