import { createServer, type Server } from 'node:http';
import { availableParallelism } from 'node:os';
import path from 'node:path';
import { createApp } from './app.ts';
import { createCheckPool, type CheckPool } from './checker/pool.ts';
import { createDataSource, migrate } from './db/data-source.ts';
import type { DemoAccount } from './features/demo/demo.service.ts';
import { serveBuiltClient, serveClientSources } from './http/client-files.ts';
import { systemClock } from './lib/clock.ts';
import { ConfigError, readConfig, type Config } from './lib/config.ts';
import { createLifetime, type Lifetime } from './lib/lifetime.ts';
import { createLogger, type Logger } from './lib/logger.ts';
import { startMailCatcher } from './lib/mail-catcher.ts';
import { createMailer } from './lib/mailer.ts';
import { openQueue } from './lib/queue.ts';
import { createRateLimiter } from './lib/rate-limit.ts';
import { composeServices, type Composed, type Platform } from './services.ts';

async function main(config: Config, logger: Logger, life: Lifetime): Promise<void> {
  const platform = await openPlatform(config, logger, life);
  const composed = composeServices(platform);
  await platform.queue.prepare(composed.jobs);
  if (config.demo) await prepareDemo(platform);
  await platform.queue.work();
  await listen(platform, composed, life);
  logger.info({ url: config.baseUrl }, 'listening');
  if (composed.demo) process.stdout.write(toGreeting(config, await composed.demo.listAccounts()));
}

async function prepareDemo(platform: Platform): Promise<void> {
  // Loaded here only: a school's server never reads it.
  const { seedDemo } = await import('./db/seed.ts');
  const begun = Date.now();
  if (await seedDemo(platform)) platform.logger.info({ ms: Date.now() - begun }, 'the demo is ready');
}

function toGreeting({ baseUrl, host, smtpUrl }: Config, accounts: readonly DemoAccount[]): string {
  const lines = [`Slipstone is at ${baseUrl}   (Ctrl-C stops it)`];
  if (smtpUrl === null) lines.push(`Its mail lands at ${baseUrl}/mailbox`);
  const [first] = accounts;
  if (first)
    lines.push('', `Sign in as one of these, with the password “${first.password}”:`, ...toTable(accounts), '');
  if (!['127.0.0.1', '::1', 'localhost'].includes(host)) {
    lines.push(`This is the demo: whoever reaches ${host} can read its mail. Set NODE_ENV=production for a school.`);
  }
  return `\n${lines.join('\n')}\n`;
}

function toTable(accounts: readonly DemoAccount[]): string[] {
  const width = Math.max(...accounts.map(({ signInName }) => signInName.length));
  return accounts.map(({ signInName, name, what }) => `  ${signInName.padEnd(width)}  ${name}, ${what}`);
}

async function openPlatform(config: Config, logger: Logger, life: Lifetime): Promise<Platform> {
  const db = createDataSource(config.databaseUrl);
  await db.initialize();
  life.onStop(() => db.destroy());
  await migrate(db);
  const catcher = config.smtpUrl === null ? await startMailCatcher(config.mailboxFile) : null;
  if (catcher) life.onStop(catcher.close);
  const mailer = createMailer(config.smtpUrl ?? catcher?.url ?? '', config.mailFrom);
  life.onStop(() => mailer.close());
  const queue = await openQueue(config.databaseUrl, logger);
  life.onStop(() => queue.stop());
  return {
    config,
    db,
    now: systemClock,
    logger,
    queue,
    rateLimiter: createRateLimiter(db, systemClock),
    mailer,
    mailbox: config.demo ? catcher : null,
    checks: openChecks(config, logger, life),
  };
}

function openChecks(config: Config, logger: Logger, life: Lifetime): CheckPool {
  // Beside this file: its own bundle in the built server, the source under tsx.
  const name = import.meta.url.endsWith('.ts') ? './checker/check.worker.ts' : './check.worker.js';
  const pool = createCheckPool({
    workerUrl: new URL(name, import.meta.url),
    threads: config.checkWorkers ?? Math.max(1, Math.min(4, availableParallelism() - 1)),
    onEnded: ({ step, reason, cause }) => logger.warn({ step, reason, err: cause }, 'a check was ended'),
  });
  life.onStop(() => pool.close());
  return pool;
}

async function listen(platform: Platform, composed: Composed, life: Lifetime): Promise<void> {
  const { config, logger } = platform;
  const server = createServer();
  const app = await createApp({
    ...composed,
    config,
    logger,
    rateLimiter: platform.rateLimiter,
    serveClient: async (express) => {
      if (config.clientFromSources) life.onStop(await serveClientSources(express, server, config.demo));
      else serveBuiltClient(express, path.resolve('dist/app'), config.demo);
    },
  });
  server.on('request', app);
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject).listen(config.port, config.host, resolve);
  });
  life.onStop(() => closeServer(server));
}

function closeServer(server: Server): Promise<void> {
  return new Promise((resolve) => {
    server.close(() => resolve());
    server.closeIdleConnections();
    setTimeout(() => server.closeAllConnections(), 2_000).unref();
  });
}

function complain(error: unknown): never {
  const words = error instanceof ConfigError ? error.message : String(error instanceof Error ? error.stack : error);
  process.stderr.write(`${words}\n`);
  process.exit(1);
}

try {
  const config = readConfig();
  const logger = createLogger(config.logLevel);
  const life = createLifetime(logger);
  // Told to stop while starting: what was half open fails, and that is no news.
  await main(config, logger, life).catch((error: unknown) => life.isStopping() || complain(error));
} catch (error) {
  complain(error);
}
