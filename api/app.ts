import express, { type Express } from 'express';
import { mountRoutes, type CallObserver } from './http/mount-routes.ts';
import { answerProblems, type UniqueConflicts } from './http/problems.ts';
import { requestLog } from './http/request-log.ts';
import type { Route, Viewer } from './http/route.ts';
import { sameSiteOnly, securityHeaders } from './http/security.ts';
import type { Config } from './lib/config.ts';
import type { Logger } from './lib/logger.ts';
import type { RateLimiter } from './lib/rate-limit.ts';

export interface AppDeps {
  readonly config: Pick<Config, 'baseUrl' | 'production' | 'clientFromSources' | 'trustProxyHops'>;
  readonly logger: Logger;
  readonly routes: readonly Route[];
  readonly conflicts: UniqueConflicts;
  readonly findViewer: (sessionToken: string) => Promise<Viewer | null>;
  readonly rateLimiter: RateLimiter;
  /** Adds what serves the client, after /api; absent where only the API is wanted. */
  readonly serveClient?: (app: Express) => void | Promise<void>;
  readonly onCall?: CallObserver;
}

/** Builds Express from its dependencies; it neither listens nor opens anything by itself. */
export async function createApp(deps: AppDeps): Promise<Express> {
  const { config, logger } = deps;
  const overHttps = config.baseUrl.startsWith('https:');
  const app = express();
  app.disable('x-powered-by');
  app.disable('etag');
  app.set('trust proxy', config.trustProxyHops);
  app.use(requestLog(logger));
  app.use(securityHeaders(overHttps, config.clientFromSources));
  app.use('/api', (_req, res, next) => {
    res.setHeader('cache-control', 'no-store');
    next();
  });
  app.use(
    '/api',
    mountRoutes(deps.routes, {
      findViewer: deps.findViewer,
      sameSite: sameSiteOnly(config.baseUrl, !config.production),
      rateLimiter: deps.rateLimiter,
      secureCookies: overHttps,
      ...(deps.onCall && { onCall: deps.onCall }),
    }),
  );
  await deps.serveClient?.(app);
  app.use(answerProblems(logger, deps.conflicts));
  return app;
}
