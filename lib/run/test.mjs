import { chmodSync, existsSync, mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { buildWebWhenChanged, bundleWorkerWhenChanged } from './support/build.mjs';
import { chromium } from './support/chromium.mjs';
import { command, endCommands } from './support/command.mjs';
import { installDependencies } from './support/dependencies.mjs';
import { loadEnvironment } from './support/environment.mjs';
import { inRoot } from './support/paths.mjs';
import { postgresPrograms } from './support/postgres-programs.mjs';
import { python } from './support/python.mjs';
import { runMain } from './support/stop.mjs';
import { playwrightCounts, vitestCounts } from './support/test-counts.mjs';

const isLong = process.argv.includes('--long');
const scratch = mkdtempSync(path.join(os.tmpdir(), 'weighhouse-npm-test-'));
const counts = { passed: 0, failed: 0 };
let isEnding = false;

const inModules = (...parts) => inRoot('node_modules', ...parts);

/** Everything the run makes lies in one folder, so that one removal leaves nothing behind. */
function testEnvironment() {
  // The cluster's own user has to pass through, without being able to list.
  chmodSync(scratch, 0o711);
  const temporary = path.join(scratch, 'tmp');
  mkdirSync(temporary, { mode: 0o1777 });
  chmodSync(temporary, 0o1777);
  const env = { ...process.env, TMPDIR: temporary, WEIGHHOUSE_TEST_CLUSTER: path.join(scratch, 'cluster'), FORCE_COLOR: '0', NO_COLOR: '1' };
  for (const name of ['DATABASE_URL', 'WEIGHHOUSE_APP_DATABASE_URL', 'WEIGHHOUSE_DATA', 'SMTP_URL', 'NEXTAUTH_URL', 'PORT', 'NODE_ENV']) delete env[name];
  return env;
}

/** Runs one step, shows its output when it failed (or always, when asked), and counts it. */
async function step(name, act, { isShown = false } = {}) {
  if (isEnding) return;
  const startedAt = Date.now();
  console.log(`begins  ${name}`);
  const { code, output, passed, failed } = await act();
  if (isEnding) return;
  counts.passed += passed ?? (code === 0 ? 1 : 0);
  counts.failed += failed ?? (code === 0 ? 0 : 1);
  const hasFailed = code !== 0 || failed > 0;
  const tally = passed === undefined ? '' : `, ${passed} passed, ${failed} failed`;
  console.log(`${hasFailed ? 'FAILED' : 'passed'}  ${name} (${Math.round((Date.now() - startedAt) / 1000)} s${tally})`);
  if ((hasFailed || isShown) && output.trim()) console.log(output.trimEnd());
}

const node = (env, args) => command(process.execPath, args, { env }).then(({ code, output, errors }) => ({ code, output: output + errors }));

async function typecheck(env) {
  const generated = await node(env, [inModules('next/dist/bin/next'), 'typegen']);
  return generated.code === 0 ? node(env, [inModules('typescript/bin/tsc'), '--noEmit']) : generated;
}

async function vitest(env) {
  const file = path.join(scratch, 'vitest.json');
  const projects = ['unit', 'components', 'reference', 'database', 'api', ...(isLong ? ['long'] : [])].flatMap((name) => ['--project', name]);
  const ran = await node(env, [inModules('vitest/vitest.mjs'), 'run', '--passWithNoTests', '--reporter=default', '--reporter=json', `--outputFile.json=${file}`, ...projects]);
  return { ...ran, ...vitestCounts(file, ran.code) };
}

async function build(env) {
  const { ok, output } = await buildWebWhenChanged(env);
  if (!ok) return { code: 1, output };
  try {
    await bundleWorkerWhenChanged();
    return { code: 0, output: '' };
  } catch (error) {
    return { code: 1, output: String(error.stack ?? error) };
  }
}

async function playwright(env) {
  const file = path.join(scratch, 'playwright.json');
  const ran = await node({ ...env, PLAYWRIGHT_JSON_OUTPUT_NAME: file }, [inModules('@playwright/test/cli.js'), 'test', '--reporter=list,json', '--pass-with-no-tests']);
  return { ...ran, ...playwrightCounts(file, ran.code) };
}

async function test() {
  loadEnvironment();
  const env = testEnvironment();
  await Promise.all([postgresPrograms().then(chromium).then(python), installDependencies()]);
  // Two lanes for two processors. The types are checked before the build, which writes into what the check reads.
  await Promise.all([
    step('type check', () => typecheck(env)).then(() => step('production build', () => build(env))),
    step('tests in Node', () => vitest(env)).then(() => step('lint', () => node(env, [inModules('eslint/bin/eslint.js'), '--max-warnings=0', '--cache', '--cache-strategy=content', `--cache-location=${inRoot('dist/eslint.json')}`, '.']))),
  ]);
  if (existsSync(inRoot('tests/browser'))) await step('tests in the browser', () => playwright(env));
}

/** Ends what still runs, gives it time to clean up, and removes what the run made. */
async function end() {
  isEnding = true;
  endCommands('SIGTERM');
  await command(process.execPath, [inRoot('lib/run/test-database.mjs'), 'remove', '0', path.join(scratch, 'cluster')]).catch(() => undefined);
  rmSync(scratch, { recursive: true, force: true });
}

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
  process.once(signal, () => void end().finally(() => process.exit(130)));
}

await runMain(async () => {
  try {
    await test();
  } finally {
    if (!isEnding) await end();
    // Somebody stopped the run: that ends the process, and there is nothing to count.
    else await new Promise(() => undefined);
  }
  console.log(`${counts.passed} passed, ${counts.failed} failed`);
  return counts.failed === 0 ? 0 : 1;
});
