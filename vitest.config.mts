import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const root = fileURLToPath(new URL('.', import.meta.url));
const alias = { '@': root.replace(/\/$/, ''), 'server-only': `${root}tests/support/server-only.ts` };
const shared = { resolve: { alias } };

export default defineConfig({
  ...shared,
  test: {
    projects: [
      { ...shared, test: { name: 'unit', include: ['tests/unit/**/*.test.ts'], environment: 'node' } },
      {
        ...shared,
        test: { name: 'reference', include: ['tests/reference/**/*.test.ts'], environment: 'node' },
      },
      {
        ...shared,
        test: {
          name: 'component',
          include: ['tests/component/**/*.test.tsx'],
          environment: 'jsdom',
          setupFiles: ['tests/support/component-setup.ts'],
        },
      },
      {
        ...shared,
        test: {
          name: 'integration',
          include: ['tests/integration/**/*.test.ts'],
          environment: 'node',
          globalSetup: ['tests/support/cluster.ts'],
          maxWorkers: 2,
          testTimeout: 30_000,
          hookTimeout: 60_000,
        },
      },
      {
        ...shared,
        test: {
          name: 'e2e',
          include: ['tests/e2e/**/*.test.ts'],
          environment: 'node',
          globalSetup: ['tests/e2e/global-setup.ts'],
          maxWorkers: 1,
          fileParallelism: false,
          testTimeout: 180_000,
          hookTimeout: 240_000,
        },
      },
    ],
  },
});
