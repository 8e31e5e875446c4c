import { expect, test, type Page, type Route } from '@playwright/test';
import { boxes, boxObj } from './support/boxes';
import { makeShow, signInAsAdmin } from './support/studio';

const MIB = 1024 * 1024;
/** Files larger than this come in parts of this size (contributor's guide, storage and uploads). */
const PART_BYTES = 8 * MIB;
const [CRATE, SMALL, OTHER] = boxes(3);

/** A cage as large as wished: its own lines behind lines of comment. */
function paddedObj(bytes: number): Buffer {
  const body = Buffer.from(boxObj(CRATE));
  const line = `# ${'-'.repeat(97)}\n`;
  return Buffer.concat([Buffer.from(line.repeat(Math.ceil((bytes - body.length) / line.length))), body]);
}

/** Four parts, and below the 50 MB that the driver of the browser takes at once. */
const LARGE = paddedObj(3.5 * PART_BYTES);
const PARTS = Math.ceil(LARGE.length / PART_BYTES);
const file = (name: string, content: Buffer | string) => ({ name, mimeType: 'model/obj', buffer: Buffer.from(content) });

/** Numbers of the parts that arrived, in the order of their answers, over every page of this browser's context. */
function listenForParts(page: Page): number[] {
  const arrived: number[] = [];
  page.context().on('response', (response) => {
    const part = /\/parts\/(\d+)$/.exec(new URL(response.url()).pathname);
    if (part && response.request().method() === 'PUT' && response.ok()) arrived.push(Number(part[1]));
  });
  return arrived;
}

async function drop(page: Page): Promise<void> {
  await page.goto('/shows/ferry/import');
  await page.getByLabel('Files', { exact: true }).setInputFiles([file('crate01_v001.obj', LARGE), file('crate02_v001.obj', boxObj(SMALL))]);
  await expect(page.getByRole('row').filter({ hasText: 'crate01_v001.obj' })).toContainText('new asset');
}

/** Lets so many parts through and holds the others, as a slow line does; answers how those are let go. */
async function letThrough(page: Page, parts: number): Promise<() => Promise<void>> {
  let left = parts;
  const held: Route[] = [];
  await page.route('**/parts/*', async (route) => {
    if (left-- > 0) await route.continue();
    else held.push(route);
  });
  return async () => {
    left = Infinity;
    await Promise.all(held.map((route) => route.continue()));
  };
}

test('an upload survives a lost connection and a reload, and no part goes up twice', async ({ page }) => {
  await signInAsAdmin(page);
  await makeShow(page, 'ferry', 'The Ferry Toll');
  const arrived = listenForParts(page);

  await test.step('the page is reloaded in the middle, after a question', async () => {
    await drop(page);
    await letThrough(page, 2);
    await page.getByRole('button', { name: 'Import 2 files' }).click();
    await expect.poll(() => arrived.length).toBe(2);
    const asked = page.waitForEvent('dialog');
    const reloaded = page.reload();
    const question = await asked;
    expect(question.type()).toBe('beforeunload');
    await question.accept();
    await reloaded;
    await page.unroute('**/parts/*');
  });

  await test.step('the import that was left is told of, and the same files go on with it', async () => {
    const unfinished = page.getByRole('list', { name: 'Unfinished imports' });
    await expect(unfinished.getByRole('listitem')).toHaveCount(1);
    await drop(page);
    await expect(unfinished).toContainText('go on with it');
  });

  await test.step('the connection is lost, is waited for, and the rest arrives', async () => {
    const letGo = await letThrough(page, 1);
    await page.getByRole('button', { name: 'Import 2 files' }).click();
    await expect.poll(() => arrived.length).toBe(3);
    await page.context().setOffline(true);
    await letGo();
    await expect(page.getByText('no connection, waiting').first()).toBeVisible();
    expect(arrived).toHaveLength(3);
    await page.unroute('**/parts/*');
    await page.context().setOffline(false);
    await page.waitForURL('**/shows/ferry/imports/*', { timeout: 120_000 });
  });

  await test.step('each part went up once, both files are measured, and there is one import', async () => {
    expect([...arrived].sort((a, b) => a - b)).toEqual(Array.from({ length: PARTS }, (_, index) => index + 1));
    await expect(page.getByRole('progressbar', { name: 'Files that have ended' })).toHaveAttribute('aria-valuenow', '2', { timeout: 60_000 });
    await expect(page.getByRole('row').filter({ hasText: 'crate01_v001.obj' })).toContainText('measured');
    await page.goto('/shows/ferry/imports');
    await expect(page.getByRole('row').filter({ hasText: 'done' })).toHaveCount(1);
    await expect(page.getByText('not submitted')).toHaveCount(0);
  });
});

test('what the desk says of a name is what the import does with it', async ({ page }) => {
  await signInAsAdmin(page);
  await makeShow(page, 'quayside', 'The Quayside Ledger');
  const rowOf = (name: string) => page.getByRole('row').filter({ hasText: name });
  const ended = (count: number) => expect(page.getByRole('progressbar', { name: 'Files that have ended' })).toHaveAttribute('aria-valuenow', String(count), { timeout: 60_000 });

  await test.step('a first version', async () => {
    await page.goto('/shows/quayside/import');
    await page.getByLabel('Files', { exact: true }).setInputFiles([file('crate01_v001.obj', boxObj(CRATE))]);
    await page.getByRole('button', { name: 'Import 1 file' }).click();
    await page.waitForURL('**/shows/quayside/imports/*');
    await ended(1);
  });

  await test.step('the same bytes, a gap, a new asset, and a file that holds no cage', async () => {
    await page.goto('/shows/quayside/import');
    await page.getByLabel('Files', { exact: true }).setInputFiles([
      file('crate01_v001.obj', boxObj(CRATE)),
      file('crate01_v004.obj', boxObj({ ...CRATE, size: [11, 22, 33] })),
      file('crate02_v001.obj', boxObj(SMALL)),
      file('crate03_v001.obj', boxObj(OTHER)),
      { name: 'crate_colour.png', mimeType: 'image/png', buffer: Buffer.from('no cage') },
    ]);
    await expect(rowOf('crate01_v001.obj')).toContainText('unchanged');
    await expect(rowOf('crate01_v004.obj')).toContainText('new version');
    await expect(rowOf('crate02_v001.obj')).toContainText('new asset');
    await expect(rowOf('crate_colour.png')).toContainText('stays here');
    const asset = page.getByLabel('Asset of crate03_v001.obj');
    await asset.fill('keg');
    await asset.press('Enter');
    await expect(rowOf('crate03_v001.obj')).toContainText('new asset');
  });

  await test.step('they end as they were shown', async () => {
    await page.getByRole('button', { name: 'Import 4 files' }).click();
    await page.waitForURL('**/shows/quayside/imports/*');
    await ended(4);
    await expect(rowOf('crate01_v001.obj')).toContainText('unchanged');
    await expect(rowOf('crate01_v004.obj')).toContainText('v004');
    await expect(rowOf('crate02_v001.obj').getByRole('link', { name: 'crate02' })).toBeVisible();
    await expect(rowOf('crate03_v001.obj').getByRole('link', { name: 'keg' })).toBeVisible();
    await expect(page.getByText('crate_colour.png')).toHaveCount(0);
  });
});
