import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readMesh } from '@/lib/formats/read-mesh';
import { badFiles, GOOD } from '../support/bad-files';
import { faultOfReading, mutations } from '../support/mutate-files';

/** Computing time that a file may take: what starting a reader costs, and what its bytes do. Waiting for other programs does not count. */
const CPU_MS = 3_000;
const CPU_MS_PER_BYTE = 0.001;
/** What the whole corpus may add to the process at its largest; files in it declare terabytes. */
const MOST_MEGABYTES = 768;
/** Where these are said, the file as a whole is meant. */
const OF_THE_WHOLE = new Set(['empty_file', 'unknown_format', 'wrong_format', 'no_faces', 'no_meshes', 'missing_property', 'too_many_entries', 'bad_archive', 'compressed', 'bad_unit', 'bomb', 'too_large']);
/** A prim, a property, an entry, a file within or a character, where there is no line and no byte. */
const PLACE_IN_WORDS = /^(mesh|prim|subset|skeleton) \S|^glTF \S|archive entry "|^expected names within the archive: |\bat position \d|^expected JSON: |^\S+\.(obj|ply|stl|glb|gltf|usd[acz]?|zip|csv): /;

describe('hostile files', () => {
  const files = badFiles();

  it('are refused in time that their bytes bound, and in memory that nothing they declare moves', async () => {
    const before = process.resourceUsage().maxRSS;
    for (const { name, fault, bytes } of files) {
      const start = process.cpuUsage();
      await faultOfReading(name, bytes);
      const { user, system } = process.cpuUsage(start);
      expect((user + system) / 1000, `${name.slice(0, 20)} ${fault}`).toBeLessThan(CPU_MS + CPU_MS_PER_BYTE * bytes.length);
    }
    expect((process.resourceUsage().maxRSS - before) / 1024).toBeLessThan(MOST_MEGABYTES);
  }, 300_000);

  it('are at least 300', () => {
    expect(files.length).toBeGreaterThanOrEqual(300);
  });

  it.each(files.map((file, i) => [i, file.name.slice(0, 20), file.fault, file] as const))('%i %s: %s', async (_, __, ___, file) => {
    const error = await faultOfReading(file.name, file.bytes);
    expect(error).not.toBeNull();
    expect(error!.detail.length).toBeLessThan(1_000);
    // A sentence: a code for machines, and words without control characters or bits of our own code.
    expect(error!.code).toMatch(/^[a-z_]+$/);
    if (!OF_THE_WHOLE.has(error!.code)) expect(error!.line !== null || error!.offset !== null || PLACE_IN_WORDS.test(error!.detail), `${error!.code}: ${error!.detail}`).toBe(true);
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
