/**
 * The server that the browser tests talk to: the built product, its demo, a database that is thrown away.
 */
import { spawn } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { startCluster } from '../api/boot/postgres.mjs';
import { buildWhatChanged } from '../api/boot/prepare.mjs';

const root = fileURLToPath(new URL('..', import.meta.url));
process.chdir(root);
await buildWhatChanged(root);

const parent = fs.existsSync('/dev/shm') ? '/dev/shm' : os.tmpdir();
const folder = path.join(parent, `slipstone-test-${process.pid}-${randomBytes(3).toString('hex')}`);
const cluster = await startCluster(folder, { throwAway: true });
// For what is done on the command line beside the running server, such as making a school.
const databaseFile = process.env.E2E_DATABASE_FILE;
if (databaseFile) {
  fs.mkdirSync(path.dirname(databaseFile), { recursive: true });
  fs.writeFileSync(databaseFile, cluster.url, { mode: 0o600 });
}
const server = spawn(process.execPath, ['--enable-source-maps', 'dist/api/main.js'], {
  env: {
    ...process.env,
    NODE_ENV: 'development',
    DATABASE_URL: cluster.url,
    LOG_LEVEL: process.env.LOG_LEVEL ?? 'warn',
  },
  stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
});

server.once('exit', (code) => {
  cluster.stop();
  if (databaseFile) fs.rmSync(databaseFile, { force: true });
  fs.rmSync(folder, { recursive: true, force: true });
  process.exit(code ?? 1);
});
for (const signal of ['SIGTERM', 'SIGINT']) process.on(signal, () => server.kill('SIGTERM'));
