import type { Express } from 'express';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { z } from 'zod';
import { createApp } from '../../api/app.ts';
import { createDataSource } from '../../api/db/data-source.ts';
import { ProblemError } from '../../api/http/problem-error.ts';
import { reply, route, type Role, type Route } from '../../api/http/route.ts';
import { School } from '../../api/features/people/people.entity.ts';
import { startTestServer, type TestServer } from '../support/test-server.ts';

let server: TestServer;
let app: Express;
const ORIGIN = 'http://slipstone.test';
const ID = '0b8f5c1e-4c1d-4f0e-9a57-3f1f6c0d2b11';

const form = z.object({
  name: z.string().min(1, 'Give a name.'),
  people: z.array(z.object({ age: z.number() })).default([]),
});

function routes(): Route[] {
  const schools = server.dataSource.getRepository(School);
  return [
    route({ method: 'get', path: '/me', who: 'signed-in', handle: async ({ viewer }) => ({ role: viewer.role }) }),
    route({ method: 'get', path: '/desk', who: 'teacher', handle: async () => ({ ok: true }) }),
    route({ method: 'post', path: '/echo', who: 'anyone', body: form, handle: async ({ body }) => body }),
    route({ method: 'post', path: '/hook', who: 'anyone', fromAnywhere: true, handle: async () => undefined }),
    route({
      method: 'get',
      path: '/find',
      who: 'anyone',
      query: z.object({ page: z.coerce.number().int() }),
      handle: async ({ query }) => query,
    }),
    route({ method: 'get', path: '/things/:thingId', who: 'anyone', handle: async ({ params }) => params }),
    route({ method: 'post', path: '/guess', who: 'anyone', triesPerMinute: 2, handle: async () => undefined }),
    route({
      method: 'post',
      path: '/in',
      who: 'anyone',
      handle: async () => reply({ sessionCookie: 'tok', status: 201, body: {} }),
    }),
    route({ method: 'post', path: '/out', who: 'anyone', handle: async () => reply({ sessionCookie: null }) }),
    route({
      method: 'post',
      path: '/schools',
      who: 'anyone',
      body: form,
      handle: async ({ body }) => void (await schools.insert({ name: body.name, timeZone: 'UTC' })),
    }),
    route({
      method: 'get',
      path: '/broken',
      who: 'anyone',
      handle: async () => {
        throw new Error('the password is hunter2');
      },
    }),
    route({
      method: 'get',
      path: '/late',
      who: 'anyone',
      handle: async () => {
        throw new ProblemError('too-late', { detail: 'Writing ended at noon.' });
      },
    }),
  ];
}

async function build(conflicts = {}): Promise<Express> {
  const { config, logger, rateLimiter } = server.platform;
  return await createApp({
    config,
    logger,
    rateLimiter,
    conflicts,
    routes: routes(),
    findViewer: async (token) => {
      if (!token.startsWith('role-')) return null;
      return { userId: ID, schoolId: ID, role: token.slice(5) as Role, sessionId: token };
    },
  });
}

const as = (role: string) => `slipstone_session=role-${role}`;
const post = (path: string) => request(app).post(`/api${path}`).set('Origin', ORIGIN);

beforeAll(async () => {
  server = await startTestServer();
  app = await build({ uq_school_name: { pointer: '/name', detail: 'There is a school of this name.' } });
});
afterAll(() => server.stop());

describe('who may call', () => {
  it('answers 401 signed out and 403 for another role', async () => {
    expect((await request(app).get('/api/me').expect(401)).body).toMatchObject({ type: 'signed-out', status: 401 });
    await request(app).get('/api/me').set('Cookie', 'slipstone_session=role').expect(401);
    await request(app).get('/api/desk').expect(401);
    expect((await request(app).get('/api/desk').set('Cookie', as('student')).expect(403)).body.type).toBe(
      'not-allowed',
    );
    await request(app).get('/api/desk').set('Cookie', as('admin')).expect(403);
    await request(app).get('/api/desk').set('Cookie', as('teacher')).expect(200, { ok: true });
  });

  it('refuses a change that comes from another site or says nothing of where it comes from', async () => {
    await request(app).post('/api/echo').send({ name: 'a' }).expect(403);
    const foreign = await request(app)
      .post('/api/echo')
      .set('Origin', 'https://evil.test')
      .send({ name: 'a' })
      .expect(403);
    expect(foreign.body.type).toBe('cross-site');
    await request(app).post('/api/echo').set('Origin', 'null').send({ name: 'a' }).expect(403);
    await request(app).post('/api/hook').set('Origin', 'https://evil.test').expect(204);
  });
});

describe('what is sent', () => {
  it('answers all bad fields at once with pointers', async () => {
    const response = await post('/echo')
      .send({ name: '', people: [{ age: 'x' }] })
      .expect(422);
    expect(response.headers['content-type']).toContain('application/problem+json');
    expect(response.body).toMatchObject({
      type: 'invalid-fields',
      errors: [{ pointer: '/name', detail: 'Give a name.' }, { pointer: '/people/0/age' }],
    });
    expect(response.body.requestId).toBe(response.headers['x-request-id']);
  });

  it('answers 422 when there is no body at all, or not JSON', async () => {
    await post('/echo').expect(422);
    await post('/echo').type('text').send('name=a').expect(422);
  });

  it('answers 400 for JSON that cannot be read and for an unknown encoding', async () => {
    expect((await post('/echo').type('json').send('{"name":').expect(400)).body.type).toBe('bad-request');
    await post('/echo').set('Content-Encoding', 'zstd').type('json').send('{"name":"a"}').expect(400);
  });

  it('answers 413 past one megabyte', async () => {
    expect(
      (
        await post('/echo')
          .send({ name: 'a'.repeat(1_100_000) })
          .expect(413)
      ).body.type,
    ).toBe('too-large');
  });

  it('reads the query, and answers 422 when it is bad', async () => {
    await request(app).get('/api/find?page=3').expect(200, { page: 3 });
    await request(app).get('/api/find?page=x').expect(422);
  });

  it('answers 404 for an id that is none', async () => {
    await request(app).get(`/api/things/${ID}`).expect(200, { thingId: ID });
    await request(app).get('/api/things/1%20or%201').expect(404);
    await request(app).get('/api/things/%E0%A4%A').expect(400);
    await request(app).get('/api/nowhere').expect(404);
  });
});

describe('what comes back', () => {
  it('never shows the inside of an error', async () => {
    const response = await request(app).get('/api/broken').expect(500);
    expect(response.text).not.toContain('hunter2');
    expect(response.body.type).toBe('unexpected');
  });

  it('answers 503 when the database is away', async () => {
    const { config, logger, rateLimiter } = server.platform;
    const away = await createDataSource('postgres://nobody@127.0.0.1:1/none')
      .initialize()
      .catch((error: unknown) => error);
    const app = await createApp({
      config,
      logger,
      rateLimiter,
      conflicts: {},
      routes: [route({ method: 'get', path: '/away', who: 'anyone', handle: () => Promise.reject(away) })],
      findViewer: async () => null,
    });
    expect((await request(app).get('/api/away').expect(503)).body.type).toBe('unavailable');
  });

  it('words a problem', async () => {
    expect((await request(app).get('/api/late').expect(409)).body).toMatchObject({
      type: 'too-late',
      detail: 'Writing ended at noon.',
    });
  });

  it('answers a named unique violation as a conflict and an unnamed one as our mistake', async () => {
    await post('/schools').send({ name: 'North' }).expect(204);
    const again = await post('/schools').send({ name: 'North' }).expect(409);
    expect(again.body).toMatchObject({
      type: 'conflict',
      errors: [{ pointer: '/name', detail: 'There is a school of this name.' }],
    });
    const unnamed = await build();
    await request(unnamed).post('/api/schools').set('Origin', ORIGIN).send({ name: 'North' }).expect(500);
  });

  it('answers 400 for a character that the database cannot keep', async () => {
    await post('/schools').send({ name: 'a\u0000b' }).expect(400);
  });

  it('sets and clears a cookie that scripts and other sites do not get', async () => {
    const set = await post('/in').expect(201);
    expect(set.headers['set-cookie']?.[0]).toMatch(/^slipstone_session=tok; .*HttpOnly; SameSite=Lax/);
    const cleared = await post('/out').expect(204);
    expect(cleared.headers['set-cookie']?.[0]).toMatch(/^slipstone_session=; .*Expires=Thu, 01 Jan 1970/);
  });

  it('is not to be kept by anybody, and carries no ETag', async () => {
    const { headers } = await request(app).get('/api/late');
    expect(headers['cache-control']).toBe('no-store');
    expect(headers).not.toHaveProperty('etag');
    expect(headers['content-security-policy']).not.toContain('upgrade-insecure-requests');
    expect(headers).not.toHaveProperty('x-powered-by');
  });
});

describe('tries', () => {
  it('are limited within a minute and free again after it', async () => {
    await post('/guess').expect(204);
    await post('/guess').expect(204);
    const refused = await post('/guess').expect(429);
    expect(refused.headers['retry-after']).toBe('60');
    server.clock.advance({ seconds: 61 });
    await post('/guess').expect(204);
  });

  it('are counted once each when they come at the same moment', async () => {
    const { rateLimiter } = server.platform;
    const results = await Promise.allSettled(Array.from({ length: 20 }, () => rateLimiter.count('burst', 5, 60)));
    expect(results.filter(({ status }) => status === 'fulfilled')).toHaveLength(5);
  });
});
