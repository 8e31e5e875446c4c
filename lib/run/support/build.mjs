import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { command } from './command.mjs';
import { isAlive } from './file-lock.mjs';
import { inRoot } from './paths.mjs';
import { sourceHash } from './source-hash.mjs';
import { Stop } from './stop.mjs';

const webStamp = inRoot('dist/web.sha256');
const workerStamp = inRoot('dist/worker.sha256');
const serving = inRoot('dist/serving');

/** Says that this process serves what is built here, so that nobody builds over it; the answer takes that back. */
export function announceServing() {
  mkdirSync(serving, { recursive: true });
  const file = `${serving}/${process.pid}`;
  writeFileSync(file, '');
  return () => rmSync(file, { force: true });
}

function otherServer() {
  if (!existsSync(serving)) return null;
  for (const pid of readdirSync(serving).map(Number)) {
    if (pid !== process.pid && isAlive(pid)) return pid;
    if (pid !== process.pid) rmSync(`${serving}/${pid}`, { force: true });
  }
  return null;
}

const isStamped = (stamp, hash) => existsSync(stamp) && readFileSync(stamp, 'utf8') === hash;

function refuseWhileServing() {
  const pid = otherServer();
  if (pid) throw new Stop(`The sources changed, and process ${pid} still serves the old build from this checkout. Stop it first.`);
}

/** The worker process and its threads, each bundled to one file under dist/worker. */
async function bundleWorker() {
  const { build, stop } = await import('esbuild');
  const jobs = inRoot('lib/jobs');
  const entries = readdirSync(jobs, { recursive: true }).filter((name) => name === 'worker.ts' || /(^|[-/])thread\.ts$/.test(name) || /^threads\/[^/]+\.ts$/.test(name));
  rmSync(inRoot('dist/worker'), { recursive: true, force: true });
  await build({
    absWorkingDir: inRoot(),
    entryPoints: entries.map((name) => inRoot('lib/jobs', name)),
    outdir: inRoot('dist/worker'),
    outbase: jobs,
    outExtension: { '.js': '.mjs' },
    bundle: true,
    platform: 'node',
    target: 'node20',
    format: 'esm',
    packages: 'external',
    sourcemap: true,
    logLevel: 'error',
  });
  // Its helper process would otherwise live as long as this one.
  await stop();
}

/** Bundles worker and threads when the sources changed. */
export async function bundleWorkerWhenChanged() {
  const hash = sourceHash();
  if (isStamped(workerStamp, hash) && existsSync(inRoot('dist/worker/worker.mjs'))) return;
  refuseWhileServing();
  try {
    await bundleWorker();
  } catch (error) {
    throw new Stop(`The worker could not be bundled: ${error.message}`);
  }
  writeFileSync(workerStamp, hash);
}

/**
 * Builds the web server for production when the sources changed.
 * @param {NodeJS.ProcessEnv} env
 * @returns {Promise<{ ok: boolean, output: string }>} the build's output when it failed
 */
export async function buildWebWhenChanged(env) {
  const hash = sourceHash();
  if (isStamped(webStamp, hash) && existsSync(inRoot('.next/BUILD_ID'))) return { ok: true, output: '' };
  refuseWhileServing();
  console.log('Building for production');
  rmSync(webStamp, { force: true });
  const next = inRoot('node_modules/next/dist/bin/next');
  const { code, output, errors } = await command(process.execPath, [next, 'build'], { env: { ...env, NODE_ENV: 'production' } });
  if (code !== 0) return { ok: false, output: `${output}\n${errors}` };
  mkdirSync(inRoot('dist'), { recursive: true });
  writeFileSync(webStamp, hash);
  return { ok: true, output: '' };
}
