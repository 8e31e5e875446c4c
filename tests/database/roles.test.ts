import { expect, test } from 'vitest';
import { appendOnlyTables } from '@/db/bootstrap/append-only';
import { roleOf } from '@/db/bootstrap/roles';
import { asApplication, asOwner, testDatabase } from '../support/database';

test('the application is no superuser and owns nothing', async () => {
  const [role] = await asApplication('select rolsuper, rolcreaterole, rolcreatedb, rolbypassrls from pg_roles where rolname = current_user');
  expect(role).toEqual({ rolsuper: false, rolcreaterole: false, rolcreatedb: false, rolbypassrls: false });
  const owned = await asApplication(`select relname from pg_class where pg_get_userbyid(relowner) = current_user`);
  expect(owned).toEqual([]);
  await expect(asApplication('create table public.mine (id int)')).rejects.toThrow(/permission denied/);
  await expect(asApplication(`set session_replication_role = 'replica'`)).rejects.toThrow(/permission denied/);
});

test('append-only tables take rows from the application and give none away', async () => {
  const rows = await asOwner<{ name: string; adds: boolean; changes: boolean; removes: boolean; empties: boolean }>(
    `select relname as name,
       has_table_privilege($1, oid, 'insert') as adds,
       has_table_privilege($1, oid, 'update') as changes,
       has_table_privilege($1, oid, 'delete') as removes,
       has_table_privilege($1, oid, 'truncate') as empties
     from pg_class where relnamespace = 'public'::regnamespace and relkind = 'r'`,
    [roleOf(testDatabase().appUrl).name],
  );
  const guarded = rows.filter((row) => row.name in appendOnlyTables);
  expect(guarded.map((row) => row.name)).toEqual(expect.arrayContaining(['geometry_records', 'findings', 'settings', 'audit_events', 'audit_items', 'receipts']));
  for (const row of guarded) expect(row, row.name).toMatchObject({ adds: true, changes: false, removes: false, empties: false });
  for (const row of rows.filter((one) => !(one.name in appendOnlyTables))) {
    expect(row, row.name).toMatchObject({ adds: true, changes: true, removes: true, empties: false });
  }
});

test('the application makes queues and jobs without owning the queue', async () => {
  await asApplication(`select pgboss.create_queue('made-by-application', '{}')`);
  await asApplication(`insert into pgboss.job (name, data) values ('made-by-application', '{}')`);
  const jobs = await asApplication(`delete from pgboss.job where name = 'made-by-application' returning id`);
  expect(jobs).toHaveLength(1);
  await expect(asApplication('drop table pgboss.job')).rejects.toThrow(/must be owner/);
});
