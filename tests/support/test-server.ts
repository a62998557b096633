import { randomBytes } from 'node:crypto';
import type { Express } from 'express';
import pg from 'pg';
import request, { type Test } from 'supertest';
import type { DataSource } from 'typeorm';
import { inject } from 'vitest';
import { createApp } from '../../api/app.ts';
import { composeServices, type Composed, type Platform } from '../../api/services.ts';
import { createDataSource } from '../../api/db/data-source.ts';
import { User } from '../../api/features/people/people.entity.ts';
import type { Viewer } from '../../api/http/route.ts';
import { SESSION_COOKIE } from '../../api/http/session-cookie.ts';
import type { Letter } from '../../api/lib/mailer.ts';
import { createFactories, type Factories } from './factories.ts';
import { createPlatform } from './platform.ts';
import { createRouteLog } from './route-log.ts';
import type { TestClock } from './test-clock.ts';

/** One person's browser: keeps its cookies and sends the right Origin. Paths are below /api. */
export interface Client {
  get(path: string): Test;
  post(path: string, body?: object): Test;
  put(path: string, body?: object): Test;
  patch(path: string, body?: object): Test;
  delete(path: string, body?: object): Test;
  /** The cookie header that is sent, for looking at and for tampering with. */
  cookie: string | null;
}

export interface TestServer {
  readonly app: Express;
  readonly platform: Platform;
  readonly features: Composed;
  readonly dataSource: DataSource;
  readonly clock: TestClock;
  /** Letters sent so far; call `runJobs` first, because mail leaves by a job. */
  readonly mails: Letter[];
  readonly mailServer: { broken: boolean };
  readonly create: Factories;
  /** A browser in which nobody is signed in. */
  visitor(): Client;
  /** A browser in which this person is signed in, without going through the sign-in page. */
  signIn(user: Pick<User, 'id'>): Promise<Client>;
  /** Runs every job that is due by the test clock, until none is left. */
  runJobs(): Promise<number>;
  stop(): Promise<void>;
}

const ORIGIN = 'http://slipstone.test';

/** The whole API on a database of its own. Call `stop` in afterAll. */
export async function startTestServer(): Promise<TestServer> {
  const database = await createDatabase();
  const dataSource = createDataSource(database.url, 8);
  await dataSource.initialize();
  const { platform, clock, mails, mailServer, close } = await createPlatform(dataSource, database.url);
  const features = composeServices(platform);
  await platform.queue.prepare(features.jobs);
  const signedIn = new Map<string, Viewer>();
  const app = await createApp({
    config: platform.config,
    logger: platform.logger,
    routes: features.routes,
    conflicts: features.conflicts,
    rateLimiter: platform.rateLimiter,
    findViewer: async (token) => signedIn.get(token) ?? (await features.findViewer(token)),
    onCall: createRouteLog(),
  });
  return {
    app,
    platform,
    features,
    dataSource,
    clock,
    mails,
    mailServer,
    create: createFactories(dataSource, clock),
    visitor: () => createClient(app, null),
    async signIn({ id }) {
      const user = await dataSource.getRepository(User).findOneByOrFail({ id });
      const token = `test-${randomBytes(9).toString('hex')}`;
      signedIn.set(token, { userId: id, schoolId: user.schoolId, role: user.role, sessionId: token });
      return createClient(app, `${SESSION_COOKIE}=${token}`);
    },
    runJobs: () => platform.queue.drain(clock.now()),
    async stop() {
      await close();
      await dataSource.destroy();
      await database.drop();
    },
  };
}

function createClient(app: Express, cookie: string | null): Client {
  const client: Client = {
    cookie,
    get: (path) => send('get', path),
    post: (path, body) => send('post', path, body),
    put: (path, body) => send('put', path, body),
    patch: (path, body) => send('patch', path, body),
    delete: (path, body) => send('delete', path, body),
  };
  function send(method: 'get' | 'post' | 'put' | 'patch' | 'delete', path: string, body?: object): Test {
    const test = request(app)[method](`/api${path}`).set('Origin', ORIGIN);
    if (client.cookie) test.set('Cookie', client.cookie);
    test.on('response', (response: { headers: Record<string, string[] | undefined> }) => {
      const set = response.headers['set-cookie']?.find((each) => each.startsWith(`${SESSION_COOKIE}=`));
      if (set) client.cookie = /=;|Expires=Thu, 01 Jan 1970/.test(set) ? null : (set.split(';', 1)[0] ?? null);
    });
    return body === undefined ? test : test.send(body);
  }
  return client;
}

async function createDatabase(): Promise<{ url: string; drop: () => Promise<void> }> {
  const { adminUrl, template } = inject('testDatabase');
  const name = `t_${randomBytes(6).toString('hex')}`;
  await runSql(adminUrl, `create database ${name} template ${template} strategy file_copy`);
  const address = new URL(adminUrl);
  address.pathname = `/${name}`;
  return { url: address.href, drop: () => runSql(adminUrl, `drop database if exists ${name} with (force)`) };
}

async function runSql(url: string, statement: string): Promise<void> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    await client.query(statement);
  } finally {
    await client.end();
  }
}
