import Papa from 'papaparse';
import { describe, expect, test } from 'vitest';
import { GET as FILES } from '@/app/api/v1/shows/[show]/imports/[import]/files/route';
import { GET as CSV } from '@/app/api/v1/shows/[show]/imports/[import]/report.csv/route';
import { GET as JSON_REPORT } from '@/app/api/v1/shows/[show]/imports/[import]/report.json/route';
import type { ImportFilePage } from '@/lib/rules/import-answer';
import { MENDS } from '@/lib/rules/import-mends';
import { REPORT_COLUMNS, type ReportRow } from '@/lib/rules/import-report';
import { call, eachCaller, expectProblem, type StatusOfCaller } from '../support/api';
import { brokenObj, cubeObj, cubesObj } from '../support/cages';
import { createCast, type Cast } from '../support/cast';
import { asOwner } from '../support/database';
import { importFiles } from '../support/imports';

const READERS: StatusOfCaller = { admin: 200, lead: 200, td: 200, artist: 200, guest: 404, outsider: 404, nobody: 401 };
const bring = (cast: Cast, files: Record<string, string>) => importFiles(cast.contextOf('td'), cast.show.code, files, { scheme: 'polyhedral' });

/** A cube without its last face: an open border of four edges. */
const openCube = (size: number) => cubeObj({ size }).trimEnd().split('\n').slice(0, -1).join('\n') + '\n';

const FAULTY = { '=cmd_v001.obj': openCube(2), 'ox_v001.obj': cubesObj(['body', 'horn']), 'bad/@broken_v002.obj': brokenObj };

const records = (text: string) => Papa.parse<Record<string, string>>(text, { header: true, skipEmptyLines: true }).data;

describe('who may read', () => {
  for (const [name, handler] of [['the CSV report', CSV], ['the JSON report', JSON_REPORT], ['the files', FILES]] as const) {
    eachCaller(name, handler, READERS, ['imports', 'import_files', 'receipts'], async (caller) => {
      const cast = await createCast();
      const { id } = await bring(cast, { 'ox.obj': cubeObj() });
      return { params: { show: cast.show.code, import: id }, token: cast.tokenOf(caller) };
    });
  }

  test.each([['CSV', CSV], ['JSON', JSON_REPORT], ['files', FILES]])('%s of an import of another show is not found', async (_name, handler) => {
    const [mine, other] = [await createCast(), await createCast()];
    const { id } = await bring(other, { 'ox.obj': cubeObj() });
    expectProblem(await call(handler, { params: { show: mine.show.code, import: id }, token: mine.people.lead.token }), 404, 'not_found');
  });
});

describe('a report', () => {
  const read = async (cast: Cast, id: string, query: Record<string, string> = {}) => {
    const [csv, json] = await Promise.all([CSV, JSON_REPORT].map((handler) => call(handler, { params: { show: cast.show.code, import: id }, query, token: cast.people.artist.token })));
    return { csv, rows: (json.json as { items: ReportRow[] }).items };
  };

  test('has a row for each failure and finding, with what mends it, and one for each file without', async () => {
    const cast = await createCast();
    const { id, files } = await bring(cast, FAULTY);
    const { rows } = await read(cast, id);
    const failure = rows.find((row) => row.file === 'bad/@broken_v002.obj')!;
    expect(failure).toMatchObject({ outcome: 'failed', severity: 'problem', line: 10, column: 11, asset: null, to_do: MENDS.content.act, sha256: files.find((file) => file.state === 'failed')!.sha256 });
    const border = rows.find((row) => row.file === '=cmd_v001.obj' && row.code === 'open_border')!;
    expect(border).toMatchObject({ outcome: 'measured', version: 'v001', take: 1, to_do: MENDS.border.act });
    expect(border.place).toMatch(/edge \d+ to \d+ at \(/);
    expect(border.line).toBeGreaterThan(0);
    expect(new Set(rows.map((row) => row.file))).toEqual(new Set(Object.keys(FAULTY)));
    expect(rows.every((row) => row.show === cast.show.code && row.import === id)).toBe(true);
  });

  test('is the same in both formats and the same each time, by file name', async () => {
    const cast = await createCast();
    const { id } = await bring(cast, FAULTY);
    const { csv, rows } = await read(cast, id);
    const again = await read(cast, id);
    expect(again.csv.text).toBe(csv.text);
    expect(records(csv.text)).toEqual(rows.map((row) => Object.fromEntries(REPORT_COLUMNS.map((column) => [column, row[column] === null ? '' : String(row[column])]))));
    const names = rows.map((row) => row.file);
    expect(names).toEqual(names.toSorted((a, b) => (a < b ? -1 : a > b ? 1 : 0)));
    expect(csv.text.split('\r\n')[0]).toBe(REPORT_COLUMNS.join(','));
  });

  test('guards names against a spreadsheet where that is asked, and never numbers', async () => {
    const cast = await createCast();
    const { id } = await bring(cast, FAULTY);
    const guarded = records((await read(cast, id, { guard: '1' })).csv.text);
    expect(guarded.map((row) => row.file)).toContain(`'=cmd_v001.obj`);
    const cells = guarded.flatMap((row) => Object.values(row));
    expect(cells.filter((cell) => /^[=+\-@\t\r]/.test(cell))).toEqual([]);
    expect(guarded.every((row) => /^\d+$/.test(row.bytes))).toBe(true);
    expect(records((await read(cast, id)).csv.text).map((row) => row.file)).toContain('=cmd_v001.obj');
  });

  test('of problems alone leaves out warnings, remarks and files without', async () => {
    const cast = await createCast();
    await bring(cast, { 'ox_v001.obj': cubeObj() });
    const { id } = await bring(cast, { ...FAULTY, 'ox_v001.obj': cubeObj({ size: 2.1 }) });
    const all = (await read(cast, id)).rows;
    expect(all.map((row) => row.code)).toContain('next_take');
    expect(all.find((row) => row.code === 'next_take')).toMatchObject({ version: 'v001-2', take: 2, severity: 'warning' });
    const { rows } = await read(cast, id, { level: 'problem' });
    expect(rows.length).toBeGreaterThan(0);
    expect(new Set(rows.map((row) => row.severity))).toEqual(new Set(['problem']));
  });

  test('is no hand-off of values: it leaves no receipt', async () => {
    const cast = await createCast();
    const { id } = await bring(cast, FAULTY);
    await read(cast, id);
    expect(await asOwner('select 1 from receipts where show_id = $1', [cast.show.id])).toEqual([]);
  });

  test('of more files than one page reads has each file once', async () => {
    const cast = await createCast();
    const { id } = await bring(cast, { 'ox.obj': cubeObj() });
    await asOwner(
      `insert into import_files (import_id, name, state, sha256, byte_size, error_code, error_message, ended_at)
       select import_id, 'many/' || n || '.obj', 'failed', sha256, byte_size, 'truncated', 'Cut off.', now() from import_files, generate_series(1, 620) n where import_id = $1`,
      [id],
    );
    const { rows } = await read(cast, id, { level: 'problem' });
    expect(rows).toHaveLength(620);
    expect(new Set(rows.map((row) => row.file)).size).toBe(620);
  });
});

describe('a page of files', () => {
  const page = async (cast: Cast, id: string, query: Record<string, string>) => (await call(FILES, { params: { show: cast.show.code, import: id }, query, token: cast.people.td.token })).json as unknown as ImportFilePage;

  test('has what needs somebody first, with findings and counts', async () => {
    const cast = await createCast();
    const { id } = await bring(cast, FAULTY);
    const { items, counts, found } = await page(cast, id, {});
    expect(items.map((item) => item.name)).toEqual(['bad/@broken_v002.obj', '=cmd_v001.obj', 'ox_v001.obj']);
    expect(items[1].findings[0]).toMatchObject({ code: 'open_border', severity: 'problem' });
    expect(counts).toMatchObject({ all: 3, failed: 1, problems: 1, going: 0, unchanged: 0 });
    expect(found).toBe(3);
  });

  test.each(['needs', 'name', '-name', 'asset', '-asset', 'parts', '-parts', 'problems', '-problems', 'bytes', '-bytes'])('by %s goes through every file once, page by page', async (sort) => {
    const cast = await createCast();
    const { id } = await bring(cast, { ...FAULTY, 'b_v001.obj': cubeObj({ size: 3 }), 'c_v001.obj': cubeObj({ size: 4 }) });
    const seen: string[] = [];
    let cursor: string | undefined;
    do {
      const { items, next_cursor } = await page(cast, id, { sort, limit: '2', ...(cursor === undefined ? {} : { cursor }) });
      seen.push(...items.map((item) => item.name));
      cursor = next_cursor ?? undefined;
    } while (cursor !== undefined);
    expect(seen.toSorted()).toEqual([...Object.keys(FAULTY), 'b_v001.obj', 'c_v001.obj'].toSorted());
    expect(seen).toEqual((await page(cast, id, { sort })).items.map((item) => item.name));
    if (sort === '-name') expect(seen).toEqual(seen.toSorted().reverse());
  });

  test('is filtered and searched', async () => {
    const cast = await createCast();
    const { id } = await bring(cast, { ...FAULTY, '100%_v001.obj': cubeObj({ size: 3 }) });
    const names = async (query: Record<string, string>) => (await page(cast, id, query)).items.map((item) => item.name);
    expect(await names({ only: 'failed' })).toEqual(['bad/@broken_v002.obj']);
    expect(await names({ only: 'problems' })).toEqual(['=cmd_v001.obj']);
    expect(await names({ only: 'going' })).toEqual([]);
    expect(await names({ q: 'OX v001' })).toEqual(['ox_v001.obj']);
    expect(await names({ q: '0%' })).toEqual(['100%_v001.obj']);
  });

  test('refuses a cursor of another order, and words it does not know', async () => {
    const cast = await createCast();
    const { id } = await bring(cast, FAULTY);
    const { next_cursor } = await page(cast, id, { limit: '1' });
    const ask = (query: Record<string, string>) => call(FILES, { params: { show: cast.show.code, import: id }, query, token: cast.people.td.token });
    expectProblem(await ask({ sort: 'name', cursor: next_cursor! }), 422, 'bad_input', 'cursor');
    expectProblem(await ask({ cursor: 'nonsense' }), 422, 'bad_input', 'cursor');
    expectProblem(await ask({ only: 'odd' }), 422, 'bad_input', 'only');
    expectProblem(await ask({ sort: 'size; drop' }), 422, 'bad_input', 'sort');
  });
});
