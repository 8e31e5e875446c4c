import { createHash } from 'node:crypto';
import { expect, test, type Browser, type Page } from '@playwright/test';
import { DEMO_PASSWORD, seedDemoShow } from './support/demo';
import { startSecondWeb } from './support/second-web';
import { signIn } from './support/studio';

const SHOTS = Array.from({ length: 10 }, (_, i) => `tst_${String(i + 1).padStart(4, '0')}`);
const MOVED = SHOTS.slice(0, 5);
const KEPT = SHOTS.slice(5);
/** tarnOx has so many parts (demo.md). */
const PARTS = 22;

async function as(browser: Browser, email: string): Promise<Page> {
  const page = await (await browser.newContext()).newPage();
  await signIn(page, email, DEMO_PASSWORD);
  return page;
}

interface Pulled {
  sha256: string;
  etag: string;
  text: string;
}

/** What a shot hands out, as a signed-in person's browser gets it. */
async function pull(page: Page, shot: string, origin = ''): Promise<Pulled> {
  const answer = await page.request.get(`${origin}/api/v1/shows/tarn/shots/${shot}/export.csv`);
  expect(answer.status()).toBe(200);
  const body = await answer.body();
  return { sha256: createHash('sha256').update(body).digest('hex'), etag: answer.headers().etag, text: body.toString('utf8') };
}

/** Approves all of the ox without warnings by keyboard, from the end of the queue where it stands; answers what its last row said. */
async function approveOx(lead: Page, state: 'asked' | 'outdated'): Promise<string> {
  await lead.goto(`/shows/tarn/approvals?state=${state}`);
  const queue = lead.getByRole('treegrid', { name: 'Approvals' });
  await expect(queue.getByRole('row').nth(2)).toBeVisible();
  await queue.focus();
  await lead.keyboard.press('End');
  const last = queue.locator('[data-key="tarnOx/torso"]');
  await expect(last).toBeVisible();
  const text = await last.innerText();
  await lead.keyboard.press('Shift+A');
  await expect(last).toBeHidden();
  return text;
}

test('a value is set, asked for, approved by somebody else, locked, and stays what it was when a heavier version comes', async ({ browser }) => {
  const heavierOx = await seedDemoShow();
  const td = await as(browser, 'ilvo.brackmere@oxbarrow.example');
  const lead = await as(browser, 'tamsel.wroe@oxbarrow.example');
  const artist = await as(browser, 'hesta.quoin@oxbarrow.example');

  await test.step('the TD says that the ox weighs 640 kg, and asks for approval', async () => {
    await td.goto('/shows/tarn?q=tarnOx');
    const table = td.getByRole('treegrid', { name: 'Parts' });
    await expect(table.getByRole('row').filter({ hasText: 'horn_L' })).toBeVisible();
    await table.focus();
    await td.keyboard.press('Control+a');
    await td.keyboard.press('m');
    const dialog = td.getByRole('dialog');
    await dialog.getByLabel('Mass from').click();
    await td.getByRole('option', { name: 'Target mass' }).click();
    await dialog.getByLabel('Target mass').fill('640 kg');
    await dialog.getByLabel('One mass for all of them').check();
    await dialog.getByRole('button', { name: /^Set/ }).click();
    await expect(dialog).toBeHidden();
    await td.goto('/shows/tarn/assets/tarnOx');
    await td.getByRole('button', { name: `Ask for approval of ${PARTS}` }).click();
    await td.getByRole('dialog').getByLabel('Note').fill('640 kg as agreed');
    await td.getByRole('dialog').getByRole('button', { name: 'Ask' }).click();
    await expect(td.getByRole('button', { name: /^Ask for approval/ })).toBeHidden();
  });

  await test.step('the lead sees the question and approves the ox by keyboard', async () => {
    await approveOx(lead, 'asked');
    await lead.goto('/shows/tarn/assets/tarnOx');
    await expect(lead.getByText(new RegExp(`^${PARTS} approved`))).toBeVisible();
  });

  await test.step('ten shots come by paste and are locked as a sequence', async () => {
    await lead.goto('/shows/tarn/shots');
    await lead.getByRole('button', { name: 'Add shots' }).click();
    const dialog = lead.getByRole('dialog');
    await dialog.getByLabel('Shot list').fill(['sequence\tshot\tassets', ...SHOTS.map((shot) => `tst\t${shot}\ttarnOx`)].join('\n'));
    await dialog.getByRole('button', { name: /^Add 10 shots/ }).click();
    await expect(dialog).toBeHidden();
    await lead.goto('/shows/tarn/sequences/tst');
    await lead.getByRole('button', { name: 'Lock sequence' }).click();
    await expect(lead.getByText(`${10 * PARTS} parts locked. Nothing is missing.`)).toBeVisible();
  });

  const promised = new Map<string, Pulled>();
  await test.step('the artist pulls them', async () => {
    for (const shot of SHOTS) promised.set(shot, await pull(artist, shot));
    expect(promised.get(SHOTS[0])?.text.split('\r\n')).toHaveLength(PARTS + 2);
    await artist.goto(`/shows/tarn/shots/${SHOTS[0]}`);
    await expect(artist.getByText('Hesta Quoin').first()).toBeVisible();
  });

  await test.step('a heavier ox comes; what is locked does not move', async () => {
    await td.goto('/shows/tarn/import');
    await td.getByLabel('Files', { exact: true }).setInputFiles([{ name: 'tarnOx_v013.obj', mimeType: 'model/obj', buffer: Buffer.from(heavierOx) }]);
    await td.getByRole('button', { name: 'Import 1 file' }).click();
    await td.waitForURL('**/shows/tarn/imports/*');
    await expect(td.getByRole('progressbar', { name: 'Files that have ended' })).toHaveAttribute('aria-valuenow', '1', { timeout: 60_000 });
    for (const shot of SHOTS) expect((await pull(artist, shot)).sha256).toBe(promised.get(shot)?.sha256);
  });

  await test.step('the lead reads the verdict, compares, and approves', async () => {
    await lead.goto('/shows/tarn/shots?state=outdated');
    await expect(lead.getByRole('row').filter({ hasText: SHOTS[0] }).first()).toBeVisible();
    await lead.goto('/shows/tarn/compare?asset=tarnOx&part=torso&a=v012&b=v013');
    await expect(lead.getByRole('heading', { level: 1 })).toContainText(/mm .*of its size/);
    await expect(lead.getByRole('table')).toContainText('Mass');
    const verdict = await approveOx(lead, 'outdated');
    expect(verdict).toMatch(/[+−][\d.]+ %|[\d.]+ mm/);
  });

  await test.step('five shots are re-locked to the new value, with every difference first', async () => {
    for (const shot of MOVED) {
      await lead.goto(`/shows/tarn/shots/${shot}`);
      await lead.getByRole('checkbox', { name: 'Every part of the shot' }).first().check();
      await lead.getByRole('button', { name: /^Re-lock/ }).click();
      const dialog = lead.getByRole('dialog');
      await expect(dialog.getByRole('table')).toContainText('torso');
      await dialog.getByLabel('Reason').fill('The hump of v013');
      await dialog.getByRole('button', { name: /^Re-lock/ }).click();
      await expect(dialog).toBeHidden();
    }
  });

  await test.step('the five have the new rows, the other five their old bytes, from a web server that was started after all that too', async () => {
    for (const shot of MOVED) {
      const now = await pull(artist, shot);
      expect(now.sha256).not.toBe(promised.get(shot)?.sha256);
      expect(now.text).toContain('v013');
    }
    const second = await startSecondWeb();
    try {
      for (const shot of KEPT) {
        const now = await pull(artist, shot, second.address);
        expect(now.sha256).toBe(promised.get(shot)?.sha256);
        const known = await artist.request.get(`${second.address}/api/v1/shows/tarn/shots/${shot}/export.csv`, { headers: { 'if-none-match': now.etag } });
        expect(known.status()).toBe(304);
      }
    } finally {
      await second.stop();
    }
  });
});
