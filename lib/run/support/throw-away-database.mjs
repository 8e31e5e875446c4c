import { randomBytes } from 'node:crypto';
import { command } from './command.mjs';
import { inRoot } from './paths.mjs';
import { Stop } from './stop.mjs';

const withName = (url, name) => Object.assign(new URL(url), { pathname: `/${name}` }).href;

/** Runs statements as a role of the server, one after another (pg is there by now). */
async function onServer(url, statements) {
  const { Client } = (await import('pg')).default;
  const client = new Client({ connectionString: url });
  await client.connect();
  try {
    for (const statement of statements) await client.query(statement);
  } finally {
    await client.end();
  }
}

/**
 * A new, empty database on the tests' throw-away cluster, or on the server in WEIGHHOUSE_TEST_DATABASE_URL.
 * @returns {Promise<{ superuserUrl?: string, ownerUrl: string, appUrl: string, drop: () => Promise<void> }>}
 */
export async function throwAwayDatabase() {
  const id = randomBytes(4).toString('hex');
  const name = `whb_${id}`;
  const given = process.env.WEIGHHOUSE_TEST_DATABASE_URL;
  if (given) {
    const appUrl = Object.assign(new URL(withName(given, name)), { username: name, password: randomBytes(12).toString('hex') }).href;
    await onServer(given, [`create database ${name}`]);
    const drop = () => onServer(given, [`drop database if exists ${name} with (force)`, `drop role if exists ${name}`]);
    return { ownerUrl: withName(given, name), appUrl, drop };
  }
  const folder = process.env.WEIGHHOUSE_TEST_CLUSTER;
  const testDatabase = (verb) => command(process.execPath, [inRoot('lib/run/test-database.mjs'), verb, String(process.pid), ...(folder ? [folder] : [])]);
  const { code, output, errors } = await testDatabase('use');
  if (code !== 0) throw new Stop(errors.trim());
  const { superuserUrl, ownerUrl, appUrl } = JSON.parse(output);
  const drop = async () => {
    await onServer(superuserUrl, [`drop database if exists ${name} with (force)`]);
    await testDatabase('leave');
  };
  return { superuserUrl, ownerUrl: withName(ownerUrl, name), appUrl: withName(appUrl, name), drop };
}
