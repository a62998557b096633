import fs from 'node:fs';
import path from 'node:path';
import type { CallObserver } from '../../api/http/mount-routes.ts';
import type { Route, Who } from '../../api/http/route.ts';

/** What the API tests really called in this run; `tests/routes/` reads it when they are done. */
export const ROUTE_LOG_FOLDER = path.resolve('test-results/route-log');

export interface LoggedCall {
  readonly route: string;
  readonly at: string;
  readonly userId: string | null;
  readonly status: number;
}

export interface RouteCase {
  readonly route: string;
  readonly missing: readonly string[];
}

export function toRouteName({ method, path: routePath }: Pick<Route, 'method' | 'path'>): string {
  return `${method.toUpperCase()} ${routePath}`;
}

/** Appends each answered call to this process's file. */
export function createRouteLog(): CallObserver {
  fs.mkdirSync(ROUTE_LOG_FOLDER, { recursive: true });
  const file = path.join(ROUTE_LOG_FOLDER, `${process.pid}.jsonl`);
  return ({ route, params, viewer, status }) => {
    const call: LoggedCall = {
      route: toRouteName(route),
      at: JSON.stringify(params),
      userId: viewer?.userId ?? null,
      status,
    };
    fs.appendFileSync(file, `${JSON.stringify(call)}\n`);
  };
}

export function readRouteLog(): LoggedCall[] {
  if (!fs.existsSync(ROUTE_LOG_FOLDER)) return [];
  return fs
    .readdirSync(ROUTE_LOG_FOLDER)
    .flatMap((name) => fs.readFileSync(path.join(ROUTE_LOG_FOLDER, name), 'utf8').trim().split('\n'))
    .map((line) => JSON.parse(line) as LoggedCall);
}

/**
 * The cases of a route that no test called. A stranger case is one address that answered one signed-in person
 * with success and another with 404, so a made-up id does not count.
 */
export function findMissingCases(route: Route, calls: readonly LoggedCall[]): string[] {
  const own = calls.filter((call) => call.route === toRouteName(route));
  const expected: [name: string, wanted: boolean, met: boolean][] = [
    ['happy', true, own.some((call) => call.status < 400)],
    ['signed out', route.who !== 'anyone', own.some((call) => call.status === 401 && call.userId === null)],
    ['wrong role', hasRole(route.who), own.some((call) => call.status === 403 && call.userId !== null)],
    ['stranger', route.who !== 'anyone' && route.path.includes(':'), meetsStranger(own)],
    ['bad input', Boolean(route.body), own.some((call) => call.status === 422)],
  ];
  return expected.filter(([, wanted, met]) => wanted && !met).map(([name]) => name);
}

function hasRole(who: Who): boolean {
  return who !== 'anyone' && who !== 'signed-in';
}

function meetsStranger(calls: readonly LoggedCall[]): boolean {
  const refused = calls.filter((call) => call.status === 404 && call.userId !== null);
  return refused.some((stranger) =>
    calls.some((owner) => owner.at === stranger.at && owner.status < 400 && owner.userId !== stranger.userId),
  );
}
