import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import vm from 'node:vm';
import { build } from 'esbuild';
import ts from 'typescript';
import { beforeAll, describe, expect, it } from 'vitest';
import type { measureCage } from '@/lib/engine/measure';
import type { MeasuredCage } from '@/lib/engine/measured';
import { CATMULL_CLARK, referenceCage } from '../support/engine-cages';

const root = fileURLToPath(new URL('../..', import.meta.url));

function filesIn(folder: string): string[] {
  return readdirSync(folder, { withFileTypes: true, recursive: true }).filter((entry) => entry.isFile() && entry.name.endsWith('.ts')).map((entry) => path.join(entry.parentPath, entry.name));
}

/** What a browser's worker has of the globals that the engine might reach for, and none of Node's. */
function browserGlobals(): Record<string, unknown> {
  return { WebAssembly, atob, performance: { now: () => 0 }, console: {}, TextDecoder, TextEncoder };
}

describe('the engine in the browser', () => {
  let bundled = '';

  beforeAll(async () => {
    const { outputFiles } = await build({
      entryPoints: [path.join(root, 'lib/engine/measure.ts')], bundle: true, write: false, platform: 'browser', format: 'iife', globalName: 'engine', target: 'es2022', logLevel: 'silent',
    });
    bundled = outputFiles[0].text;
  }, 60_000);

  it.each([['catmull-clark', 'spot.obj'], ['loop', 'icosa.obj'], ['doo-sabin', 'cube.obj'], ['polyhedral', 'cube.obj']] as const)('measures as in Node: %s', (scheme, file) => {
    const context = vm.createContext(browserGlobals());
    vm.runInContext(bundled, context);
    expect(vm.runInContext('[typeof process, typeof require, typeof Buffer, typeof global]', context).join(' ')).toBe('undefined undefined undefined undefined');
    const there = context.engine as { measureCage: typeof measureCage };
    const cage = referenceCage(file);
    const measured = there.measureCage(cage, { ...CATMULL_CLARK, scheme });
    const plain = JSON.parse(JSON.stringify(measured)) as MeasuredCage;
    expect(plain.findings).toEqual([]);
    expect(plain.parts[0].components[0].solid.volume).toBeGreaterThan(0);
    return import('@/lib/engine/measure').then((here) => {
      expect(plain).toEqual(JSON.parse(JSON.stringify(here.measureCage(cage, { ...CATMULL_CLARK, scheme }))));
    });
  }, 60_000);
});

describe('the engine’s public functions', () => {
  it('each carry a docstring, and classes and types too', () => {
    const bare = filesIn(path.join(root, 'lib/engine')).flatMap((file) => {
      const source = ts.createSourceFile(file, readFileSync(file, 'utf8'), ts.ScriptTarget.Latest, true);
      return source.statements.flatMap((statement) => {
        const isDeclaration = ts.isFunctionDeclaration(statement) || ts.isClassDeclaration(statement) || ts.isInterfaceDeclaration(statement);
        if (!isDeclaration || !statement.modifiers?.some((modifier) => modifier.kind === ts.SyntaxKind.ExportKeyword)) return [];
        return ts.getJSDocCommentsAndTags(statement).length > 0 ? [] : [`${path.relative(root, file)}: ${statement.name?.text ?? '?'}`];
      });
    });
    expect(bare).toEqual([]);
  });

  it('look at nothing outside their room but packages that a browser can load', () => {
    const packages = new Set(filesIn(path.join(root, 'lib/engine')).flatMap((file) => [...readFileSync(file, 'utf8').matchAll(/from '([^.@'][^']*)'/g)].map(([, name]) => name)));
    expect([...packages].sort()).toEqual(['robust-predicates', 'tinyqueue']);
  });
});
