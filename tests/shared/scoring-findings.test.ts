import { describe, expect, it } from 'vitest';
import { concludeSteps, judgeFinding, stateOf } from '../../shared/lib/judge-finding.ts';
import { namesInText } from '../../shared/lib/names-in-text.ts';
import { isWithinOneTerm, termsOfLine } from '../../shared/lib/within-one-term.ts';
import { sureWordOf } from '../../shared/schemas/finding.ts';
import type { StepRuling, Verdict } from '../../shared/schemas/verdict.ts';

const settings = { decimal: 'point', numbers: 'real' } as const;

function verdict(...rulings: StepRuling['ruling'][]): Verdict {
  const steps = rulings.map((ruling, i) => ({ step: i + 1, ruling, reached: null, notes: [], evidence: {} }));
  return { ...concludeSteps(steps), steps };
}

const said = { pick: 2, noFault: false, sureness: 5, markedSpan: null, slipKind: null };

describe('the outcome of steps', () => {
  it('is faulty exactly when a step fails and every earlier one holds', () => {
    expect(verdict('holds', 'fails', 'undecided')).toMatchObject({ outcome: 'faulty', firstFault: 2 });
    expect(verdict('undecided', 'fails')).toMatchObject({ outcome: 'undecided', firstFault: null });
    expect(verdict('holds', 'holds')).toMatchObject({ outcome: 'sound', firstFault: null });
  });

  it('never calls a fault behind an undecided step the first', () => {
    const { steps, firstFault } = verdict('undecided', 'fails', 'holds');
    expect(steps.map((step) => stateOf(step, firstFault))).toEqual(['undecided', 'also-fails', 'holds']);
    const faulty = verdict('holds', 'fails', 'holds', 'fails');
    expect(faulty.steps.map((step) => stateOf(step, faulty.firstFault))).toEqual([
      'holds',
      'fault',
      'carried',
      'also-fails',
    ]);
  });
});

describe('a finding against a verdict', () => {
  it('is void while nothing is decided, or where its dispute was never ruled on', () => {
    expect(judgeFinding(said, verdict('holds', 'undecided'), () => true)).toMatchObject({
      outcome: 'void',
      counted: false,
    });
    expect(judgeFinding(said, verdict('holds', 'fails'), () => true, true)).toMatchObject({
      outcome: 'void',
      points: 0,
    });
  });

  it('is right, carried, or not the first', () => {
    const truth = verdict('holds', 'fails', 'holds', 'fails');
    const outcome = (pick: number) => judgeFinding({ ...said, pick }, truth, () => true).outcome;
    expect([1, 2, 3, 4].map(outcome)).toEqual(['not-first', 'right', 'carried', 'not-first']);
  });
});

describe('terms that can be marked', () => {
  const marked = (tex: string) => termsOfLine(tex, settings).map(({ start, end }) => tex.slice(start, end));

  it('are the summands of each side with their signs', () => {
    expect(marked('2x+10-3x-3=24')).toEqual(['2x', '+10', '-3x', '-3', '24']);
  });

  it('are the summands within a side that is one term', () => {
    expect(marked('(x+2)(x-3)=0')).toEqual(['x', '+2', 'x', '-3', '0']);
    expect(marked('\\frac{2x+4}{2}')).toEqual(['2x', '+4', '2']);
  });

  it('are none on a line that cannot be read', () => {
    expect(marked('2x+')).toEqual([]);
  });

  it('hold a mark that does not reach beyond one', () => {
    expect(isWithinOneTerm('2x+10-3x-3=24', { start: 5, end: 8 }, settings)).toBe(true);
    expect(isWithinOneTerm('2x+10-3x-3=24', { start: 2, end: 8 }, settings)).toBe(false);
  });
});

describe('names in a text', () => {
  const names = ['Mira Castellan', 'Bo Lark', 'Zoë Ågren'];

  it('are found by any part of three letters or more, whatever its accents', () => {
    expect(namesInText('I think Mira did it, or Zoe. Castellan’s sign.', names)).toEqual(['Mira', 'Zoe', 'Castellan']);
  });

  it('are not ordinary words in small letters, nor short parts', () => {
    expect(namesInText('A lark sings; Bo is short; the mira is small.', names)).toEqual([]);
  });
});

describe('how sure, as an author reads it', () => {
  it('has fewer words than places', () => {
    expect(Array.from({ length: 9 }, (_, tenths) => sureWordOf(tenths))).toEqual([
      'cannot-tell',
      'a-little',
      'a-little',
      'half',
      'half',
      'half',
      'nearly',
      'nearly',
      'certain',
    ]);
  });
});
