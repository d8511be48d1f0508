import { defineConfig } from 'vitest/config';

/** The API of a running copy: web, worker, PostgreSQL and the store are real ones of its own. */
export default defineConfig({
  test: {
    include: ['tests/api/**/*.test.ts', 'scripts/*.test.ts'],
    globalSetup: 'scripts/lib/test-copy.mjs',
    testTimeout: 60_000,
    hookTimeout: 120_000,
    teardownTimeout: 60_000,
    pool: 'forks',
    poolOptions: { forks: { maxForks: 2 } },
  },
});
