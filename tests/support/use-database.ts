import { randomBytes } from 'node:crypto';
import { mkdtempSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { Client, escapeIdentifier } from 'pg';
import { afterAll, inject } from 'vitest';
import { setTestDatabase } from './database';
import { withDatabaseName } from './database-name';

// Runs before a test file's imports, so that lib/config reads the clone's address and a folder of its own.
const { ownerUrl, appUrl, template, prefix } = inject('testServer');
const name = `${prefix}${randomBytes(4).toString('hex')}`;
const folder = mkdtempSync(path.join(os.tmpdir(), 'weighhouse-test-'));

async function onServer(statement: string): Promise<void> {
  const client = new Client({ connectionString: ownerUrl });
  await client.connect();
  await client.query(statement).finally(() => client.end());
}

await onServer(`create database ${escapeIdentifier(name)} template ${escapeIdentifier(template)}`);

const owner = withDatabaseName(ownerUrl, name);
const application = withDatabaseName(appUrl, name);
Object.assign(process.env, {
  DATABASE_URL: owner,
  WEIGHHOUSE_APP_DATABASE_URL: application,
  WEIGHHOUSE_DATA: folder,
  NEXTAUTH_URL: 'http://127.0.0.1:3000',
  NEXTAUTH_SECRET: 'only-for-tests-only-for-tests-000',
  LOG_LEVEL: 'silent',
});
delete process.env.SMTP_URL;
const close = setTestDatabase({ name, ownerUrl: owner, appUrl: application });

afterAll(async () => {
  await close();
  const { closeDatabase } = await import('@/db/client');
  await closeDatabase();
  rmSync(folder, { recursive: true, force: true });
  // A pool that the test left open keeps the clone until the run's end, when the server drops it.
  await onServer(`drop database ${escapeIdentifier(name)}`).catch(() => undefined);
});
