import type {
  AuthorDerivation,
  AuthorFinding,
  ReadVerdict,
  ReviewAnswer,
  ReviewResult,
} from '../../../shared/schemas/review.ts';

const TEX = ['(x-5)(x+1)-2x(x+3)', '(x-5)(x+1)-2x^2-6x', 'x^2+x-5x+5-2x^2-6x', '-x^2-10x+5'];

export const LINES = TEX.map((tex, number) => ({
  number,
  tex,
  reason: number === 1 ? 'second product out' : '',
  prose: '',
  uses: null,
}));

export const ROUND = {
  id: 'r',
  number: 5,
  stage: 'reviewing',
  className: '10C',
  timeZone: 'Europe/Vienna',
  reviewingEndsAt: '2031-03-06T11:00:00.000Z',
  answeringEndsAt: '2031-03-08T11:00:00.000Z',
  settlesAt: '2031-03-09T11:00:00.000Z',
  settledAt: null,
} as const;

export const TASK = {
  title: 'Two products',
  instructions: '',
  given: TEX[0] ?? '',
  goal: { kind: 'expanded' },
  assumptions: [],
  settings: { numbers: 'real', reversible: false, presentationCounts: false, constantNeeded: false, decimal: 'point' },
} as const;

export const VERDICT: ReadVerdict = {
  outcome: 'faulty',
  firstFault: 2,
  decidedBy: 'checker',
  reason: null,
  steps: [
    { step: 1, state: 'holds', reached: 'proved', notes: [], evidence: {} },
    {
      step: 2,
      state: 'fault',
      reached: 'proved',
      notes: [],
      evidence: {
        witness: { at: { x: '0' }, above: '-5', below: '5' },
        wrongPart: { span: { start: 8, end: 10 }, is: '+5', shouldBe: '-5' },
        mended: { line: 'x^2+x-5x-5-2x^2-6x', changed: [{ start: 8, end: 10 }] },
        mendedEnding: ['x^2+x-5x-5-2x^2-6x', '-x^2-10x-5'],
      },
    },
    { step: 3, state: 'carried', reached: 'proved', notes: [], evidence: {} },
  ],
};

export function review(values: Partial<ReviewAnswer> = {}): ReviewAnswer {
  return {
    as: 'reviewer',
    reviewId: 'v',
    position: 1,
    total: 2,
    round: ROUND,
    task: TASK,
    lines: LINES,
    draft: null,
    draftVersion: 0,
    finding: null,
    setAside: null,
    canEdit: true,
    result: null,
    ...values,
  };
}

export function result(values: Partial<ReviewResult> = {}): ReviewResult {
  return {
    verdict: VERDICT,
    outcome: 'carried',
    points: -20,
    counted: true,
    slipNamed: null,
    termMarked: null,
    rescored: false,
    shouldBe: null,
    contest: { openUntil: '2031-03-16T11:00:00.000Z', mine: null },
    ...values,
  };
}

export function found(values: Partial<AuthorFinding> = {}): AuthorFinding {
  return {
    key: 'k1',
    pick: 2,
    noFault: false,
    markedSpan: { start: 8, end: 10 },
    sure: 'nearly',
    slipKind: 'sign',
    shouldBe: '',
    why: 'Minus five times one stays negative.',
    answer: null,
    outcome: null,
    slipNamed: null,
    termMarked: null,
    ...values,
  };
}

export function derivation(values: Partial<AuthorDerivation> = {}): AuthorDerivation {
  return {
    as: 'author',
    derivationId: 'd',
    round: { ...ROUND, stage: 'answering' },
    task: TASK,
    lines: LINES,
    canAnswer: true,
    findings: [
      found(),
      found({ key: 'k2', pick: null, noFault: true, markedSpan: null, sure: 'a-little', why: 'All is well.' }),
    ],
    settled: null,
    ...values,
  };
}
