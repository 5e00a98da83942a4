import { defineConfig } from 'vitest/config';

// Measures, one file after the other; never part of the tests.
export default defineConfig({
  test: { include: [], benchmark: { include: ['test/bench/**/*.bench.ts'] }, fileParallelism: false },
});
