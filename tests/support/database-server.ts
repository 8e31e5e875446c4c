import { execFile } from 'node:child_process';
import { createHash, randomBytes } from 'node:crypto';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import { Client, escapeIdentifier } from 'pg';
import type { TestProject } from 'vitest/node';
import { bootstrapDatabase } from '@/db/bootstrap/bootstrap-database';
import { prepareOwnCluster } from '@/db/bootstrap/roles';
import { withDatabaseName } from './database-name';

/** What a worker needs in order to clone its database. */
export type TestServer = { ownerUrl: string; appUrl: string; template: string; prefix: string };

declare module 'vitest' {
  interface ProvidedContext {
    testServer: TestServer;
  }
}

type Started = { server: TestServer; users: number; end: () => Promise<void> };

const root = fileURLToPath(new URL('../../', import.meta.url));
const run = promisify(execFile);

async function inDatabase<T>(url: string, act: (client: Client) => Promise<T>): Promise<T> {
  const client = new Client({ connectionString: url });
  await client.connect();
  return act(client).finally(() => client.end());
}

/** Everything that decides what a migrated database looks like. */
function schemaHash(): string {
  const hash = createHash('sha256');
  const inFolder = (folder: string, ending: string) =>
    existsSync(`${root}${folder}`) ? readdirSync(`${root}${folder}`).filter((name) => name.endsWith(ending)).map((name) => `${folder}/${name}`) : [];
  const files = [...inFolder('drizzle', '.sql'), ...inFolder('drizzle/meta', '_journal.json'), ...inFolder('db/bootstrap', '.ts'), 'db/migrate.ts'];
  for (const file of files.sort()) hash.update(file).update(readFileSync(`${root}${file}`));
  return hash.digest('hex').slice(0, 12);
}

/** Migrates a template once for this schema; runs that start together wait for one another. */
async function ensureTemplate(ownerUrl: string, appUrl: string, template: string): Promise<void> {
  await inDatabase(ownerUrl, async (client) => {
    await client.query('select pg_advisory_lock(7305115)');
    const { rows } = await client.query('select 1 from pg_database where datname = $1', [template]);
    if (rows.length > 0) return;
    const unfinished = `${template}_new`;
    await client.query(`drop database if exists ${escapeIdentifier(unfinished)} with (force)`);
    await client.query(`create database ${escapeIdentifier(unfinished)}`);
    await bootstrapDatabase(withDatabaseName(ownerUrl, unfinished), appUrl, `${root}drizzle`);
    await client.query(`alter database ${escapeIdentifier(unfinished)} rename to ${escapeIdentifier(template)}`);
  });
}

async function dropDatabases(ownerUrl: string, prefix: string): Promise<void> {
  await inDatabase(ownerUrl, async (client) => {
    const { rows } = await client.query<{ datname: string }>('select datname from pg_database where starts_with(datname, $1)', [prefix]);
    for (const { datname } of rows) await client.query(`drop database if exists ${escapeIdentifier(datname)} with (force)`);
  });
}

async function start(): Promise<Started> {
  const runId = randomBytes(4).toString('hex');
  const prefix = `wht_${runId}_`;
  const given = process.env.WEIGHHOUSE_TEST_DATABASE_URL;
  if (given) {
    // Somebody's server: a role and a template of this run's own, all removed at its end.
    const role = `wht_${runId}`;
    const appUrl = Object.assign(new URL(given), { username: role, password: randomBytes(12).toString('hex') }).href;
    const template = `${prefix}template`;
    await ensureTemplate(given, appUrl, template);
    const end = async () => {
      // Only a member of a role may end its connections.
      await inDatabase(given, (client) => client.query(`grant ${escapeIdentifier(role)} to current_user`)).catch(() => undefined);
      await dropDatabases(given, prefix);
      await inDatabase(given, (client) => client.query(`drop role if exists ${escapeIdentifier(role)}`));
    };
    return { server: { ownerUrl: given, appUrl, template, prefix }, users: 0, end };
  }
  const folder = process.env.WEIGHHOUSE_TEST_CLUSTER;
  const script = (verb: string) => run(process.execPath, [`${root}lib/run/test-database.mjs`, verb, String(process.pid), ...(folder ? [folder] : [])]);
  const { superuserUrl, ownerUrl, appUrl } = JSON.parse((await script('use')).stdout);
  await prepareOwnCluster(superuserUrl, ownerUrl, appUrl, true);
  const template = `whtemplate_${schemaHash()}`;
  await ensureTemplate(ownerUrl, appUrl, template);
  const end = async () => {
    // As the superuser, because a test may have left connections of the application's role open.
    await dropDatabases(superuserUrl, prefix);
    await script('leave');
  };
  return { server: { ownerUrl, appUrl, template, prefix }, users: 0, end };
}

// Several Vitest projects share one server, though each loads this module for itself.
const shared = globalThis as typeof globalThis & { weighhouseTestServer?: Promise<Started> };

export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  shared.weighhouseTestServer ??= start();
  const started = await shared.weighhouseTestServer;
  started.users += 1;
  project.provide('testServer', started.server);
  return async () => {
    started.users -= 1;
    if (started.users > 0) return;
    shared.weighhouseTestServer = undefined;
    await started.end();
  };
}
