import { z } from 'zod';
import { job, type JobKind } from '../../lib/queue.ts';
import type { RoundStages } from './round-stages.ts';

/** Stage changes at their instants; the sweep each minute makes good whatever a timed job has missed. */
export function roundsJobs(stages: RoundStages): JobKind[] {
  return [
    job({
      name: 'round-due',
      data: z.object({ roundId: z.uuid() }),
      timeoutSeconds: 300,
      handle: ({ roundId }) => stages.advance(roundId),
    }),
    job({
      name: 'round-reminder',
      data: z.object({ roundId: z.uuid(), endsAt: z.iso.datetime() }),
      handle: ({ roundId, endsAt }) => stages.remind(roundId, new Date(endsAt)),
    }),
    job({
      name: 'rounds-sweep',
      data: z.object({}),
      cron: '* * * * *',
      retryLimit: 0,
      timeoutSeconds: 300,
      handle: () => sweep(stages),
    }),
  ];
}

/** One round that fails must not keep the others waiting. */
async function sweep(stages: RoundStages): Promise<void> {
  const failures: unknown[] = [];
  for (const roundId of await stages.listDue()) {
    try {
      await stages.advance(roundId);
    } catch (error) {
      failures.push(error);
    }
  }
  if (failures.length > 0) throw new AggregateError(failures, 'Some rounds could not be moved on');
}
