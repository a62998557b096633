import { createRandom } from '../numbers/random.ts';
import { allSlips } from '../slips/catalogue.ts';
import { makeFaulty, makeSound, shuffled, type MadeDerivation, type MakerTask } from './make-faulty.ts';
import { drawFrom, practiceTopics, type PracticeLevel, type PracticeTopic } from './practice-topics.ts';

export interface Practice extends MadeDerivation {
  readonly task: MakerTask;
}

const mostTasks = 8;

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
    for (const slip of [...shuffled(telling, random), ...shuffled(others, random)]) {
      const made = makeFaulty({ task, slip: slip.id, seed: random(1_000_000) });
      if (made) return { task, ...made };
    }
  }
  return null;
}
