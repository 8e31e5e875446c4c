import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { expect, test } from 'vitest';
import { environmentSchema } from '@/lib/config';

const root = fileURLToPath(new URL('../..', import.meta.url));
const read = (name: string) => readFileSync(path.join(root, name), 'utf8');

/** Name and value of each line of the example, commented out as they are. */
const examples = new Map([...read('.env.example').matchAll(/^#? ?([A-Z][A-Z0-9_]*)=(.*)$/gm)].map(([, name, value]) => [name, value]));

/** Set by whoever runs the program, or read by its start alone. */
const NOT_FOR_THE_EXAMPLE = ['NODE_ENV'];
const OF_THE_START = ['PORT', 'WEIGHHOUSE_DEMO'];

test('the example names every variable that is read, and no other', () => {
  const names = Object.keys(environmentSchema.shape).filter((name) => !NOT_FOR_THE_EXAMPLE.includes(name));
  expect([...examples.keys()].toSorted()).toEqual([...names, ...OF_THE_START].toSorted());
  const start = ['lib/run/start.mjs', 'lib/run/support/demo.mjs'].map(read).join('\n');
  for (const name of OF_THE_START) expect(start).toContain(`process.env.${name}`);
});

test('the example says each default as it is', () => {
  const defaults = environmentSchema.parse({}) as Record<string, unknown>;
  for (const [name, value] of Object.entries(defaults).filter(([name]) => examples.has(name))) {
    const parsed = environmentSchema.parse({ [name]: examples.get(name) }) as Record<string, unknown>;
    expect([name, parsed[name]]).toEqual([name, value]);
  }
  expect(Object.keys(defaults).length).toBeGreaterThan(5);
});

test('the unit of systemd starts what is there, with variables that are read', () => {
  const unit = read('lib/run/systemd/weighhouse-worker@.service');
  const [, program] = /^ExecStart=\S+ (\S+)$/m.exec(unit)!;
  expect(existsSync(path.join(root, program))).toBe(true);
  expect(JSON.parse(read('package.json')).scripts.worker).toBe(`exec node ${program}`);
  const known = Object.keys(environmentSchema.shape);
  for (const [, name] of unit.matchAll(/\b(WEIGHHOUSE_[A-Z_]+)\b/g)) expect(known).toContain(name);
});
