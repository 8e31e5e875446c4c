import process from 'node:process';
import { bundleWorkerWhenChanged } from './support/build.mjs';
import { installDependencies } from './support/dependencies.mjs';
import { loadEnvironment } from './support/environment.mjs';
import { inRoot } from './support/paths.mjs';
import { Stop, runMain } from './support/stop.mjs';

/** One more worker, on this machine or another one: it needs the database and the storage that the studio uses, and nothing else. */
await runMain(async () => {
  loadEnvironment();
  if (!process.env.WEIGHHOUSE_APP_DATABASE_URL && !process.env.DATABASE_URL) {
    throw new Stop('A worker needs the studio’s database: set WEIGHHOUSE_APP_DATABASE_URL (see .env.example). npm start runs a worker of its own.');
  }
  await installDependencies();
  await bundleWorkerWhenChanged();
  process.env.NODE_ENV = 'production';
  process.setSourceMapsEnabled(true);
  // In this very process, so that a signal reaches the worker and its end is this one's.
  await import(inRoot('dist/worker/worker.mjs'));
  return new Promise(() => undefined);
});
