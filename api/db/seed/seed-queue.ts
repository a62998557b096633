import type { JobKind, Queue } from '../../lib/queue.ts';
import type { SeedClock } from './seed-clock.ts';

interface WaitingJob {
  readonly kind: JobKind;
  readonly data: object;
  readonly key: string | null;
  readonly at: Date;
}

export interface SeedQueue extends Queue {
  /** Runs what is due at or before `at`, each at its own instant, until nothing is left. */
  runDue(at: Date): Promise<void>;
}

export interface SeedQueueOptions {
  /** Where jobs wait that are due after the present: the product itself runs those. */
  readonly real: Queue;
  readonly present: Date;
  readonly clock: SeedClock;
  /** Kinds that the seed sees to in its own way. */
  readonly leftOut: ReadonlySet<string>;
}

/** The queue of a past that is played through: jobs due in the past are kept here and run when their time comes. */
export function createSeedQueue({ real, present, clock, leftOut }: SeedQueueOptions): SeedQueue {
  const kinds = new Map<string, JobKind>();
  let waiting: WaitingJob[] = [];

  async function runDue(at: Date): Promise<void> {
    for (;;) {
      const due = waiting.filter((job) => job.at <= at).sort((a, b) => a.at.getTime() - b.at.getTime());
      const [first] = due;
      if (!first) return;
      // Jobs of one kind that may run side by side do so here too.
      const batch = (first.kind.parallel ?? 1) > 1 ? due.filter(({ kind }) => kind === first.kind) : [first];
      waiting = waiting.filter((job) => !batch.includes(job));
      await Promise.all(
        batch.map((job) => clock.at(job.at, () => job.kind.handle(job.kind.data.parse(job.data) as never))),
      );
    }
  }

  return {
    async enqueueInTransaction(manager, name, data, options = {}) {
      if (leftOut.has(name)) return;
      const at = options.startAfter ?? clock.now();
      if (at > present) return await real.enqueueInTransaction(manager, name, data, options);
      const kind = kinds.get(name);
      if (!kind) throw new Error(`No job kind is called ${name}`);
      const key = options.key ?? null;
      if (key !== null && waiting.some((job) => job.kind === kind && job.key === key)) return;
      waiting.push({ kind, data, key, at });
    },
    async prepare(list) {
      for (const kind of list) kinds.set(kind.name, kind);
    },
    runDue,
    async work() {},
    async drain(at) {
      await runDue(at);
      return 0;
    },
    async stop() {},
  };
}
