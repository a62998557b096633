/**
 * `npm test`: everything that the tests need, then all of them. The last line is `N passed, N failed`.
 * Only node: built-ins, because it installs the packages.
 */
import { spawnSync } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { findFreePort, installPackages } from '../api/boot/postgres.mjs';
import { installWhatIsMissing } from '../api/boot/prepare.mjs';

const ROOT = fileURLToPath(new URL('..', import.meta.url));
const RESULTS = path.join(ROOT, 'test-results');
/** Together well within the hour that CI has, on two cores. */
const LIMIT_MS = { vitest: 30 * 60_000, playwright: 20 * 60_000 };

process.chdir(ROOT);
let counts = { passed: 0, failed: 0 };
try {
  await installWhatIsMissing(ROOT);
  installPrograms();
  fs.rmSync(RESULTS, { recursive: true, force: true });
  counts = add(runVitest(), await runPlaywright());
  if (counts.passed + counts.failed === 0) throw new Error('No test ran.');
} catch (error) {
  console.error(`\n${error instanceof Error ? error.message : error}`);
  counts = add(counts, { passed: 0, failed: 1 });
}
process.exitCode = counts.failed === 0 ? 0 : 1;
process.stdout.write(`\n${counts.passed} passed, ${counts.failed} failed\n`);

/** PostgreSQL is seen to where a cluster is started; a browser and SymPy are for tests alone. */
function installPrograms() {
  if (!process.env.CHROMIUM && !fs.existsSync('/usr/bin/chromium')) installPackages(['chromium'], 'Chromium');
  if (spawnSync('/usr/bin/python3', ['-c', 'import sympy']).status !== 0) installPackages(['python3-sympy'], 'SymPy');
}

function runVitest() {
  const file = path.join(RESULTS, 'vitest.json');
  const args = ['run', '--reporter=default', '--reporter=json', `--outputFile.json=${file}`];
  const { status, signal } = node('node_modules/vitest/vitest.mjs', args, LIMIT_MS.vitest);
  if (!fs.existsSync(file)) return missing('unit, API and component', signal ?? status);
  const report = JSON.parse(fs.readFileSync(file, 'utf8'));
  // A file that could not be loaded has no test to fail.
  const broken = report.testResults.filter(
    ({ status: state, assertionResults }) =>
      state === 'failed' && !assertionResults.some((test) => test.status === 'failed'),
  );
  const left = listTestFiles('tests').filter(
    (name) => !report.testResults.some((result) => result.name === path.join(ROOT, name)),
  );
  for (const name of left) console.error(`${name} belongs to no project of vite.config.ts and did not run`);
  const failed = report.numFailedTests + broken.length + left.length;
  return settle({ passed: report.numPassedTests, failed }, status, 'vitest');
}

async function runPlaywright() {
  if (!fs.readdirSync('e2e').some((name) => name.endsWith('.spec.ts')))
    throw new Error('There are no browser tests in e2e/.');
  const file = path.join(RESULTS, 'e2e.json');
  const port = process.env.E2E_PORT ?? String(await findFreePort());
  const args = ['test', '--config', 'e2e/playwright.config.ts'];
  const { status, signal } = node('node_modules/@playwright/test/cli.js', args, LIMIT_MS.playwright, {
    E2E_PORT: port,
  });
  if (!fs.existsSync(file)) return missing('browser', signal ?? status);
  const { stats, errors = [] } = JSON.parse(fs.readFileSync(file, 'utf8'));
  return settle(
    { passed: stats.expected, failed: stats.unexpected + stats.flaky + errors.length },
    status,
    'playwright',
  );
}

function node(script, args, timeout, env = {}) {
  return spawnSync(process.execPath, [script, ...args], {
    stdio: ['ignore', 'inherit', 'inherit'],
    env: { ...process.env, NODE_ENV: 'test', ...env },
    timeout,
    killSignal: 'SIGTERM',
  });
}

function missing(what, how) {
  console.error(`The ${what} tests ended without a report (${how}).`);
  return { passed: 0, failed: 1 };
}

/** A run that says it failed counts so even where every single test passed: an error between two tests, say. */
function settle({ passed, failed }, status, what) {
  if (status !== 0 && failed === 0) {
    console.error(`${what} ended with code ${status} although no test failed.`);
    return { passed, failed: 1 };
  }
  return { passed, failed };
}

function add(a, b) {
  return { passed: a.passed + b.passed, failed: a.failed + b.failed };
}

function listTestFiles(folder) {
  return fs
    .readdirSync(folder, { recursive: true })
    .filter((name) => /\.test\.tsx?$/.test(name))
    .map((name) => path.join(folder, name));
}
