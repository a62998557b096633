import type { AuthorDerivation } from '../../../shared/schemas/review.ts';
import type { DemoStudent } from './cast.ts';
import type { PlayedRound } from './played-round.ts';
import { between } from './seed-times.ts';
import { chanceOf, choose, forEach, type Actor } from './seed-world.ts';

const THANKS = ['Yes, that is it.', 'You are right, I see it now.', 'Thank you, I had read it three times.', ''];
const CONTESTS = [
  'I tested this line with a number and it agrees with the one above.',
  'This step is what the rule says. Please look again.',
  'The lines before and after agree, so it cannot be here.',
];

/** Derivations with a finding that picks a step. */
const TO_ANSWER_SQL = `
  select d.id, d.author_id as author from derivation d
   where d.round_id = $1 and exists (
     select 1 from review r join finding f on f.review_id = r.id where r.derivation_id = d.id and f.pick is not null)`;

/** Authors answer what was said about their derivations: right findings are mostly accepted, wrong ones contested. */
export async function answerFindings(round: PlayedRound): Promise<void> {
  const { world, id, of, plan } = round;
  const rows: { id: string; author: string }[] = await world.db.query(TO_ANSWER_SQL, [id]);
  await forEach(of.students, async (student) => {
    const own = rows.find(({ author }) => author === student.viewer.userId);
    if (own && !plan.silent?.includes(student.person.name)) await answerAll(round, student, own.id);
  });
}

async function answerAll(
  round: PlayedRound,
  { viewer, person }: Actor<DemoStudent>,
  derivationId: string,
): Promise<void> {
  const { world, plan, sheets, reviewingEndsAt, answeringEndsAt } = round;
  const random = chanceOf('answer', plan.task.form.title, person.name);
  const until = answeringEndsAt < world.present ? answeringEndsAt : world.present;
  const at = between(new Date(reviewingEndsAt.getTime() + 5 * 60_000), until, 0.1 + 0.8 * random());
  const fault = sheets.get(viewer.userId)?.slip?.step ?? null;
  let stubborn = plan.stubborn?.[person.name];
  await world.clock.at(at, async () => {
    const { findings } = await world.call<AuthorDerivation>(viewer, 'get', `/derivations/${derivationId}`);
    // Their keys are random; the words are not.
    for (const finding of findings.toSorted((a, b) => (a.why < b.why ? -1 : 1))) {
      if (finding.pick === null) continue;
      const isRight = finding.pick === fault;
      const roll = random();
      if (!isRight && roll > 0.85) continue;
      const contest = isRight ? stubborn : roll < 0.65 ? choose(CONTESTS, random) : undefined;
      const answer =
        contest === undefined
          ? { kind: 'accept', reason: isRight ? choose(THANKS, random) : '' }
          : { kind: 'contest', reason: contest };
      await world.call(viewer, 'put', `/findings/${finding.key}/answer`, answer);
      // Said once; the next one who finds the same is believed.
      if (isRight) stubborn = undefined;
    }
  });
}
