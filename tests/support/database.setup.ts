import { randomBytes } from 'node:crypto';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import pg from 'pg';
import type { TestProject } from 'vitest/node';
import { isAlive, startCluster, type Cluster } from '../../api/boot/postgres.mjs';
import { ROUTE_LOG_FOLDER } from './route-log.ts';
import { prepareTemplate } from './template-database.ts';

declare module 'vitest' {
  export interface ProvidedContext {
    /** Address of the server's maintenance database, and the name of the migrated template. */
    testDatabase: { adminUrl: string; template: string };
  }
}

/** One throw-away cluster a run (or TEST_DATABASE_URL's server), with a template that is migrated once. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  fs.rmSync(ROUTE_LOG_FOLDER, { recursive: true, force: true });
  const given = process.env['TEST_DATABASE_URL'];
  const cluster = given ? null : await startThrowAwayCluster();
  const adminUrl = given ?? cluster?.url ?? '';
  const template = `tpl_${randomBytes(6).toString('hex')}`;
  await sql(adminUrl, `create database ${template}`);
  await prepareTemplate(withDatabase(adminUrl, template));
  project.provide('testDatabase', { adminUrl, template });
  return async () => {
    if (cluster) cluster.remove();
    else await sql(adminUrl, `drop database if exists ${template} with (force)`);
  };
}

async function startThrowAwayCluster(): Promise<Cluster & { remove: () => void }> {
  const parent = hasRoom('/dev/shm') ? '/dev/shm' : os.tmpdir();
  removeLeftovers(parent);
  const folder = path.join(parent, `slipstone-test-${process.pid}-${randomBytes(3).toString('hex')}`);
  const cluster = await startCluster(folder, { throwAway: true });
  return {
    ...cluster,
    remove: () => {
      cluster.stop();
      fs.rmSync(folder, { recursive: true, force: true });
    },
  };
}

/** A run that was killed leaves its cluster behind, running; its folder says whose it was. */
function removeLeftovers(parent: string): void {
  for (const name of fs.readdirSync(parent)) {
    const owner = /^slipstone-test-(\d+)-/.exec(name)?.[1];
    if (!owner || isAlive(Number(owner))) continue;
    const folder = path.join(parent, name);
    const pidFile = path.join(folder, 'postgres', 'postmaster.pid');
    const pid = fs.existsSync(pidFile) ? Number(fs.readFileSync(pidFile, 'utf8').split('\n', 1)[0]) : 0;
    if (isAlive(pid) && fs.readFileSync(`/proc/${pid}/cmdline`, 'utf8').includes(folder)) process.kill(pid, 'SIGQUIT');
    fs.rmSync(folder, { recursive: true, force: true });
  }
}

function hasRoom(folder: string): boolean {
  if (!fs.existsSync(folder)) return false;
  const { bavail, bsize } = fs.statfsSync(folder);
  return bavail * bsize > 1_000_000_000;
}

function withDatabase(url: string, name: string): string {
  const address = new URL(url);
  address.pathname = `/${name}`;
  return address.href;
}

async function sql(url: string, statement: string): Promise<void> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    await client.query(statement);
  } finally {
    await client.end();
  }
}
