import { execFile } from 'node:child_process';
import { mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { beforeAll, describe, expect, it } from 'vitest';
import { parseMeasureArguments, UsageError } from '@/lib/run/measure-arguments';
import { csvHeader, csvLine, measureRecord } from '@/lib/run/measure-record';
import type { MeasuredPart } from '@/lib/engine/measured';

const launcher = fileURLToPath(new URL('../../lib/run/measure.mjs', import.meta.url));
let folder = '';

interface Outcome {
  code: number;
  stdout: string;
  stderr: string;
}

function run(...args: string[]): Promise<Outcome> {
  return new Promise((resolve) => {
    execFile(process.execPath, [launcher, ...args], { cwd: folder }, (error, stdout, stderr) => resolve({ code: error ? Number(error.code) : 0, stdout, stderr }));
  });
}

/** An axis-parallel box with sharp edges everywhere; its limit surface is the box. */
function sharpBox([x, y, z]: number[], [w, h, d]: number[]): string {
  const corners = [[0, 0, 0], [1, 0, 0], [1, 1, 0], [0, 1, 0], [0, 0, 1], [1, 0, 1], [1, 1, 1], [0, 1, 1]];
  const edges = [[0, 1], [1, 2], [2, 3], [3, 0], [4, 5], [5, 6], [6, 7], [7, 4], [0, 4], [1, 5], [2, 6], [3, 7]];
  return [
    ...corners.map(([a, b, c]) => `v ${x + a * w} ${y + b * h} ${z + c * d}`),
    'f 1 4 3 2', 'f 5 6 7 8', 'f 1 2 6 5', 'f 2 3 7 6', 'f 3 4 8 7', 'f 4 1 5 8',
    ...edges.map(([a, b]) => `t crease 2/1/0 ${a} ${b} 10`),
  ].join('\n');
}

beforeAll(() => {
  folder = mkdtempSync(path.join(tmpdir(), 'measure '));
  writeFileSync(path.join(folder, 'box.obj'), sharpBox([1, 2, 3], [2, 4, 6]));
  writeFileSync(path.join(folder, 'broken.obj'), 'v 0 0 0\nv 1 0 0\nv 0 1 0\nf 1 2 4\n');
});

describe('measure on the command line', { timeout: 120_000 }, () => {
  it('prints a line per part with moments in the file’s unit about its origin, and masses in SI', async () => {
    const { code, stdout, stderr } = await run('--unit', 'cm', '--density', '500', 'box.obj');
    expect([code, stderr]).toEqual([0, '']);
    const [line, ...rest] = stdout.trimEnd().split('\n');
    expect(rest).toEqual([]);
    const record = JSON.parse(line);
    expect(record).toMatchObject({ file: 'box.obj', part: 'whole', faces: 6, problems: [] });
    // Cuboid of 2 × 4 × 6 with its corner at (1, 2, 3): V, V c, V (s²/12 + c²), V cᵢ cⱼ.
    const expected = { volume: 48, first: [96, 192, 288], second: [48 * (4 / 12 + 4), 48 * (16 / 12 + 16), 48 * (36 / 12 + 36), 384, 576, 1152] };
    expect(record.volume).toBeCloseTo(expected.volume, 11);
    expected.first.forEach((value, i) => expect(record.first[i]).toBeCloseTo(value, 10));
    expected.second.forEach((value, i) => expect(record.second[i]).toBeCloseTo(value, 9));
    // m (a² + b²)/12 of a cuboid, in SI: 48 cm³ of 500 kg/m³ weigh 24 g.
    expect(record.mass_kg).toBeCloseTo(0.024, 15);
    expect(record.com_m.map((value: number) => value * 100)).toEqual([2, 4, 6].map((value) => expect.closeTo(value, 10)));
    expect(record.inertia_kg_m2.slice(0, 3).map((value: number) => (value * 12e4) / 0.024)).toEqual([52, 40, 20].map((value) => expect.closeTo(value, 8)));
    expect(record.free_axes).toBe('');
  });

  it('goes on after a broken file, says where it is broken and ends with 1', async () => {
    const { code, stdout, stderr } = await run('broken.obj', 'missing.obj', 'box.obj');
    expect(code).toBe(1);
    expect(stdout.trimEnd().split('\n').map((line) => JSON.parse(line).file)).toEqual(['box.obj']);
    expect(stderr).toContain('broken.obj:4:7: expected a vertex number from 1 to 3 or −1 to −3, found 4\n');
    expect(stderr).toContain('missing.obj:1:1: there is no such file\n');
  });

  it('takes scheme and unit from a file that states them, and joints from weights beside an OBJ', async () => {
    const points = '[(0, 0, 0), (1, 0, 0), (0, 1, 0), (0, 0, 1)]';
    writeFileSync(path.join(folder, 'tet.usda'), `#usda 1.0\n( metersPerUnit = 0.01 )\ndef Mesh "tet" { point3f[] points = ${points}\n int[] faceVertexCounts = [3, 3, 3, 3]\n int[] faceVertexIndices = [0, 2, 1, 0, 1, 3, 0, 3, 2, 1, 2, 3]\n uniform token subdivisionScheme = "none" }\n`);
    writeFileSync(path.join(folder, 'leg.obj'), sharpBox([0, 0, 0], [1, 1, 1]));
    writeFileSync(path.join(folder, 'leg.weights.csv'), ['vertex,joint,weight', ...[1, 2, 3, 4].map((v) => `${v},hip,1`), ...[5, 6, 7, 8].map((v) => `${v},knee,2`)].join('\n'));
    const { code, stdout, stderr } = await run('--parts-by', 'joint', 'tet.usda', 'leg.obj');
    expect([code, stderr]).toEqual([0, '']);
    const records = stdout.trimEnd().split('\n').map((line) => JSON.parse(line));
    // A sixth of a cubic centimetre of water, as it is.
    expect(records[0].volume).toBeCloseTo(1 / 6, 14);
    expect(records[0].mass_kg).toBeCloseTo(1e-3 / 6, 16);
    expect(records.slice(1).map((record) => record.part)).toEqual(['hip', 'knee']);
    expect(records[1].volume + records[2].volume).toBeCloseTo(1, 12);
  });

  it.each([[[]], [['--scheme', 'smooth', 'box.obj']], [['--density', '-1', 'box.obj']], [['--wrong', 'box.obj']]])('ends with 2 and the usage for %j', async (args) => {
    const { code, stdout, stderr } = await run(...args);
    expect([code, stdout]).toEqual([2, '']);
    expect(stderr).toContain('Usage: npm run --silent measure');
  });
});

describe('its arguments', () => {
  it('leave the boundary rule to the file unless one is given', () => {
    expect(parseMeasureArguments(['a.obj'])?.options.boundary).toBeNull();
    expect(parseMeasureArguments(['--boundary=edge-only', 'a.obj'])?.options.boundary).toBe('edge-only');
  });

  it.each([['--unit', 'mile'], ['--density', 'heavy'], ['--density', ''], ['--density', 'Infinity'], ['--parts-by', 'colour'], ['--format', 'xml']])('refuse %s %s', (...args) => {
    expect(() => parseMeasureArguments([...args, 'a.obj'])).toThrow(UsageError);
  });
});

describe('its records', () => {
  const part: MeasuredPart = {
    name: 'a, b', faces: 12, maxValence: 4, bounds: [0, 0, 0, 1, 1, 1], capAreaShare: 0, capVolumeShare: 0, openEdges: 0, looksLikeSheet: false, components: [],
  };

  it('hold null where a problem left no numbers', () => {
    const record = measureRecord({ file: 'x.obj', part, findings: [], metresPerUnit: 1, densityKgPerM3: 1000 });
    expect(record).toMatchObject({ volume: null, first: null, second: null, mass_kg: null, com_m: null });
  });

  it('have as many fields in CSV as the header has names', () => {
    const record = measureRecord({ file: 'x.obj', part, findings: [], metresPerUnit: 1, densityKgPerM3: 1000 });
    const fields = csvLine(record).trimEnd().replace('"a, b"', 'ab').split(',');
    expect(fields).toHaveLength(csvHeader().trimEnd().split(',').length);
  });
});
