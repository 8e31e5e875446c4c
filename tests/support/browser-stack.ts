import { execFile } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';

/** How the browser tests' own database and data folder are reached. */
export type BrowserStack = { ownerUrl: string; appUrl: string; data: string; logFolder: string; secret: string };

const root = fileURLToPath(new URL('../../', import.meta.url));
const run = promisify(execFile);

export function browserStack(): BrowserStack {
  const file = process.env.WEIGHHOUSE_TEST_STACK;
  if (!file) throw new Error('Only tests under tests/browser have a running product.');
  return JSON.parse(readFileSync(file, 'utf8')) as BrowserStack;
}

/** Runs `npm run admin -- …` against the browser tests' database; answers what it printed. */
export async function admin(...args: string[]): Promise<string> {
  const { ownerUrl, appUrl, data, secret } = browserStack();
  const env = { ...process.env, DATABASE_URL: ownerUrl, WEIGHHOUSE_APP_DATABASE_URL: appUrl, WEIGHHOUSE_DATA: data, NEXTAUTH_SECRET: secret };
  const { stdout } = await run(process.execPath, [`${root}lib/run/admin.mjs`, ...args], { env });
  return stdout.trim();
}
