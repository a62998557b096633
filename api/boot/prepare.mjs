/**
 * What must be there before the program can run: packages and the built program. Only node: built-ins.
 */
import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';

/** Installs packages when there are none or when they are not those of the lock file. */
export async function installWhatIsMissing(root) {
  const stamp = path.join(root, 'node_modules/.slipstone-lock');
  const lock = hashOf(root, ['package-lock.json']);
  if (readQuietly(stamp) === lock || isInstalled(root)) return;
  console.log('Installing packages ...');
  // Building needs the development packages, whatever NODE_ENV says.
  await run('npm', ['ci', '--include=dev', '--no-audit', '--no-fund'], root);
  fs.writeFileSync(stamp, lock);
}

/** Whether npm's own record of what it installed names the same packages and versions as the lock. */
function isInstalled(root) {
  const wanted = readPackages(path.join(root, 'package-lock.json'));
  const present = readPackages(path.join(root, 'node_modules/.package-lock.json'));
  if (!wanted || !present) return false;
  return Object.entries(wanted).every(
    ([name, { version, optional, link }]) => name === '' || link || optional || present[name]?.version === version,
  );
}

function readPackages(file) {
  try {
    return JSON.parse(fs.readFileSync(file, 'utf8')).packages ?? null;
  } catch {
    return null;
  }
}

const CLIENT_SOURCES = ['app', 'shared', 'index.html', 'vite.config.ts', 'tsconfig.json', 'package-lock.json'];
const SERVER_SOURCES = ['api', 'shared', 'vite.config.ts', 'tsconfig.json', 'package-lock.json'];

/** Builds client and server when their sources are not those of the last build. */
export async function buildWhatChanged(root) {
  await buildIfChanged(root, { name: 'client', sources: CLIENT_SOURCES, out: 'dist/app', args: [] });
  await buildServer(root);
}

/** The server and the commands of the checker; they speak on standard error, where a command's output is read. */
export async function buildServer(root) {
  await buildIfChanged(root, { name: 'server', sources: SERVER_SOURCES, out: 'dist/api', args: ['--ssr'] });
}

async function buildIfChanged(root, { name, sources, out, args }) {
  const stamp = path.join(root, 'dist', `.${name}-sources`);
  const hash = hashOf(
    root,
    sources.flatMap((each) => listFiles(root, each)),
  );
  if (readQuietly(stamp) === hash && fs.existsSync(path.join(root, out))) return;
  console.error(`Building the ${name} ...`);
  fs.rmSync(stamp, { force: true });
  await run(process.execPath, ['node_modules/vite/bin/vite.js', 'build', '--logLevel', 'error', ...args], root);
  fs.writeFileSync(stamp, hash);
}

function listFiles(root, name) {
  const at = path.join(root, name);
  if (!fs.existsSync(at)) return [];
  if (fs.statSync(at).isFile()) return [name];
  const names = fs.readdirSync(at).sort();
  return names.flatMap((each) => listFiles(root, path.join(name, each)));
}

function hashOf(root, files) {
  const hash = createHash('sha256');
  for (const file of files)
    hash
      .update(`${file}\0`)
      .update(fs.readFileSync(path.join(root, file)))
      .update('\0');
  return hash.digest('hex');
}

function readQuietly(file) {
  try {
    return fs.readFileSync(file, 'utf8');
  } catch {
    return '';
  }
}

/** Runs a command to its end, showing what it says on standard error. */
export function run(command, args, cwd, env = process.env) {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, { cwd, env, stdio: ['ignore', 2, 2] });
    child.once('error', (error) => reject(new Error(`${command} could not be started: ${error.message}`)));
    child.once('exit', (code, signal) => {
      if (code === 0) resolve();
      else reject(new Error(`${[command, ...args].join(' ')} ended with ${signal ?? `code ${code}`}`));
    });
  });
}
