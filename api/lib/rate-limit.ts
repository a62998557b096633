import type { DataSource } from 'typeorm';
import { ProblemError } from '../http/problem-error.ts';
import type { Now } from './clock.ts';

export interface RateLimiter {
  /** @throws {ProblemError} too-many, with the seconds to wait, past `limit` calls in the current window. */
  count(key: string, limit: number, windowSeconds: number): Promise<void>;
  /** Forgets what is a day old. */
  sweep(): Promise<void>;
}

/** Fixed windows counted in PostgreSQL, one atomic statement a try, so that several processes share one count. */
export function createRateLimiter(dataSource: DataSource, now: Now): RateLimiter {
  return {
    async count(key, limit, windowSeconds) {
      const at = now();
      const windowStart = new Date(at.getTime() - windowSeconds * 1000);
      const rows: unknown = await dataSource.query(
        `insert into rate_limit as r (key, window_starts_at, count) values ($1, $2, 1)
         on conflict (key) do update set
           count = case when r.window_starts_at <= $3 then 1 else r.count + 1 end,
           window_starts_at = case when r.window_starts_at <= $3 then $2 else r.window_starts_at end
         returning count, window_starts_at as "startsAt"`,
        [key, at, windowStart],
      );
      const [row] = rows as [{ count: number; startsAt: Date }];
      if (row.count <= limit) return;
      const retryAfterSeconds = Math.max(1, Math.ceil((row.startsAt.getTime() - windowStart.getTime()) / 1000));
      throw new ProblemError('too-many', {
        detail: `Wait ${retryAfterSeconds} seconds, then try again.`,
        extra: { retryAfterSeconds },
      });
    },
    async sweep() {
      await dataSource.query('delete from rate_limit where window_starts_at < $1', [
        new Date(now().getTime() - 86_400_000),
      ]);
    },
  };
}
