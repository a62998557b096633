import { afterAll, beforeAll, expect, it } from 'vitest';
import { startTestServer, type TestServer } from '../support/test-server.ts';

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.stop());

it('answers 200 with the state of database and workers', async () => {
  const response = await server.visitor().get('/health').expect(200);
  expect(response.body).toEqual({ database: 'up', workers: 'up' });
  expect(response.headers['cache-control']).toBe('no-store');
  expect(response.headers['x-request-id']).toMatch(/^[0-9a-f-]{36}$/);
});

it('shows the demo mailbox', async () => {
  const response = await server.visitor().get('/mailbox').expect(200);
  expect(response.body).toEqual({ letters: [] });
});
