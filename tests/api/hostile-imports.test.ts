import { expect, test } from 'vitest';
import { PUT } from '@/app/api/v1/shows/[show]/imports/[import]/files/[...name]/route';
import { getImport } from '@/lib/imports/get-import';
import { openImport } from '@/lib/imports/open-import';
import { submitImport } from '@/lib/imports/submit-import';
import { drainQueue } from '@/lib/jobs/drain-queue';
import { openImportInput } from '@/lib/rules/inputs/open-import';
import { parseInput } from '@/lib/rules/parse-input';
import { call } from '../support/api';
import { badFiles } from '../support/bad-files';
import { cubeObj } from '../support/cages';
import { createCast } from '../support/cast';
import { asOwner } from '../support/database';
import { ownThread } from '../support/imports';

/** Of an archive with several meshes each is a file of its own; these come in, each in its own unit. */
const GOOD_APART = new Set(['units that differ']);
const SENTENCE = /^[^\u0000-\u001f\u007f]+[.?!]$/;

test('no bad file gets through, none stops the worker, each ends with a code and a sentence, and a good one among them comes in', { timeout: 900_000 }, async () => {
  const cast = await createCast();
  const { show } = cast;
  const context = cast.contextOf('td');
  const { id } = await openImport(context, parseInput(openImportInput, { show: show.code, scheme: 'polyhedral' }));
  const put = (name: string, raw: Uint8Array) => call(PUT, { method: 'PUT', params: { show: show.code, import: id, name }, raw: Uint8Array.from(raw), token: cast.people.td.token });
  const files = badFiles();
  expect(files.length).toBeGreaterThan(300);
  const refused: string[] = [];
  const sent = new Map<string, string>();
  for (const [index, { name, fault, bytes }] of files.entries()) {
    const path = `${index}/${name}`;
    const answer = await put(path, bytes);
    if (answer.status === 200) sent.set(path, fault);
    else {
      expect(answer.status, fault).toBeGreaterThanOrEqual(400);
      expect(answer.status, fault).toBeLessThan(500);
      expect(answer.json, fault).toMatchObject({ code: expect.stringMatching(/^[a-z_]+$/), detail: expect.stringMatching(/\S/) });
      refused.push(fault);
    }
  }
  // What a file system cannot hold never arrives: a name of 64 kB.
  expect(refused).toEqual(files.filter((file) => file.name.length > 1_000).map((file) => file.fault));
  expect((await put('good/ox_v001.obj', new TextEncoder().encode(cubeObj()))).status).toBe(200);

  await submitImport(context, { show: show.code, import: id });
  await drainQueue(context.db, ownThread);

  const done = await getImport(context, { show: show.code, import: id });
  expect(done.state).toBe('done');
  const rows = new Map(done.files.map((file) => [file.name, file]));
  expect(rows.get('good/ox_v001.obj')).toMatchObject({ state: 'done', asset: 'ox' });
  for (const [path, fault] of sent) {
    const row = rows.get(path)!;
    const inside = done.files.filter((file) => file.name.startsWith(`${path.replace(/\.zip$/, '')}/`));
    const failed = [row, ...inside].filter((file) => file.state === 'failed');
    if (!GOOD_APART.has(fault)) expect(failed.length, `${path}: ${fault}`).toBeGreaterThan(0);
    for (const { error } of failed) {
      expect(error!.code, fault).toMatch(/^[a-z_]+$/);
      expect(error!.message, fault).toMatch(SENTENCE);
      expect(error!.message.length, fault).toBeLessThan(1_000);
      // A fault of ours hides behind a reference; none may be met here.
      expect(error!.message, fault).not.toContain('Reference');
    }
  }
  expect(await asOwner('select * from file_faults')).toEqual([]);
  // Nothing of theirs is anywhere: two good meshes of different units, the good half of a broken pair, the good ones beside an archive, and the ox.
  const assets = await asOwner<{ code: string }>('select code from assets where show_id = $1 order by code', [show.id]);
  const done_rows = done.files.filter((file) => file.state === 'done' && file.asset !== null);
  expect(new Set(done_rows.map((file) => file.asset))).toEqual(new Set(assets.map((asset) => asset.code)));
  for (const row of done_rows) expect(row.name === 'good/ox_v001.obj' || [...sent].some(([path]) => path.endsWith('.zip') && row.name.startsWith(`${path.replace(/\.zip$/, '')}/`)), row.name).toBe(true);
});
