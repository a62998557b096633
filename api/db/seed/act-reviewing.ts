import { MAX_SURENESS, type FindingDraft } from '../../../shared/schemas/finding.ts';
import type { Random } from '../../../shared/lib/seeded-random.ts';
import type { DemoStudent } from './cast.ts';
import { toLine, type DemoSheet } from './demo-task.ts';
import type { PlayedRound } from './played-round.ts';
import { between } from './seed-times.ts';
import { chanceOf, choose, forEach, type Actor } from './seed-world.ts';

interface DealtReview {
  readonly id: string;
  readonly reviewer: string;
  readonly author: string;
  readonly author_name: string;
}

interface Turn extends DealtReview {
  /** Which of the derivation's reviews this is, from 0. */
  readonly turn: number;
}

const DEALT_SQL = `
  select r.id, r.reviewer_id as reviewer, d.author_id as author, p.name as author_name
    from review r join derivation d on d.id = r.derivation_id join person p on p.id = d.author_id
   where r.round_id = $1 order by p.name, r.reviewer_id`;

/** Everybody reviews what was dealt to them; while reviewing is open some have only begun. */
export async function reviewDerivations(round: PlayedRound): Promise<void> {
  const { world, of, id, plan } = round;
  const dealt: DealtReview[] = await world.db.query(DEALT_SQL, [id]);
  const isOpen = round.reviewingEndsAt > world.present;
  await forEach(of.students, async (student) => {
    const mine = dealt.filter(({ reviewer }) => reviewer === student.viewer.userId);
    if (isOpen && plan.idle?.includes(student.person.name)) return;
    for (const [i, review] of mine.entries()) {
      // Two who look at one derivation do not say it in the same words.
      const turn = dealt
        .filter(({ author }) => author === review.author)
        .findIndex(({ id: other }) => other === review.id);
      await reviewOne(round, student, { ...review, turn }, isOpen && i > 0);
    }
  });
}

async function reviewOne(
  round: PlayedRound,
  { viewer, person }: Actor<DemoStudent>,
  { id, author, author_name, turn }: Turn,
  mayBeUndone: boolean,
): Promise<void> {
  const { world, plan, writingEndsAt, reviewingEndsAt, sheets } = round;
  const sheet = sheets.get(author);
  if (!sheet) throw new Error('Nobody knows what this author wrote');
  const random = chanceOf('review', plan.task.form.title, person.name, author_name);
  const until = reviewingEndsAt < world.present ? reviewingEndsAt : world.present;
  const at = between(new Date(writingEndsAt.getTime() + 5 * 60_000), until, 0.05 + 0.85 * random());
  const finding = findFault(sheet, person, random, turn);
  const progress = mayBeUndone ? random() : 1;
  await world.clock.at(at, async () => {
    if (progress < 0.3) return;
    if (progress < 0.6) {
      await world.call(viewer, 'get', `/reviews/${id}`);
      const draft = { ...finding, sureness: 0, why: '' };
      await world.call(viewer, 'put', `/reviews/${id}/draft`, { draft, version: 0 });
      return;
    }
    // Now and then a review is forgotten.
    if (!mayBeUndone && random() < 0.04) return;
    await world.call(viewer, 'post', `/reviews/${id}/finding`, finding);
  });
}

const NO_FAULT = [
  'I put in 2 on every line and all of them agree.',
  'Every line follows from the one above.',
  'I did it another way and came to the same end.',
  'Read it twice, found nothing.',
  '',
];
const ASTRAY = [
  'I do not see where this comes from.',
  'I get something else here.',
  'There is a step missing, I think.',
  'The sign looks wrong to me.',
];
const FURTHER_ON = [
  'From here on my numbers are different.',
  'This is not what I have in this line.',
  'The result does not fit when I test it.',
];

/** What this person says about a derivation: often what is so, by their eye; else what people say who do not see it. */
function findFault(
  { lines, slip }: DemoSheet,
  { eye, sureness: [from, to] }: DemoStudent,
  random: Random,
  turn: number,
): FindingDraft {
  const say = (pick: FindingDraft['pick'], why: string, sure = sureness): FindingDraft => ({
    pick,
    why,
    sureness: sure,
    markedSpan: null,
    slipKind: null,
    shouldBe: '',
  });
  const among = (words: readonly string[]) =>
    choose(
      words.filter((_, i) => i % 2 === turn % 2),
      random,
    );
  const sees = random() < eye;
  const sureness = Math.min(MAX_SURENESS, from + Math.floor(random() * (to - from + 1)));
  if (sees && slip) {
    return {
      ...say(slip.step, among(slip.why)),
      markedSpan: random() < 0.7 ? spanOf(lines, slip) : null,
      slipKind: random() < 0.85 ? slip.kind : null,
      shouldBe: random() < 0.6 ? slip.shouldBe : '',
    };
  }
  if (sees) return say('none', among(NO_FAULT));
  const other = random();
  if (other < 0.12) return say(null, 'I could not follow this one.', 0);
  if (slip && other < 0.5) return say('none', among(NO_FAULT), Math.max(1, sureness - 1));
  if (slip && other < 0.8 && slip.step < lines.length) return say(slip.step + 1, among(FURTHER_ON));
  const astray = lines.flatMap((_, i) => (i + 1 === slip?.step ? [] : [i + 1]));
  return say(choose(astray, random), among(ASTRAY), Math.max(1, sureness - 2));
}

function spanOf(lines: readonly string[], { step, mark }: NonNullable<DemoSheet['slip']>) {
  const { tex } = toLine(lines[step - 1] ?? '');
  const start = mark ? tex.lastIndexOf(mark) : -1;
  return mark && start >= 0 ? { start, end: start + mark.length } : null;
}
