import { fileURLToPath } from 'node:url';
import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

export default defineConfig(({ isSsrBuild }) => ({
  plugins: [react(), tailwindcss()],
  build: isSsrBuild
    ? {
        // The server and its worker threads; packages stay in node_modules.
        outDir: 'dist/api',
        target: 'node20',
        copyPublicDir: false,
        rollupOptions: {
          input: {
            main: 'api/main.ts',
            'check.worker': 'api/checker/check.worker.ts',
            verdicts: 'api/checker/cli/verdicts.ts',
            bench: 'api/checker/cli/bench.ts',
          },
          output: { entryFileNames: '[name].js' },
        },
      }
    : {
        outDir: 'dist/app',
        sourcemap: false,
        // The maths field is one library of this size, loaded only where something is written.
        chunkSizeWarningLimit: 1200,
      },
  test: {
    maxWorkers: 2,
    projects: [
      {
        extends: true,
        test: { name: 'unit', include: ['tests/{shared,checker,lib}/**/*.test.ts'], environment: 'node' },
      },
      {
        extends: true,
        test: {
          name: 'api',
          include: ['tests/api/**/*.test.ts'],
          environment: 'node',
          globalSetup: 'tests/support/database.setup.ts',
          testTimeout: 30_000,
          hookTimeout: 60_000,
        },
      },
      {
        extends: true,
        // Looks at what the API tests called, so it runs when all of them are done.
        test: {
          name: 'routes',
          include: ['tests/routes/**/*.test.ts'],
          environment: 'node',
          sequence: { groupOrder: 1 },
        },
      },
      {
        extends: true,
        resolve: {
          alias: [
            {
              find: /^mathlive$/,
              replacement: fileURLToPath(new URL('tests/support/mathlive-stub.ts', import.meta.url)),
            },
          ],
        },
        test: {
          name: 'app',
          include: ['tests/app/**/*.test.{ts,tsx}'],
          environment: 'jsdom',
          setupFiles: ['tests/support/dom.setup.ts'],
          testTimeout: 30_000,
        },
      },
    ],
  },
}));
