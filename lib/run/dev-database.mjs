import path from 'node:path';
import { bootstrap } from './support/bootstrap.mjs';
import { startCheckoutCluster } from './support/checkout-cluster.mjs';
import { dataFolder } from './support/paths.mjs';
import { runMain } from './support/stop.mjs';

/** Ensures the data folder's own PostgreSQL, brings its database up to date and prints its addresses; `stop` ends it. */
async function devDatabase() {
  const data = dataFolder();
  const cluster = await startCheckoutCluster({ folder: path.join(data, 'pg'), secretsFolder: data });
  if (process.argv.includes('stop')) return void (await cluster.stop());
  const { ownerUrl, appUrl, superuserUrl } = cluster;
  await bootstrap({ superuserUrl, ownerUrl, appUrl });
  console.log(`DATABASE_URL=${ownerUrl}\nWEIGHHOUSE_APP_DATABASE_URL=${appUrl}`);
  console.error('"node lib/run/dev-database.mjs stop" ends the cluster.');
}

await runMain(devDatabase);
