import { AsyncLocalStorage } from 'node:async_hooks';
import type { Now } from '../../lib/clock.ts';

export interface SeedClock {
  readonly now: Now;
  /** What `act` does, and all that it waits for, happens at this instant. */
  at<T>(instant: Date, act: () => Promise<T>): Promise<T>;
}

/** A clock that shows each piece of work its own instant, so that people of the past can work side by side. */
export function createSeedClock(present: Date): SeedClock {
  const instants = new AsyncLocalStorage<Date>();
  return {
    now: () => new Date(instants.getStore() ?? present),
    at: (instant, act) => instants.run(instant, act),
  };
}
