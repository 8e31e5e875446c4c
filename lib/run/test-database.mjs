import { mkdirSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { startCheckoutCluster } from './support/checkout-cluster.mjs';
import { endCluster } from './support/cluster.mjs';
import { isAlive, withLock } from './support/file-lock.mjs';
import { inRoot } from './support/paths.mjs';
import { runMain } from './support/stop.mjs';

const MOST_TEMPLATES = 3;

/** Drops what runs that were killed have left, and templates of schemas that are no more. */
async function dropLeftovers(url) {
  const { Client } = (await import('pg')).default;
  const client = new Client({ connectionString: url });
  await client.connect();
  try {
    const { rows } = await client.query(`select datname from pg_database where datname ~ '^(wht_|whb_|whtemplate_)' order by oid`);
    const templates = rows.filter(({ datname }) => datname.startsWith('whtemplate_')).slice(-MOST_TEMPLATES);
    for (const row of rows) if (!templates.includes(row)) await client.query(`drop database "${row.datname}" with (force)`);
  } finally {
    await client.end();
  }
}

/**
 * The throw-away cluster that test runs share: `test-database.mjs use PID [FOLDER]` starts it on demand and prints its
 * addresses as JSON, `leave PID [FOLDER]` stops it after its last user, `remove 0 FOLDER` deletes it.
 */
async function testDatabase() {
  const [verb, pid, given] = process.argv.slice(2);
  const folder = path.resolve(given ?? inRoot('var/test-pg'));
  const cluster = path.join(folder, 'pg');
  const users = path.join(folder, 'users');
  mkdirSync(users, { recursive: true });
  return withLock(path.join(folder, 'lock'), async () => {
    if (verb === 'remove') return endCluster({ folder: cluster, remove: true });
    rmSync(path.join(users, pid), { force: true });
    const isAlone = readdirSync(users).filter((user) => isAlive(Number(user)) || rmSync(path.join(users, user), { force: true })).length === 0;
    if (verb === 'leave') return isAlone ? endCluster({ folder: cluster }) : undefined;
    const { superuserUrl, ownerUrl, appUrl } = await startCheckoutCluster({ folder: cluster, secretsFolder: folder, throwAway: true });
    if (isAlone) await dropLeftovers(superuserUrl);
    writeFileSync(path.join(users, pid), '');
    console.log(JSON.stringify({ superuserUrl, ownerUrl, appUrl }));
  });
}

await runMain(testDatabase);
