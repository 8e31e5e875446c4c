import { zipSync } from 'three/examples/jsm/libs/fflate.module.js';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { listZipEntries } from '@/lib/rules/zip-entries';

const text = (value: string) => new TextEncoder().encode(value);
const blobOf = (bytes: Uint8Array) => new Blob([Uint8Array.from(bytes)]);

describe('the entries of a ZIP, listed in the browser', () => {
  it('are those that were packed, with their sizes, without folders and leavings', async () => {
    const files = { 'set/crate_v001.obj': text('v 0 0 0\n'.repeat(100)), 'set/': new Uint8Array(0), 'größe.ply': text('ply'), '__MACOSX/set/._crate': text('x'), 'set/.DS_Store': text('x') };
    const entries = (await listZipEntries(blobOf(zipSync(files, { comment: '' } as object))))!;
    expect(entries.map(({ name, bytes }) => [name, bytes])).toEqual([['set/crate_v001.obj', 800], ['größe.ply', 3]]);
    expect(entries[0].packedBytes).toBeLessThan(800);
  });

  it('are found behind a comment', async () => {
    const bytes = zipSync({ 'a.obj': text('v') });
    const commented = Uint8Array.from([...bytes, ...text('made on the night shift')]);
    new DataView(commented.buffer).setUint16(bytes.length - 2, 23, true);
    expect((await listZipEntries(blobOf(commented)))?.map((entry) => entry.name)).toEqual(['a.obj']);
  });

  it('are null for what is no ZIP, and nothing that is changed in one makes it fail otherwise', async () => {
    expect(await listZipEntries(blobOf(text('v 0 0 0')))).toBeNull();
    expect(await listZipEntries(blobOf(new Uint8Array(0)))).toBeNull();
    const bytes = zipSync({ 'a.obj': text('v'), 'b/c.obj': text('w') });
    await fc.assert(
      fc.asyncProperty(fc.integer({ min: 0, max: bytes.length - 1 }), fc.integer({ min: 0, max: 255 }), async (at, value) => {
        const changed = Uint8Array.from(bytes);
        changed[at] = value;
        const entries = await listZipEntries(blobOf(changed));
        expect(entries === null || entries.every((entry) => typeof entry.name === 'string')).toBe(true);
      }),
      { numRuns: 300 },
    );
  });
});
