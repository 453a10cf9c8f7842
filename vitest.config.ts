import { defineConfig } from 'vitest/config';

export default defineConfig({
  resolve: { conditions: ['@faintward/source'] },
  ssr: { resolve: { conditions: ['@faintward/source', 'module', 'node', 'development|production'] } },
  test: {
    reporters: ['default', './tests/closing-line.ts'],
    allowOnly: false,
    projects: [
      {
        extends: true,
        test: {
          name: 'libs',
          include: ['libs/*/src/**/*.test.ts', 'tests/architecture/**/*.test.ts'],
          // Pure functions share nothing that a test could spoil; a process for each file would cost more than the tests.
          pool: 'threads',
          isolate: false,
        },
      },
      {
        extends: true,
        // oxc takes decorator options from the tsconfig that includes a file; the tests' one does not set them.
        oxc: { decorator: { legacy: true, emitDecoratorMetadata: true } },
        test: {
          name: 'api',
          include: ['apps/api/src/**/*.test.ts', 'tests/api/**/*.test.ts', 'tests/faults/**/*.test.ts'],
          pool: 'threads',
          isolate: false,
          maxWorkers: 1,
          testTimeout: 60_000,
          hookTimeout: 120_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'web',
          include: ['apps/web/src/**/*.test.{ts,tsx}'],
          environment: 'jsdom',
          setupFiles: ['apps/web/src/testing/setup.ts'],
          // Generous, because a loaded machine is no failure.
          testTimeout: 90_000,
        },
      },
    ],
  },
});
