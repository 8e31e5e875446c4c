import { drizzle, type NodePgDatabase } from 'drizzle-orm/node-postgres';
import { Pool } from 'pg';
import { config } from '../lib/config';
import { schema } from './tables';

export type Database = NodePgDatabase<typeof schema>;
/** A database or a transaction in it: what a verb's helpers take. */
export type Executor = Database | Parameters<Parameters<Database['transaction']>[0]>[0];
export type Transaction = Parameters<Parameters<Database['transaction']>[0]>[0];

/** A client over its own pool, as the role named in the URL. */
export function connect(url: string, max = 10): { db: Database; pool: Pool; close: () => Promise<void> } {
  const pool = new Pool({ connectionString: url, max });
  pool.on('error', () => undefined);
  // A connection that breaks between two statements of a transaction has nobody listening but us: the next statement says so, and the process must not end of it.
  pool.on('connect', (client) => client.on('error', () => undefined));
  return { db: drizzle(pool, { schema }), pool, close: () => pool.end() };
}

const holder = globalThis as typeof globalThis & { weighhouseDatabase?: ReturnType<typeof connect> };

/** The process's database as the application's role; the development server's reloads share one pool. */
export function database(): Database {
  if (!holder.weighhouseDatabase) {
    const url = config().appDatabaseUrl;
    if (!url) throw new Error('No database: set DATABASE_URL, or start with npm start.');
    holder.weighhouseDatabase = connect(url);
  }
  return holder.weighhouseDatabase.db;
}

/** Ends the process's pool, if there is one; a later call of database() opens a new one. */
export async function closeDatabase(): Promise<void> {
  const held = holder.weighhouseDatabase;
  delete holder.weighhouseDatabase;
  await held?.close();
}
