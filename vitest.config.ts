import { defineConfig } from 'vitest/config';

/** Unit tests and outside checks: no service is needed. API and browser tests have their own runner in scripts/test.mjs. */
export default defineConfig({
  test: {
    include: ['src/**/*.test.ts', 'tests/outside/**/*.test.ts', 'samples/**/*.test.ts', 'docker-free-fakes/**/*.test.ts'],
    testTimeout: 60_000,
    pool: 'forks',
    poolOptions: { forks: { maxForks: 2 } },
  },
});
