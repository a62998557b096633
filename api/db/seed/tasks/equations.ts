import { taskForm, type DemoTask } from '../demo-task.ts';

/** x = 6 */
export const equationWithHalves: DemoTask = {
  form: taskForm({
    title: 'An equation with two denominators',
    instructions: 'Solve for x. Write beside each line what you did to both sides.',
    given: '\\frac{x+3}{2}-\\frac{x-1}{5}=\\frac{7}{2}',
    goal: { kind: 'solved', letter: 'x' },
  }),
  sheets: [
    {
      lines: ['5(x+3)-2(x-1)=35 | times 10', '5x+15-2x+2=35', '3x+17=35', '3x=18 | minus 17', 'x=6 | divided by 3'],
    },
    {
      lines: ['\\frac{5(x+3)-2(x-1)}{10}=\\frac{7}{2}', '\\frac{3x+17}{10}=\\frac{7}{2}', '3x+17=35 | times 10', 'x=6'],
    },
    {
      lines: ['5(x+3)-2(x-1)=35 | times 10', '5x+15-2x-2=35 | brackets', '3x+13=35', '3x=22', 'x=\\frac{22}{3}'],
      slip: {
        step: 2,
        kind: 'sign',
        mark: '-2',
        shouldBe: '5x+15-2x+2=35',
        why: ['-2 times -1 is +2.', 'Minus times minus is plus, so the left side is 3x + 17.'],
      },
    },
    {
      lines: [
        '5(x+3)-2(x-1)=\\frac{7}{2} | times 10',
        '5x+15-2x+2=\\frac{7}{2}',
        '3x+17=\\frac{7}{2}',
        '3x=-\\frac{27}{2}',
        'x=-\\frac{9}{2}',
      ],
      slip: {
        step: 1,
        kind: 'both-sides',
        mark: '\\frac{7}{2}',
        shouldBe: '5(x+3)-2(x-1)=35',
        why: [
          'The right side has to be multiplied by 10 as well.',
          'Only the left side was multiplied. 10 times 7/2 is 35.',
        ],
      },
    },
    {
      lines: ['5x+3-2x-1=35 | times 10', '3x+2=35', '3x=33', 'x=11'],
      slip: {
        step: 1,
        kind: 'brackets',
        mark: '5x+3',
        shouldBe: '5(x+3)-2(x-1)=35',
        why: ['x + 3 as a whole is multiplied by 5, brackets are missing.', 'The 3 and the 1 were not multiplied.'],
      },
    },
    {
      lines: ['5(x+3)-2(x-1)=35', '5x+15-2x+2=35', '3x+17=35', '3x=52 | 17 to the other side', 'x=\\frac{52}{3}'],
      slip: {
        step: 4,
        kind: 'both-sides',
        mark: '52',
        shouldBe: '3x=18',
        why: [
          '17 must be taken away on both sides: 35 - 17 = 18.',
          'It was added on the right but taken away on the left.',
        ],
      },
    },
    {
      lines: ['5(x+3)-2(x-1)=35', '5x+15-2x+2=35', '3x+17=35', '3x=18', 'x=15 | minus 3'],
      slip: {
        step: 5,
        kind: 'both-sides',
        mark: '15',
        shouldBe: 'x=6',
        why: ['3x means 3 times x, so you have to divide by 3.', 'Put 15 in: 3 times 15 is 45 and not 18.'],
      },
    },
    {
      lines: ['\\frac{x+3-x-1}{3}=\\frac{7}{2} | put together', '\\frac{2}{3}=\\frac{7}{2}'],
      slip: {
        step: 1,
        kind: 'fractions',
        shouldBe: '\\frac{5(x+3)-2(x-1)}{10}=\\frac{7}{2}',
        why: [
          'Fractions with 2 and 5 below need 10 as denominator, 5 - 2 = 3 is not it.',
          'Denominators cannot be subtracted.',
        ],
      },
    },
  ],
};

/** x = 7 or x = -1 */
export const quadraticByFactors: DemoTask = {
  form: taskForm({
    title: 'A quadratic, your own way',
    instructions: 'Solve for x. Factors, a completed square or the formula: all are welcome.',
    given: 'x^2-4x=2x+7',
    goal: { kind: 'solved', letter: 'x' },
  }),
  sheets: [
    {
      lines: ['x^2-6x-7=0 | all to the left', '(x-7)(x+1)=0 | -7 + 1 = -6', 'x=7 \\text{ or } x=-1'],
    },
    {
      lines: ['x^2-6x=7', '(x-3)^2=16 | add 9', 'x-3=\\pm4', 'x=7 \\text{ or } x=-1'],
    },
    {
      lines: ['x^2-6x=7', '(x-3)^2=16 | add 9 on both sides', 'x-3=4 | root', 'x=7'],
      slip: {
        step: 3,
        kind: 'solutions',
        mark: '4',
        shouldBe: 'x-3=\\pm4',
        why: [
          'A square is 16 for 4 and for -4. One solution got lost.',
          'x = -1 also fits the line above: (-4)^2 = 16.',
        ],
      },
    },
    {
      lines: ['x^2-2x=7 | minus 2x', '(x-1)^2=8', 'x-1=\\pm\\sqrt{8}', 'x=1\\pm\\sqrt{8}'],
      slip: {
        step: 1,
        kind: 'like-terms',
        mark: '-2x',
        shouldBe: 'x^2-6x=7',
        why: ['-4x - 2x is -6x.', 'If you take away 2x on both sides, 6x are taken away on the left.'],
      },
    },
    {
      lines: ['x^2-6x-7=0', '(x+7)(x-1)=0 | factors', 'x=-7 \\text{ or } x=1'],
      slip: {
        step: 2,
        kind: 'sign',
        mark: '(x+7)(x-1)',
        shouldBe: '(x-7)(x+1)=0',
        why: ['Multiplied out the middle is +6x, but it should be -6x.', 'The signs in the brackets are swapped.'],
      },
    },
    {
      lines: ['x^2-6x-7=0', '(x-7)(x+1)=0', 'x=-7 \\text{ or } x=1 | read off'],
      slip: {
        step: 3,
        kind: 'solutions',
        shouldBe: 'x=7 \\text{ or } x=-1',
        why: [
          'x - 7 is zero for x = 7, not for -7.',
          'The brackets are right but the signs were read off the wrong way.',
        ],
      },
    },
    {
      lines: ['x^2-6x=7', 'x(x-6)=7', 'x=7 \\text{ or } x-6=7 | one of them is 7', 'x=7 \\text{ or } x=13'],
      slip: {
        step: 3,
        kind: 'solutions',
        shouldBe: 'x^2-6x-7=0',
        why: [
          'That only works with zero on the right. 13 times 7 is not 7.',
          'A product is 7 in many ways. First bring the 7 over.',
        ],
      },
    },
    {
      lines: [
        'x^2-6x-7=0',
        '\\text{two numbers with product } -7 \\text{ and sum } 6',
        'x=7 | 7 and -1, a length cannot be negative',
      ],
      slip: {
        step: 3,
        kind: 'solutions',
        shouldBe: 'x=7 \\text{ or } x=-1',
        why: [
          'Nothing in the task says that x is a length, so -1 counts too.',
          'The second solution was thrown away without a reason in the task.',
        ],
      },
      rulings: [
        {
          step: 2,
          decision: 'holds',
          reason:
            'The sentence says which numbers are looked for, and it is right: they are 7 and -1. I count it as a step.',
        },
        {
          step: 3,
          decision: 'fails',
          reason: 'You found -1 yourself and then left it out. The task does not speak of lengths, so both stand.',
        },
      ],
    },
  ],
};

/** x = 9 */
export const rootEquation: DemoTask = {
  form: taskForm({
    title: 'A root and a line',
    instructions: 'Solve for x. Say at the end which of your candidates are solutions, and how you know.',
    given: '\\sqrt{2x+7}=x-4',
    goal: { kind: 'solved', letter: 'x' },
  }),
  sheets: [
    {
      lines: [
        '2x+7=x^2-8x+16 | square both sides',
        '0=x^2-10x+9',
        '0=(x-1)(x-9)',
        'x=1 \\text{ or } x=9',
        'x=9 | 1 gives 3 = -3',
      ],
    },
    {
      lines: [
        '2x+7=(x-4)^2 | square',
        '2x+7=x^2-8x+16',
        'x^2-10x+9=0',
        '(x-5)^2=16',
        'x=1 \\text{ or } x=9',
        'x=9 | test both',
      ],
    },
    {
      lines: ['2x+7=x^2-8x+16', 'x^2-10x+9=0', '(x-1)(x-9)=0', 'x=1 \\text{ or } x=9 | both brackets'],
      slip: {
        step: 4,
        kind: 'solutions',
        shouldBe: 'x=9',
        why: [
          '1 does not solve the equation with the root: 3 is not -3. It came in by squaring.',
          'After squaring you have to test. x = 1 must go.',
        ],
      },
    },
    {
      lines: ['2x+7=x^2-16 | square', 'x^2-2x-23=0', '(x-1)^2=24', 'x=1\\pm\\sqrt{24}'],
      slip: {
        step: 1,
        kind: 'powers-and-roots',
        mark: 'x^2-16',
        shouldBe: '2x+7=x^2-8x+16',
        why: ['The square of x - 4 has -8x in the middle and +16 at the end.', 'Both terms were squared alone.'],
      },
    },
    {
      lines: ['\\sqrt{2x}+\\sqrt{7}=x-4 | two roots', '2x+7=(x-4)^2', 'x^2-10x+9=0', 'x=1 \\text{ or } x=9', 'x=9'],
      slip: {
        step: 1,
        kind: 'powers-and-roots',
        mark: '\\sqrt{2x}+\\sqrt{7}',
        shouldBe: '2x+7=(x-4)^2',
        why: [
          'The root of a sum is not the sum of the roots.',
          'Take x = 9: the root of 25 is 5, but the two roots together are almost 7.',
        ],
      },
    },
    {
      lines: ['2x+7=x^2-8x+16', 'x^2-6x+9=0 | bring over', '(x-3)^2=0', 'x=3'],
      slip: {
        step: 2,
        kind: 'like-terms',
        mark: '-6x',
        shouldBe: 'x^2-10x+9=0',
        why: ['-8x - 2x is -10x.', '2x was added on the right, it has to be taken away.'],
      },
    },
    {
      lines: [
        '2x+7=x^2-8x+16',
        'x^2-10x+9=0',
        '\\text{sum } 10, \\text{ product } 9: \\text{ it is } 1 \\text{ and } 9',
        'x=9 | only 9 makes x - 4 positive',
      ],
      rulings: [
        { step: 3, decision: 'holds', reason: 'Read off from sum and product, and both numbers are right.' },
        { step: 4, decision: 'holds', reason: 'The reason beside it is the point: x - 4 may not be negative.' },
      ],
    },
    {
      lines: ['2x+7=x^2-8x+16', 'x^2-10x+9=0', '(x-1)(x-9)=0', 'x=9 | 1 fails in the root'],
    },
  ],
};

/** x > -3 */
export const inequality: DemoTask = {
  form: taskForm({
    title: 'Less than, with a minus',
    instructions: 'Find every x. Mind what happens to the sign when you divide.',
    given: '4-3(x-2)<2x+25',
    goal: { kind: 'solved', letter: 'x' },
  }),
  sheets: [
    { lines: ['4-3x+6<2x+25 | brackets', '10-3x<2x+25', '-5x<15', 'x>-3 | divided by -5'] },
    { lines: ['10-3x<2x+25', '10<5x+25 | plus 3x', '-15<5x', '-3<x'] },
    {
      unfinished: true,
      lines: ['4-3x-6<2x+25', '-2-3x<2x+25'],
      slip: {
        step: 1,
        kind: 'sign',
        mark: '-6',
        shouldBe: '4-3x+6<2x+25',
        why: ['-3 times -2 is +6.', 'Minus times minus gives plus.'],
      },
    },
    {
      lines: ['4-3x+6<2x+25', '10-3x<2x+25', '-5x<15', 'x<-3'],
      slip: {
        step: 4,
        kind: 'both-sides',
        shouldBe: 'x>-3',
        why: ['Divided by -5, so the sign has to turn.', 'x = 0 fits the line above but not this one.'],
      },
    },
    {
      unfinished: true,
      lines: ['x-2<2x+25 | 4 - 3 = 1'],
      slip: {
        step: 1,
        kind: 'brackets',
        shouldBe: '4-3x+6<2x+25',
        why: ['The 3 belongs to the bracket and multiplies first.', 'You cannot take 3 from 4 before multiplying.'],
      },
    },
    { unfinished: true, lines: ['4-3x+6<2x+25', '10-3x<2x+25', '-5x<'] },
    { unfinished: true, lines: ['10-3x<2x+25', '10-5x>25'] },
    { unfinished: true, lines: ['4-3x+6<2x+25', '10-3x>2x+25'] },
  ],
};
