import { existsSync, readdirSync } from 'node:fs';
import path from 'node:path';
import { installDebianPackages } from './debian-packages.mjs';
import { Stop } from './stop.mjs';

const installed = '/usr/lib/postgresql';

/** The folder of the PostgreSQL server's programs of this major version (the newest when null), or null. */
export function findPostgresPrograms(version = null) {
  if (!existsSync(installed)) return null;
  const versions = readdirSync(installed)
    .filter((name) => existsSync(path.join(installed, name, 'bin', 'initdb')) && (version ?? name) === name)
    .sort((a, b) => Number(b) - Number(a));
  return versions.length > 0 ? path.join(installed, versions[0], 'bin') : null;
}

/** The folder of the PostgreSQL server's programs, installed from Debian's packages where missing. */
export async function postgresPrograms() {
  const found = findPostgresPrograms();
  if (found) return found;
  console.error('Installing PostgreSQL from the system packages');
  await installDebianPackages(['postgresql'], {
    why: 'PostgreSQL is not installed',
    // Only the programs are wanted: no cluster of the system's own, and so no service that starts with it.
    before:
      'mkdir -p /etc/postgresql-common && { grep -qs "^create_main_cluster" /etc/postgresql-common/createcluster.conf || echo "create_main_cluster = false" >> /etc/postgresql-common/createcluster.conf; }',
  });
  const now = findPostgresPrograms();
  if (!now) throw new Stop('The package postgresql was installed, but no server was found under /usr/lib/postgresql.');
  return now;
}
