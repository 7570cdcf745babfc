import { configDefaults, defineConfig } from 'vitest/config';

const cluster = './tests/setup/cluster.ts';
const build = './tests/setup/build.ts';

/** Tests on databases, tests that ask a built server, tests with a browser; every other test is plain. */
const folders = {
  database: 'tests/{db,services,publication,seed,platform/database}/**/*.test.ts',
  api: 'tests/{api,pages,security,platform/server}/**/*.test.ts',
  browser: 'tests/e2e/**/*.test.ts',
};

export default defineConfig({
  test: {
    // A page or an image must not depend on where the tests run.
    env: { TZ: 'UTC' },
    projects: [
      {
        extends: true,
        test: {
          name: 'unit',
          include: ['tests/**/*.test.ts'],
          exclude: [...configDefaults.exclude, ...Object.values(folders)],
        },
      },
      {
        extends: true,
        test: {
          name: 'database',
          include: [folders.database],
          globalSetup: cluster,
          testTimeout: 30_000,
          hookTimeout: 60_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'api',
          include: [folders.api],
          globalSetup: [cluster, build],
          testTimeout: 30_000,
          hookTimeout: 120_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'browser',
          include: [folders.browser],
          globalSetup: [cluster, build],
          testTimeout: 120_000,
          hookTimeout: 120_000,
          // Two browsers at once on two cores only slow each other.
          fileParallelism: false,
        },
      },
    ],
  },
});
