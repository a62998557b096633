import type { Line } from '../../../shared/maths/expression.ts';
import { printLine } from '../../../shared/maths/print.ts';
import { DEFAULT_READ_SETTINGS, readLine } from '../../../shared/maths/read.ts';
import type { CheckSettings, Goal, Verdict } from '../../../shared/schemas/verdict.ts';
import { createRandom, type Random } from '../numbers/random.ts';
import { checkDerivation } from '../rule-derivation.ts';
import { allSlips } from '../slips/catalogue.ts';
import type { Slip } from '../slips/slip.ts';
import { carryFrom } from './model-derivation.ts';
import { wrongLines } from './wrong-lines.ts';

/** What a derivation is made for. */
export interface MakerTask {
  /** TeX. */
  readonly given: string;
  readonly goal: Goal;
  readonly assumptions: readonly string[];
  readonly settings: CheckSettings;
}

export interface MadeDerivation {
  /** TeX; the first is the given. */
  readonly lines: readonly string[];
  /** The step that does not follow, null in a sound derivation. */
  readonly firstFault: number | null;
  /** The id of the slip in the catalogue. */
  readonly slip: string | null;
}

const mostChecks = 60;

/** A sound derivation from the given to the goal, checked; null where the makers know no way. */
export function makeSound(task: MakerTask): MadeDerivation | null {
  const lines = modelFor(task)?.map((line) => printLine(line)) ?? [];
  if (lines.length < 2) return null;
  if (check(task, lines).outcome !== 'sound' || !readsAsWritten(lines)) return null;
  return { lines: [task.given, ...lines.slice(1)], firstFault: null, slip: null };
}

/**
 * A derivation whose first fault is the slip and whose later lines are carried rightly from it, confirmed by the checker:
 * the first fault is there, later steps hold, and the slip is the one that the checker names. Null where the slip has no
 * place in this task. The same for the same seed.
 */
export function makeFaulty(question: {
  readonly task: MakerTask;
  readonly slip: string;
  readonly seed: number;
}): MadeDerivation | null {
  const slip = allSlips.find(({ id }) => id === question.slip);
  const model = modelFor(question.task);
  if (!slip || !model || model.length < 2) return null;
  const random = createRandom(question.seed);
  let checks = 0;
  for (const step of shuffled(stepsOf(model), random)) {
    for (const wrong of shuffled(wrongAt(slip, model, step), random)) {
      checks += 1;
      if (checks > mostChecks) return null;
      const made = confirmed(question.task, slip, model.slice(0, step), wrong);
      if (made) return made;
    }
  }
  return null;
}

function modelFor(task: MakerTask): Line[] | null {
  const reading = readLine(task.given, {
    ...DEFAULT_READ_SETTINGS,
    numbers: task.settings.numbers ?? 'real',
    decimal: task.settings.decimal ?? 'point',
  });
  return reading.ok ? [reading.line, ...carryFrom(reading.line, task.goal)] : null;
}

function stepsOf(model: readonly Line[]): number[] {
  return model.slice(1).map((_, k) => k + 1);
}

function wrongAt(slip: Slip, model: readonly Line[], step: number): Line[] {
  const [above, below] = [model[step - 1], model[step]];
  return above && below ? wrongLines(slip, above, below) : [];
}

function confirmed(task: MakerTask, slip: Slip, before: readonly Line[], wrong: Line): MadeDerivation | null {
  const firstFault = before.length;
  const after = carryFrom(wrong, task.goal);
  // What is wrong only until it is worked out is written worked out, as an author would.
  const [next] = after;
  const isRough = next !== undefined && printLine(wrong).length > 1.15 * printLine(next).length;
  for (const skipped of next ? (isRough ? [1, 0] : [0, 1]) : [0]) {
    const ending = [wrong, ...after].slice(skipped);
    const lines = [...before, ...ending].map((line) => printLine(line));
    const verdict = check(task, lines);
    if (verdict.outcome !== 'faulty' || verdict.firstFault !== firstFault) continue;
    const [fault, ...later] = verdict.steps.slice(firstFault - 1);
    if (fault?.evidence.slip?.id !== slip.id || later.some(({ ruling }) => ruling !== 'holds')) continue;
    if (readsAsWritten(lines)) return { lines: [task.given, ...lines.slice(1)], firstFault, slip: slip.id };
  }
  return null;
}

function readsAsWritten(lines: readonly string[]): boolean {
  return lines.every((line) => {
    const reading = readLine(line);
    return reading.ok && reading.alternatives.length === 0;
  });
}

function check(task: MakerTask, lines: readonly string[]): Verdict {
  return checkDerivation({
    lines: [task.given, ...lines.slice(1)],
    assume: task.assumptions,
    settings: { ...task.settings, goal: task.goal },
  });
}

export function shuffled<T>(items: readonly T[], random: Random): T[] {
  const result = [...items];
  for (let k = result.length - 1; k > 0; k -= 1) {
    const other = random(k + 1);
    [result[k], result[other]] = [result[other] as T, result[k] as T];
  }
  return result;
}
