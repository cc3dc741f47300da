import { defineConfig } from 'vitest/config';

const slow = { testTimeout: 30_000, hookTimeout: 180_000, fileParallelism: false };

/** What needs only the module runs beside it; what needs a database, a server, a process or a browser is in tests/. */
export default defineConfig({
  test: {
    projects: [
      {
        test: {
          name: 'unit',
          include: [
            'src/**/*.test.{ts,tsx}',
            'jobs/**/*.test.ts',
            'seeders/**/*.test.ts',
            'tests/reference/**/*.test.ts',
          ],
        },
      },
      { test: { name: 'architecture', include: ['tests/architecture/**/*.test.ts'], testTimeout: 60_000 } },
      {
        test: {
          name: 'database',
          include: ['tests/db/**/*.test.ts'],
          globalSetup: ['tests/support/database.ts'],
          ...slow,
        },
      },
      {
        test: {
          name: 'product',
          include: ['tests/{api,jobs,e2e}/**/*.test.ts'],
          globalSetup: ['tests/support/product.ts'],
          setupFiles: ['tests/support/productClock.ts'],
          ...slow,
        },
      },
    ],
  },
});
