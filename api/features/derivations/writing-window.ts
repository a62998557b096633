import { GRACE_MS } from '../../../shared/lib/round-times.ts';
import type { Round } from '../rounds/rounds.entity.ts';

type Times = Pick<Round, 'stage' | 'writingEndsAt' | 'lateRule' | 'lateDealtAt'>;

export interface WritingWindow {
  /** When writing ends for this person. */
  readonly endsAt: Date;
  /** Whether handing in, taking back and saving are open now. */
  readonly open: boolean;
  /** Whether what comes in now counts as late. */
  readonly late: boolean;
}

/**
 * Whether one person may still write. In time: until the own end (an extension counts, also while others already
 * review). Late: never (`closed`), while the round is still in writing (`until-reviewing`), or until the late batch
 * has been dealt (`late-batch`).
 */
export function writingWindow(round: Times, extendedTo: Date | null, now: Date): WritingWindow {
  const endsAt = extendedTo && extendedTo > round.writingEndsAt ? extendedTo : round.writingEndsAt;
  const inTime = now.getTime() <= endsAt.getTime() + GRACE_MS;
  const stageTakesWork = round.stage === 'writing' || (round.stage === 'reviewing' && round.lateDealtAt === null);
  return { endsAt, open: stageTakesWork && (inTime || takesLate(round)), late: !inTime };
}

function takesLate({ stage, lateRule }: Times): boolean {
  switch (lateRule) {
    case 'closed':
      return false;
    case 'until-reviewing':
      return stage === 'writing';
    case 'late-batch':
      return true;
  }
}
