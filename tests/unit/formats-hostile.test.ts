import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readMesh } from '@/lib/formats/read-mesh';
import { badFiles, GOOD } from '../support/bad-files';
import { faultOfReading, mutations } from '../support/mutate-files';

describe('hostile files', () => {
  const files = badFiles();

  it('are at least 150', () => {
    expect(files.length).toBeGreaterThanOrEqual(150);
  });

  it.each(files.map((file, i) => [i, file.name.slice(0, 20), file.fault, file] as const))('%i %s: %s', async (_, __, ___, file) => {
    const error = await faultOfReading(file.name, file.bytes);
    expect(error).not.toBeNull();
    expect(error!.detail.length).toBeLessThan(1_000);
    // A sentence: a code for machines, and words without control characters or bits of our own code.
    expect(error!.code).toMatch(/^[a-z_]+$/);
    expect(error!.message).not.toMatch(/[\u0000-\u0009\u000b-\u001f]|undefined|\[object|NaN of|Cannot read/);
  });

  it('are not mistaken for the good ones', async () => {
    for (const { name, bytes } of GOOD) expect(await faultOfReading(name, bytes), name).toBeNull();
  });
});

describe('mutated files', () => {
  it.each(GOOD.map(({ name, bytes }) => [name, bytes] as const))('%s is read, or refused with a sentence', async (name, bytes) => {
    await fc.assert(
      fc.asyncProperty(mutations(bytes), async (mutated) => {
        await faultOfReading(name, mutated);
      }),
      { numRuns: 150 },
    );
  }, 60_000);

  it('are the same however they arrive', async () => {
    for (const { name, bytes } of GOOD) {
      const whole = await readMesh(name, chunks(bytes, bytes.length));
      expect(await readMesh(name, chunks(bytes, 7)), name).toEqual(whole);
    }
  });
});

async function* chunks(bytes: Uint8Array, size: number): AsyncGenerator<Uint8Array> {
  for (let at = 0; at < bytes.length; at += size) yield bytes.slice(at, at + size);
}
