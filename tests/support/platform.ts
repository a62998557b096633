import type { DataSource } from 'typeorm';
import type { Platform } from '../../api/services.ts';
import { checkDerivation } from '../../api/checker/rule-derivation.ts';
import { readConfig } from '../../api/lib/config.ts';
import { createLogger } from '../../api/lib/logger.ts';
import type { Letter, Mailer } from '../../api/lib/mailer.ts';
import { openQueue } from '../../api/lib/queue.ts';
import { createRateLimiter } from '../../api/lib/rate-limit.ts';
import { TestClock } from './test-clock.ts';

export interface TestPlatform {
  readonly platform: Platform;
  readonly clock: TestClock;
  /** Every letter that a job handed to the mail server, oldest first. */
  readonly mails: Letter[];
  /** Set to make the mail server refuse. */
  readonly mailServer: { broken: boolean };
  readonly close: () => Promise<void>;
}

/** The real platform on a real database, with a clock that stands still and a mail server that keeps what it is given. */
export async function createPlatform(dataSource: DataSource, databaseUrl: string): Promise<TestPlatform> {
  const logger = createLogger(process.env['TEST_LOG_LEVEL'] ?? 'silent');
  const clock = new TestClock();
  const now = () => clock.now();
  const mails: Letter[] = [];
  const mailServer = { broken: false };
  const queue = await openQueue(databaseUrl, logger, false);
  const config = readConfig({ NODE_ENV: 'test', DATABASE_URL: databaseUrl, BASE_URL: 'http://slipstone.test' });
  const platform: Platform = {
    config,
    db: dataSource,
    now,
    logger,
    queue,
    rateLimiter: createRateLimiter(dataSource, now),
    mailer: keepLetters(mails, mailServer),
    mailbox: { list: () => [] },
    // The same rules as in the worker threads, without waiting for one to start in every test file.
    checks: { check: async (input) => ({ ...checkDerivation(input), ms: 0, explainMs: 0 }), healthy: async () => true },
  };
  return { platform, clock, mails, mailServer, close: () => queue.stop() };
}

function keepLetters(mails: Letter[], mailServer: { broken: boolean }): Mailer {
  return {
    async send(letter) {
      if (mailServer.broken) throw new Error('The mail server is away');
      mails.push(letter);
    },
    close: () => undefined,
  };
}
