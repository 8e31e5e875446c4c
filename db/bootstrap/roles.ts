import { Client, escapeIdentifier, escapeLiteral } from 'pg';

/** Name and password of a role, taken from a connection address. */
export function roleOf(url: string): { name: string; password: string; database: string } {
  const { username, password, pathname } = new URL(url);
  return { name: decodeURIComponent(username), password: decodeURIComponent(password), database: decodeURIComponent(pathname.slice(1)) };
}

async function ensureRole(client: Client, name: string, password: string, attributes: string): Promise<void> {
  const { rows } = await client.query('select 1 from pg_roles where rolname = $1', [name]);
  const verb = rows.length > 0 ? 'alter' : 'create';
  await client.query(`${verb} role ${escapeIdentifier(name)} with login ${attributes} password ${escapeLiteral(password)}`);
}

/**
 * On a cluster of our own: the owner's role with its database, and the application's role, neither of them a superuser,
 * who would pass every trigger. The superuser is used here and nowhere else.
 * @param superuserUrl the cluster's superuser, at the database `postgres`
 */
export async function prepareOwnCluster(superuserUrl: string, ownerUrl: string, appUrl: string, mayCreate: boolean): Promise<void> {
  const client = new Client({ connectionString: superuserUrl });
  await client.connect();
  try {
    const owner = roleOf(ownerUrl);
    const app = roleOf(appUrl);
    await ensureRole(client, owner.name, owner.password, `nosuperuser nocreaterole ${mayCreate ? 'createdb' : 'nocreatedb'}`);
    await ensureRole(client, app.name, app.password, 'nosuperuser nocreaterole nocreatedb');
    const { rows } = await client.query('select 1 from pg_database where datname = $1', [owner.database]);
    if (rows.length === 0) {
      await client.query(`create database ${escapeIdentifier(owner.database)} owner ${escapeIdentifier(owner.name)}`);
    }
  } finally {
    await client.end();
  }
}

/**
 * On somebody else's server: makes the application's role where the given role may do so.
 * @param client a connected client of the role that migrates
 * @returns false when the role is not there and cannot be made
 */
export async function ensureApplicationRole(client: Client, appUrl: string): Promise<boolean> {
  const { name, password } = roleOf(appUrl);
  const { rows } = await client.query<{ present: boolean; may_create: boolean }>(
    `select exists (select 1 from pg_roles where rolname = $1) as present,
       (select rolsuper or rolcreaterole from pg_roles where rolname = current_user) as may_create`,
    [name],
  );
  if (rows[0].present) return true;
  if (!rows[0].may_create) return false;
  await ensureRole(client, name, password, 'nosuperuser nocreaterole nocreatedb');
  return true;
}
