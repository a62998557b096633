import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

export default defineConfig({
  plugins: [react(), tailwindcss()],
  build: { outDir: 'dist/app', sourcemap: false },
  test: {
    maxWorkers: 2,
    projects: [
      { extends: true, test: { name: 'unit', include: ['tests/{shared,checker}/**/*.test.ts'], environment: 'node' } },
      {
        extends: true,
        test: { name: 'api', include: ['tests/api/**/*.test.ts'], environment: 'node', globalSetup: 'tests/support/database.setup.ts', testTimeout: 30_000 },
      },
      {
        extends: true,
        test: { name: 'app', include: ['tests/app/**/*.test.{ts,tsx}'], environment: 'jsdom', setupFiles: ['tests/support/dom.setup.ts'] },
      },
    ],
  },
});
