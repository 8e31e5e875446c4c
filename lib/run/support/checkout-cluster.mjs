import path from 'node:path';
import { localUrl } from './bootstrap.mjs';
import { startCluster } from './cluster.mjs';
import { withLock } from './file-lock.mjs';
import { localSecrets } from './local-secrets.mjs';

/**
 * Starts a cluster of the checkout's own and names its three addresses: superuser (bootstrap only), owner (migrates),
 * application.
 * @param {{ folder: string, secretsFolder: string, throwAway?: boolean }} options
 */
export async function startCheckoutCluster({ folder, secretsFolder, throwAway = false }) {
  const [secrets, cluster] = await withLock(path.join(secretsFolder, 'pg.lock'), async () => {
    const made = localSecrets(secretsFolder);
    return [made, await startCluster({ folder: path.resolve(folder), superuserPassword: made.superuserPassword, throwAway })];
  });
  const { port } = cluster;
  return {
    ...cluster,
    secrets,
    superuserUrl: localUrl({ user: 'postgres', password: secrets.superuserPassword, port, database: 'postgres' }),
    ownerUrl: localUrl({ user: 'weighhouse_owner', password: secrets.ownerPassword, port, database: 'weighhouse' }),
    appUrl: localUrl({ user: 'weighhouse_app', password: secrets.appPassword, port, database: 'weighhouse' }),
  };
}
