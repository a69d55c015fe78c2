import { configDefaults, defineConfig } from 'vitest/config';

/** Folders whose tests are pure: they start at once, without a database. */
const PURE = ['engine', 'study-file', 'reference', 'components', 'house', 'machine'].map(
  (folder) => `tests/${folder}/**`,
);
const EVERY_TEST = 'tests/**/*.test.{ts,tsx}';

export default defineConfig({
  resolve: { tsconfigPaths: true },
  test: {
    testTimeout: 30_000,
    hookTimeout: 60_000,
    projects: [
      {
        extends: true,
        test: { name: 'pure', include: PURE.map((folder) => `${folder}/*.test.{ts,tsx}`) },
      },
      {
        extends: true,
        test: {
          name: 'database',
          include: [EVERY_TEST],
          exclude: [...configDefaults.exclude, ...PURE, 'tests/e2e/**'],
          globalSetup: ['tests/support/database-server.mjs'],
          setupFiles: ['tests/support/database-per-file.ts'],
        },
      },
    ],
  },
});
