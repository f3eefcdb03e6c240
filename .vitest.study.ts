import { defineConfig } from 'vitest/config';

// Long simulation studies, run by hand: npm run study.
export default defineConfig({
  test: { include: ['test/**/*.study.ts'], env: { TZ: 'UTC' }, testTimeout: 3_600_000, maxWorkers: 2 },
});
