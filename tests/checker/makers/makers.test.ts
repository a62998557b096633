import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { makeFaulty, makeSound, type MakerTask } from '../../../api/checker/makers/make-faulty.ts';
import { makePractice } from '../../../api/checker/makers/make-practice.ts';
import { practiceTopics, type PracticeTopic } from '../../../api/checker/makers/practice-topics.ts';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

const r = String.raw;

function task(given: string, goal: MakerTask['goal']): MakerTask {
  return { given, goal, assumptions: [], settings: {} };
}

const forX: MakerTask['goal'] = { kind: 'solved', letter: 'x' };
const topics = Object.keys(practiceTopics) as PracticeTopic[];

describe('a sound derivation', () => {
  it.each<[string, MakerTask['goal'], string]>([
    ['3(x-2)-2(x-5)', { kind: 'expanded' }, 'x+4'],
    ['x^2-5x+6', { kind: 'factored' }, r`\left(x-2\right)\left(x-3\right)`],
    ['6x^2+x-2', { kind: 'factored' }, r`\left(2x-1\right)\left(3x+2\right)`],
    [r`\frac{x^2-9}{x^2-5x+6}`, { kind: 'simplified' }, r`\frac{x+3}{x-2}`],
    ['5(x-2)=3x+4', forX, 'x=7'],
    ['x^2=5x-6', forX, r`x=2\text{ or }x=3`],
    [r`\frac{x}{x-2}=\frac{2}{x-2}+3`, forX, r`\text{no solution}`],
    [r`\sqrt{x+3}=x-3`, forX, 'x=6'],
    ['2^{x+1}=8', forX, 'x=2'],
    ['3e^{2x}=12', forX, r`x=\frac{\ln 4}{2}`],
    ['|2x-3|=7', forX, r`x=5\text{ or }x=-2`],
    ['7-2x<3x+1', forX, r`x>\frac{6}{5}`],
    ['A=P(1+rt)', { kind: 'solved', letter: 't' }, r`t=\frac{A-P}{Pr}`],
    [r`\frac{d}{dx}(x^3\sin x)`, { kind: 'simplified' }, r`3x^2\sin x+x^3\cos x`],
    [r`\int_1^3 (3x^2-2x)\,dx`, { kind: 'simplified' }, '18'],
  ])('leads from %s to the end', (given, goal, last) => {
    expect(makeSound(task(given, goal))?.lines.at(-1)).toBe(last);
  });

  it('is not made where no way is known', () => {
    expect(makeSound(task(r`x=\cos x`, forX))).toBeNull();
  });
});

describe('a derivation with a slip', { timeout: 60_000 }, () => {
  it.each<[string, MakerTask['goal'], string, number]>([
    ['3(x-2)-2(x-5)', { kind: 'expanded' }, 'only-the-first-term-was-multiplied', 1],
    ['5(x-2)=3x+4', forX, 'a-term-was-moved-across-without-changing-its-sign', 2],
    ['(x-2)(x-3)=0', forX, 'roots-were-read-with-the-signs-of-the-factors', 1],
    ['|2x-3|=7', forX, 'only-one-case-of-an-absolute-value-was-taken', 1],
    ['7-2x<3x+1', forX, 'the-inequality-was-not-reversed-on-dividing-by-a-negative', 4],
    [r`\sqrt{x+3}=x-3`, forX, 'the-square-of-a-difference-was-taken-with-a-minus-kept', 2],
  ])('%s (%s, %s): the first fault is the slip and the rest follows', (given, goal, slip, firstFault) => {
    const made = makeFaulty({ task: task(given, goal), slip, seed: 3 });
    expect(made).toMatchObject({ firstFault, slip });
    const verdict = checkDerivation({ lines: made?.lines ?? [], assume: [], settings: { goal } });
    expect(verdict).toMatchObject({ outcome: 'faulty', firstFault });
    expect(verdict.steps[firstFault - 1]?.evidence.slip?.id).toBe(slip);
    expect(verdict.steps.slice(firstFault).every(({ ruling }) => ruling === 'holds')).toBe(true);
  });

  it('is not made where the slip has no place, and is the same for the same seed', () => {
    const expand = task('3(x-2)-2(x-5)', { kind: 'expanded' });
    expect(makeFaulty({ task: expand, slip: 'only-the-positive-root-was-taken', seed: 1 })).toBeNull();
    const once = makeFaulty({ task: expand, slip: 'only-the-first-term-was-multiplied', seed: 9 });
    expect(makeFaulty({ task: expand, slip: 'only-the-first-term-was-multiplied', seed: 9 })).toEqual(once);
  });
});

describe('practice', { timeout: 120_000 }, () => {
  it('has at least twelve topics', () => {
    expect(topics.length).toBeGreaterThanOrEqual(12);
  });

  it.each(topics)('of %s is sound where it should be, at every level', (topic) => {
    for (const level of [1, 2, 3] as const) {
      for (const seed of [1, 2, 3]) {
        const made = makePractice({ topic, level, withSlip: false, seed });
        expect(made, `${topic} ${level} ${seed}`).not.toBeNull();
        const { lines = [], task: given } = made ?? {};
        const input = { lines, assume: given?.assumptions ?? [], settings: { ...given?.settings, goal: given?.goal } };
        expect(checkDerivation(input).outcome).toBe('sound');
      }
    }
  });

  it.each(topics)('of %s hides one slip where it should, at every level', (topic) => {
    for (const level of [1, 2, 3] as const) {
      const made = makePractice({ topic, level, withSlip: true, seed: 20 + level });
      expect(made, `${topic} ${level}`).not.toBeNull();
      expect(made?.slip).not.toBeNull();
      const { lines = [], task: given } = made ?? {};
      const input = { lines, assume: given?.assumptions ?? [], settings: { ...given?.settings, goal: given?.goal } };
      expect(checkDerivation(input)).toMatchObject({ outcome: 'faulty', firstFault: made?.firstFault });
    }
  });
});

describe('practice of systems, quadratic inequalities and trigonometric equations', { timeout: 240_000 }, () => {
  const questions = fc.record({
    topic: fc.constantFrom<PracticeTopic>('systems', 'quadratic-inequalities', 'trigonometric-equations'),
    level: fc.constantFrom<1 | 2 | 3>(1, 2, 3),
    withSlip: fc.boolean(),
    seed: fc.integer({ min: 0, max: 1_000_000 }),
  });

  it('is what it says for any seed, and the same for the same one', () => {
    fc.assert(
      fc.property(questions, (question) => {
        const made = makePractice(question);
        expect(made).not.toBeNull();
        expect(makePractice(question)).toEqual(made);
        const { lines = [], task: given, slip = null, firstFault = null } = made ?? {};
        const settings = { ...given?.settings, goal: given?.goal };
        const verdict = checkDerivation({ lines, assume: given?.assumptions ?? [], settings });
        expect(slip !== null).toBe(question.withSlip);
        expect(verdict).toMatchObject({ outcome: question.withSlip ? 'faulty' : 'sound', firstFault });
        if (firstFault === null) return;
        expect(verdict.steps[firstFault - 1]?.evidence.slip?.id).toBe(slip);
        expect(verdict.steps.slice(firstFault).every(({ ruling }) => ruling === 'holds')).toBe(true);
      }),
      { seed: 23, numRuns: 24 },
    );
  });

  it.each<[string, MakerTask['goal'], readonly string[], string]>([
    [r`x+2y=8,\ 3x-y=3`, { kind: 'free' }, [], r`x=2\text{ and }y=3`],
    ['x^2-x<6', forX, [], '-2<x<3'],
    ['x^2>4x', forX, [], r`x<0\text{ or }x>4`],
    [
      r`2\sin^2 x=\sin x`,
      forX,
      [r`0\le x<2\pi`],
      r`x=0\text{ or }x=\pi\text{ or }x=\frac{\pi}{6}\text{ or }x=\frac{5\pi}{6}`,
    ],
  ])('leads from %s to the end', (given, goal, assumptions, last) => {
    expect(makeSound({ given, goal, assumptions, settings: {} })?.lines.at(-1)).toBe(last);
  });
});
