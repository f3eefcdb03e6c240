import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    include: ['test/**/*.test.ts'],
    // Times of day never enter a result; a pinned zone keeps any slip from hiding.
    env: { TZ: 'UTC' },
    testTimeout: 120_000,
    maxWorkers: 2,
  },
});
