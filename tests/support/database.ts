import { Pool, type QueryResultRow } from 'pg';

/** The clone of the migrated template that belongs to this test file alone. */
export type TestDatabase = {
  name: string;
  /** Address as the owner's role, which migrates. */
  ownerUrl: string;
  /** Address as the application's role, under which the product runs. */
  appUrl: string;
};

let current: TestDatabase | null = null;
let pools: { owner: Pool; application: Pool } | null = null;

/** Called by the set-up file; answers what closes the pools. */
export function setTestDatabase(database: TestDatabase): () => Promise<void> {
  current = database;
  return async () => {
    await Promise.all([pools?.owner.end(), pools?.application.end()]);
    pools = null;
  };
}

/** This test file's own database: cloned for it, dropped after it. `lib/config` already points at it. */
export function testDatabase(): TestDatabase {
  if (!current) throw new Error('Only tests under tests/database, tests/api and tests/long have a database.');
  return current;
}

function openPools(): { owner: Pool; application: Pool } {
  const { ownerUrl, appUrl } = testDatabase();
  pools ??= { owner: new Pool({ connectionString: ownerUrl, max: 2 }), application: new Pool({ connectionString: appUrl, max: 2 }) };
  return pools;
}

/** Runs SQL as the owner, past the product's own code: to arrange and to look. */
export async function asOwner<Row extends QueryResultRow>(text: string, values: unknown[] = []): Promise<Row[]> {
  return (await openPools().owner.query<Row>(text, values)).rows;
}

/** Runs SQL as the application's role: to show what the database refuses it. */
export async function asApplication<Row extends QueryResultRow>(text: string, values: unknown[] = []): Promise<Row[]> {
  return (await openPools().application.query<Row>(text, values)).rows;
}
