import { randomUUID } from 'node:crypto';
import { open, readdir, rm, truncate, utimes, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { afterEach, describe, expect, test, vi } from 'vitest';
import { database } from '@/db/client';
import { config } from '@/lib/config';
import { putImportFile } from '@/lib/imports/put-import-file';
import { runOrder } from '@/lib/run/admin-cli';
import { checkStorage } from '@/lib/storage/check-storage';
import { blobKey, disk, partKey, pathInFolder } from '@/lib/storage/disk';
import { openBlob } from '@/lib/storage/open-blob';
import { storeBlob } from '@/lib/storage/store-blob';
import { sweepStorage } from '@/lib/storage/sweep-storage';
import { cubeObj } from '../support/cages';
import { contextOf, createCast, type Cast } from '../support/cast';
import { asOwner } from '../support/database';
import { importFiles, openWith } from '../support/imports';
import { announce, longObj, PART, partOf, putPart, sha256Of } from '../support/uploads';

const db = database();
const OLD = new Date(Date.now() - 90 * 24 * 3_600_000);

async function* once(text: string): AsyncIterable<Uint8Array> {
  yield Buffer.from(text);
}
const store = (text: string) => storeBlob(once(text), { maxBytes: 1e6 });
const isStored = async (text: string): Promise<boolean> => (await disk()).exists(blobKey(sha256Of(text)));
const hasRow = async (text: string) => (await asOwner('select 1 from blobs where sha256 = $1', [sha256Of(text)])).length > 0;
const age = (text: string) => asOwner('update blobs set seen_at = $2 where sha256 = $1', [sha256Of(text), OLD]);
const unique = () => `${cubeObj()}# ${randomUUID()}\n`;

async function putFile(cast: Cast, id: string, name: string, text: string) {
  return putImportFile(contextOf(cast.people.td), { show: cast.show.code, import: id, name }, new Request('http://127.0.0.1:3000/', { method: 'PUT', body: text }));
}

afterEach(() => vi.restoreAllMocks());

describe('sweeping', () => {
  test('takes a blob that nothing refers to, after its grace time, and leaves what is referred to or young', async () => {
    const cast = await createCast();
    const [orphan, young, kept] = [unique(), unique(), unique()];
    await openWith(cast.contextOf('td'), cast.show.code, { 'ox.obj': kept });
    await store(orphan);
    await store(young);
    await age(orphan);
    await age(kept);
    expect((await sweepStorage(db)).blobs).toBe(1);
    expect(await Promise.all([orphan, young, kept].map(async (text) => [await isStored(text), await hasRow(text)]))).toEqual([[false, false], [true, true], [true, true]]);
  });

  test('never takes a blob that is being registered: the same bytes come again while the sweep holds them', async () => {
    const cast = await createCast();
    const id = await openWith(cast.contextOf('td'), cast.show.code, {});
    const text = unique();
    await store(text);
    await age(text);
    const storage = await disk();
    const remove = storage.delete.bind(storage);
    let upload: Promise<unknown> = Promise.resolve();
    let isDone = false;
    vi.spyOn(storage, 'delete').mockImplementation(async (key) => {
      if (key !== blobKey(sha256Of(text))) return remove(key);
      // The sweep has deleted the row and not yet the bytes; the upload runs as far as it can.
      upload = putFile(cast, id, 'ox.obj', text).finally(() => (isDone = true));
      await new Promise((resolve) => setTimeout(resolve, 500));
      expect(isDone).toBe(false);
      await remove(key);
    });
    expect((await sweepStorage(db)).blobs).toBe(1);
    await upload;
    expect([await isStored(text), await hasRow(text)]).toEqual([true, true]);
    expect(await asOwner('select 1 from import_files where import_id = $1', [id])).toHaveLength(1);
  });

  test('leaves a blob that was registered between its look and its hold', async () => {
    const cast = await createCast();
    const text = unique();
    const id = await openWith(cast.contextOf('td'), cast.show.code, {});
    await store(text);
    await age(text);
    // Registered by its row alone, as a file whose content is known is: the row's time stays old.
    await asOwner(`insert into import_files (import_id, name, sha256, byte_size) values ($1, 'ox.obj', $2, $3)`, [id, sha256Of(text), text.length]);
    await sweepStorage(db);
    expect([await isStored(text), await hasRow(text)]).toEqual([true, true]);
  });

  test('by three at once, beside uploads of what they sweep, leaves every registered file whole', async () => {
    const cast = await createCast();
    const id = await openWith(cast.contextOf('td'), cast.show.code, {});
    const texts = Array.from({ length: 24 }, unique);
    for (const text of texts) await store(text);
    await asOwner('update blobs set seen_at = $1 where sha256 = any($2)', [OLD, texts.map(sha256Of)]);
    const uploads = texts.filter((_, index) => index % 2 === 0).map((text, index) => putFile(cast, id, `${index}.obj`, text));
    await Promise.all([sweepStorage(db), sweepStorage(db), sweepStorage(db), ...uploads]);
    const after = await Promise.all(texts.map(async (text) => [await isStored(text), await hasRow(text)]));
    expect(after).toEqual(texts.map((_, index) => (index % 2 === 0 ? [true, true] : [false, false])));
  });

  test('ends uploads that ran out with their parts, and removes leftovers of a day', async () => {
    const cast = await createCast();
    const sender = { show: cast.show.code, id: await openWith(cast.contextOf('td'), cast.show.code, {}), token: cast.people.td.token };
    const bytes = longObj(cubeObj(), 1.5 * PART, randomUUID());
    const upload = String((await announce(sender, 'ox.obj', bytes)).json?.upload);
    await putPart(sender, upload, 1, partOf(bytes, 1));
    const running = longObj(cubeObj(), 1.5 * PART, randomUUID());
    const other = String((await announce(sender, 'b.obj', running)).json?.upload);
    await putPart(sender, other, 1, partOf(running, 1));
    await asOwner(`update uploads set expires_at = now() - interval '1 minute' where id = $1`, [upload]);
    const lost = partKey(randomUUID(), 1, sha256Of('lost'));
    for (const key of [lost, 'uploads/lost', 'uploads/fresh']) await (await disk()).put(key, 'lost');
    for (const key of [lost, 'uploads/lost', partKey(other, 1, sha256Of(partOf(running, 1)))]) await utimes(pathInFolder(key), OLD, OLD);
    expect(await sweepStorage(db)).toMatchObject({ uploads: 1, leftovers: 2 });
    const storage = await disk();
    expect(await Promise.all([partKey(upload, 1, sha256Of(partOf(bytes, 1))), lost, 'uploads/lost', 'uploads/fresh', partKey(other, 1, sha256Of(partOf(running, 1)))].map((key) => storage.exists(key)))).toEqual([false, false, false, true, true]);
    await storage.delete('uploads/fresh');
  });

  test('removes an old file that the database does not know, and leaves a young one', async () => {
    const [old, young] = [unique(), unique()];
    for (const text of [old, young]) await (await disk()).put(blobKey(sha256Of(text)), text);
    await utimes(pathInFolder(blobKey(sha256Of(old))), OLD, OLD);
    expect((await sweepStorage(db)).unknown).toBe(1);
    expect([await isStored(old), await isStored(young), await hasRow(old), await hasRow(young)]).toEqual([false, true, false, false]);
  });
});

describe('a folder that fails', () => {
  test('a full disk refuses the file in plain words and leaves nothing', async () => {
    const cast = await createCast();
    const id = await openWith(cast.contextOf('td'), cast.show.code, {});
    const handle = await open(path.join(config().dataFolder, 'probe'), 'w');
    vi.spyOn(Object.getPrototypeOf(handle) as typeof handle, 'writeFile').mockRejectedValue(Object.assign(new Error('no space left on device'), { code: 'ENOSPC' }));
    const text = unique();
    await expect(putFile(cast, id, 'ox.obj', text)).rejects.toMatchObject({ code: 'storage_full', status: 507 });
    vi.restoreAllMocks();
    await handle.close();
    expect(await readdir(pathInFolder('uploads'))).toEqual([]);
    expect([await isStored(text), await hasRow(text)]).toEqual([false, false]);
    await putFile(cast, id, 'ox.obj', text);
    expect(await isStored(text)).toBe(true);
  });

  test('stored bytes are never written over, but a torn file is mended by the right ones', async () => {
    const text = unique();
    await store(text);
    const file = pathInFolder(blobKey(sha256Of(text)));
    const { ino } = await (await open(file, 'r')).stat();
    await store(text);
    expect((await (await open(file, 'r')).stat()).ino).toBe(ino);
    await truncate(file, 10);
    await store(text);
    expect((await (await disk()).getMetaData(blobKey(sha256Of(text)))).contentLength).toBe(text.length);
  });

  test('a damaged file fails its reader at the end', async () => {
    const text = unique();
    await store(text);
    await writeFile(pathInFolder(blobKey(sha256Of(text))), text.replace('v ', 'V '));
    const reading = async () => {
      for await (const piece of await openBlob(sha256Of(text))) expect(piece).toBeTruthy();
    };
    await expect(reading()).rejects.toThrow(/have the SHA-256/);
  });
});

describe('the check', () => {
  async function planted() {
    const cast = await createCast({ scheme: 'polyhedral' });
    const texts = { gone: unique(), short: unique(), changed: unique(), well: unique() };
    await importFiles(cast.contextOf('td'), cast.show.code, Object.fromEntries(Object.entries(texts).map(([name, text]) => [`a/${name}_v003.obj`, text])));
    const file = (text: string) => pathInFolder(blobKey(sha256Of(text)));
    await rm(file(texts.gone));
    await truncate(file(texts.short), 3);
    await writeFile(file(texts.changed), texts.changed.replace('v ', 'V '));
    const [orphan, unknown] = [unique(), unique()];
    await store(orphan);
    await age(orphan);
    await (await disk()).put(blobKey(sha256Of(unknown)), unknown);
    await utimes(file(unknown), OLD, OLD);
    await (await disk()).put('blobs/00/notes.txt', 'x');
    const sender = { show: cast.show.code, id: await openWith(cast.contextOf('td'), cast.show.code, {}), token: cast.people.td.token };
    const bytes = longObj(cubeObj(), 1.5 * PART, randomUUID());
    const upload = String((await announce(sender, 'ox.obj', bytes)).json?.upload);
    await putPart(sender, upload, 1, partOf(bytes, 1));
    const part = partKey(upload, 1, sha256Of(partOf(bytes, 1)));
    await (await disk()).delete(part);
    const keys = new Map<string, string>([...Object.entries({ ...texts, orphan, unknown }).map(([name, text]) => [blobKey(sha256Of(text)), name] as const), ['blobs/00/notes.txt', 'notes'], [part, 'part']]);
    const kinds = async (options: { deep: boolean; mend: boolean }) => Object.fromEntries((await checkStorage(db, options)).faults.flatMap((one) => (keys.has(one.key) ? [[keys.get(one.key), one.kind]] : [])));
    return { cast, texts, kinds, show: cast.show.code, sender, upload };
  }

  test('finds each planted fault, the changed file only where it reads them', async () => {
    const { kinds } = await planted();
    const shallow = { gone: 'missing', short: 'wrong_size', orphan: 'orphan', unknown: 'unknown', notes: 'strange', part: 'part' };
    expect(await kinds({ deep: false, mend: false })).toEqual(shallow);
    expect(await kinds({ deep: true, mend: false })).toEqual({ ...shallow, changed: 'wrong_hash' });
  });

  test('mends what can be mended; the rest comes back with its file', async () => {
    const { kinds, cast, texts, sender, upload } = await planted();
    await kinds({ deep: true, mend: true });
    expect(await kinds({ deep: true, mend: false })).toEqual({ gone: 'missing', short: 'missing', changed: 'missing', notes: 'strange' });
    expect(await asOwner('select number from upload_parts where upload_id = $1', [upload])).toEqual([]);
    for (const name of ['gone', 'short', 'changed'] as const) await putFile(cast, sender.id, `${name}.obj`, texts[name]);
    expect(await kinds({ deep: true, mend: false })).toEqual({ notes: 'strange' });
    await (await disk()).delete('blobs/00/notes.txt');
  });

  test('says it in words, with the files concerned, and by its exit code', async () => {
    const { texts, show } = await planted();
    const lines: string[] = [];
    vi.spyOn(console, 'log').mockImplementation((line: string) => void lines.push(line));
    expect(await runOrder({ verb: 'storage check', input: { deep: true, mend: false } })).toBe(1);
    const said = lines.join('\n');
    expect(said).toContain(`Missing: ${blobKey(sha256Of(texts.gone))}`);
    expect(said).toContain(`  ${show}: a/gone_v003.obj, asset gone v003`);
    expect(said).toContain(`Damaged: the bytes of ${blobKey(sha256Of(texts.changed))} are not those that were stored.`);
    expect(said).toMatch(/stored files, .* read whole: \d+ faults\.$/);
  });
});
