import { text } from 'node:stream/consumers';
import { Client } from 'pg';
import { z } from 'zod';
import { bootstrapDatabase } from './bootstrap-database';
import { setMark } from './marks';
import { prepareOwnCluster } from './roles';

/** What `lib/run` hands over on standard input: passwords do not belong on a command line. */
const orders = z.strictObject({
  superuserUrl: z.string().optional(),
  ownerUrl: z.string(),
  appUrl: z.string(),
  migrations: z.string(),
  /** The owner may make databases: for test servers. */
  mayCreateDatabases: z.boolean().default(false),
  /** Only set this mark. */
  mark: z.string().optional(),
});

async function run(): Promise<unknown> {
  const { superuserUrl, ownerUrl, appUrl, migrations, mark, mayCreateDatabases } = orders.parse(JSON.parse(await text(process.stdin)));
  if (mark) {
    const client = new Client({ connectionString: ownerUrl });
    await client.connect();
    await setMark(client, mark).finally(() => client.end());
    return {};
  }
  if (superuserUrl) await prepareOwnCluster(superuserUrl, ownerUrl, appUrl, mayCreateDatabases);
  return bootstrapDatabase(ownerUrl, appUrl, migrations);
}

try {
  console.log(JSON.stringify(await run()));
} catch (error) {
  const { code, message } = error as Error & { code?: string };
  console.log(JSON.stringify({ failed: message || String(error), code: code ?? null }));
  process.exitCode = 1;
}
