import type { ZodType } from 'zod';

export type Role = 'admin' | 'teacher' | 'student';

/** The signed-in person, as far as routes and services need to know. */
export interface Viewer {
  readonly userId: string;
  readonly schoolId: string;
  readonly role: Role;
  readonly sessionId: string;
}

/**
 * Who may call a route at all. Anything finer (this class's teacher, this review's reviewer) is the service's
 * first act, and answers 404 to everyone else.
 */
export type Who = 'anyone' | 'signed-in' | 'admin' | 'teacher' | 'student';

export interface Call<Body = unknown, Query = unknown, W extends Who = Who> {
  readonly viewer: W extends 'anyone' ? Viewer | null : Viewer;
  readonly params: Readonly<Record<string, string>>;
  readonly query: Query;
  readonly body: Body;
  readonly ip: string;
  readonly userAgent: string;
  readonly requestId: string;
}

/** What a handler may answer beside plain JSON. */
export interface Reply {
  readonly status?: number;
  readonly body?: unknown;
  /** A session cookie to set (a string) or to clear (null). */
  readonly sessionCookie?: string | null;
  readonly headers?: Readonly<Record<string, string>>;
  /** Sent as is with its own content type, instead of JSON. */
  readonly text?: { readonly type: string; readonly content: string };
}
export const REPLY = Symbol('reply');
export type MarkedReply = Reply & { readonly [REPLY]: true };

/** Marks an answer that is more than a JSON body. */
export function reply(answer: Reply): MarkedReply {
  return { ...answer, [REPLY]: true };
}

export interface Route {
  readonly method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  /** Express 5 path below /api, such as `/classes/:classId`. */
  readonly path: string;
  readonly who: Who;
  readonly body?: ZodType;
  readonly query?: ZodType;
  /** Tries a minute from one address (of one person, where the route is for signed-in people). */
  readonly triesPerMinute?: number;
  /** true: callable without a cookie or an Origin header (one-click unsubscribe only). */
  readonly fromAnywhere?: boolean;
  readonly handle: (call: never) => Promise<unknown>;
}

interface RouteSpec<W extends Who, Body, Query> extends Omit<Route, 'who' | 'body' | 'query' | 'handle'> {
  readonly who: W;
  readonly body?: ZodType<Body>;
  readonly query?: ZodType<Query>;
  /** The answer's JSON body (undefined: 204), or a `reply`. */
  readonly handle: (call: Call<Body, Query, W>) => Promise<unknown>;
}

/** Declares one route with its types tied together; Express is built from the list in app.ts. */
export function route<W extends Who, Body = undefined, Query = undefined>(spec: RouteSpec<W, Body, Query>): Route {
  return spec as Route;
}
