import path from 'node:path';
import { bootstrap } from './support/bootstrap.mjs';
import { announceServing, bundleWorkerWhenChanged, buildWebWhenChanged } from './support/build.mjs';
import { startCheckoutCluster } from './support/checkout-cluster.mjs';
import { endCommands } from './support/command.mjs';
import { demoAccounts, isDemoWanted, seedDemo } from './support/demo.mjs';
import { installDependencies } from './support/dependencies.mjs';
import { givenDatabase, loadEnvironment, serviceEnvironment } from './support/environment.mjs';
import { freePort, isPortFree } from './support/free-port.mjs';
import { waitUntilReady } from './support/health.mjs';
import { localSecrets } from './support/local-secrets.mjs';
import { seedMaterialLibrary } from './support/material-library.mjs';
import { dataFolder, inRoot } from './support/paths.mjs';
import { takeDataFolder } from './support/run-record.mjs';
import { startService } from './support/service.mjs';
import { Stop, runMain } from './support/stop.mjs';

async function choosePort() {
  const wish = process.env.PORT;
  if (!wish) return freePort(3000);
  const port = Number(wish);
  if (!Number.isInteger(port) || port < 1 || port > 65535) throw new Stop(`PORT is ${wish}, but a port is a number from 1 to 65535.`);
  if (!(await isPortFree(port))) throw new Stop(`Port ${port} is in use. Set PORT to another one, or leave it out to take a free one.`);
  return port;
}

/** What has to be undone at the end, last first. */
const undo = [];
let isEnding = false;

async function end() {
  isEnding = true;
  endCommands();
  while (undo.length > 0) await undo.pop()();
}

async function start() {
  loadEnvironment();
  const data = dataFolder();
  const record = await takeDataFolder(data);
  undo.push(record.release);
  const port = await choosePort();
  const address = `http://127.0.0.1:${port}`;
  const secrets = localSecrets(data);
  const fromAbove = Boolean(process.env.DATABASE_URL);
  const [database] = await Promise.all([
    fromAbove ? givenDatabase(secrets) : startCheckoutCluster({ folder: path.join(data, 'pg'), secretsFolder: data }),
    installDependencies(),
  ].map(async (step) => {
    const done = await step;
    if (done?.stop) undo.push(done.stop);
    return done;
  }));
  const { superuserUrl, ownerUrl, appUrl: wishedUrl } = database;
  const { hasApplicationRole, marks } = await bootstrap({ superuserUrl, ownerUrl, appUrl: wishedUrl });
  if (!hasApplicationRole) {
    console.error('The role in DATABASE_URL may not make roles, so web and worker use it too. Give them one that owns nothing in WEIGHHOUSE_APP_DATABASE_URL.');
  }
  const env = serviceEnvironment({ appUrl: hasApplicationRole ? wishedUrl : ownerUrl, secrets, data, port });
  undo.push(announceServing());

  await bundleWorkerWhenChanged();
  const services = [];
  const remember = () => record.write({ address, pids: services.map((service) => service.pid).filter(Boolean) });
  const serve = (name, args) => {
    const service = startService({ name, args, env, logFolder: path.join(data, 'log'), onChange: () => !isEnding && queueMicrotask(remember) });
    services.push(service);
    return service;
  };
  undo.push(() => Promise.all(services.map((service) => service.stop())));
  serve('worker', ['--enable-source-maps', inRoot('dist/worker/worker.mjs')]);
  const isSeeding = await isDemoWanted(marks, ownerUrl);
  if (!isSeeding) await seedMaterialLibrary({ marks, env, ownerUrl });
  const [, built] = await Promise.all([isSeeding && seedDemo({ data, env, ownerUrl }), buildWebWhenChanged(env)]);
  if (!built.ok) throw new Stop(`The production build failed:\n${built.output.trim()}`);
  const web = serve('web', [inRoot('node_modules/next/dist/bin/next'), 'start', '-p', String(port), '-H', '127.0.0.1']);
  await waitUntilReady(address, web);
  console.log(`Weighhouse is ready at ${address}`);
  if (isSeeding || marks.includes('demo')) console.log(demoAccounts(data));
}

let signals = 0;
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
  process.on(signal, async () => {
    signals += 1;
    if (signals > 1) return;
    await end().catch((error) => console.error(error));
    process.exit(0);
  });
}

await runMain(async () => {
  try {
    await start();
  } catch (error) {
    // A step that fails because the end has begun says nothing new.
    if (isEnding) return new Promise(() => undefined);
    await end();
    throw error;
  }
});
