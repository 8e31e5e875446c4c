import { readdir } from 'node:fs/promises';
import path from 'node:path';
import { afterEach, describe, expect, test } from 'vitest';
import { POST as KNOWN } from '@/app/api/v1/shows/[show]/imports/[import]/known/route';
import { POST as ANNOUNCE } from '@/app/api/v1/shows/[show]/imports/[import]/uploads/route';
import { DELETE as CANCEL, GET } from '@/app/api/v1/shows/[show]/imports/[import]/uploads/[upload]/route';
import { POST as COMPLETE } from '@/app/api/v1/shows/[show]/imports/[import]/uploads/[upload]/complete/route';
import { PUT as PUT_PART } from '@/app/api/v1/shows/[show]/imports/[import]/uploads/[upload]/parts/[part]/route';
import { GET as LIMITS } from '@/app/api/v1/shows/[show]/upload-limits/route';
import { config } from '@/lib/config';
import type { UploadAnswer } from '@/lib/rules/upload-parts';
import { call, eachCaller, expectProblem, rowsOf, type StatusOfCaller } from '../support/api';
import { cubeObj } from '../support/cages';
import { addMember, createCast, type Caller, type Cast, type Person } from '../support/cast';
import { asOwner } from '../support/database';
import { openWith } from '../support/imports';
import { announce, complete, longObj, PART, partOf, putPart, sendInParts, sha256Of, type Sender } from '../support/uploads';

const TABLES = ['imports', 'import_files', 'blobs', 'uploads', 'upload_parts', 'storage_usage', 'audit_events'];
const writers = (status: number): StatusOfCaller => ({ admin: status, lead: status, td: status, artist: 403, guest: 404, outsider: 404, nobody: 401 });
/** An upload belongs to who began it: nobody else is told of it. */
const OWNER_ONLY = (status: number): StatusOfCaller => ({ ...writers(404), td: status });

let seed = 0;
const content = (parts: number): Buffer => longObj(cubeObj(), Math.round((parts - 0.5) * PART), `seed ${seed++}`);
const senderOf = async (cast: Cast, who: Person = 'td'): Promise<Sender> => ({ show: cast.show.code, id: await openWith(cast.contextOf(who), cast.show.code, {}, { scheme: 'polyhedral' }), token: cast.people[who].token });
const uploadOf = (answer: { json: Record<string, unknown> | null }): UploadAnswer & { upload: string } => answer.json as unknown as UploadAnswer & { upload: string };
const stored = (folder: string) => readdir(path.join(config().filesFolder, folder), { recursive: true, withFileTypes: true }).then((all) => all.filter((one) => one.isFile()).map((one) => one.name), () => []);

const limits = { ...config() };
afterEach(() => Object.assign(config(), limits));

describe('who may do what', () => {
  const begun = async (caller: Caller) => {
    const cast = await createCast();
    const sender = await senderOf(cast);
    const bytes = content(2);
    const { upload } = uploadOf(await announce(sender, 'ox.obj', bytes));
    return { sender, bytes, params: { show: sender.show, import: sender.id, upload }, token: cast.tokenOf(caller) };
  };

  eachCaller('announcing', ANNOUNCE, writers(200), TABLES, async (caller) => {
    const cast = await createCast();
    const { show, id } = await senderOf(cast);
    return { method: 'POST', params: { show, import: id }, body: { name: 'ox.obj', bytes: 100, sha256: sha256Of('x') }, token: cast.tokenOf(caller) };
  });

  eachCaller('taking known files', KNOWN, writers(200), TABLES, async (caller) => {
    const cast = await createCast();
    const { show, id } = await senderOf(cast);
    return { method: 'POST', params: { show, import: id }, body: { items: [{ name: 'ox.obj', bytes: 100, sha256: sha256Of('x') }] }, token: cast.tokenOf(caller) };
  });

  eachCaller('asking for the limits', LIMITS, writers(200), TABLES, async (caller) => {
    const cast = await createCast();
    return { params: { show: cast.show.code }, token: cast.tokenOf(caller) };
  });

  eachCaller('asking for an upload', GET, OWNER_ONLY(200), TABLES, async (caller) => {
    const { params, token } = await begun(caller);
    return { params, token };
  });

  eachCaller('putting a part', PUT_PART, OWNER_ONLY(200), TABLES, async (caller) => {
    const { params, token, bytes } = await begun(caller);
    const part = partOf(bytes, 1);
    return { method: 'PUT', params: { ...params, part: '1' }, raw: new Uint8Array(part), headers: { 'x-content-sha256': sha256Of(part) }, token };
  });

  eachCaller('completing', COMPLETE, OWNER_ONLY(200), TABLES, async (caller) => {
    const { params, token, bytes, sender } = await begun(caller);
    for (const number of [1, 2]) await putPart(sender, params.upload, number, partOf(bytes, number));
    return { method: 'POST', params, body: { name: 'ox.obj' }, token };
  });

  eachCaller('cancelling', CANCEL, OWNER_ONLY(204), TABLES, async (caller) => {
    const { params, token } = await begun(caller);
    return { method: 'DELETE', params, token };
  });
});

describe('a file in parts', () => {
  test('comes in any order and side by side, and is the file in the end', async () => {
    const cast = await createCast();
    const sender = await senderOf(cast);
    const bytes = content(5);
    const begun = uploadOf(await announce(sender, 'creatures/ox_v001.obj', bytes));
    expect(begun).toMatchObject({ state: 'open', bytes: bytes.length, part_bytes: PART, part_count: 5, parts: [] });
    const answers = await Promise.all([4, 1, 5, 3, 2].map((number) => putPart(sender, begun.upload, number, partOf(bytes, number))));
    expect(answers.map((one) => [one.status, one.json?.stored])).toEqual(Array(5).fill([200, true]));
    const done = await complete(sender, begun.upload, 'creatures/ox_v001.obj');
    expect(done.json).toMatchObject({ state: 'stored', sha256: sha256Of(bytes), bytes: bytes.length });
    expect(await asOwner('select name, sha256, byte_size::int as bytes from import_files where import_id = $1', [sender.id])).toEqual([{ name: 'creatures/ox_v001.obj', sha256: sha256Of(bytes), bytes: bytes.length }]);
    expect(await stored(`parts/${begun.upload}`)).toEqual([]);
    expect(await stored('uploads')).toEqual([]);
  });

  test('a part again is a no-op, and so is completing again, even by two at once', async () => {
    const cast = await createCast();
    const sender = await senderOf(cast);
    const bytes = content(2);
    const { upload } = uploadOf(await announce(sender, 'ox.obj', bytes));
    for (const number of [1, 1, 2]) await putPart(sender, upload, number, partOf(bytes, number));
    expect((await putPart(sender, upload, 2, partOf(bytes, 2))).json).toMatchObject({ stored: false });
    const both = await Promise.all([complete(sender, upload, 'ox.obj'), complete(sender, upload, 'ox.obj')]);
    expect(both.map((one) => one.json?.state)).toEqual(['stored', 'stored']);
    const before = await rowsOf('import_files', 'blobs');
    expect((await complete(sender, upload, 'ox.obj')).json).toMatchObject({ state: 'stored' });
    expect(await rowsOf('import_files', 'blobs')).toBe(before);
  });

  test('goes on after a break, for another import too, and what came is not asked for again', async () => {
    const cast = await createCast();
    const sender = await senderOf(cast);
    const bytes = content(4);
    const first = uploadOf(await announce(sender, 'ox.obj', bytes));
    for (const number of [1, 3]) await putPart(sender, first.upload, number, partOf(bytes, number));
    const after = { ...sender, id: (await senderOf(cast)).id };
    const again = uploadOf(await announce(after, 'ox.obj', bytes, { part_bytes: PART * 2 }));
    expect(again).toMatchObject({ state: 'open', upload: first.upload, part_bytes: PART, parts: [1, 3] });
    for (const number of [2, 4]) await putPart(after, again.upload, number, partOf(bytes, number));
    expect((await complete(after, again.upload, 'ox.obj')).json).toMatchObject({ state: 'stored' });
    expect(await asOwner('select import_id from import_files where sha256 = $1', [sha256Of(bytes)])).toEqual([{ import_id: after.id }]);
  });

  test('is not complete before all parts came', async () => {
    const cast = await createCast();
    const sender = await senderOf(cast);
    const bytes = content(3);
    const { upload } = uploadOf(await announce(sender, 'ox.obj', bytes));
    await putPart(sender, upload, 2, partOf(bytes, 2));
    expect(expectProblem(await complete(sender, upload, 'ox.obj'), 409, 'conflict').detail).toBe('2 parts have not arrived yet.');
  });

  test('is refused when its parts are not the file that was announced, and can be sent afresh', async () => {
    const cast = await createCast();
    const sender = await senderOf(cast);
    const [bytes, other] = [content(2), content(2)];
    const { upload } = uploadOf(await announce(sender, 'ox.obj', bytes));
    await putPart(sender, upload, 1, partOf(other, 1));
    await putPart(sender, upload, 2, partOf(bytes, 2));
    expectProblem(await complete(sender, upload, 'ox.obj'), 422, 'bad_input', 'sha256');
    expectProblem(await complete(sender, upload, 'ox.obj'), 422, 'bad_input', 'sha256');
    expect(await stored(`parts/${upload}`)).toEqual([]);
    expect(await asOwner('select 1 from blobs where sha256 = $1', [sha256Of(bytes)])).toEqual([]);
    expect((await sendInParts(sender, 'ox.obj', bytes)).json).toMatchObject({ state: 'stored' });
  });

  test.each([
    ['other bytes than said', 1, (part: Buffer) => ({ bytes: part, sha: sha256Of('other') }), 422, 'bad_input'],
    ['too few bytes', 1, (part: Buffer) => ({ bytes: part.subarray(1), sha: sha256Of(part.subarray(1)) }), 400, 'bad_request'],
    ['too many bytes', 2, (part: Buffer) => ({ bytes: Buffer.concat([part, part]), sha: sha256Of(Buffer.concat([part, part])) }), 413, 'too_large'],
    ['a number past the end', 3, (part: Buffer) => ({ bytes: part, sha: sha256Of(part) }), 422, 'bad_input'],
    ['no hash', 1, (part: Buffer) => ({ bytes: part, sha: null }), 422, 'bad_input'],
  ] as const)('a part with %s is refused and leaves nothing', async (_what, number, make, status, code) => {
    const cast = await createCast();
    const sender = await senderOf(cast);
    const bytes = content(2);
    const { upload } = uploadOf(await announce(sender, 'ox.obj', bytes));
    const before = await rowsOf(...TABLES);
    const { bytes: sent, sha } = make(partOf(bytes, Math.min(number, 2)));
    expectProblem(await putPart(sender, upload, number, sent, sha === null ? {} : { 'x-content-sha256': sha }), status, code);
    expect(await rowsOf(...TABLES)).toBe(before);
    expect(await stored(`parts/${upload}`)).toEqual([]);
    expect(await stored('uploads')).toEqual([]);
  });

  test('a cancelled upload is gone with its parts, and gives back its room', async () => {
    const cast = await createCast();
    const sender = await senderOf(cast);
    const bytes = content(2);
    const { upload } = uploadOf(await announce(sender, 'ox.obj', bytes));
    await putPart(sender, upload, 1, partOf(bytes, 1));
    const params = { show: sender.show, import: sender.id, upload };
    expect((await call(CANCEL, { method: 'DELETE', params, token: sender.token })).status).toBe(204);
    expect(await stored(`parts/${upload}`)).toEqual([]);
    expectProblem(await putPart(sender, upload, 1, partOf(bytes, 1)), 404, 'not_found');
    config().maxShowBytes = bytes.length;
    expect((await announce(sender, 'ox.obj', bytes)).status).toBe(200);
  });
});

describe('content that is there already', () => {
  test('of the same show needs no bytes, by announcing and by the list', async () => {
    const cast = await createCast();
    const sender = await senderOf(cast);
    const bytes = content(2);
    await sendInParts(sender, 'ox.obj', bytes);
    const lead = await senderOf(cast, 'lead');
    expect((await announce(lead, 'again.obj', bytes)).json).toMatchObject({ state: 'stored', upload: null });
    const other = content(1);
    const items = [bytes, other].map((one, index) => ({ name: `${index}.obj`, bytes: one.length, sha256: sha256Of(one) }));
    const known = await call(KNOWN, { method: 'POST', params: { show: lead.show, import: lead.id }, token: lead.token, body: { items } });
    expect(known.json).toEqual({ items: [{ name: '0.obj', state: 'stored' }, { name: '1.obj', state: 'needed' }] });
    expect(await asOwner('select name from import_files where import_id = $1 order by 1', [lead.id])).toEqual([{ name: '0.obj' }, { name: 'again.obj' }]);
    expect((await asOwner<{ count: number }>('select count(*)::int as count from blobs where sha256 = $1', [sha256Of(bytes)]))[0].count).toBe(1);
  });

  test('of a show that the asker does not read has to be proved by its bytes, and is not stored twice', async () => {
    const [mine, other] = [await createCast(), await createCast()];
    const bytes = content(2);
    await sendInParts(await senderOf(other), 'secret.obj', bytes);
    const sender = await senderOf(mine);
    expect((await announce(sender, 'claimed.obj', bytes)).json).toMatchObject({ state: 'open', parts: [] });
    const items = [{ name: 'claimed.obj', bytes: bytes.length, sha256: sha256Of(bytes) }];
    const known = () => call(KNOWN, { method: 'POST', params: { show: sender.show, import: sender.id }, token: sender.token, body: { items } });
    expect((await known()).json).toMatchObject({ items: [{ state: 'needed' }] });
    await addMember(other.show, mine.people.td, 'guest');
    expect((await known()).json, 'a guest sees what is locked, not the cages').toMatchObject({ items: [{ state: 'needed' }] });
    expect((await sendInParts(sender, 'claimed.obj', bytes)).json).toMatchObject({ state: 'stored' });
    expect((await stored('blobs')).filter((name) => name === sha256Of(bytes))).toHaveLength(1);
  });

  test('of another show that the asker reads needs no bytes', async () => {
    const [mine, other] = [await createCast(), await createCast()];
    const bytes = content(2);
    await sendInParts(await senderOf(other), 'ox.obj', bytes);
    await addMember(other.show, mine.people.td, 'artist');
    expect((await announce(await senderOf(mine), 'ox.obj', bytes)).json).toMatchObject({ state: 'stored' });
  });

  test('a hash with another size than its content has is not taken for it', async () => {
    const cast = await createCast();
    const sender = await senderOf(cast);
    const bytes = content(2);
    await sendInParts(sender, 'ox.obj', bytes);
    expect((await announce(sender, 'b.obj', bytes, { bytes: bytes.length + 1 })).json).toMatchObject({ state: 'open' });
  });
});

describe('limits', () => {
  test('are told', async () => {
    const cast = await createCast();
    Object.assign(config(), { maxFileBytes: 1000, maxImportBytes: 5000, maxImportFiles: 7, maxShowBytes: 9000 });
    const answer = await call(LIMITS, { params: { show: cast.show.code }, token: cast.people.td.token });
    expect(answer.json).toMatchObject({ max_file_bytes: 1000, max_import_bytes: 5000, max_files: 7, max_show_bytes: 9000, left_bytes: 9000 });
  });

  test('of a file and of an import refuse an announcement', async () => {
    const cast = await createCast();
    const sender = await senderOf(cast);
    const bytes = content(3);
    config().maxFileBytes = bytes.length - 1;
    expectProblem(await announce(sender, 'ox.obj', bytes), 413, 'too_large', 'bytes');
    Object.assign(config(), { maxFileBytes: bytes.length, maxImportBytes: bytes.length - 1 });
    expectProblem(await announce(sender, 'ox.obj', bytes), 413, 'too_large', 'bytes');
  });

  test.each(['maxShowBytes', 'maxStudioBytes'] as const)('%s: of two announced at once one goes up, and bytes put at once count too', async (limit) => {
    const cast = await createCast();
    const sender = await senderOf(cast);
    const files = [content(3), content(3)];
    const there = limit === 'maxShowBytes' ? 0 : Number((await asOwner<{ sum: string }>(`select (select coalesce(sum(byte_size), 0) from blobs) + (select coalesce(sum(byte_size), 0) from uploads u where completed_at is null and not exists (select 1 from blobs b where b.sha256 = u.sha256)) as sum`))[0].sum);
    config()[limit] = there + files[0].length + 200;
    const answers = await Promise.all(files.map((bytes, index) => announce(sender, `${index}.obj`, bytes)));
    expect(answers.map((one) => one.status).sort()).toEqual([200, 413]);
    const { upload } = uploadOf(answers.find((one) => one.status === 200)!);
    const winner = files[answers.findIndex((one) => one.status === 200)];
    for (const number of [1, 2, 3]) await putPart(sender, upload, number, partOf(winner, number));
    expect((await complete(sender, upload, 'won.obj')).json).toMatchObject({ state: 'stored' });
    const { PUT } = await import('@/app/api/v1/shows/[show]/imports/[import]/files/[...name]/route');
    const put = (text: string, name: string) => call(PUT, { method: 'PUT', params: { show: sender.show, import: sender.id, name }, raw: text, token: sender.token });
    const small = ['a', 'b', 'c'].map((letter) => letter.repeat(130) + limit);
    expect((await Promise.all(small.map((text, index) => put(text, `small${index}.obj`)))).map((one) => one.status).sort()).toEqual([200, 413, 413]);
  });

  test('of files in an import hold for many put at once', async () => {
    const cast = await createCast();
    const sender = await senderOf(cast);
    config().maxImportFiles = 3;
    const { PUT } = await import('@/app/api/v1/shows/[show]/imports/[import]/files/[...name]/route');
    const answers = await Promise.all([1, 2, 3, 4, 5, 6].map((n) => call(PUT, { method: 'PUT', params: { show: sender.show, import: sender.id, name: `${n}.obj` }, raw: `# ${n} ${seed++}`, token: sender.token })));
    expect(answers.filter((one) => one.status === 200)).toHaveLength(3);
    expect((await asOwner<{ count: number }>('select count(*)::int as count from import_files where import_id = $1', [sender.id]))[0].count).toBe(3);
  });
});
