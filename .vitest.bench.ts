import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    benchmark: { include: ['test/bench/**/*.bench.ts'] },
    env: { TZ: 'UTC' },
    // One at a time: two benchmarks on two cores would slow each other through memory and heat.
    fileParallelism: false,
  },
});
