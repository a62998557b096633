import { describe, expect, it } from 'vitest';
import { edgeStates, stepWords, verdictHeadline, type Sentence } from '../../shared/lib/step-words.ts';
import type { StepRuling } from '../../shared/schemas/verdict.ts';

function ruling(step: number, values: Partial<StepRuling> = {}): StepRuling {
  return { step, ruling: 'holds', reached: 'proved', notes: [], evidence: {}, ...values };
}
const flat = (sentence: Sentence | undefined) =>
  (sentence ?? []).map((part) => (typeof part === 'string' ? part : `$${part.tex}$`)).join('');

describe('the edge', () => {
  it('carries what follows the first fault, and sets a further fault apart', () => {
    const steps = [ruling(1), ruling(2, { ruling: 'fails' }), ruling(3), ruling(4, { ruling: 'fails' })];
    expect(edgeStates({ firstFault: 2, steps })).toEqual(['holds', 'fault', 'carried', 'also-fails']);
  });

  it('calls no fault the first behind an undecided step', () => {
    const steps = [ruling(1, { ruling: 'undecided' }), ruling(2, { ruling: 'fails' })];
    expect(edgeStates({ firstFault: null, steps })).toEqual(['undecided', 'also-fails']);
  });
});

describe('the headline', () => {
  it('names the first fault, or says that every step follows', () => {
    expect(verdictHeadline({ outcome: 'faulty', firstFault: 3, steps: [] })).toBe('The first fault is step 3.');
    expect(verdictHeadline({ outcome: 'sound', firstFault: null, steps: [] })).toBe('Every step follows.');
  });

  it('names the undecided steps', () => {
    const steps = [1, 2, 3].map((step) => ruling(step, { ruling: 'undecided' }));
    expect(verdictHeadline({ outcome: 'undecided', firstFault: null, steps })).toBe('Steps 1, 2 and 3 are undecided.');
  });
});

describe('the evidence in words', () => {
  it('gives both values at the witness', () => {
    const faulty = ruling(2, {
      ruling: 'fails',
      evidence: { witness: { at: { x: '1', y: '2' }, above: '-12', below: '4' } },
    });
    expect(flat(stepWords(faulty, 'fault').evidence[0])).toBe(
      'At $x=1$ and $y=2$ the line above is $-12$, this one is $4$.',
    );
  });

  it('says true and not true of statements', () => {
    const faulty = ruling(1, {
      ruling: 'fails',
      evidence: { witness: { at: { x: '3' }, above: 'true', below: 'false' } },
    });
    expect(flat(stepWords(faulty, 'fault').evidence[0])).toBe('At $x=3$ the line above is true, this one is not true.');
  });

  it('names lost and gained solutions', () => {
    const faulty = ruling(1, { ruling: 'fails', evidence: { lost: ['x=0'], gained: ['x=2', 'x=-2'] } });
    const [lost, gained] = stepWords(faulty, 'fault').evidence;
    expect(flat(lost)).toBe('$x=0$ solves the line above, but not this one: it was lost.');
    expect(flat(gained)).toBe('$x=2$ and $x=-2$ solve this line, but not the line above: they were gained.');
  });

  it('says why a step is undecided, and where a line could not be read', () => {
    const open = ruling(1, { ruling: 'undecided', reached: null, evidence: { reason: 'not-covered' } });
    expect(flat(stepWords(open, 'undecided').evidence[0])).toBe('The checker does not rule on this kind of line.');
    const unread = { line: 2, code: 'missing-bracket', place: { start: 0, end: 1 }, found: '(', expected: [')'] };
    const other = ruling(2, { ruling: 'undecided', reached: null, evidence: { reason: 'not-read', error: unread } });
    expect(flat(stepWords(other, 'undecided').evidence[0])).toBe('Line 2 could not be read at “(”.');
  });

  it('adds the conditions to a note on the domain', () => {
    const noted = ruling(1, { notes: ['domain'], evidence: { excluded: ['x \\ne 2'] } });
    expect(stepWords(noted, 'holds').notes.map(flat)[1]).toBe('Here it has to be said that $x \\ne 2$.');
  });
});
