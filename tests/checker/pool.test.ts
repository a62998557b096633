import { afterAll, describe, expect, it } from 'vitest';
import { createCheckPool } from '../../api/checker/pool.ts';

const pool = createCheckPool({ threads: 1, stepMs: 5000, derivationMs: 20_000 });
afterAll(() => pool.close());

describe('the pool of checks', () => {
  it('rules on a derivation in a worker and says how long it took', async () => {
    const verdict = await pool.check({ lines: ['x^2=7x', 'x=7'], assume: [], settings: {} });
    expect(verdict).toMatchObject({ outcome: 'faulty', firstFault: 1 });
    expect(verdict.steps[0]?.evidence.lost).toEqual(['0']);
    expect(verdict.ms).toBeGreaterThan(0);
  }, 30_000);

  it('is healthy until it is closed', async () => {
    const other = createCheckPool({ threads: 1, stepMs: 5000 });
    expect(await other.healthy()).toBe(true);
    await other.close();
    expect(await other.healthy()).toBe(false);
  }, 30_000);

  it('ends a worker whose step takes too long, leaves that step undecided and rules on the rest', async () => {
    const worker = new URL('./data/slow.worker.ts', import.meta.url);
    const ended: number[] = [];
    const slow = createCheckPool({
      threads: 1,
      stepMs: 150,
      derivationMs: 20_000,
      workerUrl: worker,
      onEnded: ({ step }) => ended.push(step),
    });
    const verdict = await slow.check({ lines: ['x+x', '2x', '2x', 'x'], assume: [], settings: {} });
    expect(ended).toEqual([2, 2]);
    expect(verdict.steps.map((step) => step.ruling)).toEqual(['holds', 'undecided', 'fails']);
    expect(verdict.steps[1]?.evidence.reason).toBe('time');
    expect(verdict.outcome).toBe('undecided');
    await slow.close();
  }, 30_000);

  it('leaves the step undecided at which the checker itself breaks, tells of it, and rules on the rest', async () => {
    const told: string[] = [];
    const broken = createCheckPool({
      threads: 1,
      stepMs: 5000,
      derivationMs: 20_000,
      workerUrl: new URL('./data/broken.worker.ts', import.meta.url),
      onEnded: ({ step, reason, cause }) => told.push(`${step} ${reason} ${String(cause)}`),
    });
    const verdict = await broken.check({ lines: ['x+x', '2x', '2x', 'x'], assume: [], settings: {} });
    expect(told).toEqual(['2 broken TypeError: broken on purpose']);
    expect(verdict.steps.map((step) => step.ruling)).toEqual(['holds', 'undecided', 'fails']);
    await broken.close();
  }, 30_000);

  it('replaces a worker that goes over its memory, answers that derivation and the next one', async () => {
    const told: string[] = [];
    const hungry = createCheckPool({
      threads: 1,
      stepMs: 20_000,
      derivationMs: 120_000,
      memoryMb: 96,
      workerUrl: new URL('./data/hungry.worker.ts', import.meta.url),
      onEnded: ({ step, reason }) => told.push(`${step} ${reason}`),
    });
    const verdict = await hungry.check({ lines: ['x+x', '2x', '2x', 'x'], assume: [], settings: {} });
    expect(told).toEqual(['2 memory']);
    expect(verdict.steps.map((step) => step.ruling)).toEqual(['holds', 'undecided', 'fails']);
    const next = await hungry.check({ lines: ['x^2=7x', 'x=7'], assume: [], settings: {} });
    expect(next).toMatchObject({ outcome: 'faulty', firstFault: 1 });
    expect(await hungry.healthy()).toBe(true);
    await hungry.close();
  }, 180_000);
});
