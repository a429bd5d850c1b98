import { fileURLToPath } from 'node:url';
import vue from '@vitejs/plugin-vue';
import { defineConfig } from 'vitest/config';

const database = ['./tests/support/cluster-setup.ts'];

/** Four projects, run one after another: each may take the whole machine. */
export default defineConfig({
  resolve: { alias: { '@': fileURLToPath(new URL('packages/client/src', import.meta.url)) } },
  plugins: [vue()],
  test: {
    reporters: ['default', './tests/support/closing-line.ts'],
    projects: [
      {
        extends: true,
        test: {
          name: 'unit',
          include: [
            'tests/{shared,kernel,reference,client,architecture}/**/*.test.ts',
            'tests/attacks/notation*.test.ts',
          ],
          pool: 'threads',
          testTimeout: 30_000,
          sequence: { groupOrder: 0 },
        },
      },
      {
        extends: true,
        test: {
          name: 'api',
          // The scripts know no types, and neither do their tests.
          include: ['tests/{server,api}/**/*.test.ts', 'tests/scripts/**/*.test.mjs'],
          globalSetup: database,
          pool: 'forks',
          testTimeout: 30_000,
          hookTimeout: 60_000,
          sequence: { groupOrder: 1 },
        },
      },
      {
        extends: true,
        test: {
          name: 'live',
          include: ['tests/live/**/*.test.ts', 'tests/attacks/{script,worker,access}*.test.ts'],
          globalSetup: database,
          pool: 'forks',
          fileParallelism: false,
          testTimeout: 60_000,
          hookTimeout: 60_000,
          sequence: { groupOrder: 2 },
        },
      },
      {
        extends: true,
        test: {
          name: 'browser',
          include: ['tests/browser/**/*.test.ts'],
          globalSetup: database,
          pool: 'forks',
          fileParallelism: false,
          testTimeout: 60_000,
          hookTimeout: 120_000,
          sequence: { groupOrder: 3 },
        },
      },
    ],
  },
});
