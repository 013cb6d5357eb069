import { defineConfig } from 'vitest/config';

// `npm test` runs the quick suite; `npm run test:slow` the long statistical checks, which print tables.
export default defineConfig(({ mode }) => ({
  test: {
    include: [mode === 'slow' ? 'test/**/*.slow.ts' : 'test/**/*.test.ts'],
    testTimeout: mode === 'slow' ? 3_600_000 : 120_000,
    pool: 'forks',
    maxWorkers: 2,
  },
}));
