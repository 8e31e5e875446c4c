import { escapeIdentifier, type Client } from 'pg';
import { appendOnlyTables } from './append-only';

/**
 * Gives the application's role what it needs and takes back the rest, table by table, so that a table that became
 * append-only loses its old rights.
 * @param client a connected client of the owner's role
 * @param appRole name of the application's role
 */
export async function grantToApplication(client: Client, appRole: string): Promise<void> {
  const role = escapeIdentifier(appRole);
  const { rows } = await client.query<{ name: string; is_view: boolean; columns: string[] }>(
    `select relname as name, relkind in ('v', 'm') as is_view,
       array(select attname::text from pg_attribute where attrelid = pg_class.oid and attnum > 0 and not attisdropped) as columns
     from pg_class
     where relnamespace = 'public'::regnamespace and relkind in ('r', 'p', 'v', 'm')
       and pg_get_userbyid(relowner) = current_user`,
  );
  const statements = [`grant usage on schema public to ${role}`];
  for (const { name, is_view: isView, columns } of rows) {
    const table = `public.${escapeIdentifier(name)}`;
    const changeable = appendOnlyTables[name];
    const rights = isView ? 'select' : changeable ? 'select, insert' : 'select, insert, update, delete';
    statements.push(`revoke insert, update, delete, truncate on ${table} from ${role}`, `grant ${rights} on ${table} to ${role}`);
    const open = (changeable ?? []).filter((column) => columns.includes(column)).map(escapeIdentifier);
    if (open.length > 0) statements.push(`grant update (${open.join(', ')}) on ${table} to ${role}`);
  }
  statements.push(`grant usage, select on all sequences in schema public to ${role}`);
  await client.query(statements.join(';\n'));
}
