import { escapeIdentifier, escapeLiteral, type Client } from 'pg';
import { appendOnlyTables } from './append-only';

/**
 * Refuses what append-only tables must not suffer, from whichever role it comes: no row is removed or changed but in the columns that
 * the trigger names, and those only from null, all at once.
 */
const REFUSE_CHANGE = `
create or replace function public.refuse_change() returns trigger language plpgsql set search_path = pg_catalog as $guard$
begin
  if tg_op = 'UPDATE' and tg_nargs > 0 and to_jsonb(new) - tg_argv = to_jsonb(old) - tg_argv
     and not exists (select 1 from unnest(tg_argv) as open(name) where to_jsonb(old) -> open.name <> 'null'::jsonb or to_jsonb(new) -> open.name = 'null'::jsonb) then
    return new;
  end if;
  raise exception '% of %: what was written there is never changed', lower(tg_op), tg_table_name using errcode = 'restrict_violation';
end $guard$`;

/**
 * Puts the guards on every append-only table that there is, where they are not there yet.
 * @param client a connected client of the owner's role
 */
export async function guardAppendOnly(client: Client): Promise<void> {
  const { rows } = await client.query<{ name: string; guards: string[] }>(
    `select c.relname as name, array(select pg_get_triggerdef(t.oid) from pg_trigger t where t.tgrelid = c.oid and not t.tgisinternal) as guards
     from pg_class c where c.relnamespace = 'public'::regnamespace and c.relkind = 'r' and c.relname = any($1)`,
    [Object.keys(appendOnlyTables)],
  );
  const statements = rows.flatMap(({ name, guards }) => {
    const table = `public.${escapeIdentifier(name)}`;
    const columns = appendOnlyTables[name].map(escapeLiteral).join(', ');
    const wanted = [
      `CREATE TRIGGER append_only_row BEFORE DELETE OR UPDATE ON ${table} FOR EACH ROW EXECUTE FUNCTION refuse_change(${columns})`,
      `CREATE TRIGGER append_only_table BEFORE TRUNCATE ON ${table} FOR EACH STATEMENT EXECUTE FUNCTION refuse_change()`,
    ];
    return wanted.filter((one) => !guards.includes(one.replaceAll('"', ''))).map((one) => one.replace('CREATE TRIGGER', 'create or replace trigger').replace('FUNCTION refuse_change', 'FUNCTION public.refuse_change'));
  });
  await client.query([REFUSE_CHANGE, ...statements].join(';\n'));
}
