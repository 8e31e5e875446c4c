import { fileURLToPath } from 'node:url';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

const root = fileURLToPath(new URL('.', import.meta.url));

const withDatabase = {
  environment: 'node' as const,
  globalSetup: ['tests/support/database-server.ts'],
  setupFiles: ['tests/support/use-database.ts'],
};

export default defineConfig({
  root,
  plugins: [react()],
  resolve: { alias: [{ find: /^@\//, replacement: root }] },
  test: {
    pool: 'forks',
    maxWorkers: 2,
    // Limits that only end what hangs: a machine under load must not fail a test.
    testTimeout: 60_000,
    hookTimeout: 120_000,
    slowTestThreshold: 60_000,
    projects: [
      { extends: true, test: { name: 'unit', environment: 'node', include: ['tests/unit/**/*.test.ts'] } },
      {
        extends: true,
        test: {
          name: 'components',
          environment: 'jsdom',
          include: ['tests/unit/**/*.test.tsx'],
          setupFiles: ['tests/support/use-dom.ts'],
        },
      },
      { extends: true, test: { name: 'reference', environment: 'node', include: ['tests/reference/**/*.test.ts'], testTimeout: 300_000 } },
      { extends: true, test: { name: 'database', include: ['tests/database/**/*.test.ts'], ...withDatabase } },
      { extends: true, test: { name: 'api', include: ['tests/api/**/*.test.ts'], ...withDatabase } },
      { extends: true, test: { name: 'long', include: ['tests/long/**/*.test.ts'], ...withDatabase, testTimeout: 600_000 } },
    ],
  },
});
