import { randomBytes } from 'node:crypto';
import { chmodSync, existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import path from 'node:path';

const secret = () => randomBytes(24).toString('base64url');

/**
 * The installation's passwords and secrets, made once and kept in `local.env` (mode 0600) of the data folder.
 * @param {string} folder the data folder
 * @returns {{ superuserPassword: string, ownerPassword: string, appPassword: string, authSecret: string }}
 */
export function localSecrets(folder) {
  const file = path.join(folder, 'local.env');
  const known = existsSync(file) ? Object.fromEntries(readFileSync(file, 'utf8').split('\n').filter((line) => line.includes('=')).map((line) => [line.slice(0, line.indexOf('=')), line.slice(line.indexOf('=') + 1)])) : {};
  const names = ['SUPERUSER_PASSWORD', 'OWNER_PASSWORD', 'APP_PASSWORD', 'NEXTAUTH_SECRET'];
  const missing = names.filter((name) => !known[name]);
  if (missing.length > 0) {
    for (const name of missing) known[name] = secret();
    mkdirSync(folder, { recursive: true });
    const text = Object.entries(known).map(([name, value]) => `${name}=${value}\n`);
    writeFileSync(`${file}.new`, text.join(''), { mode: 0o600 });
    renameSync(`${file}.new`, file);
  }
  chmodSync(file, 0o600);
  return {
    superuserPassword: known.SUPERUSER_PASSWORD,
    ownerPassword: known.OWNER_PASSWORD,
    appPassword: known.APP_PASSWORD,
    authSecret: known.NEXTAUTH_SECRET,
  };
}
