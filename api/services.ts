import type { DataSource } from 'typeorm';
import { z } from 'zod';
import { healthRoutes } from './features/health/health.routes.ts';
import { mailJobs } from './features/mail/mail.jobs.ts';
import { mailRoutes } from './features/mail/mail.routes.ts';
import { createMailService } from './features/mail/mail.service.ts';
import { mailboxRoutes } from './features/mail/mailbox.routes.ts';
import type { UniqueConflicts } from './http/problems.ts';
import type { Route, Viewer } from './http/route.ts';
import type { Now } from './lib/clock.ts';
import type { Config } from './lib/config.ts';
import type { Logger } from './lib/logger.ts';
import type { MailCatcher } from './lib/mail-catcher.ts';
import type { Mailer } from './lib/mailer.ts';
import { job, type JobKind, type Queue } from './lib/queue.ts';
import type { RateLimiter } from './lib/rate-limit.ts';

/** What every feature may be handed; main opens the real ones, the tests their own. */
export interface Platform {
  readonly config: Config;
  readonly db: DataSource;
  readonly now: Now;
  readonly logger: Logger;
  readonly queue: Queue;
  readonly rateLimiter: RateLimiter;
  readonly mailer: Mailer;
  /** The demo's letters; null in production. */
  readonly mailbox: Pick<MailCatcher, 'list'> | null;
  readonly workersHealthy: () => boolean;
}

/** Everything the application is made of: what createApp and the job queue need. */
export interface Composed {
  readonly routes: readonly Route[];
  readonly jobs: readonly JobKind[];
  /** What to say when a named unique constraint stops a write. */
  readonly conflicts: UniqueConflicts;
  readonly findViewer: (sessionToken: string) => Promise<Viewer | null>;
}

/**
 * Composes everything in one place: each feature's service, its routes and its jobs, and hands one service's
 * function to another, because features never import each other.
 */
export function composeServices(platform: Platform): Composed {
  const { config, db, now, queue, rateLimiter, mailer } = platform;
  const mail = createMailService({ db, now, queue, mailer, baseUrl: config.baseUrl, secret: config.secret });
  return {
    routes: [
      ...healthRoutes({ pingDatabase: () => db.query('select 1'), workersHealthy: platform.workersHealthy }),
      ...mailRoutes(mail),
      ...(platform.mailbox ? mailboxRoutes(platform.mailbox) : []),
    ],
    jobs: [
      ...mailJobs(mail),
      job({ name: 'sweep-rate-limits', data: z.object({}), cron: '17 3 * * *', handle: () => rateLimiter.sweep() }),
    ],
    conflicts: {},
    findViewer: async () => null,
  };
}
