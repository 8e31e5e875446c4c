import { defineConfig, globalIgnores } from 'eslint/config';
import nextVitals from 'eslint-config-next/core-web-vitals';
import nextTypescript from 'eslint-config-next/typescript';

export default defineConfig([
  globalIgnores(['.next/**', 'var/**', 'dist/**', 'drizzle/**', 'test-results/**', 'playwright-report/**', 'next-env.d.ts']),
  ...nextVitals,
  ...nextTypescript,
  {
    // A rule that is in the way is discussed and changed here, not switched off in a file.
    linterOptions: { noInlineConfig: true, reportUnusedDisableDirectives: 'off' },
    rules: {
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'no-warning-comments': ['error', { terms: ['todo', 'fixme', 'xxx'], location: 'start' }],
      'prefer-const': 'error',
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-non-null-assertion': 'off',
      '@typescript-eslint/ban-ts-comment': ['error', { 'ts-expect-error': true, 'ts-ignore': true, 'ts-nocheck': true }],
      '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
    },
  },
  {
    files: ['app/**', 'components/**', 'hooks/**', 'lib/**', 'db/**'],
    ignores: ['lib/run/**', 'db/bootstrap/run.ts', 'db/seed/**'],
    rules: { 'no-console': 'error' },
  },
  {
    // The one place where rows are virtualised; the compiler skips it, which is what we want of it there.
    files: ['hooks/use-virtual-rows.ts', 'hooks/use-measured-rows.ts'],
    rules: { 'react-hooks/incompatible-library': 'off' },
  },
]);
