import { taskForm, type DemoTask } from '../demo-task.ts';

/** (5x + 1) / ((x - 1)(x + 2)) */
export const sumOfFractions: DemoTask = {
  form: taskForm({
    title: 'Two fractions become one',
    instructions: 'Bring both to one denominator. The denominator may stay a product.',
    given: '\\frac{2}{x-1}+\\frac{3}{x+2}',
    goal: { kind: 'simplified' },
  }),
  sheets: [
    {
      lines: [
        '\\frac{2(x+2)}{(x-1)(x+2)}+\\frac{3(x-1)}{(x-1)(x+2)} | same denominator',
        '\\frac{2(x+2)+3(x-1)}{(x-1)(x+2)}',
        '\\frac{2x+4+3x-3}{(x-1)(x+2)}',
        '\\frac{5x+1}{(x-1)(x+2)}',
      ],
    },
    {
      lines: ['\\frac{2(x+2)+3(x-1)}{(x-1)(x+2)} | cross over', '\\frac{2x+4+3x-3}{x^2+x-2}', '\\frac{5x+1}{x^2+x-2}'],
    },
    {
      lines: ['\\frac{2+3}{x-1+x+2} | add', '\\frac{5}{2x+1}'],
      slip: {
        step: 1,
        kind: 'fractions',
        shouldBe: '\\frac{2(x+2)+3(x-1)}{(x-1)(x+2)}',
        why: [
          'You cannot add top and bottom each. They need the same denominator first.',
          'For x = 2 the task is 2 + 3/4, and this is 1.',
        ],
      },
    },
    {
      lines: [
        '\\frac{2(x+2)+3(x-1)}{(x-1)(x+2)}',
        '\\frac{2x+4+3x-1}{(x-1)(x+2)} | multiply out',
        '\\frac{5x+3}{(x-1)(x+2)}',
      ],
      slip: {
        step: 2,
        kind: 'brackets',
        mark: '3x-1',
        shouldBe: '\\frac{2x+4+3x-3}{(x-1)(x+2)}',
        why: [
          '3 times -1 is -3. The 3 did not reach the second term.',
          'The bracket (x - 1) has two terms, both get the 3.',
        ],
      },
    },
    {
      lines: [
        '\\frac{2(x-1)}{(x-1)(x+2)}+\\frac{3(x+2)}{(x-1)(x+2)} | extend',
        '\\frac{2x-2+3x+6}{(x-1)(x+2)}',
        '\\frac{5x+4}{(x-1)(x+2)}',
      ],
      slip: {
        step: 1,
        kind: 'fractions',
        mark: '2(x-1)',
        shouldBe: '\\frac{2(x+2)}{(x-1)(x+2)}+\\frac{3(x-1)}{(x-1)(x+2)}',
        why: [
          'Each top must be multiplied by the other denominator. They are swapped.',
          'The first fraction was extended by x - 1, but it had that already; x + 2 was missing.',
        ],
      },
    },
    {
      lines: ['\\frac{2(x+2)+3(x-1)}{(x-1)(x+2)}', '\\frac{2x+4+3x-3}{x^2-2}', '\\frac{5x+1}{x^2-2}'],
      slip: {
        step: 2,
        kind: 'brackets',
        mark: 'x^2-2',
        shouldBe: '\\frac{2x+4+3x-3}{x^2+x-2}',
        why: [
          'In the denominator the middle products 2x - x are missing.',
          'x times 2 and -1 times x were left out below.',
        ],
      },
    },
    {
      lines: ['\\frac{2(x+2)+3(x-1)}{(x-1)(x+2)}', '2+3 | cancel what is on top and below', '5'],
      slip: {
        step: 2,
        kind: 'fractions',
        shouldBe: '\\frac{2x+4+3x-3}{(x-1)(x+2)}',
        why: [
          'You can only cancel factors of the whole top, these are parts of a sum.',
          'Cancelling out of a sum does not work; try x = 2.',
        ],
      },
    },
    {
      lines: ['\\frac{2(x+2)+3(x-1)}{(x-1)(x+2)}', '\\frac{2x+4+3x-3}{(x-1)(x+2)}', '\\frac{5x+7}{(x-1)(x+2)}'],
      slip: {
        step: 3,
        kind: 'like-terms',
        mark: '+7',
        shouldBe: '\\frac{5x+1}{(x-1)(x+2)}',
        why: ['4 - 3 is 1.', 'The three is taken away, not added.'],
      },
    },
  ],
};

/** (x - 3) / (x - 2) */
export const cancelFactors: DemoTask = {
  form: taskForm({
    title: 'What may be cancelled',
    instructions: 'Simplify. Say which factor you cancel, and for which x that is allowed.',
    given: '\\frac{x^2-9}{x^2+x-6}',
    goal: { kind: 'simplified' },
  }),
  sheets: [
    {
      lines: [
        '\\frac{(x-3)(x+3)}{x^2+x-6} | difference of squares',
        '\\frac{(x-3)(x+3)}{(x-2)(x+3)} | 3 - 2 = 1 and 3 * (-2) = -6',
        '\\frac{x-3}{x-2} | cancel x + 3, so x is not -3',
      ],
    },
    {
      lines: [
        '\\frac{(x+3)(x-3)}{x^2+3x-2x-6}',
        '\\frac{(x+3)(x-3)}{x(x+3)-2(x+3)}',
        '\\frac{(x+3)(x-3)}{(x+3)(x-2)}',
        '\\frac{x-3}{x-2}',
      ],
    },
    {
      lines: ['\\frac{-9}{x-6} | cancel the squares', '\\frac{9}{6-x}'],
      slip: {
        step: 1,
        kind: 'fractions',
        shouldBe: '\\frac{(x-3)(x+3)}{x^2+x-6}',
        why: [
          'x^2 is a term here and not a factor, it cannot be cancelled.',
          'Put x = 0: above it is 3/2 and here too, but with x = 1 it is 2 against 9/5.',
        ],
      },
    },
    {
      lines: ['\\frac{(x-3)^2}{x^2+x-6}', '\\frac{(x-3)^2}{(x-2)(x+3)}', '\\frac{(x-3)(x-3)}{(x-2)(x+3)}'],
      slip: {
        step: 1,
        kind: 'powers-and-roots',
        mark: '(x-3)^2',
        shouldBe: '\\frac{(x-3)(x+3)}{x^2+x-6}',
        why: [
          'x^2 - 9 is (x - 3)(x + 3), the square would have -6x in it.',
          'A difference of squares is not the square of a difference.',
        ],
      },
    },
    {
      lines: ['\\frac{(x-3)(x+3)}{x^2+x-6}', '\\frac{(x-3)(x+3)}{(x+2)(x-3)} | factors of -6', '\\frac{x+3}{x+2}'],
      slip: {
        step: 2,
        kind: 'sign',
        mark: '(x+2)(x-3)',
        shouldBe: '\\frac{(x-3)(x+3)}{(x-2)(x+3)}',
        why: [
          '2 - 3 is -1, but the middle term is +x.',
          'Multiplied out it gives x^2 - x - 6. The signs are the wrong way round.',
        ],
      },
    },
    {
      lines: ['\\frac{(x-3)(x+3)}{(x-2)(x+3)}', '\\frac{x-3}{x-2}', '\\frac{3}{2} | cancel x'],
      slip: {
        step: 3,
        kind: 'fractions',
        shouldBe: '\\frac{x-3}{x-2}',
        why: [
          'The x is part of a difference on both sides of the bar, it does not cancel.',
          'It was done already on the line before. x = 0 gives 3/2, but x = 1 gives 2.',
        ],
      },
    },
    {
      lines: [
        '\\frac{(x-3)(x+3)}{(x-2)(x+3)}',
        '\\frac{x-3}{x-2}\\cdot\\frac{x+3}{x+3}',
        '\\frac{x-3}{x-2}+1 | the second fraction is 1',
        '\\frac{2x-5}{x-2}',
      ],
      slip: {
        step: 3,
        kind: 'fractions',
        mark: '+1',
        shouldBe: '\\frac{x-3}{x-2}\\cdot1',
        why: ['It is times 1 and not plus 1.', 'A factor that is 1 leaves everything as it was.'],
      },
    },
    {
      lines: ['\\frac{(x-3)(x+3)}{(x-2)(x+3)}', '\\frac{x-3}{x-2} | x is not -3'],
    },
  ],
};
