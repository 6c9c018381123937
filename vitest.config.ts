import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

/** Everything but the Angular application's own specs, which `ng test` runs. */
export default defineConfig({
  test: {
    globals: true,
    // `npm run coverage`: the arithmetic alone, and what its own specs hold of it.
    coverage: {
      provider: 'v8',
      include: ['shared/**/*.ts'],
      exclude: ['**/*.spec.ts', '**/*.d.ts', 'shared/testing/**'],
      reporter: [['text', { skipFull: true }], 'text-summary'],
      thresholds: { branches: 95 },
    },
    projects: [
      {
        extends: true,
        test: { name: 'shared', include: ['shared/**/*.spec.ts', 'test/mutants/**/*.spec.ts'] },
      },
      {
        extends: true,
        test: {
          name: 'api',
          include: ['api/**/*.spec.ts'],
          // Each spec makes its own server and book; the modules are loaded once a worker, not once a file.
          isolate: false,
          testTimeout: 30_000,
          hookTimeout: 30_000,
        },
      },
      { extends: true, test: { name: 'checks', include: ['test/checks/**/*.spec.ts'], testTimeout: 60_000 } },
      {
        // Simulated tablets run the application's own offline layer, which knows shared by its alias.
        extends: true,
        resolve: { alias: { '@shared': fileURLToPath(new URL('shared', import.meta.url)) } },
        test: { name: 'sync', include: ['test/sync/**/*.spec.ts'], testTimeout: 60_000 },
      },
      { extends: true, test: { name: 'lint', include: ['test/lint/**/*.spec.ts'], testTimeout: 60_000 } },
    ],
  },
});
