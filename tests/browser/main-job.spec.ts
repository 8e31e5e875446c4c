import { readFileSync } from 'node:fs';
import { expect, test, type Locator, type Page } from '@playwright/test';
import Papa from 'papaparse';
import { boxes, boxMass, boxObj } from './support/boxes';
import { makeShow, signInAsAdmin } from './support/studio';

const WATER_KG_PER_M3 = 1000;
/** Volume of spot's limit surface in file units³: reference tables of the cages, computed outside the project (tests/reference/limits.json). */
const SPOT_VOLUME = 0.711593283178345;
const SPOT = readFileSync('tests/reference/cages/spot.obj');
const CRATES = boxes(28);
const BROKEN = 'v 0 0 0\nv 1 0 0\nv 0 1 0\nf 1 2 9\n';

const relative = (value: number, truth: number) => Math.abs(value - truth) / Math.abs(truth);

function file(name: string, content: string | Buffer) {
  return { name, mimeType: 'model/obj', buffer: Buffer.from(content) };
}

async function press(table: Locator, page: Page, keys: string): Promise<void> {
  await table.focus();
  await page.keyboard.press(keys);
}

test('thirty cages, one of them broken, become a CSV whose numbers hold against the handbook', async ({ page }) => {
  await signInAsAdmin(page);
  await makeShow(page, 'quay', 'The Quay Weights');

  await test.step('drop thirty files and look at where they go', async () => {
    await page.goto('/shows/quay/import');
    await page.getByLabel('Files', { exact: true }).setInputFiles([
      ...CRATES.map((box) => file(`${box.asset}_v001.obj`, boxObj(box))),
      file('spot_v003.obj', SPOT),
      file('broken_v001.obj', BROKEN),
    ]);
    await expect(page.getByLabel('Asset of crate01_v001.obj')).toHaveValue('crate01');
    await page.getByRole('button', { name: 'Import 30 files' }).click();
    await page.waitForURL('**/shows/quay/imports/*');
  });

  await test.step('one file fails with its place, twenty-nine are measured', async () => {
    await expect(page.getByRole('progressbar', { name: 'Files that have ended' })).toHaveAttribute('aria-valuenow', '30', { timeout: 60_000 });
    const failed = page.getByRole('row').filter({ hasText: 'broken_v001.obj' });
    await expect(failed).toContainText('line 4');
    await expect(failed).toContainText('9');
  });

  await test.step('set the density of everything at once, and one target mass, which undo takes back', async () => {
    await page.goto('/shows/quay');
    const table = page.getByRole('treegrid', { name: 'Parts' });
    await expect(table.getByRole('row').filter({ hasText: 'crate01' }).first()).toBeVisible();
    await press(table, page, 'Control+a');
    await page.keyboard.press('m');
    const dialog = page.getByRole('dialog');
    await dialog.getByLabel('Mass from').click();
    await page.getByRole('option', { name: 'Density' }).click();
    await dialog.getByLabel('Density').fill('1 g/cm3');
    await dialog.getByRole('button', { name: /^Set/ }).click();
    await expect(dialog).toBeHidden();
    await expect(page.getByRole('button', { name: /No mass yet/ })).toBeHidden();
  });

  await test.step('export, and compare with values from outside the code', async () => {
    await page.goto('/shows/quay/export');
    const download = page.waitForEvent('download');
    await page.getByRole('link', { name: 'Download CSV' }).click();
    const text = readFileSync(await (await download).path(), 'utf8');
    const { data: rows } = Papa.parse<Record<string, string>>(text, { header: true, skipEmptyLines: true });
    expect(rows).toHaveLength(29);
    const rowOf = (asset: string) => rows.find((row) => row.asset === asset)!;

    const spot = rowOf('spot');
    expect(spot.version).toBe('v003');
    expect(relative(Number(spot.volume_m3) * 1e6, SPOT_VOLUME)).toBeLessThan(1e-12);
    expect(relative(Number(spot.mass_kg), SPOT_VOLUME * 1e-6 * WATER_KG_PER_M3)).toBeLessThan(1e-12);

    for (const box of CRATES) {
      const row = rowOf(box.asset);
      const truth = boxMass(box, WATER_KG_PER_M3);
      expect(relative(Number(row.volume_m3), truth.volumeM3)).toBeLessThan(1e-12);
      expect(relative(Number(row.mass_kg), truth.massKg)).toBeLessThan(1e-12);
      const size = Math.max(...box.size) / 100;
      [row.com_x_m, row.com_y_m, row.com_z_m].forEach((place, axis) => expect(Math.abs(Number(place) - truth.comM[axis]) / size).toBeLessThan(1e-12));
      [row.i1_kg_m2, row.i2_kg_m2, row.i3_kg_m2].forEach((moment, axis) => expect(relative(Number(moment), truth.principalKgM2[axis])).toBeLessThan(1e-12));
      expect(row.state).toBe('measured');
    }
  });

  await test.step('type a target mass into a row, see it, and take it back', async () => {
    await page.goto('/shows/quay?q=spot');
    const table = page.getByRole('treegrid', { name: 'Parts' });
    const row = table.getByRole('row').last();
    await expect(row).toContainText('711.6');
    await row.click();
    await page.keyboard.type('640 kg');
    await page.keyboard.press('Enter');
    await expect(row).toContainText('640.0');
    await press(table, page, 'Control+z');
    await expect(row).not.toContainText('640.0');
    await expect(row).toContainText('711.6');
  });
});
