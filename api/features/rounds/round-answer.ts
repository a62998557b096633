import type { EntityManager } from 'typeorm';
import type { RoundAnswer } from '../../../shared/schemas/round.ts';
import type { StaffRound } from './round-access.ts';
import { listRoundPeople } from './round-people.ts';
import { warnOfSize } from './round-preview.ts';

/** A round for the staff of its class. */
export async function toRoundAnswer(manager: EntityManager, staff: StaffRound): Promise<RoundAnswer> {
  const { round } = staff;
  const people = await listRoundPeople(manager, round);
  return {
    id: round.id,
    classId: round.classId,
    className: staff.className,
    timeZone: staff.timeZone,
    number: round.number,
    taskId: round.taskId,
    title: staff.title,
    stage: round.stage,
    instants: {
      opensAt: round.opensAt.toISOString(),
      writingEndsAt: round.writingEndsAt.toISOString(),
      reviewingEndsAt: round.reviewingEndsAt.toISOString(),
      answeringEndsAt: round.answeringEndsAt.toISOString(),
      settlesAt: round.settlesAt.toISOString(),
    },
    reviewsPerDerivation: round.reviewsPerDerivation,
    lateRule: round.lateRule,
    waitingForRulings: round.waitingForRulings,
    version: round.version,
    role: staff.role,
    warnings: warnOfSize(people.length),
  };
}
