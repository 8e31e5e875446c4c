import { expect, type Page } from '@playwright/test';

export const ADMIN = { name: 'Odrun Vask', email: 'odrun.vask@oxbarrow.example', password: 'a long pole and a bell' };

/** Signed in as the studio's admin: through the first-run page when nobody is there yet, else through the form. */
export async function signInAsAdmin(page: Page): Promise<void> {
  await page.goto('/first-run');
  if (new URL(page.url()).pathname === '/first-run') {
    await page.getByLabel('Your name').fill(ADMIN.name);
    await page.getByLabel('E-mail').fill(ADMIN.email);
    await page.getByLabel('Password').fill(ADMIN.password);
    await page.getByRole('button', { name: 'Set up the studio' }).click();
    await page.waitForURL('**/shows/new');
    return;
  }
  await signIn(page, ADMIN.email, ADMIN.password);
}

export async function signIn(page: Page, email: string, password: string): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL('**/shows');
}

/** Makes a show in centimetres, y up, by the form. */
export async function makeShow(page: Page, code: string, title: string): Promise<void> {
  await page.goto('/shows/new');
  await page.getByLabel('Code').fill(code);
  await page.getByLabel('Title').fill(title);
  await page.getByRole('button', { name: 'Make the show' }).click();
  await page.waitForURL(`**/shows/${code}`);
  await expect(page.getByText(title).first()).toBeVisible();
}
