import { ProblemError } from '../http/problem-error.ts';
import type { ReadLine, ReadRound, ReadTask, ReadVerdict, Stage } from '../../shared/schemas/review.ts';
import type { HandedInLine } from '../../shared/schemas/sheet.ts';
import type { FrozenTask } from '../../shared/schemas/task.ts';
import type { Verdict } from '../../shared/schemas/verdict.ts';
import { toReadSteps } from '../../shared/lib/judge-finding.ts';

interface PresentedRound {
  readonly id: string;
  readonly number: number;
  readonly stage: Stage;
  readonly reviewingEndsAt: Date;
  readonly answeringEndsAt: Date;
  readonly settlesAt: Date;
  readonly settledAt: Date | null;
  readonly frozen: FrozenTask | null;
  readonly class?: { readonly name: string; readonly timeZone: string };
}

/** A round's facts that everyone in it may read. Needs the class loaded. */
export function toReadRound(round: PresentedRound): ReadRound {
  if (!round.class) throw new Error('The round was loaded without its class');
  return {
    id: round.id,
    number: round.number,
    stage: round.stage,
    className: round.class.name,
    timeZone: round.class.timeZone,
    reviewingEndsAt: round.reviewingEndsAt.toISOString(),
    answeringEndsAt: round.answeringEndsAt.toISOString(),
    settlesAt: round.settlesAt.toISOString(),
    settledAt: round.settledAt?.toISOString() ?? null,
  };
}

/** The task as it was frozen. @throws {ProblemError} wrong-stage before the round has opened. */
export function toReadTask(round: Pick<PresentedRound, 'frozen'>): ReadTask {
  const { frozen } = round;
  if (!frozen) throw new ProblemError('wrong-stage');
  const { title, instructions, given, goal, assumptions, settings } = frozen;
  return { title, instructions, given, goal, assumptions, settings };
}

/** Lines by number; step ids and times stay here. */
export function toReadLines(lines: readonly HandedInLine[]): ReadLine[] {
  return lines.map(({ tex, reason, prose, uses }, number) => ({ number, tex, reason, prose, uses }));
}

/** A verdict as people read it. Call only where the round is settled, or for those who rule. */
export function toReadVerdict(
  verdict: Verdict & {
    readonly source: 'checker' | 'ruling';
    readonly ruling?: { readonly reason: string } | null | undefined;
  },
): ReadVerdict {
  return {
    outcome: verdict.outcome,
    firstFault: verdict.firstFault,
    steps: toReadSteps(verdict),
    decidedBy: verdict.source === 'ruling' ? 'teacher' : 'checker',
    reason: verdict.ruling?.reason ?? null,
  };
}
