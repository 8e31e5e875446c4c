import { execFile } from 'node:child_process';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import { Client } from 'pg';
import { bootstrapDatabase } from '@/db/bootstrap/bootstrap-database';
import { prepareOwnCluster } from '@/db/bootstrap/roles';
import { withDatabaseName } from './database-name';

const root = fileURLToPath(new URL('../../', import.meta.url));

async function script(...args: string[]): Promise<string> {
  return (await promisify(execFile)(process.execPath, [path.join(root, 'lib/run/test-database.mjs'), ...args])).stdout;
}

/** Addresses of a throw-away PostgreSQL server, one a role. */
export interface OwnCluster {
  superuserUrl: string;
  ownerUrl: string;
  appUrl: string;
}

/** Starts the folder's server, which is made on the first call; each start has the same addresses. */
export async function startOwnCluster(folder: string): Promise<OwnCluster> {
  return JSON.parse(await script('use', String(process.pid), folder)) as OwnCluster;
}

/** Shuts the server down as an administrator would: whoever is connected is sent away. */
export const stopOwnCluster = (folder: string): Promise<string> => script('leave', String(process.pid), folder);

export async function removeOwnCluster(folder: string): Promise<void> {
  await script('remove', '0', folder);
}

/** A migrated database of this name on the server; answers its addresses. */
export async function makeDatabase(cluster: OwnCluster, name: string): Promise<{ ownerUrl: string; appUrl: string }> {
  await prepareOwnCluster(cluster.superuserUrl, cluster.ownerUrl, cluster.appUrl, true);
  const client = new Client({ connectionString: withDatabaseName(cluster.ownerUrl, 'postgres') });
  await client.connect();
  await client.query(`create database ${name}`).finally(() => client.end());
  const urls = { ownerUrl: withDatabaseName(cluster.ownerUrl, name), appUrl: withDatabaseName(cluster.appUrl, name) };
  await bootstrapDatabase(urls.ownerUrl, urls.appUrl, path.join(root, 'drizzle'));
  return urls;
}
