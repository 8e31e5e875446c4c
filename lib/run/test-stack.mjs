import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { bootstrap } from './support/bootstrap.mjs';
import { announceServing, buildWebWhenChanged, bundleWorkerWhenChanged } from './support/build.mjs';
import { endCommands } from './support/command.mjs';
import { seedDemo } from './support/demo.mjs';
import { serviceEnvironment } from './support/environment.mjs';
import { waitUntilReady } from './support/health.mjs';
import { inRoot } from './support/paths.mjs';
import { startService } from './support/service.mjs';
import { Stop, runMain } from './support/stop.mjs';
import { throwAwayDatabase } from './support/throw-away-database.mjs';

/*
 * What the browser tests run against: web and worker in production mode on a throw-away database and data folder.
 * Reads WEIGHHOUSE_TEST_PORT, WEIGHHOUSE_TEST_STACK (where to say how it is reached) and WEIGHHOUSE_TEST_DEMO (1 makes the
 * demo show). Ends, leaving nothing, on SIGTERM.
 */
const undo = [];
let isEnding = false;

async function end() {
  if (isEnding) return;
  isEnding = true;
  endCommands();
  while (undo.length > 0) await Promise.resolve(undo.pop()()).catch((error) => console.error(error));
}

async function testStack() {
  process.env.NEXT_TELEMETRY_DISABLED = '1';
  const port = Number(process.env.WEIGHHOUSE_TEST_PORT);
  const data = mkdtempSync(path.join(os.tmpdir(), 'weighhouse-stack-'));
  undo.push(() => rmSync(data, { recursive: true, force: true }));
  const { superuserUrl, ownerUrl, appUrl, drop } = await throwAwayDatabase();
  undo.push(drop);
  await bootstrap({ superuserUrl, ownerUrl, appUrl, mayCreateDatabases: true });
  // Empty rather than left out: the framework would read what a developer has in .env.
  Object.assign(process.env, { SMTP_URL: '', NEXTAUTH_SECRET: '', NEXTAUTH_URL: '' });
  const env = serviceEnvironment({ appUrl, secrets: { authSecret: 'only-for-tests-only-for-tests-000' }, data, port });
  undo.push(announceServing());
  await bundleWorkerWhenChanged();
  const built = await buildWebWhenChanged(env);
  if (!built.ok) throw new Stop(`The production build failed:\n${built.output.trim()}`);
  const logFolder = path.join(data, 'log');
  mkdirSync(logFolder);
  const worker = startService({ name: 'worker', args: ['--enable-source-maps', inRoot('dist/worker/worker.mjs')], env, logFolder });
  undo.push(worker.stop);
  if (process.env.WEIGHHOUSE_TEST_DEMO === '1') await seedDemo({ data, env, ownerUrl });
  // Written before the server answers, because Playwright begins as soon as it does.
  writeFileSync(process.env.WEIGHHOUSE_TEST_STACK, JSON.stringify({ ownerUrl, appUrl, data, logFolder, secret: env.NEXTAUTH_SECRET }), { mode: 0o600 });
  undo.push(() => rmSync(process.env.WEIGHHOUSE_TEST_STACK, { force: true }));
  const web = startService({ name: 'web', args: [inRoot('node_modules/next/dist/bin/next'), 'start', '-p', String(port), '-H', '127.0.0.1'], env, logFolder });
  undo.push(web.stop);
  await waitUntilReady(env.NEXTAUTH_URL, web);
}

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => void end().then(() => process.exit(0)));

await runMain(async () => {
  try {
    await testStack();
  } catch (error) {
    if (isEnding) return new Promise(() => undefined);
    await end();
    throw error;
  }
});
