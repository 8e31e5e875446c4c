import { Client, escapeIdentifier } from 'pg';
import { migrateDatabase, type MigrationReport } from '@/db/migrate';
import { grantToApplication } from './grants';
import { guardAppendOnly } from './guards';
import { readMarks } from './marks';
import { prepareQueueSchema } from './queue-schema';
import { ensureApplicationRole, roleOf } from './roles';

/** Key of the advisory lock that lets one start at a time change the schema. */
const BOOTSTRAP_LOCK = 7_305_114;

export type BootstrapReport = MigrationReport & {
  /** False when the application's role could be neither found nor made: then the program runs as the owner. */
  hasApplicationRole: boolean;
  marks: string[];
};

/**
 * Brings a database to what this program expects: migrations, the queue's schema, the application's role and its rights.
 * @param ownerUrl address of the role that owns the tables
 * @param appUrl address of the application's role
 * @param folder the folder of the generated migrations
 */
export async function bootstrapDatabase(ownerUrl: string, appUrl: string, folder: string): Promise<BootstrapReport> {
  const client = new Client({ connectionString: ownerUrl });
  await client.connect();
  try {
    await client.query('select pg_advisory_lock($1)', [BOOTSTRAP_LOCK]);
    const hasApplicationRole = await ensureApplicationRole(client, appUrl);
    const migrations = await migrateDatabase(client, folder);
    await guardAppendOnly(client);
    const appRole = hasApplicationRole ? roleOf(appUrl).name : roleOf(ownerUrl).name;
    await prepareQueueSchema(client, appRole);
    if (hasApplicationRole && appRole !== roleOf(ownerUrl).name) {
      await grantToApplication(client, appRole);
      await client.query(`grant connect on database ${escapeIdentifier(roleOf(ownerUrl).database)} to ${escapeIdentifier(appRole)}`);
    }
    const marks = await readMarks(client);
    return { ...migrations, hasApplicationRole, marks: [...marks] };
  } finally {
    // Ending the session gives the advisory lock back.
    await client.end();
  }
}
