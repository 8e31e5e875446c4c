import { existsSync, readFileSync } from 'node:fs';
import { command } from './command.mjs';
import { inRoot } from './paths.mjs';
import { Stop } from './stop.mjs';

/** Whether node_modules holds what the lock file asks for, by npm's own record of what it installed. */
function isInstalled() {
  const record = inRoot('node_modules/.package-lock.json');
  if (!existsSync(record)) return false;
  const installed = JSON.parse(readFileSync(record, 'utf8')).packages;
  const wanted = JSON.parse(readFileSync(inRoot('package-lock.json'), 'utf8')).packages;
  return Object.entries(wanted).every(([place, { version, optional, peer, link }]) => {
    if (place === '' || link) return true;
    if (!installed[place]) return Boolean(optional || peer);
    return installed[place].version === version && existsSync(inRoot(place));
  });
}

/** Installs the packages of the lock file when they are not there. */
export async function installDependencies() {
  if (isInstalled()) return;
  console.error('Installing packages (npm ci)');
  // A start in production still builds, so it wants the development packages too.
  const { code, errors } = await command('npm', ['ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error']);
  if (code !== 0) throw new Stop(`npm ci failed: ${errors.trim() || 'see its log'}\nCheck the network or the registry that npm is set to, then start again.`);
}
