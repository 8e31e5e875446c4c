import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import path from 'node:path';
import { inRoot } from './paths.mjs';

const sources = ['app', 'components', 'hooks', 'lib', 'db', 'public', 'fonts'];
const files = ['package-lock.json', 'tsconfig.json', 'next.config.mjs', 'tailwind.config.ts', 'postcss.config.mjs', 'proxy.ts', 'instrumentation.ts'];

/** What runs from source and is in no build. */
const unbuilt = new Set(['lib/run', 'db/seed', 'db/bootstrap'].map((name) => inRoot(name)));

function* walk(place) {
  if (!existsSync(place) || unbuilt.has(place)) return;
  if (!statSync(place).isDirectory()) return void (yield place);
  for (const name of readdirSync(place).sort()) yield* walk(path.join(place, name));
}

/** Hash over everything that decides what a production build contains. */
export function sourceHash() {
  const hash = createHash('sha256').update(process.version);
  for (const name of [...sources, ...files]) {
    for (const file of walk(inRoot(name))) {
      const bytes = readFileSync(file);
      hash.update(`${path.relative(inRoot(), file)}\0${bytes.length}\0`).update(bytes);
    }
  }
  return hash.digest('hex');
}
