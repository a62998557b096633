import { setTimeout } from 'node:timers/promises';

const SHORTEST_MS = 150;

/** Answers after at least this long, so that the time it took does not tell which way the work went. */
export async function inEvenTime<T>(work: Promise<T>): Promise<T> {
  const [result] = await Promise.allSettled([work, setTimeout(SHORTEST_MS)]);
  if (result.status === 'rejected') throw result.reason;
  return result.value;
}
