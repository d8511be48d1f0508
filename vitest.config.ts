import { defineConfig } from 'vitest/config';

/** Unit tests and outside checks: no service of the product is needed. */
export default defineConfig({
  test: {
    include: [
      'src/**/*.test.{ts,tsx}',
      'tests/outside/**/*.test.ts',
      'samples/**/*.test.ts',
      'scripts/lib/**/*.test.ts',
      'docker-free-fakes/**/*.test.ts',
    ],
    testTimeout: 60_000,
    hookTimeout: 60_000,
    pool: 'forks',
    poolOptions: { forks: { maxForks: 2 } },
  },
});
