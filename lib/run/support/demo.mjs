import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { markDatabase } from './bootstrap.mjs';
import { command } from './command.mjs';
import { inRoot } from './paths.mjs';
import { Stop } from './stop.mjs';

const entry = inRoot('db/seed/run.ts');
const accountsFile = (data) => path.join(data, 'demo-accounts.txt');

/**
 * Whether the demo show is to be made now. A database that was started without the demo stays without it, until
 * WEIGHHOUSE_DEMO=1 asks for it: it may hold a studio's work by then.
 */
export async function isDemoWanted(marks, ownerUrl) {
  if (marks.includes('demo') || !existsSync(entry)) return false;
  const wish = process.env.WEIGHHOUSE_DEMO;
  if (wish === '0') {
    if (!marks.includes('without-demo')) await markDatabase(ownerUrl, 'without-demo');
    return false;
  }
  return wish === '1' || !marks.includes('without-demo');
}

/** Makes the demo show through the real import path: the worker must run. What it prints about accounts is kept for later starts. */
export async function seedDemo({ data, env, ownerUrl }) {
  console.log('Importing the demo show');
  const { code, output, errors } = await command(process.execPath, ['--import', 'tsx', entry], { env });
  if (code !== 0) throw new Stop(`The demo show could not be made (WEIGHHOUSE_DEMO=0 starts without it):\n${(errors || output).trim()}`);
  writeFileSync(accountsFile(data), output, { mode: 0o600 });
  await markDatabase(ownerUrl, 'demo');
}

/** The demo's accounts as the seed printed them, or nothing. */
export const demoAccounts = (data) => (existsSync(accountsFile(data)) ? readFileSync(accountsFile(data), 'utf8').trim() : '');
