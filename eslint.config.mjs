import nextCoreWebVitals from 'eslint-config-next/core-web-vitals';
import nextTypescript from 'eslint-config-next/typescript';
import { defineConfig, globalIgnores } from 'eslint/config';

export default defineConfig([
  ...nextCoreWebVitals,
  ...nextTypescript,
  globalIgnores(['.next/**', '.data/**', 'dist/**', 'next-env.d.ts', 'playwright-report/**', 'test-results/**']),
  {
    linterOptions: { reportUnusedDisableDirectives: 'error' },
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', ignoreRestSiblings: true }],
      '@typescript-eslint/ban-ts-comment': [
        'error',
        { 'ts-ignore': true, 'ts-expect-error': true, 'ts-nocheck': true },
      ],
      eqeqeq: ['error', 'always'],
      'no-console': 'error',
      // Both speak for React's compiler, which is not used here.
      'react-hooks/preserve-manual-memoization': 'off',
      'react-hooks/incompatible-library': 'off',
    },
  },
  {
    files: ['tests/**'],
    rules: { '@next/next/no-assign-module-variable': 'off' },
  },
  {
    // Programs of the command line speak to their terminal.
    files: ['scripts/**'],
    rules: { 'no-console': 'off' },
  },
  {
    // The environment is parsed in one place; a page that reads it elsewhere would escape its checks.
    files: ['app/**', 'components/**', 'lib/**'],
    ignores: ['lib/env.ts', 'lib/log.ts', 'lib/db/orm.ts'],
    rules: {
      'no-restricted-properties': [
        'error',
        { object: 'process', property: 'env', message: 'Read the environment through lib/env.ts.' },
      ],
    },
  },
]);
