/** Who plays the round of the story, what they write, and what is found on it. All of it is invented. */

export interface Finding {
  /** A step, 'none' for no fault, null for not being able to tell. */
  readonly pick: number | 'none' | null;
  /** How sure, in places from 0 to 8. */
  readonly sure: number;
  readonly kind?: string;
  readonly shouldBe?: string;
  readonly why: string;
  /** What the author answers: a reason contests it. */
  readonly answer?: 'accept' | { readonly contest: string };
  /** What the reviewer reads when the round is settled. */
  readonly headline: string;
  readonly points: string;
}

export interface Author {
  readonly name: string;
  readonly lines: readonly string[];
  readonly verdict: string;
  /** By whoever comes first, and by whoever comes second. */
  readonly findings: readonly [Finding, Finding];
}

export const GIVEN = '(x+3)(x-5)-x(x-4)';
export const TASK = 'Two products, one taken away';
export const ADMIN = 'Odile Marchetti';
export const TEACHER = 'Bram Stavenga';

/** The value of the given, and of the line where Milo slips, by hand. */
export const valueOfGiven = (x: number) => (x + 3) * (x - 5) - x * (x - 4);
export const valueOfSlip = (x: number) => x ** 2 - 5 * x + 3 * x - 15 - x ** 2 - 4 * x;

export const MENDED = ['x^2-5x+3x-15-x^2+4x', '2x-15'] as const;

/**
 * Points for derivations of two steps (n = 2), from the formula of the points: b = 3/8 where there is no fault and 7/8
 * where a step is it. Certain is s = 0.8: right earns 100 b (2s - s^2), so +36 and +84.
 */
export const AUTHORS: readonly Author[] = [
  {
    name: 'Signe Okafor',
    lines: ['x^2-5x+3x-15-x^2+4x', '2x-15'],
    verdict: 'Every step follows.',
    findings: [
      {
        pick: 'none',
        sure: 8,
        why: 'Put x = 2 in: minus eleven every time.',
        headline: 'You saw that every step follows.',
        points: '+36',
      },
      {
        pick: 2,
        sure: 6,
        kind: 'Unlike terms put together',
        why: 'The squares cannot just go away.',
        answer: { contest: 'One square is added and one is taken away, so nothing of them is left.' },
        headline: 'You marked step 2; there is no fault.',
        // 100 (3/8 * 0.84 - 2 * 0.6 * 0.4 * (1 + 1/4 - 1/2) - 2 * 0.36) = -76.5, half away from zero
        points: '−77',
      },
    ],
  },
  {
    name: 'Milo Brandvold',
    lines: ['x^2-5x+3x-15-x^2-4x', '-6x-15'],
    verdict: 'The first fault is step 1.',
    findings: [
      {
        pick: 1,
        sure: 8,
        kind: 'Wrong sign',
        shouldBe: 'x^2-5x+3x-15-x^2+4x',
        why: 'Minus x times minus 4 is plus 4x.',
        answer: { contest: 'There is a minus before the x, so all that follows is taken away.' },
        headline: 'You found the first fault: step 1.',
        points: '+84',
      },
      {
        pick: 2,
        sure: 4,
        why: 'The end should be 2x - 15.',
        answer: 'accept',
        headline: 'You marked a carried step; the first fault is step 1.',
        // 100 (7/8 * 0.64 - 2 * 0.4 * 0.6 * 1 - 2 * 0.16) = -24
        points: '−24',
      },
    ],
  },
  {
    name: 'Inaya Castelo',
    lines: ['x^2-2x-15-x^2+4x', '2x+15'],
    verdict: 'The first fault is step 2.',
    findings: [
      {
        pick: 2,
        sure: 8,
        kind: 'Miscopied or miscounted',
        shouldBe: '2x-15',
        why: 'The 15 was taken away and then it is added.',
        answer: 'accept',
        headline: 'You found the first fault: step 2.',
        points: '+84',
      },
      {
        pick: 'none',
        sure: 8,
        why: 'I followed each term and they are all there.',
        headline: 'You said there is no fault; the first fault is step 2.',
        // 100 (7/8 * 0.96 - 2 * 0.8 * 0.2 * (1 + 1/2 - 1/4) - 2 * 0.64) = -84
        points: '−84',
      },
    ],
  },
  {
    name: 'Piet Harrowgate',
    // The bracket is never closed: nobody can say what is taken away.
    lines: ['x^2-2x-15-(x^2-4x', '2x-15'],
    verdict: 'The first fault is step 1.',
    findings: [
      {
        pick: 1,
        sure: 8,
        kind: 'A bracket multiplied out wrongly',
        why: 'The bracket has no end, so line 1 says nothing.',
        answer: 'accept',
        headline: 'You found the first fault: step 1.',
        points: '+84',
      },
      {
        pick: null,
        sure: 0,
        why: 'I do not know how line 1 is meant.',
        headline: 'You could not tell; the first fault is step 1.',
        points: '0',
      },
    ],
  },
  {
    name: 'Lumi Szabo',
    lines: ['x^2-2x-15-x^2+4x', '2x-15'],
    verdict: 'Every step follows.',
    findings: [
      {
        pick: 'none',
        sure: 8,
        why: 'Every term is where it should be.',
        headline: 'You saw that every step follows.',
        points: '+36',
      },
      {
        pick: 'none',
        sure: 8,
        why: 'Both lines give minus eleven at x = 2.',
        headline: 'You saw that every step follows.',
        points: '+36',
      },
    ],
  },
];

/** What Lumi hands in first, and takes back. */
export const FIRST_TRY = ['x^2-2x-15-x^2-4x', '-6x-15'] as const;

export const RULINGS = {
  contested: 'Minus x times minus 4 is plus 4x: the minus stands before both.',
  undecided: 'Without the end of the bracket line 1 does not follow from the given.',
} as const;
