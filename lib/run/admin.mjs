import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { bootstrap } from './support/bootstrap.mjs';
import { startCheckoutCluster } from './support/checkout-cluster.mjs';
import { installDependencies } from './support/dependencies.mjs';
import { givenDatabase, loadEnvironment, serviceEnvironment } from './support/environment.mjs';
import { localSecrets } from './support/local-secrets.mjs';
import { dataFolder, inRoot } from './support/paths.mjs';
import { runningStart } from './support/run-record.mjs';
import { runMain } from './support/stop.mjs';

/** The address that a running start serves: links in messages lead there. */
function servedAddress(data) {
  const record = path.join(data, 'run.json');
  return runningStart(data) && existsSync(record) ? JSON.parse(readFileSync(record, 'utf8')).address : undefined;
}

/** Administers without a browser, whether the program runs or not: `admin.mjs user add EMAIL --name NAME`. */
async function admin() {
  loadEnvironment();
  await installDependencies();
  const { register } = await import('tsx/esm/api');
  register({ tsconfig: inRoot('tsconfig.json') });
  const { parseOrder } = await import('./admin-arguments.ts');
  const order = parseOrder(process.argv.slice(2));
  if ('usage' in order) {
    console.error(order.usage);
    return 2;
  }
  const data = dataFolder();
  const secrets = localSecrets(data);
  const database = process.env.DATABASE_URL
    ? givenDatabase(secrets)
    : await startCheckoutCluster({ folder: path.join(data, 'pg'), secretsFolder: data });
  try {
    const { superuserUrl, ownerUrl, appUrl } = database;
    const { hasApplicationRole } = await bootstrap({ superuserUrl, ownerUrl, appUrl });
    const address = process.env.NEXTAUTH_URL ?? servedAddress(data);
    const env = serviceEnvironment({ appUrl: hasApplicationRole ? appUrl : ownerUrl, secrets, data, port: null });
    Object.assign(process.env, env, address ? { NEXTAUTH_URL: address } : {});
    const { runOrder } = await import('./admin-cli.ts');
    return await runOrder(order);
  } finally {
    if (!database.wasRunning && !runningStart(data)) await database.stop();
  }
}

await runMain(admin);
