import type { DisputeCase, DisputeItem } from '../../../shared/schemas/dispute.ts';
import type { DemoSheet } from './demo-task.ts';
import { minutesAfter, type PlayedRound } from './played-round.ts';

/** The teacher works through the desk until nothing of this round is left. */
export async function ruleOnDisputes(round: PlayedRound): Promise<void> {
  const { world, of, answeringEndsAt } = round;
  const { viewer } = of.teacher;
  for (let minutes = 30; minutes < 1000; minutes += 4) {
    const isDone = await world.clock.at(minutesAfter(answeringEndsAt, minutes), async () => {
      const items = await world.call<DisputeItem[]>(viewer, 'get', `/disputes?classId=${of.id}`);
      const mine = items.filter(({ taskTitle }) => taskTitle === round.plan.task.form.title);
      // What is undecided comes first: a ruling on it may answer what is contested.
      const [next] = mine.toSorted((a, b) => Number(b.kind === 'undecided') - Number(a.kind === 'undecided'));
      if (!next) return true;
      const dispute = await world.call<DisputeCase>(viewer, 'get', `/disputes/${next.disputeId}`);
      const ruling = decide(dispute, await findSheet(round, next.disputeId));
      await world.call(viewer, 'post', `/disputes/${next.disputeId}/ruling`, { ...ruling, along: false });
      return false;
    });
    if (isDone) return;
  }
  throw new Error(`The desk does not get empty: ${round.plan.task.form.title}`);
}

function decide({ step }: DisputeCase, { slip, rulings }: DemoSheet): { decision: 'holds' | 'fails'; reason: string } {
  const planned = rulings?.find((ruling) => ruling.step === step);
  if (planned) return { decision: planned.decision, reason: planned.reason };
  if (slip?.step === step) return { decision: 'fails', reason: `The finding is right. ${slip.why[0]}` };
  return { decision: 'holds', reason: 'I went through this step by hand, and it follows from the line above.' };
}

async function findSheet({ world, sheets }: PlayedRound, disputeId: string): Promise<DemoSheet> {
  const [row]: { author: string }[] = await world.db.query(
    `select d.author_id as author from dispute c join derivation_version v on v.id = c.version_id
       join derivation d on d.id = v.derivation_id where c.id = $1`,
    [disputeId],
  );
  const sheet = row && sheets.get(row.author);
  if (!sheet) throw new Error('A dispute is about a derivation that nobody wrote');
  return sheet;
}
