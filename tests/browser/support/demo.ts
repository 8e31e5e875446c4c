import { execFile } from 'node:child_process';
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { promisify } from 'node:util';
import { browserStack } from '../../support/browser-stack';

const run = promisify(execFile);

/** Everybody's password in the demo. */
export const DEMO_PASSWORD = 'ferrow-tarn-demo';

/** Makes the demo show in the browser tests' database, as a start does; answers the text of the heavier ox that is to be dropped. */
export async function seedDemoShow(): Promise<string> {
  const { ownerUrl, appUrl, data, secret } = browserStack();
  const env = { ...process.env, DATABASE_URL: ownerUrl, WEIGHHOUSE_APP_DATABASE_URL: appUrl, WEIGHHOUSE_DATA: data, NEXTAUTH_SECRET: secret };
  await run(process.execPath, ['--import', 'tsx', 'db/seed/run.ts'], { env });
  return readFileSync(path.join(data, 'demo', 'tarnOx_v013.obj'), 'utf8');
}
