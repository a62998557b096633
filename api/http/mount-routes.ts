import express, { Router, type NextFunction, type Request, type RequestHandler, type Response } from 'express';
import type { RateLimiter } from '../lib/rate-limit.ts';
import { notFound, ProblemError } from './problem-error.ts';
import { REPLY, type MarkedReply, type Route, type Viewer } from './route.ts';
import { readSessionCookie, writeSessionCookie } from './session-cookie.ts';

/** Told about every answered call; the tests learn from it which cases of a route were tried. */
export type CallObserver = (call: {
  route: Route;
  params: Call['params'];
  viewer: Viewer | null;
  status: number;
}) => void;

export interface MountOptions {
  readonly findViewer: (sessionToken: string) => Promise<Viewer | null>;
  readonly sameSite: RequestHandler;
  readonly rateLimiter: RateLimiter;
  readonly secureCookies: boolean;
  readonly onCall?: CallObserver;
}

interface Call {
  readonly viewer: Viewer | null;
  readonly params: Readonly<Record<string, string>>;
}

const UUID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/i;

const readJson = express.json({ limit: '1mb' });

/** Builds Express from the list. Order of a call: origin, person, role, tries, body, fields, handler. */
export function mountRoutes(routes: readonly Route[], options: MountOptions): Router {
  const router = Router({ caseSensitive: true });
  for (const route of routes) {
    const call = new WeakMap<Request, Call>();
    const gate: RequestHandler = async (req, res, next) => {
      const viewer = await findViewer(req, options);
      const params = toParams(req);
      call.set(req, { viewer, params });
      if (options.onCall) observe(options.onCall, route, res, { viewer, params });
      enforce(route, viewer, params);
      await limitTries(route, req, viewer, options.rateLimiter);
      next();
    };
    const answer: RequestHandler = async (req, res) => {
      const known = call.get(req);
      if (!known) throw new Error('The gate has not run');
      send(res, await callHandler(route, req, known), options.secureCookies);
    };
    router[route.method](route.path, ...guards(route, options), gate, ...bodyReaders(route), answer);
  }
  router.use((_req: Request, _res: Response, next: NextFunction) => next(notFound()));
  return router;
}

function guards(route: Route, options: MountOptions): RequestHandler[] {
  return route.method === 'get' || route.fromAnywhere ? [] : [options.sameSite];
}

function bodyReaders(route: Route): RequestHandler[] {
  return route.body ? [readJson] : [];
}

async function findViewer(req: Request, options: MountOptions): Promise<Viewer | null> {
  const token = readSessionCookie(req);
  return token === null ? null : await options.findViewer(token);
}

function toParams(req: Request): Record<string, string> {
  return Object.fromEntries(Object.entries(req.params).map(([name, value]) => [name, String(value)]));
}

function enforce(route: Route, viewer: Viewer | null, params: Call['params']): void {
  if (route.who !== 'anyone') {
    if (!viewer) throw new ProblemError('signed-out');
    if (route.who !== 'signed-in' && viewer.role !== route.who) throw new ProblemError('not-allowed');
  }
  // A malformed id names nothing, as an unknown one does; it must not reach the database as a bad uuid.
  for (const [name, value] of Object.entries(params)) {
    if (name.endsWith('Id') && !UUID.test(value)) throw notFound();
  }
}

/** Counted by address; where one must be signed in by person, because a whole class may sit behind one address. */
async function limitTries(route: Route, req: Request, viewer: Viewer | null, limiter: RateLimiter): Promise<void> {
  if (route.triesPerMinute === undefined) return;
  const who = route.who === 'anyone' || !viewer ? (req.ip ?? '') : viewer.userId;
  await limiter.count(`${route.method} ${route.path} ${who}`, route.triesPerMinute, 60);
}

async function callHandler(route: Route, req: Request, known: Call): Promise<unknown> {
  const handle = route.handle as (call: unknown) => Promise<unknown>;
  return await handle({
    ...known,
    query: route.query ? route.query.parse({ ...req.query }) : undefined,
    body: route.body ? route.body.parse(req.body ?? {}) : undefined,
    ip: req.ip ?? '',
    userAgent: req.get('user-agent') ?? '',
    requestId: String(req.id),
  });
}

function send(res: Response, result: unknown, secureCookies: boolean): void {
  if (!isReply(result)) {
    if (result === undefined) res.status(204).end();
    else res.json(result);
    return;
  }
  if (result.sessionCookie !== undefined) writeSessionCookie(res, result.sessionCookie, secureCookies);
  for (const [name, value] of Object.entries(result.headers ?? {})) res.setHeader(name, value);
  if (result.text)
    res
      .status(result.status ?? 200)
      .type(result.text.type)
      .send(result.text.content);
  else if (result.body === undefined) res.status(result.status ?? 204).end();
  else res.status(result.status ?? 200).json(result.body);
}

function isReply(result: unknown): result is MarkedReply {
  return typeof result === 'object' && result !== null && REPLY in result;
}

function observe(onCall: CallObserver, route: Route, res: Response, call: Call): void {
  res.on('finish', () => onCall({ route, ...call, status: res.statusCode }));
}
