import { randomUUID } from 'node:crypto';
import type { RequestHandler } from 'express';
import { pinoHttp } from 'pino-http';
import { toLoggedPath, type Logger } from '../lib/logger.ts';

/** One line per request, with an id that is also answered as `X-Request-Id`; no headers, no bodies. */
export function requestLog(logger: Logger): RequestHandler {
  return pinoHttp({
    logger,
    genReqId: (_req, res) => {
      const id = randomUUID();
      res.setHeader('x-request-id', id);
      return id;
    },
    customLogLevel: (_req, res, error) => (error || res.statusCode >= 500 ? 'error' : 'info'),
    serializers: {
      req: (req: { id: string; method: string; url: string }) => ({
        id: req.id,
        method: req.method,
        path: toLoggedPath(req.url),
      }),
      res: (res: { statusCode: number }) => ({ status: res.statusCode }),
    },
  });
}
