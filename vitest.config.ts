import { fileURLToPath } from 'node:url';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

const root = fileURLToPath(new URL('.', import.meta.url));

const withDatabase = {
  environment: 'node' as const,
  globalSetup: ['tests/support/database-server.ts'],
  setupFiles: ['tests/support/use-database.ts'],
  testTimeout: 20_000,
  hookTimeout: 60_000,
};

export default defineConfig({
  root,
  plugins: [react()],
  resolve: { alias: [{ find: /^@\//, replacement: root }] },
  test: {
    pool: 'forks',
    maxWorkers: 2,
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
      { extends: true, test: { name: 'reference', environment: 'node', include: ['tests/reference/**/*.test.ts'], testTimeout: 60_000 } },
      { extends: true, test: { name: 'database', include: ['tests/database/**/*.test.ts'], ...withDatabase } },
      { extends: true, test: { name: 'api', include: ['tests/api/**/*.test.ts'], ...withDatabase } },
      { extends: true, test: { name: 'long', include: ['tests/long/**/*.test.ts'], ...withDatabase, testTimeout: 600_000 } },
    ],
  },
});
