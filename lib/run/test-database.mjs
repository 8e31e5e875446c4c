import { mkdirSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { startCheckoutCluster } from './support/checkout-cluster.mjs';
import { isAlive, withLock } from './support/file-lock.mjs';
import { inRoot } from './support/paths.mjs';
import { runMain } from './support/stop.mjs';

/**
 * The throw-away cluster that test runs share: `test-database.mjs use PID [FOLDER]` starts it on demand and prints its
 * addresses as JSON, `leave PID [FOLDER]` stops it after its last user.
 */
async function testDatabase() {
  const [verb, pid, given] = process.argv.slice(2);
  const folder = path.resolve(given ?? inRoot('var/test-pg'));
  const users = path.join(folder, 'users');
  mkdirSync(users, { recursive: true });
  return withLock(path.join(folder, 'lock'), async () => {
    const { superuserUrl, ownerUrl, appUrl, stop } = await startCheckoutCluster({
      folder: path.join(folder, 'pg'),
      secretsFolder: folder,
      throwAway: true,
    });
    if (verb === 'use') {
      writeFileSync(path.join(users, pid), '');
      console.log(JSON.stringify({ superuserUrl, ownerUrl, appUrl }));
      return;
    }
    rmSync(path.join(users, pid), { force: true });
    const living = readdirSync(users).filter((user) => {
      if (isAlive(Number(user))) return true;
      rmSync(path.join(users, user), { force: true });
      return false;
    });
    if (living.length === 0) await stop();
  });
}

await runMain(testDatabase);
