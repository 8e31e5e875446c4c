import { existsSync } from 'node:fs';
import { drizzle } from 'drizzle-orm/node-postgres';
import { migrate } from 'drizzle-orm/node-postgres/migrator';
import { readMigrationFiles } from 'drizzle-orm/migrator';
import type { Client } from 'pg';

/** What the database holds of the migrations that the program ships. */
export type MigrationReport = { applied: number; expected: number };

/**
 * Brings the schema up to date and checks that every shipped migration is in the database: the migrator itself compares
 * only the newest timestamp, and would skip one with an older stamp without a word.
 * The caller holds the bootstrap's advisory lock.
 * @param client a connected client of the owner's role
 * @param folder the folder of the generated migrations
 */
export async function migrateDatabase(client: Client, folder: string): Promise<MigrationReport> {
  if (!existsSync(`${folder}/meta/_journal.json`)) return { applied: 0, expected: 0 };
  await migrate(drizzle(client), { migrationsFolder: folder });
  const shipped = readMigrationFiles({ migrationsFolder: folder }).map((one) => one.hash);
  const { rows } = await client.query<{ hash: string }>('select hash from drizzle.__drizzle_migrations');
  const present = new Set(rows.map((row) => row.hash));
  const missing = shipped.filter((hash) => !present.has(hash)).length;
  if (missing > 0) throw new Error(`${missing} of ${shipped.length} migrations are not in the database, or differ from what was applied.`);
  if (rows.length > shipped.length) {
    throw new Error(`The database knows ${rows.length} migrations and this program ${shipped.length}: the program is older than its data.`);
  }
  return { applied: rows.length, expected: shipped.length };
}
