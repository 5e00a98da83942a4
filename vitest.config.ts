import { defineConfig } from 'vitest/config';

// Everything runs as a machine in Greenwich would run it, and all that touches time once more as one half an hour off
// in Newfoundland: no answer may depend on the zone of the machine. Every test makes its own database and port.
const always = { pool: 'forks', testTimeout: 30_000 } as const;

export default defineConfig({
  test: {
    reporters: ['default', './test/rig/closing-line.ts'],
    projects: [
      {
        test: {
          ...always,
          name: 'utc',
          env: { TZ: 'UTC' },
          include: ['test/**/*.test.{ts,tsx}'],
        },
      },
      {
        test: {
          ...always,
          name: 'newfoundland',
          env: { TZ: 'America/St_Johns' },
          include: [
            'test/{model,planning,exchange,actions,reference,properties,seed-demo}/**/*.test.ts',
            'test/tidy/zone.test.ts',
          ],
        },
      },
    ],
  },
});
