import { randomUUID } from 'node:crypto';
import PgBoss from 'pg-boss';
import type { EntityManager } from 'typeorm';
import type { ZodType } from 'zod';
import type { Logger } from './logger.ts';

/** One kind of work done outside a request. `handle` must be safe to run twice: a crash after the work repeats it. */
export interface JobKind {
  readonly name: string;
  readonly data: ZodType<object>;
  /** Also runs by itself at these minutes (five cron fields, UTC), with empty data. */
  readonly cron?: string;
  /** Tries after the first one; the pause doubles from `retryDelaySeconds` on. Default 5 from 10 s. */
  readonly retryLimit?: number;
  readonly retryDelaySeconds?: number;
  /** Longest run before the job is tried again. Default 60. */
  readonly timeoutSeconds?: number;
  /** Jobs of this kind that one process runs at once. Default 1. */
  readonly parallel?: number;
  /** Pause between looks into an empty queue. Default 2. */
  readonly pollSeconds?: number;
  readonly handle: (data: never) => Promise<void>;
}

interface JobSpec<Data extends object> extends Omit<JobKind, 'data' | 'handle'> {
  readonly data: ZodType<Data>;
  readonly handle: (data: Data) => Promise<void>;
}

/** Declares a kind of job with its data's type tied to its handler. */
export function job<Data extends object>(spec: JobSpec<Data>): JobKind {
  return spec as JobKind;
}

export interface EnqueueOptions {
  /** At most one waiting job of the kind with this key; a second one is left out. Put the instant into the key of a timed job. */
  readonly key?: string;
  readonly startAfter?: Date;
}

export interface Queue {
  /** Written through the caller's transaction: a roll-back takes the job back, a commit never loses it. */
  enqueueInTransaction(manager: EntityManager, name: string, data: object, options?: EnqueueOptions): Promise<void>;
  /** Makes the queues known; jobs can be written from now on. Call once, with every kind. */
  prepare(kinds: readonly JobKind[]): Promise<void>;
  /** Begins to run jobs and schedules. */
  work(): Promise<void>;
  /** Runs waiting jobs that are due at `at` until none is left, and returns how many ran; for tests and the seed. */
  drain(at: Date): Promise<number>;
  stop(): Promise<void>;
}

/** A queue in the PostgreSQL schema `pgboss`; survives restarts and is shared by all processes. */
export async function openQueue(databaseUrl: string, logger: Logger, supervise = true): Promise<Queue> {
  const boss = new PgBoss({
    connectionString: databaseUrl,
    max: 4,
    application_name: 'slipstone-jobs',
    supervise,
    schedule: supervise,
  });
  boss.on('error', (error) => logger.error({ err: error }, 'job queue'));
  await boss.start();
  const kinds = new Map<string, JobKind>();

  return {
    async enqueueInTransaction(manager, name, data, options = {}) {
      if (!kinds.has(name)) throw new Error(`No job kind is called ${name}`);
      await boss.send(name, data, toSendOptions(manager, options));
    },
    async prepare(list) {
      for (const kind of list) {
        kinds.set(kind.name, kind);
        await boss.createQueue(kind.name, { name: kind.name, ...toQueueOptions(kind) });
        await boss.updateQueue(kind.name, { name: kind.name, ...toQueueOptions(kind) });
      }
    },
    async work() {
      for (const kind of kinds.values()) await startWorkers(boss, kind, logger);
    },
    drain: (at) => drain(boss, kinds, at),
    stop: () => boss.stop({ graceful: true, timeout: 5_000, wait: true }),
  };
}

function toQueueOptions(kind: JobKind) {
  return {
    // "short": one waiting job per key; jobs without a key get a key of their own.
    policy: 'short' as const,
    retryLimit: kind.retryLimit ?? 5,
    retryDelay: kind.retryDelaySeconds ?? 10,
    retryBackoff: true,
    expireInSeconds: kind.timeoutSeconds ?? 60,
    retentionDays: 90,
  };
}

function toSendOptions(manager: EntityManager, options: EnqueueOptions): PgBoss.SendOptions {
  return {
    singletonKey: options.key ?? randomUUID(),
    ...(options.startAfter && { startAfter: options.startAfter }),
    db: {
      async executeSql(text, values) {
        const rows: unknown = await manager.query(text, values);
        return { rows: Array.isArray(rows) ? rows : [] };
      },
    },
  };
}

async function startWorkers(boss: PgBoss, kind: JobKind, logger: Logger): Promise<void> {
  for (let i = 0; i < (kind.parallel ?? 1); i += 1) {
    await boss.work<object>(kind.name, { pollingIntervalSeconds: kind.pollSeconds ?? 2 }, async ([next]) => {
      if (!next) return;
      try {
        await run(kind, next.data);
      } catch (error) {
        logger.warn({ err: error, job: kind.name, jobId: next.id }, 'job failed, to be tried again');
        throw error;
      }
    });
  }
  if (kind.cron) await boss.schedule(kind.name, kind.cron, {}, { tz: 'UTC', singletonKey: 'schedule' });
}

async function run(kind: JobKind, data: unknown): Promise<void> {
  await kind.handle(kind.data.parse(data ?? {}) as never);
}

async function drain(boss: PgBoss, kinds: ReadonlyMap<string, JobKind>, at: Date): Promise<number> {
  let done = 0;
  for (;;) {
    // What is due at the given instant becomes due by the database's clock, earliest first.
    const { rows } = await boss.getDb().executeSql(
      `update pgboss.job set start_after = now() - interval '1 second'
       where id = (select id from pgboss.job where state in ('created', 'retry') and name = any($2) and start_after <= $1
                   order by start_after, created_on limit 1)
       returning id, name`,
      [at.toISOString(), [...kinds.keys()]],
    );
    const next: { id: string; name: string } | undefined = rows[0];
    const kind = next && kinds.get(next.name);
    if (!kind) return done;
    const [taken] = await boss.fetch<object>(kind.name);
    if (!taken) return done;
    try {
      await run(kind, taken.data);
      await boss.complete(kind.name, taken.id);
    } catch (error) {
      await boss.fail(kind.name, taken.id, { message: String(error) });
      throw error;
    }
    done += 1;
  }
}
