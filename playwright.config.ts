import { execFileSync } from 'node:child_process';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { defineConfig, devices } from '@playwright/test';

const inRoot = (name: string) => fileURLToPath(new URL(name, import.meta.url));

// Chosen once in the main process; the workers, which read this file again, inherit them.
process.env.WEIGHHOUSE_TEST_PORT ??= execFileSync(process.execPath, [inRoot('lib/run/print-free-port.mjs')], { encoding: 'utf8' }).trim();
process.env.WEIGHHOUSE_TEST_STACK ??= path.join(os.tmpdir(), `weighhouse-stack-${process.pid}.json`);
const address = `http://127.0.0.1:${process.env.WEIGHHOUSE_TEST_PORT}`;

export default defineConfig({
  testDir: 'tests/browser',
  outputDir: 'test-results',
  fullyParallel: false,
  workers: 1,
  forbidOnly: true,
  // Limits that only end what hangs: a machine under load must not fail a test.
  timeout: 300_000,
  expect: { timeout: 30_000 },
  reporter: [['list']],
  use: {
    ...devices['Desktop Chrome'],
    baseURL: address,
    viewport: { width: 1440, height: 900 },
    locale: 'en-GB',
    timezoneId: 'UTC',
    colorScheme: 'dark',
    trace: 'retain-on-failure',
    screenshot: 'only-on-failure',
    launchOptions: {
      executablePath: '/usr/bin/chromium',
      args: [
        '--no-sandbox',
        '--disable-quic',
        '--no-first-run',
        '--disable-background-networking',
        '--disable-component-update',
        '--disable-sync',
        '--use-angle=swiftshader',
      ],
    },
  },
  webServer: {
    command: `"${process.execPath}" lib/run/test-stack.mjs`,
    cwd: inRoot('.'),
    url: `${address}/api/health/ready`,
    timeout: 900_000,
    reuseExistingServer: false,
    stdout: 'pipe',
    stderr: 'pipe',
    gracefulShutdown: { signal: 'SIGTERM', timeout: 30_000 },
  },
});
