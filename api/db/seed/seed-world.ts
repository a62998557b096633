import { createHash } from 'node:crypto';
import type { DataSource } from 'typeorm';
import { seededRandom, type Random } from '../../../shared/lib/seeded-random.ts';
import { composeServices, type Platform } from '../../services.ts';
import type { Viewer } from '../../http/route.ts';
import { createRouteCaller, type RouteCaller } from './route-caller.ts';
import { createSeedChecks } from './seed-checks.ts';
import { createSeedClock, type SeedClock } from './seed-clock.ts';
import { createSeedQueue } from './seed-queue.ts';

/** Where the past of the demo happens: the product itself, with a clock that is set and jobs that run when told. */
export interface SeedWorld extends RouteCaller {
  readonly db: DataSource;
  readonly present: Date;
  readonly clock: SeedClock;
  /** Runs what is due until then. */
  runUntil(instant: Date): Promise<void>;
  /** Runs a kind of job that has its own hours, as if the hour had come. */
  runJob(name: string): Promise<void>;
}

/** Letters are dealt with when everything has happened: see seed-mail. */
const LEFT_OUT = new Set(['send-mail']);

/** A world of its own; several can share one database. */
export async function createSeedWorld(platform: Platform, present: Date): Promise<SeedWorld> {
  const clock = createSeedClock(present);
  const queue = createSeedQueue({ real: platform.queue, present, clock, leftOut: LEFT_OUT });
  const composed = composeServices({
    ...platform,
    now: clock.now,
    queue,
    checks: createSeedChecks(),
    // Thirty people of the demo at one keyboard are no attack.
    rateLimiter: { count: async () => undefined, sweep: async () => undefined },
    drawSeed: (round) => `demo ${round.number} ${round.frozen?.title ?? ''}`,
  });
  await queue.prepare(composed.jobs);
  return {
    ...createRouteCaller(composed.routes),
    db: platform.db,
    present,
    clock,
    runUntil: (instant) => queue.runDue(instant < present ? instant : present),
    async runJob(name) {
      await composed.jobs.find((kind) => kind.name === name)?.handle({} as never);
    },
  };
}

/** A person of the demo who is signed in. */
export interface Actor<Person> {
  readonly person: Person;
  readonly viewer: Viewer;
}

/** Chance that comes out the same each time for the same words. */
export function chanceOf(...words: readonly (string | number)[]): Random {
  return seededRandom(words.join('/'));
}

export function choose<T>(items: readonly T[], random: Random): T {
  const item = items[Math.floor(random() * items.length)];
  if (item === undefined) throw new Error('There is nothing to choose from');
  return item;
}

/** An id that is the same each time for the same words. */
export function idOf(...words: readonly (string | number)[]): string {
  const hex = createHash('sha256').update(words.join('/')).digest('hex');
  return [hex.slice(0, 8), hex.slice(8, 12), `4${hex.slice(13, 16)}`, `8${hex.slice(17, 20)}`, hex.slice(20, 32)].join(
    '-',
  );
}

/** Does something for each, several side by side. */
export async function forEach<T>(items: readonly T[], act: (item: T, index: number) => Promise<void>): Promise<void> {
  const queue = [...items.entries()];
  const worker = async () => {
    for (let next = queue.shift(); next; next = queue.shift()) await act(next[1], next[0]);
  };
  await Promise.all(Array.from({ length: 4 }, worker));
}
