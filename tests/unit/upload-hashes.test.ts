import { createHash, randomBytes } from 'node:crypto';
import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import { hashParts } from '@/hooks/hash-parts';
import { patiently } from '@/hooks/patiently';
import { RequestLanes } from '@/hooks/request-lanes';
import { RequestError } from '@/hooks/request-json';
import { uploadAddress } from '@/hooks/upload-file';

const hex = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex');

// FIPS 180-2, appendix B.1 and B.2: the messages "abc" and its 448-bit one (from memory).
test.each([
  ['abc', 'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad'],
  ['abcdbcdecdefdefgefghfghighijhijkijkljklmklmnlmnomnopnopq', '248d6a61d20638b8e5c026930c3e6039a33ce45964ff2167f6ecedd419db06c1'],
])('%s has the published SHA-256', async (text, published) => {
  expect((await hashParts(new Blob([text]), 64, () => undefined)).sha256).toBe(published);
});

test.each([0, 1, 63, 64, 1000, 1001, 2500, 70_000])('%i bytes hash in the browser as node hashes them, whole and by parts', async (size) => {
  const bytes = randomBytes(size);
  const seen: number[] = [];
  const { sha256, parts } = await hashParts(new Blob([bytes]), 1000, (hashed) => seen.push(hashed));
  expect(sha256).toBe(hex(bytes));
  expect(parts).toEqual(Array.from({ length: Math.ceil(size / 1000) }, (_, index) => hex(bytes.subarray(index * 1000, (index + 1) * 1000))));
  expect(seen.at(-1) ?? 0).toBe(size);
});

test('without the browser’s own digest, on plain HTTP, the parts hash the same', async () => {
  vi.stubGlobal('crypto', {});
  const bytes = randomBytes(2500);
  expect((await hashParts(new Blob([bytes]), 1000, () => undefined)).parts[2]).toBe(hex(bytes.subarray(2000)));
});

let page: EventTarget;
beforeEach(() => {
  page = new EventTarget();
  vi.stubGlobal('addEventListener', page.addEventListener.bind(page));
  vi.stubGlobal('removeEventListener', page.removeEventListener.bind(page));
});
afterEach(() => {
  vi.unstubAllGlobals();
  vi.useRealTimers();
});

const lost = () => new RequestError(0, 'not_reached', 'The server was not reached.');
const patience = () => ({ signal: new AbortController().signal, onWaiting: vi.fn() });

test('a lost connection is waited for as long as it takes, and said', async () => {
  vi.useFakeTimers();
  let turns = 0;
  const given = patience();
  const done = patiently(() => (++turns < 30 ? Promise.reject(lost()) : Promise.resolve('there')), given);
  await vi.advanceTimersByTimeAsync(30 * 40_000);
  expect(await done).toBe('there');
  expect(given.onWaiting.mock.calls.map(([isWaiting]) => isWaiting as boolean)).toEqual([...Array<boolean>(29).fill(true), false]);
});

test('the browser’s word that the network is back ends the pause', async () => {
  vi.useFakeTimers();
  let turns = 0;
  const done = patiently(() => (++turns === 1 ? Promise.reject(lost()) : Promise.resolve('there')), patience());
  await vi.advanceTimersByTimeAsync(0);
  page.dispatchEvent(new Event('online'));
  expect(await done).toBe('there');
});

test('a server that goes on failing is given up, a refusal and a full storage at once', async () => {
  vi.useFakeTimers();
  const tries = async (status: number) => {
    const act = vi.fn(() => Promise.reject(new RequestError(status, 'x', 'no')));
    const done = patiently(act, patience()).catch((error: RequestError) => error.status);
    await vi.advanceTimersByTimeAsync(20 * 40_000);
    expect(await done).toBe(status);
    return act.mock.calls.length;
  };
  expect([await tries(503), await tries(422), await tries(507)]).toEqual([8, 1, 1]);
});

test('ending it ends a pause', async () => {
  const controller = new AbortController();
  const done = patiently(() => Promise.reject(lost()), { signal: controller.signal, onWaiting: () => setTimeout(() => controller.abort(), 1) });
  await expect(done).rejects.toMatchObject({ name: 'AbortError' });
});

test('no more run at a time than there are lanes, and all run', async () => {
  const lanes = new RequestLanes(3);
  let [running, most, ended] = [0, 0, 0];
  const act = async () => {
    most = Math.max(most, ++running);
    await new Promise((resolve) => setTimeout(resolve, 1));
    running--;
    if (++ended % 5 === 0) throw new Error('one of them fails');
  };
  await Promise.allSettled(Array.from({ length: 20 }, () => lanes.run(act)));
  expect([most, ended]).toEqual([3, 20]);
});

test('a file’s address says its import, its name and what was said of it', () => {
  expect(uploadAddress('/api/v1/shows/tarn/imports/1/files/cr%C3%A9atures/a%2Bb.obj?asset=ox+1&version=3')).toMatchObject({
    base: '/api/v1/shows/tarn/imports/1',
    said: { name: 'créatures/a+b.obj', asset: 'ox 1', version: '3' },
  });
});
