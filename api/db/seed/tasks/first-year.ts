import { taskForm, type DemoTask } from '../demo-task.ts';

/** 2x - 22 */
export const twoBrackets: DemoTask = {
  form: taskForm({
    title: 'Two brackets, one minus',
    instructions: 'Write it without brackets and collect.',
    given: '5(x-2)-3(x+4)',
    goal: { kind: 'expanded' },
  }),
  sheets: [
    { lines: ['5x-10-3(x+4) | first bracket', '5x-10-3x-12', '2x-22'] },
    { lines: ['5x-10-3x-12 | both', '5x-3x-10-12', '2x-22'] },
    {
      lines: ['5x-10-3x+12', '2x+2'],
      slip: {
        step: 1,
        kind: 'sign',
        mark: '+12',
        shouldBe: '5x-10-3x-12',
        why: ['-3 times 4 is -12.', 'The minus goes with the 3 to both terms.'],
      },
    },
    {
      lines: ['5x-2-3x+4', '2x+2'],
      slip: {
        step: 1,
        kind: 'brackets',
        mark: '-2',
        shouldBe: '5x-10-3x-12',
        why: ['5 has to multiply the 2 too.', 'Only the x was multiplied, in both brackets.'],
      },
    },
    {
      lines: ['5x-10-3(x+4)', '5x-10-3x-12', '5x-3x-10-12', '2x-2 | collect'],
      slip: {
        step: 4,
        kind: 'like-terms',
        mark: '-2',
        shouldBe: '2x-22',
        why: ['-10 and -12 make -22.', 'Two debts add up: ten and twelve are twenty-two.'],
      },
    },
    {
      lines: ['5x-10-3x-12', '8x-22'],
      slip: {
        step: 2,
        kind: 'like-terms',
        mark: '8x',
        shouldBe: '2x-22',
        why: ['5x - 3x is 2x.', 'The 3x is taken away, not added.'],
      },
    },
  ],
};

/** y = 11 */
export const lettersOnBothSides: DemoTask = {
  form: taskForm({
    title: 'The letter on both sides',
    instructions: 'Solve for y and write beside each line what you did to both sides.',
    given: '4(y-3)=2y+10',
    goal: { kind: 'solved', letter: 'y' },
  }),
  sheets: [
    { lines: ['4y-12=2y+10 | bracket', '2y-12=10 | minus 2y', '2y=22 | plus 12', 'y=11 | half'] },
    { lines: ['2(y-3)=y+5 | halved', '2y-6=y+5', 'y=11'] },
    {
      lines: ['4y-3=2y+10', '2y-3=10', '2y=13', 'y=6.5'],
      slip: {
        step: 1,
        kind: 'brackets',
        mark: '-3',
        shouldBe: '4y-12=2y+10',
        why: ['4 times 3 is 12, the bracket was only half opened.', 'Both terms in the bracket get the 4.'],
      },
    },
    {
      lines: ['4y-12=2y+10', '6y-12=10 | bring 2y over', '6y=22', 'y=\\frac{11}{3}'],
      slip: {
        step: 2,
        kind: 'both-sides',
        mark: '6y',
        shouldBe: '2y-12=10',
        why: ['2y is taken away on both sides, so 4y - 2y is left.', 'Going to the other side it must become -2y.'],
      },
    },
    {
      lines: ['4y-12=2y+10', '2y-12=10', '2y=-2 | minus 12', 'y=-1'],
      slip: {
        step: 3,
        kind: 'both-sides',
        mark: '-2',
        shouldBe: '2y=22',
        why: [
          'To get rid of -12 you add 12: 10 + 12 = 22.',
          'On the left 12 was added, on the right it was taken away.',
        ],
      },
    },
    {
      lines: ['4y-12=2y+10', '2y-12=10', '2y=22', 'y=20 | minus 2'],
      slip: {
        step: 4,
        kind: 'both-sides',
        mark: '20',
        shouldBe: 'y=11',
        why: ['2y is two times y, you have to divide.', 'Twice 20 is 40, that is not 22.'],
      },
    },
  ],
};

/** 5a - 8 */
export const squaresThatVanish: DemoTask = {
  form: taskForm({
    title: 'Where did the square go?',
    instructions: 'Expand and collect. What is special about the result?',
    given: '(a+4)(a-2)+a(3-a)',
    goal: { kind: 'expanded' },
  }),
  sheets: [
    { lines: ['a^2-2a+4a-8+a(3-a)', 'a^2+2a-8+a(3-a)', 'a^2+2a-8+3a-a^2', '5a-8 | the squares cancel'] },
    { lines: ['a^2+2a-8+3a-a^2', '2a+3a-8', '5a-8'] },
    {
      lines: ['a^2-8+a(3-a) | first times first, last times last', 'a^2-8+3a-a^2', '3a-8'],
      slip: {
        step: 1,
        kind: 'brackets',
        mark: 'a^2-8',
        shouldBe: 'a^2-2a+4a-8+a(3-a)',
        why: [
          'Each term meets each other term: -2a and 4a are missing.',
          'Four products belong there and only two were made.',
        ],
      },
    },
    {
      lines: ['a^2-2a+4a+8+a(3-a)', 'a^2+2a+8+3a-a^2', '5a+8'],
      slip: {
        step: 1,
        kind: 'sign',
        mark: '+8',
        shouldBe: 'a^2-2a+4a-8+a(3-a)',
        why: ['4 times -2 is -8.', 'One minus in the product makes it negative.'],
      },
    },
    {
      lines: ['a^2+2a-8+a(3-a)', 'a^2+2a-8+3a-a', 'a^2+4a-8'],
      slip: {
        step: 2,
        kind: 'powers-and-roots',
        mark: '-a',
        shouldBe: 'a^2+2a-8+3a-a^2',
        why: ['a times a is a squared.', 'The a in front multiplies the second a as well.'],
      },
    },
    {
      lines: ['a^2+2a-8+a(3-a)', 'a^2+2a-8+3a-a^2', '2a^2+5a-8'],
      slip: {
        step: 3,
        kind: 'like-terms',
        mark: '2a^2',
        shouldBe: '5a-8',
        why: ['a^2 - a^2 is nothing.', 'The second square has a minus, they cancel.'],
      },
    },
  ],
};

/** t = 1 */
export const minusBeforeBracket: DemoTask = {
  form: taskForm({
    title: 'A bracket with a minus in front',
    instructions: 'Solve for t.',
    given: '2(3t-5)-(t-8)=3',
    goal: { kind: 'solved', letter: 't' },
  }),
  sheets: [
    { lines: ['6t-10-(t-8)=3', '6t-10-t+8=3 | signs turn', '5t-2=3', '5t=5', 't=1'] },
    { lines: ['6t-10-t+8=3', '5t-2=3', 't=1'] },
    {
      lines: ['6t-10-t-8=3', '5t-18=3', '5t=21', 't=\\frac{21}{5}'],
      slip: {
        step: 1,
        kind: 'sign',
        mark: '-8',
        shouldBe: '6t-10-t+8=3',
        why: ['The minus in front turns -8 into +8.', 'Taking away a bracket turns every sign in it.'],
      },
    },
    {
      lines: ['6t-5-(t-8)=3', '6t-5-t+8=3', '5t+3=3', '5t=0', 't=0'],
      slip: {
        step: 1,
        kind: 'brackets',
        mark: '-5',
        shouldBe: '6t-10-(t-8)=3',
        why: ['2 times 5 is 10.', 'The 2 only reached the first term.'],
      },
    },
    {
      lines: ['6t-10-t+8=3', '6t-t=3-10+8 | sort', '5t=1', 't=\\frac{1}{5}'],
      slip: {
        step: 2,
        kind: 'both-sides',
        mark: '-10+8',
        shouldBe: '6t-t=3+10-8',
        why: [
          'What goes to the other side changes its sign.',
          '-10 + 8 stands on the left; on the right it must be +10 - 8.',
        ],
      },
    },
    {
      lines: ['6t-10-t+8=3', '5t-2=3', '5t=1 | minus 2', 't=0.2'],
      slip: {
        step: 3,
        kind: 'both-sides',
        mark: '1',
        shouldBe: '5t=5',
        why: ['The 2 must be added on both sides: 3 + 2 = 5.', 'Left it was plus two and right minus two.'],
      },
    },
  ],
};

/** (5n - 3) / 6 */
export const thirdsAndHalves: DemoTask = {
  form: taskForm({
    title: 'Thirds and halves',
    instructions: 'Write it as one fraction.',
    given: '\\frac{n}{3}+\\frac{n-1}{2}',
    goal: { kind: 'simplified' },
  }),
  sheets: [
    { lines: ['\\frac{2n}{6}+\\frac{3(n-1)}{6} | sixths', '\\frac{2n+3n-3}{6}', '\\frac{5n-3}{6}'] },
    { lines: ['\\frac{2n+3(n-1)}{6}', '\\frac{2n+3n-3}{6}', '\\frac{5n-3}{6}'] },
    {
      lines: ['\\frac{n+n-1}{3+2} | add', '\\frac{2n-1}{5}'],
      slip: {
        step: 1,
        kind: 'fractions',
        shouldBe: '\\frac{2n+3(n-1)}{6}',
        why: ['Thirds and halves have to become sixths first.', 'The denominators are not added.'],
      },
    },
    {
      lines: ['\\frac{2n+3(n-1)}{6}', '\\frac{2n+3n-1}{6}', '\\frac{5n-1}{6}'],
      slip: {
        step: 2,
        kind: 'brackets',
        mark: '-1',
        shouldBe: '\\frac{2n+3n-3}{6}',
        why: ['3 times 1 is 3.', 'The 3 has to reach both terms.'],
      },
    },
    {
      lines: ['\\frac{n}{6}+\\frac{n-1}{6} | same denominator', '\\frac{2n-1}{6}'],
      slip: {
        step: 1,
        kind: 'fractions',
        shouldBe: '\\frac{2n}{6}+\\frac{3(n-1)}{6}',
        why: ['The tops have to grow with the bottoms.', 'If you double the 3 you must double the n.'],
      },
    },
    {
      lines: ['\\frac{2n+3(n-1)}{6}', '\\frac{2n+3n-3}{6}', '\\frac{5n-3}{6}', '\\frac{5n-1}{2} | cancel 3'],
      slip: {
        step: 4,
        kind: 'fractions',
        mark: '5n-1',
        shouldBe: '\\frac{5n-3}{6}',
        why: ['5n has no factor 3, so nothing cancels.', 'Only one of the two terms was divided by 3.'],
      },
    },
  ],
};

/** k = 5 */
export const minusTwoBrackets: DemoTask = {
  form: taskForm({
    title: 'Brackets on both sides',
    instructions: 'Solve for k. Test your result in the first line.',
    given: '7-2(k+3)=3(k-8)',
    goal: { kind: 'solved', letter: 'k' },
  }),
  sheets: [
    { lines: ['7-2k-6=3k-24 | brackets', '1-2k=3k-24', '25=5k', 'k=5'] },
    { lines: ['1-2k=3k-24', '-5k=-25', 'k=5'] },
    { unfinished: true, lines: ['7-2k+6=3k-24', '13-2k=3k-24'] },
    { unfinished: true, lines: ['5(k+3)=3(k-8) | 7 - 2', '5k+15=3k-24'] },
    { unfinished: true, lines: ['7-2k-6=3k-24', '1-2k=3k-24'] },
    { unfinished: true, lines: ['7-2k-6=3k-8'] },
  ],
};
