import { spawnSync } from 'node:child_process';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, test } from 'vitest';
import { GET as exportCsv } from '@/app/api/v1/shows/[show]/export.csv/route';
import { PATCH } from '@/app/api/v1/shows/[show]/parts/route';
import { GET as valueInputs } from '@/app/api/v1/shows/[show]/value-inputs/route';
import { call, eachCaller } from '../support/api';
import { createCast } from '../support/cast';
import { boxPart, putCage } from '../support/put-cage';

const folder = await mkdtemp(join(tmpdir(), 'weighhouse-verify-'));
afterAll(() => rm(folder, { recursive: true }));

/** A show with two boxes, one by density and one by target mass, beside names and densities that are awkward to write. */
async function createBoxes() {
  const cast = await createCast({ linearUnit: 'in', scheme: 'polyhedral' });
  await putCage(cast.show, cast.people.td, 'crate', [boxPart('body "left", ü', [-1, -1, -1], [1, 1, 1]), boxPart('lid', [10.1, 0, 0], [11, 1.3, 1.7])], { scale: 1.1 });
  const items = [
    { asset: 'crate', part: 'body "left", ü', revision: 1, density_kg_m3: 1e-7, variant: 'wet' },
    { asset: 'crate', part: 'lid', revision: 1, target_mass_kg: 123456789012345680000000 },
  ];
  const answer = await call(PATCH, { method: 'PATCH', params: { show: cast.show.code }, body: { items }, token: cast.tokenOf('td') });
  expect(answer.status, answer.text).toBe(200);
  return cast;
}

/** Runs the checking program, which knows the canonical form from its page alone. */
async function verify(rows: string, inputs: string): Promise<{ status: number | null; output: string }> {
  await writeFile(join(folder, 'rows.csv'), rows);
  await writeFile(join(folder, 'inputs.json'), inputs);
  const run = spawnSync('python3', ['tests/support/verify_rows.py', join(folder, 'rows.csv'), join(folder, 'inputs.json')], { encoding: 'utf8' });
  return { status: run.status, output: run.stdout + run.stderr };
}

describe('the inputs behind values', () => {
  eachCaller('read inputs', valueInputs, { admin: 200, lead: 200, td: 200, artist: 200, guest: 404, outsider: 404, nobody: 401 }, ['part_current'], async (caller) => {
    const cast = await createBoxes();
    return { params: { show: cast.show.code }, token: cast.tokenOf(caller) };
  });

  test('give every exported row its hash again, by another program', async () => {
    const cast = await createBoxes();
    const rows = await call(exportCsv, { params: { show: cast.show.code }, token: cast.tokenOf('artist') });
    const inputs = await call(valueInputs, { params: { show: cast.show.code }, token: cast.tokenOf('artist') });
    expect(await verify(rows.text, inputs.text)).toEqual({ status: 0, output: '2 rows, 0 faults\n' });
  });

  test.each([
    ['a mass', 'mass_kg', (cell: string) => `${cell}1`],
    ['a centre of mass', 'com_x_m', () => '0.5'],
    ['a moment', 'i2_kg_m2', (cell: string) => String(Number(cell) * (1 + 2 ** -50))],
    ['a construction', 'construction', () => 'hollow'],
    ['a name', 'asset', () => 'other'],
    ['free axes', 'free_axes', () => '12'],
  ] as const)('find %s that was changed', async (_, column, change) => {
    const cast = await createBoxes();
    const rows = await call(exportCsv, { params: { show: cast.show.code }, token: cast.tokenOf('artist') });
    const inputs = await call(valueInputs, { params: { show: cast.show.code }, token: cast.tokenOf('artist') });
    const [head, first, last] = rows.text.split('\r\n');
    const cells = last.split(',');
    const at = head.split(',').indexOf(column);
    const planted = [head, first, cells.with(at, change(cells[at])).join(','), ''].join('\r\n');
    expect(planted).not.toBe(rows.text);
    const { status, output } = await verify(planted, inputs.text);
    expect(status).toBe(1);
    expect(output).toMatch(/^line 3: .*does not give its hash\n2 rows, 1 faults\n$/);
  });
});
