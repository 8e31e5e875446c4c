import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { VALUE_FORM } from '@/lib/rules/canonical-form';
import type { ListValueInputsInput } from '@/lib/rules/inputs/list-value-inputs';
import { findShot } from '@/lib/shots/find-shot';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { computeValue } from './compute-value';
import { loadValueInputs } from './load-value-inputs';

/** What a value follows from beside the cells of its row: with both, the hash can be made again (docs/conventions). */
export interface ValueInputsEntry {
  part_id: string;
  value_sha256: string;
  geometry: unknown[];
  metres_per_unit: number;
  density_set_kg_m3: number | null;
  material: unknown[] | null;
  areal_density_set_kg_m2: number | null;
  cavities: string;
}

export interface ValueInputsAnswer {
  form: string;
  items: ValueInputsEntry[];
}

/** The inputs behind an asset's current values, or behind what is locked for a shot. Values that are not there have none. */
export async function listValueInputs(context: Context, input: ListValueInputsInput): Promise<ValueInputsAnswer> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const found = input.shot === undefined ? await currentTexts(db, show.id, input.asset) : await lockedTexts(db, (await findShot(db, show.id, input.shot)).id, input.asset);
  const items = found.map(({ partId, valueSha256, canonical }): ValueInputsEntry => {
    const form = JSON.parse(canonical) as unknown[];
    return {
      part_id: partId,
      value_sha256: valueSha256,
      geometry: form[1] as unknown[],
      metres_per_unit: form[3] as number,
      density_set_kg_m3: form[8] as number | null,
      material: form[9] as unknown[] | null,
      areal_density_set_kg_m2: form[10] as number | null,
      cavities: form[12] as string,
    };
  });
  return { form: VALUE_FORM, items };
}

interface CanonicalText {
  partId: string;
  valueSha256: string;
  canonical: string;
}

async function currentTexts(db: Executor, showId: string, asset: string | undefined): Promise<CanonicalText[]> {
  const { rows } = await db.execute<{ id: string }>(sql`select id from assets where show_id = ${showId} ${asset === undefined ? sql`` : sql`and code = ${asset}`} order by code collate "C"`);
  const texts: CanonicalText[] = [];
  // An asset at a time, so that a large show's components never stand in memory together.
  for (const { id } of rows) {
    for (const part of await loadValueInputs(db, [id], null)) {
      const value = computeValue(part);
      if (value.canonical !== null && value.valueSha256 !== null) texts.push({ partId: part.partId, valueSha256: value.valueSha256, canonical: value.canonical });
    }
  }
  return texts;
}

async function lockedTexts(db: Executor, shotId: string, asset: string | undefined): Promise<CanonicalText[]> {
  const { rows } = await db.execute<{ part_id: string; value_sha256: string; canonical: string }>(sql`
    select distinct on (l.part_id, a.value_sha256) l.part_id, a.value_sha256, a.canonical from locks l join approvals a on a.id = l.approval_id
    where l.shot_id = ${shotId} and l.unlocked_at is null ${asset === undefined ? sql`` : sql`and a.asset = ${asset}`}`);
  return rows.map((row) => ({ partId: row.part_id, valueSha256: row.value_sha256, canonical: row.canonical }));
}
