import { createServer, type Server } from 'node:http';
import path from 'node:path';
import { createApp } from './app.ts';
import { createDataSource, migrate } from './db/data-source.ts';
import { serveBuiltClient, serveClientSources } from './http/client-files.ts';
import { systemClock } from './lib/clock.ts';
import { ConfigError, readConfig, type Config } from './lib/config.ts';
import { createLogger, type Logger } from './lib/logger.ts';
import { startMailCatcher } from './lib/mail-catcher.ts';
import { createMailer } from './lib/mailer.ts';
import { openQueue } from './lib/queue.ts';
import { createRateLimiter } from './lib/rate-limit.ts';
import { composeServices, type Composed, type Platform } from './services.ts';

type Closer = () => unknown;

async function main(): Promise<void> {
  const config = readConfig();
  const logger = createLogger(config.logLevel);
  const closers: Closer[] = [];
  stopOnSignal(closers, logger);
  const platform = await openPlatform(config, logger, closers);
  const composed = composeServices(platform);
  await platform.queue.prepare(composed.jobs);
  await listen(platform, composed, closers);
  await platform.queue.work();
  logger.info({ url: config.baseUrl }, 'listening');
  if (config.demo) process.stdout.write(toGreeting(config));
}

function toGreeting({ baseUrl }: Config): string {
  return `\nSlipstone is at ${baseUrl}   (Ctrl-C stops it)\nIts mail lands at ${baseUrl}/mailbox\n`;
}

async function openPlatform(config: Config, logger: Logger, closers: Closer[]): Promise<Platform> {
  const db = createDataSource(config.databaseUrl);
  await db.initialize();
  closers.push(() => db.destroy());
  await migrate(db);
  const queue = await openQueue(config.databaseUrl, logger);
  closers.push(() => queue.stop());
  const catcher = config.smtpUrl === null ? await startMailCatcher(config.mailboxFile) : null;
  if (catcher) closers.push(catcher.close);
  const mailer = createMailer(config.smtpUrl ?? catcher?.url ?? '', config.mailFrom);
  closers.push(() => mailer.close());
  return {
    config,
    db,
    now: systemClock,
    logger,
    queue,
    rateLimiter: createRateLimiter(db, systemClock),
    mailer,
    mailbox: config.demo ? catcher : null,
    workersHealthy: () => true,
  };
}

async function listen(platform: Platform, composed: Composed, closers: Closer[]): Promise<void> {
  const { config, logger } = platform;
  const server = createServer();
  const app = await createApp({
    ...composed,
    config,
    logger,
    rateLimiter: platform.rateLimiter,
    serveClient: async (express) => {
      if (config.clientFromSources) closers.push(await serveClientSources(express, server));
      else serveBuiltClient(express, path.resolve('dist/app'));
    },
  });
  server.on('request', app);
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject).listen(config.port, config.host, resolve);
  });
  // Last opened, first closed: no new request meets a closed database.
  closers.push(() => closeServer(server));
}

function closeServer(server: Server): Promise<void> {
  return new Promise((resolve) => {
    server.close(() => resolve());
    server.closeIdleConnections();
    setTimeout(() => server.closeAllConnections(), 2_000).unref();
  });
}

function stopOnSignal(closers: Closer[], logger: Logger): void {
  let stopping = false;
  const stop = async (signal: string) => {
    if (stopping) return;
    stopping = true;
    logger.info({ signal }, 'stopping');
    for (const close of closers.reverse()) {
      try {
        await close();
      } catch (error) {
        logger.error({ err: error }, 'could not close');
      }
    }
    process.exit(0);
  };
  process.on('SIGINT', () => void stop('SIGINT'));
  process.on('SIGTERM', () => void stop('SIGTERM'));
  // Started by `npm start`, which has been killed: nobody would be left to stop us.
  process.on('disconnect', () => void stop('disconnect'));
}

try {
  await main();
} catch (error) {
  process.stderr.write(
    error instanceof ConfigError ? `${error.message}\n` : `${String(error instanceof Error ? error.stack : error)}\n`,
  );
  process.exit(1);
}
