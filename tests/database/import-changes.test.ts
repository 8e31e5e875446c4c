import { Client } from 'pg';
import { expect, test } from 'vitest';
import { database } from '@/db/client';
import { readImportChanges } from '@/lib/imports/read-import-changes';
import { cubeObj } from '../support/cages';
import { createCast } from '../support/cast';
import { testDatabase } from '../support/database';
import { openWith } from '../support/imports';

const names = (read: Awaited<ReturnType<typeof readImportChanges>>) => read.detail.files.map((file) => file.name);

async function connected(): Promise<Client> {
  const client = new Client({ connectionString: testDatabase().appUrl });
  await client.connect();
  return client;
}

test('what began earlier and commits later is told after the mark of a reading in between', async () => {
  const cast = await createCast();
  const id = await openWith(cast.contextOf('td'), cast.show.code, { 'early.obj': cubeObj(), 'late.obj': cubeObj({ size: 3 }) });
  const read = (since: bigint | null) => readImportChanges(database(), cast.show.id, id, since);
  const [slow, quick] = [await connected(), await connected()];
  try {
    const move = (client: Client, name: string) => client.query(`update import_files set state = 'reading' where import_id = $1 and name = $2`, [id, name]);
    const before = (await read(null)).mark;
    await slow.query('begin');
    await move(slow, 'early.obj');
    await move(quick, 'late.obj');
    const between = await read(before);
    expect(names(between)).toContain('late.obj');
    expect(between.detail.files.find((file) => file.name === 'early.obj')?.state ?? 'queued').toBe('queued');
    await slow.query('commit');
    const after = await read(between.mark);
    expect(after.detail.files.find((file) => file.name === 'early.obj')?.state).toBe('reading');
  } finally {
    await Promise.all([slow.end(), quick.end()]);
  }
});

test('a lease that is renewed is no news', async () => {
  const cast = await createCast();
  const id = await openWith(cast.contextOf('td'), cast.show.code, { 'a.obj': cubeObj() });
  const client = await connected();
  try {
    const changed = async () => (await client.query<{ changed: string }>('select changed from import_files where import_id = $1', [id])).rows[0].changed;
    const before = await changed();
    await client.query(`update import_files set lease_until = now() where import_id = $1`, [id]);
    expect(await changed()).toBe(before);
    await client.query(`update import_files set state = 'measuring' where import_id = $1`, [id]);
    expect(BigInt(await changed())).toBeGreaterThan(BigInt(before));
  } finally {
    await client.end();
  }
});

test('readers that come and go while files change are told the end of every file', async () => {
  const cast = await createCast();
  const files = Object.fromEntries(Array.from({ length: 40 }, (_, index) => [`f${index}.obj`, cubeObj({ size: 1 + index / 100 })]));
  const id = await openWith(cast.contextOf('td'), cast.show.code, files);
  const writers = await Promise.all(Array.from({ length: 4 }, connected));
  const known = new Map<string, string>();
  let isOver = false;
  const reading = (async () => {
    let mark: bigint | null = null;
    for (let isLast = false; !isLast; ) {
      isLast = isOver;
      const read = await readImportChanges(database(), cast.show.id, id, mark);
      mark = read.mark;
      for (const file of read.detail.files) known.set(file.name, file.state);
    }
  })();
  try {
    await Promise.all(
      writers.map(async (client, writer) => {
        for (let index = writer; index < 40; index += writers.length) {
          await client.query('begin');
          await client.query(`update import_files set state = 'measuring' where import_id = $1 and name = $2`, [id, `f${index}.obj`]);
          // Transactions of different lengths, so that they commit in another order than they began.
          await client.query('select pg_sleep($1)', [(index % 5) / 500]);
          await client.query('commit');
        }
      }),
    );
  } finally {
    isOver = true;
    await reading;
    await Promise.all(writers.map((client) => client.end()));
  }
  expect([...known.values()]).toEqual(Array.from({ length: 40 }, () => 'measuring'));
});
