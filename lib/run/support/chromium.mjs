import { existsSync } from 'node:fs';
import { installDebianPackages } from './debian-packages.mjs';

const program = '/usr/bin/chromium';

/** The system's Chromium, installed from Debian's packages where missing. */
export async function chromium() {
  if (existsSync(program)) return program;
  console.error('Installing Chromium from the system packages');
  await installDebianPackages(['chromium', 'fonts-liberation'], { why: 'Chromium for the browser tests is not installed' });
  return program;
}
