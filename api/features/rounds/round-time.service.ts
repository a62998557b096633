import type { DataSource } from 'typeorm';
import type { InstantName, MoreTime } from '../../../shared/schemas/round.ts';
import { ProblemError } from '../../http/problem-error.ts';
import type { Viewer } from '../../http/route.ts';
import type { Now } from '../../lib/clock.ts';
import { getStaffRound } from './round-access.ts';
import { createRoundRecord } from './round-record.ts';
import type { RoundStages } from './round-stages.ts';
import type { Round } from './rounds.entity.ts';

export interface RoundTimeDeps {
  readonly db: DataSource;
  readonly now: Now;
  readonly stages: RoundStages;
}
export type RoundTimeService = ReturnType<typeof createRoundTimeService>;

const LATER: Record<Round['stage'], readonly InstantName[]> = {
  planned: ['opensAt', 'writingEndsAt', 'reviewingEndsAt', 'answeringEndsAt', 'settlesAt'],
  writing: ['writingEndsAt', 'reviewingEndsAt', 'answeringEndsAt', 'settlesAt'],
  reviewing: ['reviewingEndsAt', 'answeringEndsAt', 'settlesAt'],
  answering: ['answeringEndsAt', 'settlesAt'],
  settled: [],
};

/** More time for everyone, and the late batch before its time. */
export function createRoundTimeService({ db, now, stages }: RoundTimeDeps) {
  const record = createRoundRecord(now);

  return {
    /** Moves the end of the running stage and everything after it. */
    async giveMoreTime(viewer: Viewer, roundId: string, { minutes, reason }: MoreTime): Promise<void> {
      await db.transaction(async (manager) => {
        const { round } = await getStaffRound(manager, viewer, roundId, { teacherOnly: true, lock: true });
        const names = LATER[round.stage];
        const [first] = names;
        if (!first) throw new ProblemError('wrong-stage', { detail: 'A settled round has no time left to give.' });
        const before = Object.fromEntries(names.map((name) => [name, round[name].toISOString()]));
        for (const name of names) round[name] = new Date(round[name].getTime() + minutes * 60_000);
        if (round[first] <= now()) {
          throw new ProblemError('invalid-fields', {
            errors: [{ pointer: '/minutes', detail: 'That would be over already. Give more.' }],
          });
        }
        round.version += 1;
        await manager.save(round);
        await stages.schedule(manager, round);
        const after = Object.fromEntries(names.map((name) => [name, round[name].toISOString()]));
        await record(manager, viewer, round, 'round.more-time', { before, after, reason });
      });
    },

    /** Deals what came late now. */
    async dealLateNow(viewer: Viewer, roundId: string): Promise<{ reviews: number }> {
      return await db.transaction(async (manager) => {
        const { round } = await getStaffRound(manager, viewer, roundId, { teacherOnly: true, lock: true });
        if (round.stage !== 'reviewing') {
          throw new ProblemError('wrong-stage', { detail: 'Late derivations are dealt while reviewing is open.' });
        }
        const reviews = await stages.dealLateNow(manager, round);
        await record(manager, viewer, round, 'round.late-dealt', { before: null, after: { reviews }, reason: '' });
        return { reviews };
      });
    },
  };
}
