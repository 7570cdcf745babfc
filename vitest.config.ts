import { defineConfig } from 'vitest/config';

const databases = ['./tests/setup/cluster.ts'];

export default defineConfig({
  test: {
    // A page or an image must not depend on where the tests run.
    env: { TZ: 'UTC' },
    projects: [
      {
        extends: true,
        test: {
          name: 'unit',
          include: ['tests/{econ,charts,images,lint,platform}/**/*.test.ts'],
        },
      },
      {
        extends: true,
        test: {
          name: 'database',
          include: ['tests/{db,services,publication,seed}/**/*.test.ts'],
          globalSetup: databases,
          testTimeout: 30_000,
          hookTimeout: 60_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'api',
          include: ['tests/api/**/*.test.ts'],
          globalSetup: databases,
          testTimeout: 30_000,
          hookTimeout: 120_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'browser',
          include: ['tests/e2e/**/*.test.ts'],
          globalSetup: databases,
          testTimeout: 120_000,
          hookTimeout: 120_000,
          // Two browsers at once on two cores only slow each other.
          fileParallelism: false,
        },
      },
    ],
  },
});
