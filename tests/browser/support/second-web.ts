import { execFileSync, spawn } from 'node:child_process';
import { once } from 'node:events';
import { setTimeout as wait } from 'node:timers/promises';
import { browserStack } from '../../support/browser-stack';

/** Starts another web server of the same build on the browser tests' database, as after a restart, and waits until it answers. */
export async function startSecondWeb(): Promise<{ address: string; stop: () => Promise<void> }> {
  const { appUrl, data, secret } = browserStack();
  const port = execFileSync(process.execPath, ['lib/run/print-free-port.mjs'], { encoding: 'utf8' }).trim();
  const address = `http://127.0.0.1:${port}`;
  const env = { ...process.env, NODE_ENV: 'production', DATABASE_URL: appUrl, WEIGHHOUSE_APP_DATABASE_URL: appUrl, WEIGHHOUSE_DATA: data, NEXTAUTH_SECRET: secret, NEXTAUTH_URL: address, PORT: port, SMTP_URL: '' } satisfies NodeJS.ProcessEnv;
  const child = spawn(process.execPath, ['node_modules/next/dist/bin/next', 'start', '-p', port, '-H', '127.0.0.1'], { env, stdio: ['ignore', 'ignore', 'pipe'] });
  let faults = '';
  child.stderr.on('data', (chunk: Buffer) => (faults += chunk.toString()));
  const stop = async () => {
    if (child.exitCode !== null) return;
    const ended = once(child, 'exit');
    child.kill('SIGTERM');
    await ended;
  };
  for (let turn = 0; turn < 240; turn++) {
    if (child.exitCode !== null) throw new Error(`The second web server ended with ${child.exitCode}: ${faults}`);
    const answer = await fetch(`${address}/api/health/ready`).catch(() => null);
    if (answer?.ok) return { address, stop };
    await wait(500);
  }
  await stop();
  throw new Error('The second web server did not answer.');
}
