import { defineConfig } from 'vitest/config';

const root = new URL('..', import.meta.url).pathname;

/** Tests of the stores, and of what must hold on each of them: these have a PostgreSQL server, started once. */
const ON_STORES = ['test/storage/**/*.test.ts', 'test/stores/**/*.test.ts'];

const shared = { root, testTimeout: 60_000, hookTimeout: 60_000 };

export default defineConfig({
  root,
  test: {
    projects: [
      { root, test: { ...shared, name: 'units', include: ['test/**/*.test.ts'], exclude: ON_STORES } },
      { root, test: { ...shared, name: 'stores', include: ON_STORES, globalSetup: 'test/support/postgres-server.ts' } },
    ],
  },
});
