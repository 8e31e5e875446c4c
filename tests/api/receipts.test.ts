import { createHash } from 'node:crypto';
import { describe, expect, test } from 'vitest';
import { GET as GET_PART } from '@/app/api/v1/shows/[show]/assets/[asset]/parts/[part]/route';
import { GET as GET_ASSET } from '@/app/api/v1/shows/[show]/assets/[asset]/route';
import { GET as GET_CSV } from '@/app/api/v1/shows/[show]/export.csv/route';
import { GET as GET_JSON } from '@/app/api/v1/shows/[show]/export.json/route';
import { GET as GET_PARTS } from '@/app/api/v1/shows/[show]/parts/route';
import { listReceipts } from '@/lib/exports/list-receipts';
import { previewExport } from '@/lib/exports/preview-export';
import { exportRowsInput } from '@/lib/rules/inputs/export-rows';
import { listReceiptsInput } from '@/lib/rules/inputs/list-receipts';
import { setValues } from '@/lib/settings/set-values';
import { call } from '../support/api';
import { createCast, type Cast } from '../support/cast';
import { asOwner } from '../support/database';
import { boxPart, putCage } from '../support/put-cage';

async function createShow(): Promise<Cast> {
  const cast = await createCast({ linearUnit: 'm', scheme: 'polyhedral' });
  for (const asset of ['anvil', 'bench']) await putCage(cast.show, cast.people.td, asset, [boxPart('top', [0, 0, 0], [1, 2, 3]), boxPart('foot', [5, 0, 0], [6, 1, 1])]);
  return cast;
}

const take = (cast: Cast, query: Record<string, string> = {}) => call(GET_CSV, { params: { show: cast.show.code }, query, token: cast.people.artist.token });

test('receipts are listed newest first, page by page, with who took what by which token', async () => {
  const cast = await createShow();
  const taken: string[] = [];
  const queries: Record<string, string>[] = [{}, { asset: 'anvil' }, { asset: 'bench' }];
  for (const query of queries) taken.push((await take(cast, query)).headers.get('etag')!.replaceAll('"', ''));
  const page = (cursor?: string) => listReceipts(cast.contextOf('td'), listReceiptsInput.parse({ show: cast.show.code, limit: 2, cursor }));
  const first = await page();
  const second = await page(first.next_cursor!);
  const all = [...first.items, ...second.items];
  expect(all.map((one) => one.sha256)).toEqual(taken.toReversed());
  expect(all.map((one) => [one.selection, one.rows])).toEqual([['asset=bench', 2], ['asset=anvil', 2], ['', 4]]);
  expect(new Set(all.map((one) => `${one.taken_by} ${one.token}`))).toEqual(new Set([`${cast.people.artist.name} test`]));
  expect(second.next_cursor).toBeNull();
});

test.each(['guest', 'outsider'] as const)('a %s sees neither receipts nor a preview', async (who) => {
  const cast = await createShow();
  const context = cast.contextOf(who);
  await expect(listReceipts(context, listReceiptsInput.parse({ show: cast.show.code }))).rejects.toMatchObject({ code: 'not_found' });
  await expect(previewExport(context, exportRowsInput.parse({ show: cast.show.code }))).rejects.toMatchObject({ code: 'not_found' });
});

test('the preview is the beginning of the file', async () => {
  const cast = await createShow();
  const preview = await previewExport(cast.contextOf('artist'), exportRowsInput.parse({ show: cast.show.code }));
  const lines = (await take(cast)).text.trimEnd().split('\r\n');
  expect([preview.columns, ...preview.rows].map((cells) => cells.join(','))).toEqual(lines);
  expect(preview).toMatchObject({ total: 4, without_mass: 4 });
});

interface Handed extends Record<string, unknown> {
  format: string;
  selection: string;
  sha256: string;
  rows: number;
  handed: { part: string; value: string | null }[];
}

/** The show's receipts with the rows that they name, oldest first. */
const receiptsOf = (cast: Cast) =>
  asOwner<Handed>(
    `select r.format, r.selection, r.sha256, r.rows, (select json_agg(json_build_object('part', h.part_id, 'value', h.value_sha256) order by h.id) from receipt_rows h where h.receipt_id = r.id) as handed
     from receipts r where r.show_id = $1 order by r.created_at`,
    [cast.show.id],
  );

const weigh = (cast: Cast, density: number, revision: number) => setValues(cast.contextOf('td'), { show: cast.show.code, items: [{ asset: 'anvil', part: 'top', revision, density_kg_m3: density }] });

describe('a receipt names its rows', () => {
  test('of an export: the very values in the bytes that were sent, whichever format', async () => {
    const cast = await createShow();
    await weigh(cast, 7, 1);
    const answer = await call(GET_JSON, { params: { show: cast.show.code }, token: cast.people.artist.token });
    const items = (answer.json as { items: { part_id: string; value_sha256: string | null }[] }).items;
    expect(items.map((item) => item.value_sha256 === null)).toEqual([true, false, true, true]);
    const csv = await take(cast);
    const lines = csv.text.trimEnd().split('\r\n').slice(1).map((line) => line.split(','));
    const [ofJson, ofCsv] = await receiptsOf(cast);
    expect(ofJson.handed).toEqual(items.map((item) => ({ part: item.part_id, value: item.value_sha256 })));
    expect(ofCsv.handed).toEqual(lines.map((cells) => ({ part: cells.at(-3), value: cells.at(-1) || null })));
    expect([ofJson.format, ofCsv.format]).toEqual(['json', 'csv']);
  });

  test('also of a file that was made before and is handed out again', async () => {
    const cast = await createShow();
    await weigh(cast, 7, 1);
    await take(cast);
    const other = await call(GET_CSV, { params: { show: cast.show.code }, token: cast.people.td.token });
    expect(other.status).toBe(200);
    const [first, second] = await receiptsOf(cast);
    expect(second.handed).toEqual(first.handed);
    expect(first.handed).toHaveLength(4);
  });

  test('of more rows than a page holds, in their order', async () => {
    const cast = await createCast({ linearUnit: 'm', scheme: 'polyhedral' });
    await putCage(cast.show, cast.people.td, 'wall', Array.from({ length: 1203 }, (_, i) => boxPart(`brick_${String(i).padStart(4, '0')}`, [2 * i, 0, 0], [2 * i + 1, 1, 1])));
    const { text } = await take(cast);
    const ids = text.trimEnd().split('\r\n').slice(1).map((line) => line.split(',').at(-3));
    const [receipt] = await receiptsOf(cast);
    expect(ids).toHaveLength(1203);
    expect(receipt.handed.map((row) => row.part)).toEqual(ids);
  });
});

describe('a token that reads values', () => {
  const read = (cast: Cast, query: Record<string, string> = {}) => call(GET_PARTS, { params: { show: cast.show.code }, query, token: cast.people.artist.token });

  test('leaves one receipt a selection, hash and day, with the rows', async () => {
    const cast = await createShow();
    await weigh(cast, 7, 1);
    const answer = await read(cast, { asset: 'anvil' });
    const { items } = answer.json as { items: { part_id: string; value_sha256: string | null }[] };
    await read(cast, { asset: 'anvil' });
    const receipts = await receiptsOf(cast);
    expect(receipts).toEqual([{ format: 'parts', selection: 'asset=anvil', rows: 2, sha256: createHash('sha256').update(JSON.stringify(items), 'utf8').digest('hex'), handed: items.map((item) => ({ part: item.part_id, value: item.value_sha256 })) }]);
    await read(cast, { asset: 'bench' });
    expect(await receiptsOf(cast)).toHaveLength(2);
    await weigh(cast, 8, 2);
    await read(cast, { asset: 'anvil' });
    const after = await receiptsOf(cast);
    expect(after.map((one) => one.selection)).toEqual(['asset=anvil', 'asset=bench', 'asset=anvil']);
    expect(after[2].sha256).not.toBe(after[0].sha256);
  });

  test('of one asset or one part leaves one too; an empty answer and a refused call leave none', async () => {
    const cast = await createShow();
    await call(GET_ASSET, { params: { show: cast.show.code, asset: 'anvil' }, token: cast.people.artist.token });
    await call(GET_PART, { params: { show: cast.show.code, asset: 'anvil', part: 'top' }, token: cast.people.artist.token });
    expect((await receiptsOf(cast)).map((one) => [one.selection, one.rows])).toEqual([['asset=anvil', 2], ['asset=anvil&part=top', 1]]);
    expect((await read(cast, { q: 'nothing of that name' })).json).toMatchObject({ items: [] });
    expect((await call(GET_PARTS, { params: { show: cast.show.code }, token: cast.people.outsider.token })).status).toBe(404);
    expect(await receiptsOf(cast)).toHaveLength(2);
  });
});
