import { defineConfig } from 'vitest/config';

/** Tests that start what is built. */
const programs = ['test/cli/**/*.test.ts', 'test/lsp/**/*.test.ts', 'test/session/**/*.test.ts', 'test/package.test.ts'];
/** Tests that measure time, or wait for a browser to show something: one at a time, after the others. */
const alone = ['test/bench/**/*.test.ts', 'test/editor/**/*.test.ts'];
const globalSetup = 'test/build.ts';

export default defineConfig({
  test: {
    projects: [
      { test: { name: 'parts', include: ['test/**/*.test.ts'], exclude: [...programs, ...alone], testTimeout: 30_000 } },
      { test: { name: 'programs', include: programs, globalSetup, testTimeout: 30_000, sequence: { groupOrder: 1 } } },
      {
        test: {
          name: 'alone',
          include: alone,
          globalSetup,
          testTimeout: 120_000,
          hookTimeout: 180_000,
          fileParallelism: false,
          sequence: { groupOrder: 2 },
        },
      },
    ],
  },
});
