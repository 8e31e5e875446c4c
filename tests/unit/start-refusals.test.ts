import { spawn } from 'node:child_process';
import { existsSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterEach, beforeEach, expect, test } from 'vitest';

const script = fileURLToPath(new URL('../../lib/run/start.mjs', import.meta.url));
let folder = '';

beforeEach(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), 'weighhouse-refusal-'));
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

/** Starts the program where it has to refuse, before it touches a database. */
function start(env: Record<string, string>): Promise<{ code: number | null; errors: string }> {
  const child = spawn(process.execPath, [script], { env: { ...process.env, WEIGHHOUSE_DATA: folder, DATABASE_URL: '', ...env } });
  let errors = '';
  child.stderr.on('data', (chunk: Buffer) => (errors += chunk.toString()));
  return new Promise((resolve) => child.once('close', (code) => resolve({ code, errors: errors.trim() })));
}

test('a port that is none is refused in one sentence', async () => {
  const { code, errors } = await start({ PORT: '70000' });
  expect(code).toBe(1);
  expect(errors).toBe('PORT is 70000, but a port is a number from 1 to 65535.');
});

test('a port in use is named, with what to do', async () => {
  const server = net.createServer();
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as net.AddressInfo;
  try {
    const { code, errors } = await start({ PORT: String(port) });
    expect(code).toBe(1);
    expect(errors).toBe(`Port ${port} is in use. Set PORT to another one, or leave it out to take a free one.`);
  } finally {
    server.close();
  }
});

test('a second start on the same data folder says that one runs, and leaves its lock', async () => {
  writeFileSync(path.join(folder, 'run.lock'), String(process.pid));
  writeFileSync(path.join(folder, 'run.json'), JSON.stringify({ address: 'http://127.0.0.1:4242', pids: [] }));
  const { code, errors } = await start({ PORT: '70000' });
  expect(code).toBe(1);
  expect(errors).toMatch(/^Weighhouse already runs on .* at http:\/\/127\.0\.0\.1:4242 \(process \d+\)\./);
  expect(existsSync(path.join(folder, 'run.lock'))).toBe(true);
});

test('the lock of a start that is gone is taken over and given back', async () => {
  const gone = spawn(process.execPath, ['-e', '']);
  await new Promise((resolve) => gone.once('close', resolve));
  writeFileSync(path.join(folder, 'run.lock'), String(gone.pid));
  const { errors } = await start({ PORT: '70000' });
  expect(errors).toMatch(/^PORT is 70000/);
  expect(existsSync(path.join(folder, 'run.lock'))).toBe(false);
});

test('a data folder that cannot be made is named, with what to do', async () => {
  const file = path.join(folder, 'file');
  writeFileSync(file, '');
  const { code, errors } = await start({ WEIGHHOUSE_DATA: path.join(file, 'data') });
  expect(code).toBe(1);
  expect(errors).toMatch(/cannot be written \(ENOTDIR\)\. Set WEIGHHOUSE_DATA to a folder that can\.$/);
});
