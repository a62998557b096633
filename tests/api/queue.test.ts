import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { z } from 'zod';
import { createLogger } from '../../api/lib/logger.ts';
import { job, openQueue, type Queue } from '../../api/lib/queue.ts';
import { startTestServer, type TestServer } from '../support/test-server.ts';

let server: TestServer;
let queue: Queue;
const ran: string[] = [];
let failures = 0;

beforeAll(async () => {
  server = await startTestServer();
  queue = await openQueue(server.platform.config.databaseUrl, createLogger('silent'), false);
  await queue.prepare([
    job({
      name: 'try-out',
      data: z.object({ word: z.string() }),
      handle: async ({ word }) => {
        if (failures-- > 0) throw new Error('not yet');
        ran.push(word);
      },
    }),
  ]);
});
afterAll(async () => {
  await queue.stop();
  await server.stop();
});
beforeEach(() => {
  ran.length = 0;
  failures = 0;
});

function enqueue(word: string, options?: { key?: string; startAfter?: Date }): Promise<void> {
  return server.dataSource.transaction((manager) => queue.enqueueInTransaction(manager, 'try-out', { word }, options));
}
const hoursFromNow = (hours: number) => new Date(server.clock.now().getTime() + hours * 3_600_000);

describe('the job queue', () => {
  it('runs what was committed and not what was rolled back', async () => {
    await enqueue('kept');
    const rolledBack = server.dataSource.transaction(async (manager) => {
      await queue.enqueueInTransaction(manager, 'try-out', { word: 'lost' });
      throw new Error('no');
    });
    await expect(rolledBack).rejects.toThrow('no');
    await queue.drain(server.clock.now());
    expect(ran).toEqual(['kept']);
  });

  it('waits for the time of a job, and runs jobs in the order of their times', async () => {
    await enqueue('second', { startAfter: hoursFromNow(2) });
    await enqueue('first', { startAfter: hoursFromNow(1) });
    expect(await queue.drain(server.clock.now())).toBe(0);
    server.clock.advance({ hours: 3 });
    expect(await queue.drain(server.clock.now())).toBe(2);
    expect(ran).toEqual(['first', 'second']);
  });

  it('keeps one waiting job a key, and takes the key again afterwards', async () => {
    await enqueue('once', { key: 'k' });
    await enqueue('twice', { key: 'k' });
    await enqueue('other', { key: 'l' });
    await queue.drain(server.clock.now());
    await enqueue('again', { key: 'k' });
    await queue.drain(server.clock.now());
    expect(ran).toEqual(['once', 'other', 'again']);
  });

  it('runs a failed job again', async () => {
    failures = 1;
    await enqueue('stubborn');
    await expect(queue.drain(server.clock.now())).rejects.toThrow('not yet');
    await queue.drain(server.clock.now());
    expect(ran).toEqual(['stubborn']);
  });

  it('refuses a job that nobody would run', async () => {
    const lost = server.dataSource.transaction((manager) => queue.enqueueInTransaction(manager, 'nobody', {}));
    await expect(lost).rejects.toThrow('nobody');
  });

  it('works by itself in a running server, two processes sharing the jobs', async () => {
    const url = server.platform.config.databaseUrl;
    const seen: string[] = [];
    const kind = (who: string) =>
      job({
        name: 'shared-work',
        data: z.object({ n: z.number() }),
        pollSeconds: 0.5,
        handle: async ({ n }) => void seen.push(`${who}${n}`),
      });
    const both = await Promise.all([openQueue(url, createLogger('silent')), openQueue(url, createLogger('silent'))]);
    for (const [i, each] of both.entries()) await each.prepare([kind('ab'[i] ?? '')]);
    for (const n of [1, 2, 3, 4]) {
      await server.dataSource.transaction((manager) => both[0].enqueueInTransaction(manager, 'shared-work', { n }));
    }
    for (const each of both) await each.work();
    await expect.poll(() => seen.length, { timeout: 15_000 }).toBe(4);
    expect(seen.map((each) => each.slice(1)).sort()).toEqual(['1', '2', '3', '4']);
    for (const each of both) await each.stop();
  });
});
