import { text } from 'node:stream/consumers';
import { Client } from 'pg';
import { z } from 'zod';
import { bootstrapDatabase } from './bootstrap-database';
import { setMark } from './marks';
import { prepareOwnCluster, roleOf } from './roles';

/** What `lib/run` hands over on standard input: passwords do not belong on a command line. */
const orders = z.strictObject({
  superuserUrl: z.string().optional(),
  ownerUrl: z.string(),
  appUrl: z.string(),
  migrations: z.string(),
  /** The owner may make databases: for test servers. */
  mayCreateDatabases: z.boolean().default(false),
  /** Names what this run does, to be found done by the next start. */
  fingerprint: z.string().optional(),
  /** Only set this mark. */
  mark: z.string().optional(),
});

/** On somebody else's server the role may be there already, with a password that we do not know. */
async function tryConnecting(appUrl: string): Promise<void> {
  const client = new Client({ connectionString: appUrl });
  try {
    await client.connect();
  } catch {
    throw Object.assign(new Error(`The role ${roleOf(appUrl).name} exists there, but does not let us in with the password at hand.`), { code: 'APPLICATION_ROLE' });
  } finally {
    await client.end().catch(() => undefined);
  }
}

async function run(): Promise<unknown> {
  const { superuserUrl, ownerUrl, appUrl, migrations, fingerprint, mark, mayCreateDatabases } = orders.parse(JSON.parse(await text(process.stdin)));
  if (mark) return setMark(ownerUrl, mark);
  if (superuserUrl) await prepareOwnCluster(superuserUrl, ownerUrl, appUrl, mayCreateDatabases);
  const report = await bootstrapDatabase(ownerUrl, appUrl, migrations);
  if (report.hasApplicationRole && !superuserUrl) await tryConnecting(appUrl);
  if (fingerprint && report.hasApplicationRole) await setMark(ownerUrl, `done:${fingerprint}`, 'done:');
  return report;
}

try {
  console.log(JSON.stringify((await run()) ?? {}));
} catch (error) {
  const { code, message } = error as Error & { code?: string };
  console.log(JSON.stringify({ failed: message || String(error), code: code ?? null }));
  process.exitCode = 1;
}
