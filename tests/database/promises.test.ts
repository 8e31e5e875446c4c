import { beforeAll, describe, expect, test } from 'vitest';
import { appendOnlyTables } from '@/db/bootstrap/append-only';
import { POST as approve } from '@/app/api/v1/shows/[show]/approvals/route';
import { GET as list, PATCH } from '@/app/api/v1/shows/[show]/parts/route';
import { GET as exportCsv } from '@/app/api/v1/shows/[show]/shots/[shot]/export.csv/route';
import { POST as lock } from '@/app/api/v1/shows/[show]/shots/[shot]/locks/route';
import { POST as shots } from '@/app/api/v1/shows/[show]/shots/route';
import type { PartPage } from '@/lib/rules/part-row';
import { call, rowsOf } from '../support/api';
import { createCast, type Cast } from '../support/cast';
import { asApplication, asOwner } from '../support/database';
import { boxPart, putCage } from '../support/put-cage';

let cast: Cast;

/** A crate in two shots: approved, locked and pulled. */
beforeAll(async () => {
  cast = await createCast({ linearUnit: 'm', scheme: 'polyhedral' });
  await putCage(cast.show, cast.people.td, 'crate', [boxPart('body', [0, 0, 0], [2, 3, 4])]);
  const params = { show: cast.show.code };
  await call(PATCH, { method: 'PATCH', params, body: { items: [{ asset: 'crate', part: 'body', revision: 1, density_kg_m3: 1 }] }, token: cast.tokenOf('td') });
  const page = (await call(list, { params, token: cast.tokenOf('lead') })).json as unknown as PartPage;
  const approved = await call(approve, { params, body: { items: [{ asset: 'crate', part: 'body', value_sha256: page.items[0].value_sha256 }] }, token: cast.tokenOf('lead') });
  const [{ value_id }] = (approved.json as { items: { value_id: string }[] }).items;
  await call(shots, { params, body: { items: ['fer_0010', 'fer_0020'].map((code) => ({ code, sequence: 'fer', assets: ['crate'] })) }, token: cast.tokenOf('lead') });
  for (const shot of ['fer_0010', 'fer_0020']) {
    const locked = await call(lock, { params: { ...params, shot }, body: { items: [{ asset: 'crate', part: 'body', value_id }] }, token: cast.tokenOf('lead') });
    expect(locked.status, locked.text).toBe(201);
  }
  expect((await call(exportCsv, { params: { ...params, shot: 'fer_0010' }, token: cast.tokenOf('artist') })).status).toBe(200);
});

/** What was promised, byte by byte. */
const promised = () => rowsOf('approvals', 'locks', 'lock_claims', 'receipts', 'receipt_rows', 'geometry_records', 'geometry_parts', 'geometry_components', 'audit_events', 'audit_items', 'settings', 'value_setters');

async function isRefused(sql: string, role: 'application' | 'owner' = 'application'): Promise<void> {
  const before = await promised();
  await expect((role === 'application' ? asApplication : asOwner)(sql), sql).rejects.toThrow(/permission denied|never changed|must be owner|must be superuser|violates|cannot/);
  expect(await promised()).toBe(before);
}

describe('the application’s role with raw SQL', () => {
  test.each(Object.keys(appendOnlyTables))('cannot change, remove or empty %s', async (table) => {
    const [{ column }] = await asOwner<{ column: string }>(`select attname as column from pg_attribute where attrelid = $1::regclass and attnum = 3`, [table]);
    await isRefused(`update ${table} set "${column}" = "${column}"`);
    await isRefused(`delete from ${table}`);
    await isRefused(`truncate ${table} cascade`);
  });

  test.each([
    `update locks set cells = '[]'`,
    `update locks set approval_id = approval_id, unlocked_at = now()`,
    `update locks set unlocked_at = now()`,
    `update lock_claims set part_id = part_id`,
    `insert into locks select * from locks`,
    `insert into locks (show_id, shot_id, copy, asset_id, part_id, approval_id, value_sha256, csv_schema, cells, locked_by) select show_id, shot_id, copy, asset_id, part_id, approval_id, value_sha256, csv_schema, '[]', locked_by from locks`,
    `insert into approvals (id, ordinal) overriding system value values (gen_random_uuid(), 1)`,
    `with gone as (delete from receipts returning *) select count(*) from gone`,
    `merge into approvals a using (select 1) x on true when matched then delete`,
    `insert into receipts (id, show_id, user_id, format, selection, rows, byte_size, sha256, day) select id, show_id, user_id, format, selection, 0, byte_size, sha256, day from receipts on conflict (id) do update set rows = 0`,
    `alter table locks disable trigger all`,
    `alter table locks disable trigger append_only_row`,
    `drop trigger append_only_row on locks`,
    `create or replace function public.refuse_change() returns trigger language plpgsql as $$ begin return new; end $$`,
    `drop function public.refuse_change() cascade`,
    `create trigger mine before update on locks for each row execute function suppress_redundant_updates_trigger()`,
    `create rule mine as on insert to receipts do instead nothing`,
    `alter table approvals alter column mass_kg type text`,
    `alter table locks owner to current_user`,
    `drop table receipts cascade`,
    `set session_replication_role = replica`,
    `set role postgres`,
    `set session authorization postgres`,
    `do $$ begin execute format('set role %I', (select pg_get_userbyid(relowner) from pg_class where relname = 'locks')); end $$`,
    `grant update on locks to current_user; update locks set cells = ''`,
    `alter role current_user superuser`,
    `alter default privileges in schema public grant all on tables to current_user; update locks set cells = ''`,
    `copy locks from program 'true'`,
    `lock table locks in access exclusive mode; delete from locks`,
  ])('is refused: %s', (sql) => isRefused(sql));

  test('a lock ends once, and takes its end back never', async () => {
    const [{ id }] = await asOwner<{ id: string }>(`select l.id from locks l join shots s on s.id = l.shot_id where s.code = 'fer_0020'`);
    await isRefused(`update locks set unlocked_at = now() where id = '${id}'`);
    await asApplication(`update locks set unlocked_at = now(), unlocked_by = locked_by, unlock_reason = 'wrong shot' where id = $1`, [id]);
    await isRefused(`update locks set unlocked_at = null, unlocked_by = null, unlock_reason = null where id = '${id}'`);
    await isRefused(`update locks set unlock_reason = 'another' where id = '${id}'`);
  });
});

describe('the owner of the tables', () => {
  test.each(Object.keys(appendOnlyTables))('is refused too by the triggers of %s', async (table) => {
    const [{ rows, column }] = await asOwner<{ rows: boolean; column: string }>(`select exists (select 1 from ${table}) as rows, (select attname from pg_attribute where attrelid = $1::regclass and attnum = 3) as column`, [table]);
    await isRefused(`truncate ${table} cascade`, 'owner');
    if (!rows) return;
    await isRefused(`delete from ${table}`, 'owner');
    await isRefused(`update ${table} set "${column}" = "${column}"`, 'owner');
  });
});
