import { createHash, randomBytes } from 'node:crypto';
import { buffer } from 'node:stream/consumers';
import { CreateMultipartUploadCommand, S3Client, UploadPartCommand } from '@aws-sdk/client-s3';
import { afterAll, afterEach, beforeAll, beforeEach, expect, test } from 'vitest';
import { database } from '@/db/client';
import { config } from '@/lib/config';
import { checkStorage } from '@/lib/storage/check-storage';
import { blobKey, disk } from '@/lib/storage/disk';
import { openBlob } from '@/lib/storage/open-blob';
import { S3_PART_BYTES } from '@/lib/storage/receive-into-s3';
import { isTransientStorageFault } from '@/lib/storage/storage-fault';
import { storeBlob } from '@/lib/storage/store-blob';
import { sweepMultiparts } from '@/lib/storage/sweep-multiparts';
import { cubeObj } from '../support/cages';
import { createCast } from '../support/cast';
import { asOwner } from '../support/database';
import { openWith } from '../support/imports';
import { startS3, type TestS3 } from '../support/s3';
import { longObj, PART, sendInParts, sha256Of } from '../support/uploads';

let s3: TestS3;
beforeAll(async () => {
  s3 = await startS3();
  config().s3 = s3.config;
});
afterAll(async () => {
  config().s3 = null;
  await s3.close();
});
beforeEach(() => {
  s3.asked.length = 0;
});
afterEach(() => {
  s3.fault = () => null;
});

async function* inChunks(bytes: Buffer, size = 100_000): AsyncIterable<Uint8Array> {
  for (let at = 0; at < bytes.length; at += size) yield bytes.subarray(at, at + size);
}
const store = (bytes: Buffer, expectedSha256: string | null = null) => storeBlob(inChunks(bytes), { maxBytes: 1e9, expectedSha256 });
const sha256 = (bytes: Buffer) => createHash('sha256').update(bytes).digest('hex');
const keysUnder = async (prefix: string) => [...(await (await disk()).listAll(prefix, { recursive: true })).objects].map((one) => (one.isFile ? one.key : ''));

test.each([
  ['small', 1000],
  ['as long as one part', S3_PART_BYTES],
  ['of several parts', 2 * S3_PART_BYTES + 12_345],
])('a %s file goes into the bucket and comes out as it was', async (_what, size) => {
  const bytes = randomBytes(size);
  expect(await store(bytes, sha256(bytes))).toEqual({ sha256: sha256(bytes), byteSize: size });
  expect((await buffer(await openBlob(sha256(bytes)))).equals(bytes)).toBe(true);
  expect(s3.asked.some((one) => /partNumber=3/.test(one))).toBe(size > 2 * S3_PART_BYTES);
  expect(await keysUnder('uploads/')).toEqual([]);
  expect(await s3.openMultiparts()).toEqual([]);
});

test('bytes that are there are not written again', async () => {
  const bytes = randomBytes(5000);
  await store(bytes);
  s3.asked.length = 0;
  await store(bytes);
  expect(s3.asked.filter((one) => !/^(HEAD|GET) /.test(one))).toEqual([]);
});

test('a long file that is not the one announced leaves no object and no multipart upload', async () => {
  const bytes = randomBytes(S3_PART_BYTES + 1000);
  await expect(store(bytes, sha256(randomBytes(1)))).rejects.toMatchObject({ code: 'bad_input' });
  expect(await (await disk()).exists(blobKey(sha256(bytes)))).toBe(false);
  expect(await keysUnder('uploads/')).toEqual([]);
  expect(await s3.openMultiparts()).toEqual([]);
});

test('a sender that breaks off in the middle of a long file leaves nothing', async () => {
  async function* broken() {
    yield randomBytes(S3_PART_BYTES + 1000);
    throw new Error('gone');
  }
  await expect(storeBlob(broken(), { maxBytes: 1e9 })).rejects.toMatchObject({ code: 'bad_request' });
  expect(await keysUnder('uploads/')).toEqual([]);
  expect(await s3.openMultiparts()).toEqual([]);
});

test('an upload in parts keeps them in the bucket, so that any web server can go on with it', async () => {
  const cast = await createCast();
  const sender = { show: cast.show.code, id: await openWith(cast.contextOf('td'), cast.show.code, {}), token: cast.people.td.token };
  const bytes = longObj(cubeObj(), 2.5 * PART, 'bucket');
  expect((await sendInParts(sender, 'ox.obj', bytes)).json).toMatchObject({ state: 'stored' });
  expect(s3.asked.filter((one) => /^PUT .*\/parts\//.test(one))).toHaveLength(3);
  expect(await keysUnder('parts/')).toEqual([]);
  expect((await buffer(await openBlob(sha256Of(bytes)))).equals(bytes)).toBe(true);
});

test('a bucket that is busy for a moment is asked again; one that stays away says to try again', async () => {
  const bytes = randomBytes(2000);
  let refusals = 2;
  s3.fault = () => (refusals-- > 0 ? 503 : null);
  await store(bytes);
  s3.fault = () => 'drop';
  await expect(store(randomBytes(100))).rejects.toMatchObject({ code: 'not_available' });
  const fault = await openBlob(sha256(bytes)).catch((error: unknown) => error);
  expect(isTransientStorageFault(fault)).toBe(true);
  s3.fault = () => null;
  const missing = await openBlob(sha256(randomBytes(3))).catch((error: unknown) => error);
  expect(isTransientStorageFault(missing)).toBe(false);
});

test('multipart uploads of a dead process are ended once they are a day old', async () => {
  const client = new S3Client({ region: 'us-east-1', endpoint: s3.config.endpoint!, credentials: s3.config.keys!, forcePathStyle: true, requestChecksumCalculation: 'WHEN_REQUIRED', responseChecksumValidation: 'WHEN_REQUIRED' });
  const Bucket = s3.config.bucket;
  const { UploadId } = await client.send(new CreateMultipartUploadCommand({ Bucket, Key: 'uploads/lost' }));
  await client.send(new UploadPartCommand({ Bucket, Key: 'uploads/lost', UploadId, PartNumber: 1, Body: randomBytes(1000) }));
  expect(await sweepMultiparts()).toBe(0);
  expect(await s3.openMultiparts()).toHaveLength(1);
  s3.initiated = new Date(Date.now() - 25 * 3_600_000);
  expect(await sweepMultiparts()).toBe(1);
  expect(await s3.openMultiparts()).toEqual([]);
});

test('the check finds a missing, a short and a changed file in the bucket', async () => {
  const cast = await createCast();
  const texts = { 'a/gone.obj': `${cubeObj()}# gone`, 'a/short.obj': `${cubeObj()}# short`, 'a/changed.obj': `${cubeObj()}# changed` };
  await openWith(cast.contextOf('td'), cast.show.code, texts);
  const [gone, short, changed] = Object.values(texts);
  await (await disk()).delete(blobKey(sha256Of(gone)));
  await (await disk()).put(blobKey(sha256Of(short)), short.slice(1));
  await (await disk()).put(blobKey(sha256Of(changed)), changed.replace('changed', 'CHANGED'));
  const mine = new Set([gone, short, changed].map((text) => blobKey(sha256Of(text))));
  const kinds = async (deep: boolean) => (await checkStorage(database(), { deep, mend: false })).faults.filter((one) => mine.has(one.key)).map((one) => [one.kind, one.concerns[0]?.file]).sort();
  expect(await kinds(false)).toEqual([['missing', 'a/gone.obj'], ['wrong_size', 'a/short.obj']]);
  expect(await kinds(true)).toEqual([['missing', 'a/gone.obj'], ['wrong_hash', 'a/changed.obj'], ['wrong_size', 'a/short.obj']]);
  expect(await asOwner('select 1 from blobs where sha256 = $1', [sha256Of(gone)])).toHaveLength(1);
});
