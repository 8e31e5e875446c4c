import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { computeValue } from '@/lib/values/compute-value';
import { loadValueInputs } from '@/lib/values/load-value-inputs';
import { valueColumnList } from '@/lib/values/value-column-list';
import type { Candidate } from './find-candidates';

/** What an approval says beside its value. */
interface ApprovalWords {
  approvedBy: string;
  note: string | null;
  /** The candidates are carried over from their last approval. */
  carriedOver: boolean;
}

/**
 * Appends an approval for each candidate: the numbers of its row, copied in the database, with the canonical text behind its hash.
 * Answers the new ids by part and shot (see approvalKey). The caller holds the show's values.
 */
export async function insertApprovals(tx: Transaction, candidates: readonly Candidate[], words: ApprovalWords): Promise<Map<string, string>> {
  const own = candidates.filter((one) => one.shotId === null);
  const ofShots = candidates.filter((one) => one.shotId !== null);
  const ids = new Map<string, string>();
  if (own.length > 0) {
    const canonical = await canonicalTexts(tx, own);
    const given = own.map((one) => ({ part_id: one.partId, canonical: canonical.get(one.partId), carried_from: words.carriedOver ? one.lastApprovalId : null }));
    await insert(tx, ids, words, sql`
      select c.show_id, c.asset_id, c.part_id, null::uuid, c.version_id, c.geometry_part_id, c.faces, c.max_valence, given.canonical, given.carried_from, ${valueColumnList('c')}
      from json_to_recordset(${JSON.stringify(given)}::json) as given(part_id uuid, canonical text, carried_from uuid)
      join part_current c on c.part_id = given.part_id`);
  }
  if (ofShots.length > 0) {
    const given = ofShots.map((one) => ({ part_id: one.partId, shot_id: one.shotId }));
    await insert(tx, ids, words, sql`
      select s.show_id, p.asset_id, o.part_id, o.shot_id, o.version_id, o.geometry_part_id, o.faces, o.max_valence, o.canonical, null::uuid, ${valueColumnList('o')}
      from json_to_recordset(${JSON.stringify(given)}::json) as given(part_id uuid, shot_id uuid)
      join shot_overrides o on o.part_id = given.part_id and o.shot_id = given.shot_id and o.dropped_at is null
      join shots s on s.id = o.shot_id
      join parts p on p.id = o.part_id`);
  }
  if (ids.size !== candidates.length) throw new Error(`${ids.size} of ${candidates.length} approvals were written.`);
  return ids;
}

export function approvalKey(partId: string, shotId: string | null): string {
  return `${partId} ${shotId ?? ''}`;
}

async function insert(tx: Transaction, ids: Map<string, string>, words: ApprovalWords, values: ReturnType<typeof sql>): Promise<void> {
  const { rows } = await tx.execute<{ id: string; part_id: string; shot_id: string | null }>(sql`
    insert into approvals (show_id, asset_id, part_id, shot_id, version_id, geometry_part_id, faces, max_valence, canonical, carried_from, ${valueColumnList()}, setter_mark, note, approved_by)
    select given.*, coalesce((select max(v.id) from value_setters v where v.part_id = given.part_id), 0), ${words.note}, ${words.approvedBy}::uuid
    from (${values}) as given(show_id, asset_id, part_id, shot_id)
    returning id, part_id, shot_id`);
  for (const row of rows) ids.set(approvalKey(row.part_id, row.shot_id), row.id);
}

/** The text behind each part's hash, made anew from its inputs: it must give the hash that the row has. */
async function canonicalTexts(tx: Transaction, candidates: readonly Candidate[]): Promise<Map<string, string>> {
  const assetIds = [...new Set(candidates.map((one) => one.assetId))];
  const loaded = new Map((await loadValueInputs(tx, assetIds, candidates.map((one) => one.partId))).map((part) => [part.partId, part]));
  return new Map(
    candidates.map((one) => {
      const inputs = loaded.get(one.partId);
      const value = inputs ? computeValue(inputs) : null;
      if (!value?.canonical || value.valueSha256 !== one.valueSha256) throw new Error(`The row of part ${one.partId} is not what its inputs give.`);
      return [one.partId, value.canonical];
    }),
  );
}
