import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '..');
const shared = {
  root,
  resolve: {
    alias: {
      '@tests': path.join(root, 'tests'),
      '@fixtures': path.join(root, 'fixtures'),
      '@': path.join(root, 'src'),
    },
  },
};
const setupFiles = ['tests/helpers/strict.ts'];
const globalSetup = ['tests/helpers/machine-wide.ts'];

export default defineConfig({
  ...shared,
  test: {
    // Two cores: a third worker only makes the others wait.
    maxWorkers: 2,
    minWorkers: 1,
    projects: [
      {
        ...shared,
        test: {
          name: 'unit',
          include: ['src/**/*.test.ts', 'tests/properties/**/*.test.ts', 'tests/docs.test.ts'],
          exclude: ['src/cli/**'],
          setupFiles,
          testTimeout: 60_000,
        },
      },
      {
        ...shared,
        test: {
          name: 'integration',
          include: ['tests/integration/**/*.test.ts'],
          setupFiles,
          globalSetup,
          testTimeout: 60_000,
          hookTimeout: 120_000,
        },
      },
      {
        ...shared,
        test: {
          name: 'e2e',
          include: ['tests/e2e/**/*.test.ts'],
          setupFiles,
          globalSetup,
          testTimeout: 120_000,
          hookTimeout: 120_000,
        },
      },
    ],
  },
});
