import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    include: ['test/**/*.test.ts'],
    benchmark: { include: ['test/bench/**/*.bench.ts'] },
    setupFiles: ['test/support/fixed-seed.ts'],
    testTimeout: 60_000,
    // Two cores: the real-thread tests of test/built start threads of their own.
    maxWorkers: 2,
  },
});
