/**
 * `npm start`: from a fresh clone to a running product. Only node: built-ins, because it installs the packages.
 */
import { spawn } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { buildWhatChanged, installWhatIsMissing } from './prepare.mjs';
import { isAlive, isFree, startCluster } from './postgres.mjs';

const ROOT = fileURLToPath(new URL('../..', import.meta.url));
// Everything that is kept: the database, its port and password, the caught letters.
const DATA = path.resolve(ROOT, process.env.SLIPSTONE_DATA || '.data');
const PID_FILE = path.join(DATA, 'start.pid');
const dev = process.argv.includes('--dev');
const production = process.env.NODE_ENV === 'production';
const host = process.env.HOST || '127.0.0.1';
const port = Number(process.env.PORT || 4600);

process.chdir(ROOT);
let stopping = false;
let server = null;
let cluster = null;

process.on('SIGINT', () => stop());
process.on('SIGTERM', () => stop());
process.on('SIGHUP', () => stop());

try {
  checkNode();
  await claimPlace();
  await installWhatIsMissing(ROOT);
  const [database] = await Promise.all([openDatabase(), dev ? null : buildWhatChanged(ROOT)]);
  if (!stopping) await serve(database);
} catch (error) {
  console.error(`\n${error instanceof Error ? error.message : error}`);
  finish(1);
}

function checkNode() {
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major < 20 || (major === 20 && minor < 19))
    throw new Error(`Slipstone needs Node.js 20.19 or newer; this is ${process.versions.node}`);
}

/** One start at a time in one folder, and a port that is free, before anything else is touched. */
async function claimPlace() {
  if (!Number.isInteger(port) || port < 0 || port > 65_535)
    throw new Error(`PORT must be a number up to 65535, not ${process.env.PORT}`);
  const other = fs.existsSync(PID_FILE) ? Number(fs.readFileSync(PID_FILE, 'utf8')) : 0;
  if (isAlive(other) && other !== process.pid && commandOf(other).includes('start.mjs')) {
    throw new Error(`Slipstone is already running from this folder (process ${other}).`);
  }
  // After a kill the old server needs a moment to notice and to leave.
  if (other) await waitUntil(() => isFree(port, host), 6_000);
  if (!(await isFree(port, host)))
    throw new Error(`Port ${port} is taken by another program. Choose one: PORT=4700 npm start`);
  fs.mkdirSync(DATA, { recursive: true });
  fs.writeFileSync(PID_FILE, String(process.pid));
}

async function waitUntil(isTrue, patienceMs) {
  const end = Date.now() + patienceMs;
  while (Date.now() < end && !(await isTrue())) await new Promise((resolve) => setTimeout(resolve, 100));
}

function commandOf(pid) {
  try {
    return fs.readFileSync(`/proc/${pid}/cmdline`, 'utf8');
  } catch {
    // No /proc on this system: better to refuse than to run twice.
    return 'start.mjs';
  }
}

async function openDatabase() {
  if (process.env.DATABASE_URL) return process.env.DATABASE_URL;
  if (production) return undefined;
  cluster = await startCluster(DATA);
  return cluster.url;
}

/** Runs the server until it ends by itself or is told to stop. */
async function serve(database) {
  const command = dev
    ? [path.join(ROOT, 'node_modules/tsx/dist/cli.mjs'), 'watch', '--clear-screen=false', 'api/main.ts']
    : ['--enable-source-maps', 'dist/api/main.js'];
  const env = {
    ...process.env,
    ...(database && { DATABASE_URL: database }),
    ...(dev && { SLIPSTONE_DEV: '1' }),
    ...(!production && {
      MAILBOX_FILE: process.env.MAILBOX_FILE || path.join(DATA, 'mailbox.jsonl'),
      LOG_LEVEL: process.env.LOG_LEVEL || 'warn',
    }),
  };
  // The channel tells the server when we are gone without a word (kill -9), so that it does not keep the port.
  server = spawn(process.execPath, command, { env, stdio: ['inherit', 'inherit', 'inherit', 'ipc'] });
  server.on('exit', (code, signal) => {
    server = null;
    finish(stopping ? 0 : (code ?? (signal ? 1 : 0)));
  });
}

function stop() {
  if (stopping) return;
  stopping = true;
  console.log('\nStopping ...');
  if (server) server.kill('SIGTERM');
  else finish(0);
}

function finish(code) {
  if (cluster) {
    try {
      cluster.stop();
    } catch (error) {
      console.error(error instanceof Error ? error.message : error);
    }
  }
  if (readPid() === process.pid) fs.rmSync(PID_FILE, { force: true });
  process.exit(code);
}

function readPid() {
  return fs.existsSync(PID_FILE) ? Number(fs.readFileSync(PID_FILE, 'utf8')) : 0;
}
