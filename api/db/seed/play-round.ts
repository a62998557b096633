import { answerFindings } from './act-answering.ts';
import { contestVerdict, writeMends } from './act-settled.ts';
import { reviewDerivations } from './act-reviewing.ts';
import { ruleOnDisputes } from './act-ruling.ts';
import { writeDerivations } from './act-writing.ts';
import { DEMO_SCHOOL } from './cast.ts';
import { minutesAfter, type PlayedRound } from './played-round.ts';
import type { RoundPlan } from './round-plan.ts';
import type { SeededClass } from './seed-class.ts';
import { instantOf } from './seed-times.ts';
import type { SeedWorld } from './seed-world.ts';

/** Plans a round and plays it up to the present: every stage comes by its own job, at its own instant. */
export async function playRound(world: SeedWorld, of: SeededClass, plan: RoundPlan, taskId: string): Promise<void> {
  const round = await planRound(world, of, plan, taskId);
  const { present } = world;
  const { opensAt, writingEndsAt, reviewingEndsAt, answeringEndsAt, settlesAt } = round;
  if (opensAt > present) return;
  await world.runUntil(opensAt);
  await arrange(round);
  await writeDerivations(round);
  await world.runUntil(minutesAfter(writingEndsAt, 3));
  if (writingEndsAt > present) return;
  await reviewDerivations(round);
  await world.runUntil(minutesAfter(reviewingEndsAt, 3));
  if (reviewingEndsAt > present) return;
  await answerFindings(round);
  await world.runUntil(answeringEndsAt);
  if (answeringEndsAt > present) return;
  if (plan.ruled) await ruleOnDisputes(round);
  await world.runUntil(settlesAt);
  if (!plan.ruled) return;
  await writeMends(round);
  await contestVerdict(round);
}

async function planRound(world: SeedWorld, of: SeededClass, plan: RoundPlan, taskId: string): Promise<PlayedRound> {
  const [opensAt, writingEndsAt, reviewingEndsAt, answeringEndsAt, settlesAt] = plan.times.map((time) =>
    instantOf(world.present, DEMO_SCHOOL.timeZone, time),
  ) as [Date, Date, Date, Date, Date];
  const instants = { opensAt, writingEndsAt, reviewingEndsAt, answeringEndsAt, settlesAt };
  const dayBefore = new Date(Math.min(opensAt.getTime() - 86_400_000, world.present.getTime() - 3_600_000));
  const { id } = await world.clock.at(dayBefore, () =>
    world.call<{ id: string }>(of.teacher.viewer, 'post', '/rounds', {
      classId: of.id,
      taskId,
      ...Object.fromEntries(Object.entries(instants).map(([name, at]) => [name, at.toISOString()])),
      lateRule: plan.lateRule ?? 'closed',
    }),
  );
  return { world, of, plan, id, ...instants, sheets: new Map() };
}

/** What the teacher arranges for single people once the round is open. */
async function arrange({ world, of, plan, id, opensAt }: PlayedRound): Promise<void> {
  const person = (name: string) => of.students.find((student) => student.person.name === name)?.viewer.userId ?? '';
  await world.clock.at(minutesAfter(opensAt, 40), async () => {
    for (const name of plan.excused ?? []) {
      await world.call(of.teacher.viewer, 'put', `/rounds/${id}/people/${person(name)}/excuse`, {
        excused: true,
        reason: 'Away this week',
      });
    }
    if (!plan.extended) return;
    await world.call(of.teacher.viewer, 'put', `/rounds/${id}/people/${person(plan.extended.name)}/extension`, {
      writingEndsAt: instantOf(world.present, DEMO_SCHOOL.timeZone, plan.extended.until).toISOString(),
      reason: plan.extended.reason,
    });
  });
}
