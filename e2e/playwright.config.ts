import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { defineConfig } from '@playwright/test';

const root = fileURLToPath(new URL('..', import.meta.url));
const port = Number(process.env['E2E_PORT'] ?? 4690);
const baseURL = `http://127.0.0.1:${port}`;
process.env['E2E_DATABASE_FILE'] ??= path.join(root, 'test-results/e2e-database');

/** The built product on a port and a throw-away database of its own, in Debian's Chromium. */
export default defineConfig({
  testDir: root,
  testMatch: 'e2e/**/*.spec.ts',
  // Pictures are made on demand and kept in the repository.
  testIgnore: process.env['PICTURES'] === '1' ? [] : ['e2e/pictures.spec.ts'],
  outputDir: path.join(root, 'test-results/e2e'),
  fullyParallel: false,
  workers: 2,
  forbidOnly: true,
  retries: 0,
  timeout: 120_000,
  globalTimeout: 19 * 60_000,
  expect: { timeout: 20_000 },
  reporter: [['list'], ['json', { outputFile: path.join(root, 'test-results/e2e.json') }]],
  use: {
    baseURL,
    actionTimeout: 30_000,
    locale: 'en-GB',
    timezoneId: 'Europe/Lisbon',
    viewport: { width: 1440, height: 900 },
    screenshot: 'only-on-failure',
    trace: 'retain-on-failure',
    launchOptions: {
      executablePath: process.env['CHROMIUM'] ?? '/usr/bin/chromium',
      args: [
        '--no-sandbox',
        '--disable-gpu',
        '--disable-quic',
        '--no-first-run',
        '--disable-background-networking',
        '--disable-component-update',
        '--disable-sync',
      ],
    },
  },
  webServer: {
    command: 'node e2e/server.mjs',
    cwd: root,
    url: `${baseURL}/api/health`,
    env: { PORT: String(port), E2E_DATABASE_FILE: process.env['E2E_DATABASE_FILE'] },
    timeout: 180_000,
    reuseExistingServer: false,
    gracefulShutdown: { signal: 'SIGTERM', timeout: 10_000 },
    stdout: 'ignore',
    stderr: 'pipe',
  },
});
