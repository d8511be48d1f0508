import { defineConfig } from 'vitest/config';

/** The built product in Debian's Chromium, one at a time. */
export default defineConfig({
  test: {
    include: ['tests/browser/**/*.test.ts'],
    globalSetup: 'scripts/lib/test-copy.mjs',
    testTimeout: 120_000,
    hookTimeout: 120_000,
    teardownTimeout: 60_000,
    fileParallelism: false,
    // A browser on a crowded machine now and then misses a wait: once more, and what fails twice has failed.
    retry: 1,
    pool: 'forks',
  },
});
