import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import path from 'node:path';
import { inRoot } from './paths.mjs';

const sources = ['app', 'components', 'hooks', 'lib', 'db', 'public', 'fonts'];
const files = ['package-lock.json', 'tsconfig.json', 'next.config.mjs', 'tailwind.config.ts', 'postcss.config.mjs', 'proxy.ts', 'instrumentation.ts'];

/** What runs from source and is in no build. */
const unbuilt = ['lib/run/', 'db/seed/', 'db/bootstrap/'];

/** The files of a folder and its folders, or the file itself, in a fixed order. */
export function* filesUnder(place) {
  if (!existsSync(place)) return;
  if (!statSync(place).isDirectory()) return void (yield place);
  for (const name of readdirSync(place).sort()) yield* filesUnder(path.join(place, name));
}

let known = null;

/** Hash over everything that decides what a production build contains, taken once in a process. */
export function sourceHash() {
  known ??= hashSources();
  return known;
}

function hashSources() {
  const hash = createHash('sha256').update(process.version);
  for (const place of [...sources, ...files]) {
    for (const file of filesUnder(inRoot(place))) {
      const name = path.relative(inRoot(), file);
      if (unbuilt.some((folder) => name.startsWith(folder))) continue;
      const bytes = readFileSync(file);
      hash.update(`${name}\0${bytes.length}\0`).update(bytes);
    }
  }
  return hash.digest('hex');
}
