import { createRandom } from '../numbers/random.ts';
import { allSlips } from '../slips/catalogue.ts';
import { makeFaulty, makeSound, shuffled, type MadeDerivation, type MakerTask } from './make-faulty.ts';
import { drawFrom, practiceTopics, type PracticeLevel, type PracticeTopic } from './practice-topics.ts';

export interface Practice extends MadeDerivation {
  readonly task: MakerTask;
}

const mostTasks = 8;

/** What is most often done wrong in a topic, where a wrong rule for parts of a line would hide something else. */
const ownSlips: Partial<Record<PracticeTopic, readonly string[]>> = {
  systems: [
    'a-term-was-moved-across-without-changing-its-sign',
    'different-things-were-done-to-the-two-sides',
    'only-the-first-term-was-multiplied',
    'the-coefficient-was-subtracted-instead-of-divided-by',
    'a-sign-was-changed-on-dividing-by-a-coefficient',
    'a-product-of-two-negatives-was-left-negative',
  ],
  'quadratic-inequalities': [
    'the-square-root-of-an-inequality-was-taken-as-of-an-equation',
    'the-zero-product-rule-was-used-with-an-inequality',
    'the-inequality-was-not-reversed-on-dividing-by-a-negative',
    'the-inequality-was-reversed-when-nothing-negative-was-divided-by',
    'a-strict-inequality-and-one-that-is-not-were-exchanged',
    'the-factor-pair-had-the-right-product-and-the-wrong-sum',
  ],
  'trigonometric-equations': [
    'both-sides-were-divided-by-a-function-that-can-be-zero',
    'a-term-was-moved-across-without-changing-its-sign',
    'the-coefficient-was-subtracted-instead-of-divided-by',
    'a-sign-was-changed-on-dividing-by-a-coefficient',
    'the-zero-product-rule-was-used-with-a-right-side-that-is-not-zero',
  ],
};

/**
 * A random derivation to practise on, sound or with one hidden slip, confirmed by the checker; the same for the same seed.
 * Null only where no task that was drawn has a place for a slip.
 */
export function makePractice(question: {
  readonly topic: PracticeTopic;
  readonly level: PracticeLevel;
  readonly withSlip: boolean;
  readonly seed: number;
}): Practice | null {
  const random = createRandom(question.seed);
  const draw = drawFrom(random);
  for (let tries = 0; tries < mostTasks; tries += 1) {
    const task = practiceTopics[question.topic](draw, question.level);
    const sound = makeSound(task);
    if (!sound) continue;
    if (!question.withSlip) return { task, ...sound };
    // What explains nearly anything is no good practice; better known mistakes first.
    const telling = allSlips.filter(({ rank }) => rank >= 6);
    const others = allSlips.filter(({ rank, kind }) => rank >= 5 && rank < 6 && kind !== 'copying');
    const own = shuffled(ownSlips[question.topic] ?? [], random);
    const rest = [...shuffled(telling, random), ...shuffled(others, random)].map(({ id }) => id);
    for (const slip of new Set([...own, ...rest])) {
      const made = makeFaulty({ task, slip, seed: random(1_000_000) });
      if (made) return { task, ...made };
    }
  }
  return null;
}
