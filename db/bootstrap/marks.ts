import type { Client } from 'pg';

/** What a start has already done to this database, e.g. `demo`; kept beside the migrations' own journal. */
export async function readMarks(client: Client): Promise<Set<string>> {
  await client.query(`create schema if not exists drizzle`);
  await client.query(
    `create table if not exists drizzle.bootstrap_marks (name text primary key, set_at timestamptz not null default now())`,
  );
  const { rows } = await client.query<{ name: string }>('select name from drizzle.bootstrap_marks');
  return new Set(rows.map((row) => row.name));
}

/** Remembers that a start did this. */
export async function setMark(client: Client, name: string): Promise<void> {
  await client.query('insert into drizzle.bootstrap_marks (name) values ($1) on conflict do nothing', [name]);
}
