import { Client } from 'pg';

/** What a start has already done to this database, e.g. `demo`; kept beside the migrations' own journal. */
export async function readMarks(client: Client): Promise<Set<string>> {
  await client.query(`create schema if not exists drizzle`);
  await client.query(
    `create table if not exists drizzle.bootstrap_marks (name text primary key, set_at timestamptz not null default now())`,
  );
  const { rows } = await client.query<{ name: string }>('select name from drizzle.bootstrap_marks');
  return new Set(rows.map((row) => row.name));
}

/**
 * Remembers that a start did this.
 * @param replaces marks that begin so are forgotten in its place
 */
export async function setMark(ownerUrl: string, name: string, replaces?: string): Promise<void> {
  const client = new Client({ connectionString: ownerUrl });
  await client.connect();
  try {
    if (replaces) await client.query('delete from drizzle.bootstrap_marks where starts_with(name, $1)', [replaces]);
    await client.query('insert into drizzle.bootstrap_marks (name) values ($1) on conflict do nothing', [name]);
  } finally {
    await client.end();
  }
}
