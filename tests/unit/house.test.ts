import { existsSync, readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { expect, test } from 'vitest';

const root = fileURLToPath(new URL('../..', import.meta.url)).replace(/\/$/, '');
/** The framework's own files at the top look where app may. */
const frameworkFiles = ['proxy.ts', 'instrumentation.ts'].filter((name) => existsSync(path.join(root, name)));
const rooms = ['app', 'components', 'hooks', 'lib', 'db'];

function filesIn(folder: string): string[] {
  return readdirSync(path.join(root, folder), { withFileTypes: true }).flatMap((entry) => {
    const name = `${folder}/${entry.name}`;
    if (entry.isDirectory()) return filesIn(name);
    return /\.(ts|tsx)$/.test(entry.name) ? [name] : [];
  });
}

/** What a file imports of ours, as paths from the checkout's folder; packages are left out. */
function importsOf(file: string): string[] {
  const text = readFileSync(path.join(root, file), 'utf8');
  const found = text.matchAll(/(?:\bfrom\s*|\bimport\s*\(?\s*)(['"])([^'"\n]+)\1/g);
  return [...found].flatMap(([, , target]) => {
    if (target.startsWith('@/')) return [target.slice(2)];
    if (target.startsWith('.')) return [path.posix.join(path.posix.dirname(file), target)];
    return [];
  });
}

/** The room of a path, by the table of DEVELOPERS.md. */
function roomOf(file: string): string {
  const [top, second] = file.split('/');
  if (frameworkFiles.includes(file)) return 'app';
  if (top !== 'lib') return top;
  if (second === 'engine' || second === 'formats' || second === 'rules') return `lib/${second}`;
  if (/^config(\.ts)?$/.test(second ?? '')) return 'lib/config';
  return 'lib';
}

const mayImport: Record<string, readonly string[]> = {
  'lib/engine': ['lib/engine'],
  'lib/rules': ['lib/rules'],
  'lib/formats': ['lib/formats', 'lib/engine'],
  'lib/config': [],
  lib: ['lib', 'lib/engine', 'lib/rules', 'lib/formats', 'lib/config', 'db'],
  db: ['db', 'lib/rules', 'lib/config'],
  hooks: ['hooks', 'lib/rules', 'lib/engine'],
  components: ['components', 'hooks', 'lib/rules', 'lib/engine'],
  app: ['app', 'components', 'hooks', 'lib', 'lib/engine', 'lib/rules', 'lib/formats', 'lib/config', 'public', 'fonts'],
};

/** The seed drives the real import path, as a script does: it may look where lib may. */
const allowedOf = (file: string): readonly string[] => (file.startsWith('db/seed/') ? mayImport.lib : (mayImport[roomOf(file)] ?? []));

const files = [...rooms.flatMap(filesIn), ...frameworkFiles];

test('every import stays within what its room may see', () => {
  const offences = files.flatMap((file) =>
    importsOf(file)
      .filter((target) => !allowedOf(file).includes(roomOf(target)))
      .map((target) => `${file} imports ${target}`),
  );
  expect(offences).toEqual([]);
});

test('the check sees an import across rooms', () => {
  expect(roomOf('db/client')).toBe('db');
  expect(mayImport.app).not.toContain(roomOf('db/schema/shows'));
  expect(mayImport.components).not.toContain(roomOf('lib/shows/get-show'));
  expect(importsOf('db/migrate.ts')).toEqual([]);
  expect(importsOf('db/bootstrap/bootstrap-database.ts')).toContain('db/migrate');
});

test('the environment is read in one file', () => {
  // NEXT_RUNTIME is the compiler's: it replaces these very words, and takes away what the other runtime cannot load.
  const textOf = (file: string) => readFileSync(path.join(root, file), 'utf8').replaceAll('process.env.NEXT_RUNTIME', '');
  const readers = files.filter((file) => /process\s*\.\s*env|process\[['"]env/.test(textOf(file)));
  expect(readers).toEqual(['lib/config.ts']);
});

test('nothing is at the top but what the house names', () => {
  const allowed = new Set(
    `app components hooks db drizzle public fonts tests lib .ci README.md DEVELOPERS.md LICENSE package.json package-lock.json
     tsconfig.json next.config.mjs drizzle.config.ts tailwind.config.ts vitest.config.ts postcss.config.mjs eslint.config.mjs
     playwright.config.ts proxy.ts instrumentation.ts .env.example .prettierrc.json .gitignore .npmrc .git`.split(/\s+/),
  );
  const made = new Set('node_modules .next var dist test-results playwright-report coverage bench-results next-env.d.ts .env .env.local'.split(' '));
  const strangers = readdirSync(root).filter((name) => !allowed.has(name) && !made.has(name) && !name.endsWith('.tsbuildinfo'));
  expect(strangers).toEqual([]);
});

test('no file of ours is too long to read, or switches a check off', () => {
  const words = new RegExp(['@ts-' + 'ignore', '@ts-' + 'nocheck', 'eslint-' + 'disable', '\\bTO' + 'DO\\b', '\\bFIX' + 'ME\\b'].join('|'));
  const offences = files.flatMap((file) => {
    const text = readFileSync(path.join(root, file), 'utf8');
    const lines = text.split('\n').length;
    // What a generator of ours wrote is read there, not here.
    const isGenerated = /^\/\/ Written by lib\/run\/[a-z-]+\.mjs/m.test(text);
    return [...(lines > 351 && !isGenerated ? [`${file} has ${lines} lines`] : []), ...(words.test(text) ? [`${file} switches a check off or puts work off`] : [])];
  });
  expect(offences).toEqual([]);
});

test('no file only passes on what others export', () => {
  const barrels = files.filter((file) => {
    const code = readFileSync(path.join(root, file), 'utf8').replace(/\/\*[\s\S]*?\*\//g, '').split('\n').map((line) => line.trim()).filter(Boolean);
    return code.length > 0 && code.every((line) => /^export\s.*\sfrom\s|^export \*/.test(line));
  });
  expect(barrels).toEqual([]);
});
