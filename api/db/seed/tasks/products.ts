import { taskForm, type DemoTask } from '../demo-task.ts';

/** 2x^2 - 15x + 10 */
export const productTakenAway: DemoTask = {
  form: taskForm({
    title: 'One product taken away from another',
    instructions:
      'Write it as a sum of powers of x. Go one small step at a time; the minus is where it gets interesting.',
    given: '3x(x-4)-(x-2)(x+5)',
    goal: { kind: 'expanded' },
  }),
  sheets: [
    {
      lines: [
        '3x^2-12x-(x-2)(x+5) | first product',
        '3x^2-12x-(x^2+5x-2x-10) | keep the brackets',
        '3x^2-12x-(x^2+3x-10)',
        '3x^2-12x-x^2-3x+10 | minus turns every sign',
        '2x^2-15x+10 | collect',
      ],
    },
    {
      lines: ['3x^2-12x-(x^2+3x-10) | multiply both out', '3x^2-x^2-12x-3x+10', '2x^2-15x+10'],
    },
    {
      lines: [
        '3x^2-12x-(x-2)(x+5)',
        '3x^2-12x-(x^2+3x-10)',
        '3x^2-12x-x^2+3x-10 | take the brackets away',
        '2x^2-9x-10',
      ],
      slip: {
        step: 3,
        kind: 'brackets',
        mark: '+3x',
        shouldBe: '3x^2-12x-x^2-3x+10',
        why: [
          'The minus in front belongs to the whole bracket. Here only x^2 got it.',
          'With x = 0 the line above is 10 and this one is -10. The signs of 3x and 10 were not turned.',
        ],
      },
    },
    {
      lines: [
        '3x^2-12x-(x-2)(x+5)',
        '3x^2-12x-(x^2+5x-2x+10) | each with each',
        '3x^2-12x-(x^2+3x+10)',
        '3x^2-12x-x^2-3x-10',
        '2x^2-15x-10',
      ],
      slip: {
        step: 2,
        kind: 'sign',
        mark: '+10',
        shouldBe: '3x^2-12x-(x^2+5x-2x-10)',
        why: [
          '-2 times 5 is -10, a minus times a plus.',
          'The last product has one minus in it, so it must be negative.',
        ],
      },
    },
    {
      lines: ['3x^2-4-(x-2)(x+5) | multiply by 3x', '3x^2-4-(x^2+3x-10)', '3x^2-4-x^2-3x+10', '2x^2-3x+6'],
      slip: {
        step: 1,
        kind: 'brackets',
        mark: '-4',
        shouldBe: '3x^2-12x-(x-2)(x+5)',
        why: [
          '3x has to multiply the 4 as well.',
          'Only the first term in the bracket was multiplied. 3x times -4 is -12x.',
        ],
      },
    },
    {
      lines: ['3x^2-12x-(x^2+3x-10)', '3x^2-12x-x^2-3x+10', '3x^2-x^2-12x-3x+10 | sort', '2x^2-9x+10'],
      slip: {
        step: 4,
        kind: 'like-terms',
        mark: '-9x',
        shouldBe: '2x^2-15x+10',
        why: [
          '-12x and -3x are both taken away, together -15x.',
          'Twelve away and three more away is fifteen away, not nine.',
        ],
      },
    },
    {
      lines: ['3x^2-12x-(x^2+3x-10)', '3x^2-12x-x^2-3x+10', '2x^4-15x+10 | collect'],
      slip: {
        step: 3,
        kind: 'like-terms',
        mark: '2x^4',
        shouldBe: '2x^2-15x+10',
        why: [
          '3x^2 - x^2 is 2x^2. Nothing is multiplied, so the power stays.',
          'Powers only add up when you multiply. Here you subtract.',
        ],
      },
    },
    {
      lines: ['3x^2-12x-(x+2)(x+5)', '3x^2-12x-(x^2+7x+10)', '3x^2-12x-x^2-7x-10', '2x^2-19x-10'],
      slip: {
        step: 1,
        kind: 'copying',
        mark: '(x+2)',
        shouldBe: '3x^2-12x-(x-2)(x+5)',
        why: ['It says x - 2 in the task.', 'Copied wrongly: the second bracket starts with x - 2.'],
      },
    },
  ],
};

/** 3x^2 - 7x + 15 */
export const squareAndProduct: DemoTask = {
  form: taskForm({
    title: 'A square and a product',
    instructions: 'Expand and collect. Say in a word or two what you did on each line.',
    given: '(2x-3)^2-(x+1)(x-6)',
    goal: { kind: 'expanded' },
  }),
  sheets: [
    {
      lines: [
        '(2x-3)(2x-3)-(x+1)(x-6) | a square is a product',
        '4x^2-12x+9-(x+1)(x-6)',
        '4x^2-12x+9-(x^2-5x-6)',
        '4x^2-12x+9-x^2+5x+6 | all signs turn',
        '3x^2-7x+15',
      ],
    },
    { lines: ['4x^2-12x+9-(x^2-6x+x-6)', '4x^2-12x+9-x^2+6x-x+6', '4x^2-x^2-12x+5x+15 | sorted', '3x^2-7x+15'] },
    {
      lines: ['4x^2-9-(x+1)(x-6) | square both', '4x^2-9-(x^2-5x-6)', '4x^2-9-x^2+5x+6', '3x^2+5x-3'],
      slip: {
        step: 1,
        kind: 'powers-and-roots',
        mark: '4x^2-9',
        shouldBe: '4x^2-12x+9-(x+1)(x-6)',
        why: [
          'A difference squared has a middle term: -12x. And 9 comes with a plus.',
          'Try x = 0: the square of -3 is 9 and not -9.',
        ],
      },
    },
    {
      lines: ['4x^2-6x+9-(x+1)(x-6)', '4x^2-6x+9-(x^2-5x-6)', '4x^2-6x+9-x^2+5x+6', '3x^2-x+15'],
      slip: {
        step: 1,
        kind: 'powers-and-roots',
        mark: '-6x',
        shouldBe: '4x^2-12x+9-(x+1)(x-6)',
        why: ['2x times -3 comes twice, so -12x.', 'The product in the middle was not doubled.'],
      },
    },
    {
      lines: ['2x^2-12x+9-(x+1)(x-6)', '2x^2-12x+9-(x^2-5x-6)', '2x^2-12x+9-x^2+5x+6', 'x^2-7x+15'],
      slip: {
        step: 1,
        kind: 'powers-and-roots',
        mark: '2x^2',
        shouldBe: '4x^2-12x+9-(x+1)(x-6)',
        why: [
          'The 2 has to be squared too: (2x)^2 = 4x^2.',
          'At x = 1 the square is 1, this gives -1. The factor 2 was not squared.',
        ],
      },
    },
    {
      lines: ['4x^2-12x+9-(x+1)(x-6)', '4x^2-12x+9-x^2-5x-6 | multiply out', '3x^2-17x+3'],
      slip: {
        step: 2,
        kind: 'brackets',
        mark: '-5x-6',
        shouldBe: '4x^2-12x+9-(x^2-5x-6)',
        why: [
          'The brackets are gone but the minus only reached the first term.',
          'It should be +5x + 6 after taking the bracket away.',
        ],
      },
    },
    {
      lines: ['4x^2-12x+9-(x^2-5x+6)', '4x^2-12x+9-x^2+5x-6', '3x^2-7x+3'],
      slip: {
        step: 1,
        kind: 'sign',
        mark: '+6',
        shouldBe: '4x^2-12x+9-(x^2-5x-6)',
        why: ['1 times -6 is -6.', 'Plus times minus is minus, the last term must be -6.'],
      },
    },
    {
      lines: ['4x^2-12x+9-(x^2-5x-6)', '4x^2-12x+9-x^2+5x+6', '3x^2+17x+15 | put together'],
      slip: {
        step: 3,
        kind: 'like-terms',
        mark: '+17x',
        shouldBe: '3x^2-7x+15',
        why: ['-12 + 5 is -7.', 'The signs of -12x and 5x are different, so you take one from the other: -7x.'],
      },
    },
  ],
};

/** \frac{d}{dx}(x^2(3x-1)) = 9x^2 - 2x */
export const slopeOfProduct: DemoTask = {
  form: taskForm({
    title: 'The slope of a product',
    instructions: 'Two ways lead there. Choose one and stay with it.',
    given: '\\frac{d}{dx}\\left(x^2(3x-1)\\right)',
    goal: { kind: 'expanded' },
  }),
  sheets: [{ lines: ['\\frac{d}{dx}\\left(3x^3-x^2\\right)', '9x^2-2x'] }],
};
