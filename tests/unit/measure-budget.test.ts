import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { MESH_EXTENSIONS } from '@/lib/formats/mesh-extensions';
import { expectedMeasureBytes } from '@/lib/jobs/measure-budget';

const size = fc.integer({ min: 1, max: 2 ** 40 });
const name = fc.constantFrom(...MESH_EXTENSIONS, 'unknown').map((extension) => `asset.${extension}`);

describe('the memory that a measurement is expected to need', () => {
  it('grows with the file and with its faces, and holds a file that is not streamed at least once', () => {
    fc.assert(
      fc.property(name, size, size, size, (file, a, b, faces) => {
        const [small, large] = [Math.min(a, b), Math.max(a, b)];
        expect(expectedMeasureBytes({ name: file, byteSize: small })).toBeLessThanOrEqual(expectedMeasureBytes({ name: file, byteSize: large }));
        expect(expectedMeasureBytes({ name: file, byteSize: small, faces })).toBeGreaterThan(1_000 * faces);
        if (file !== 'asset.obj') expect(expectedMeasureBytes({ name: file, byteSize: small })).toBeGreaterThan(2 * small);
      }),
    );
  });

  it('of an asset of two million faces leaves most of 24 GiB for others, known or not from its 180 MB', () => {
    expect(expectedMeasureBytes({ name: 'hero.obj', byteSize: 180e6, faces: 2_000_000 })).toBeLessThan(8 * 2 ** 30);
    expect(expectedMeasureBytes({ name: 'hero.obj', byteSize: 180e6 })).toBeLessThan(20 * 2 ** 30);
  });

  it('of a file by its size alone is no less than by the faces that such files hold', () => {
    // A quad of a large OBJ with all digits takes about 90 bytes, a triangle of a binary STL exactly 50, one of a binary PLY with its half vertex 19.
    for (const [file, bytesPerFace] of [['a.obj', 90], ['a.stl', 50], ['a.ply', 19]] as const) {
      expect(expectedMeasureBytes({ name: file, byteSize: bytesPerFace * 1e6 })).toBeGreaterThanOrEqual(expectedMeasureBytes({ name: file, byteSize: bytesPerFace * 1e6, faces: 1e6 }));
    }
  });
});
