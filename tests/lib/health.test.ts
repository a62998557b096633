import { expect, it, vi } from 'vitest';
import { healthRoutes, type HealthDeps } from '../../api/features/health/health.routes.ts';

async function ask(deps: HealthDeps) {
  const [health] = healthRoutes(deps);
  return await health?.handle({} as never);
}
const fine: HealthDeps = { pingDatabase: async () => 1, workersHealthy: async () => true };

it('names the part that is down, with 503', async () => {
  const broken = () => Promise.reject(new Error('gone'));
  expect(await ask(fine)).toMatchObject({ status: 200, body: { database: 'up', workers: 'up' } });
  expect(await ask({ ...fine, pingDatabase: broken })).toMatchObject({
    status: 503,
    body: { database: 'down', workers: 'up' },
  });
  expect(await ask({ ...fine, workersHealthy: broken })).toMatchObject({
    status: 503,
    body: { database: 'up', workers: 'down' },
  });
  expect(await ask({ ...fine, workersHealthy: async () => false })).toMatchObject({
    status: 503,
    body: { workers: 'down' },
  });
});

it('does not wait for a part that hangs', async () => {
  vi.useFakeTimers();
  const asked = ask({ ...fine, pingDatabase: () => new Promise<never>(() => undefined) });
  await vi.advanceTimersByTimeAsync(2_000);
  expect(await asked).toMatchObject({ status: 503, body: { database: 'down' } });
  vi.useRealTimers();
});
