import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readJointWeights } from '@/lib/formats/joint-weights';
import { MeshError } from '@/lib/formats/mesh-error';
import { GOOD, badFiles } from '../support/bad-files';
import { faultOfReading, mutations } from '../support/mutate-files';

/** What never comes back is ended by this, and fails. */
const MOST_MS = 600_000;

describe('mutated files, many', () => {
  it.each(GOOD.map(({ name, bytes }) => [name, bytes] as const))(
    '%s is read, or refused with a sentence, and memory does not pile up',
    async (name, bytes) => {
      const before = process.memoryUsage().arrayBuffers;
      await fc.assert(fc.asyncProperty(mutations(bytes), async (mutated) => void (await faultOfReading(name, mutated))), { numRuns: 8_000 });
      expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(1e9);
    },
    MOST_MS,
  );

  it(
    'skin weights are read, or refused with a line',
    () => {
      const csv = new TextEncoder().encode('vertex,joint,weight\r\n1,hip,0.5\r\n1,"knee, left",0.5\r\n2,hip,1\r\n3,"a ""b""",1e-3\r\n');
      const check = (mutated: Uint8Array) => {
        try {
          const { starts, joints, weights, names } = readJointWeights(mutated, 3);
          expect([starts.length, starts[3]]).toEqual([4, weights.length]);
          expect(joints.every((joint) => joint < names.length) && weights.every((weight) => weight >= 0 && weight < Infinity)).toBe(true);
        } catch (error) {
          if (!(error instanceof MeshError)) throw error;
          expect(error.line !== null || error.code === 'empty_file').toBe(true);
        }
      };
      fc.assert(fc.property(mutations(csv), check), { numRuns: 20_000 });
    },
    MOST_MS,
  );

  it(
    'bad ones stay bad, or at least sound, when they are changed further',
    async () => {
      const small = badFiles().filter((file) => file.bytes.length < 20_000 && file.bytes.length > 0);
      const further = fc.constantFrom(...small).chain((file) => mutations(file.bytes).map((bytes) => ({ name: file.name, bytes })));
      await fc.assert(fc.asyncProperty(further, async ({ name, bytes }) => void (await faultOfReading(name, bytes))), { numRuns: 8_000 });
    },
    MOST_MS,
  );
});
