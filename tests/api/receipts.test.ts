import { expect, test } from 'vitest';
import { GET as GET_CSV } from '@/app/api/v1/shows/[show]/export.csv/route';
import { listReceipts } from '@/lib/exports/list-receipts';
import { previewExport } from '@/lib/exports/preview-export';
import { exportRowsInput } from '@/lib/rules/inputs/export-rows';
import { listReceiptsInput } from '@/lib/rules/inputs/list-receipts';
import { call } from '../support/api';
import { createCast, type Cast } from '../support/cast';
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
