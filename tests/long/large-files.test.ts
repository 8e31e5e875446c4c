import { execFile } from 'node:child_process';
import { mkdtempSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { expectedMeasureBytes } from '@/lib/jobs/measure-budget';
import type { LargeMeasured } from '../support/measure-large';
import { writeTorusObj } from '../support/write-torus-obj';

const root = fileURLToPath(new URL('../../', import.meta.url));
/** What never comes back is ended by this, and fails. */
const MOST_MS = 1_200_000;
const MB = 2 ** 20;

/**
 * Volume of the limit of a torus of n × n vertices with radii 3 and 1, but for parts of θ⁴, θ = 2π/n. Points of a circle as control points of a uniform cubic spline
 * give the circle (2 + cos θ)/3 as wide, once each way; by Pappus' theorem the volume goes with the fourth power of that.
 */
const torusVolume = (n: number): number => 2 * Math.PI ** 2 * 3 * ((2 + Math.cos((2 * Math.PI) / n)) / 3) ** 4;

let folder = '';
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'large-'));
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

async function measure(path: string): Promise<LargeMeasured> {
  const { stdout } = await promisify(execFile)(process.execPath, ['--import', 'tsx', join(root, 'tests/support/measure-large.ts'), path], { cwd: root });
  return JSON.parse(stdout) as LargeMeasured;
}

describe('large files', () => {
  it('an OBJ of a gigabyte is read as a stream: memory holds its numbers, not its text', async () => {
    const n = 3_300;
    const path = join(folder, 'torus.obj');
    writeTorusObj(path, n, false);
    const bytes = statSync(path).size;
    expect(bytes).toBeGreaterThan(1e9);
    const large = await measure(path);
    expect([large.faces, large.vertices, large.problems]).toEqual([n * n, n * n, []]);
    expect(large.lastFace).toEqual([n * n - 1, n - 1, 0, n * (n - 1)]);
    const [a, b] = [Math.cos((2 * Math.PI * (n - 1)) / n), Math.sin((2 * Math.PI * (n - 1)) / n)];
    expect(large.lastVertex).toEqual([(3 + a) * a, (3 + a) * b, b]);
    expect(Math.abs(large.volume / torusVolume(n) - 1)).toBeLessThan(1e-10);
    // Three doubles a vertex, five indices and a line a face: what the cage takes. The file on top would not fit.
    const cage = (24 + 4 * 4 + 4 + 4) * n * n;
    expect(large.readBytes - large.startBytes).toBeLessThan(2.2 * cage + 100 * MB);
    expect(large.readBytes - large.startBytes).toBeLessThan(cage + bytes);
    expect((large.peakBytes - large.startBytes) / large.faces).toBeLessThan(1_000);
    expect(large.peakBytes).toBeLessThan(expectedMeasureBytes({ name: path, byteSize: bytes, faces: large.faces }));
  }, MOST_MS);

  it('an asset of two million faces, some irregular, takes less than a kilobyte a face from file to values', async () => {
    const path = join(folder, 'torus.obj');
    const n = 1_410;
    const faces = writeTorusObj(path, n, true);
    expect(faces).toBeGreaterThan(2e6);
    const large = await measure(path);
    expect([large.faces, large.problems]).toEqual([faces, []]);
    // A cut quad moves the surface beside it by parts of θ², and one in a hundred is cut.
    expect(Math.abs(large.volume / torusVolume(n) - 1)).toBeLessThan(2e-7);
    expect((large.peakBytes - large.startBytes) / faces).toBeLessThan(1_000);
    expect(large.peakBytes).toBeLessThan(expectedMeasureBytes({ name: path, byteSize: statSync(path).size, faces }));
    expect(large.peakBytes).toBeLessThan(expectedMeasureBytes({ name: path, byteSize: statSync(path).size }));
  }, MOST_MS);
});
