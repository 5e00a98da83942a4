import { defineConfig } from 'vitest/config';

// One run tests everything. `fileParallelism` stays on: every test makes its own database and its own port.
export default defineConfig({
  test: {
    include: ['test/**/*.test.ts', 'test/**/*.test.tsx'],
    pool: 'forks',
    testTimeout: 20_000,
    reporters: ['default', './test/rig/closing-line.ts'],
  },
});
