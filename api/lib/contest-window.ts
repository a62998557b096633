import { CONTEST_MS } from '../../shared/lib/round-times.ts';

/** Until when a verdict or points can be contested: a week after settling. */
export function contestEndsAt(settledAt: Date): Date {
  return new Date(settledAt.getTime() + CONTEST_MS);
}
