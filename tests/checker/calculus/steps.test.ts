import { describe, expect, it } from 'vitest';
import type { CheckSettings } from '../../../shared/schemas/verdict.ts';
import handSteps from './hand-steps.json';
import { judgeLines, lettersFor } from './judge-lines.ts';
import madeSteps from './made-steps.json';
import sourcedSteps from './sourced-steps.json';

interface HandStep {
  readonly lines: readonly string[];
  /** One letter a step: holds, fails, undecided. */
  readonly want: string;
  readonly settings?: CheckSettings;
}

describe.each(Object.entries(handSteps as unknown as Record<string, readonly HandStep[]>))(
  '%s, by hand',
  (_, table) => {
    it.each(table.map((row) => [row.lines.join('  |  '), row] as const))('%s', (_text, row) => {
      expect(lettersFor(judgeLines(row.lines, row.settings))).toBe(row.want);
    });
  },
);

describe('steps with a source', () => {
  it.each(sourcedSteps.map((row) => [`${row.lines.join('  |  ')}  (${row.source})`, row] as const))(
    '%s',
    (_text, row) => {
      const letters = lettersFor(judgeLines(row.lines));
      const wanted = row.firstFault === null ? 'h'.repeat(row.lines.length - 1) : 'h'.repeat(row.firstFault - 1) + 'f';
      expect(letters.slice(0, wanted.length)).toBe(wanted);
    },
  );
});

describe('steps made by make_calculus_steps.py with SymPy and mpmath (1500 steps, seed 2)', () => {
  it('rules none of them falsely and leaves at most 1 in 200 open', () => {
    const ruled = madeSteps.map(({ lines, right }) => ({ lines, right, ruling: judgeLines(lines)[0]?.ruling }));
    expect(ruled.filter(({ right, ruling }) => ruling === (right ? 'fails' : 'holds'))).toEqual([]);
    expect(ruled.filter(({ ruling }) => ruling !== 'holds' && ruling !== 'fails').length * 200).toBeLessThanOrEqual(
      ruled.length,
    );
  }, 60_000);
});

describe('evidence', () => {
  it('shows the derivatives where a line is no antiderivative', () => {
    const [step] = judgeLines(['\\int x\\,dx', 'x^2+C']);
    expect(step?.evidence.witness).toEqual({ at: { x: '1' }, above: '1', below: '2' });
  });

  it('notes a missing constant, which is a fault where the task asks for it', () => {
    const lines = ['\\int 2x\\,dx', 'x^2'];
    expect(judgeLines(lines)[0]).toMatchObject({ ruling: 'holds', notes: ['constant'] });
    expect(judgeLines(lines, { constant: true })[0]).toMatchObject({
      ruling: 'fails',
      notes: ['constant'],
      evidence: { meant: 'x^2+C' },
    });
  });

  it('names a point of the curve where dy/dx is wrong', () => {
    const [step] = judgeLines(['x^2+y^2=25', '\\frac{dy}{dx}=\\frac{x}{y}']);
    expect(step?.evidence.witness?.at).toMatchObject({ x: '3' });
    expect(step?.evidence.witness?.below).toBe('false');
  });

  it('calls differentiating both sides one-way', () => {
    const [step] = judgeLines(['x^2+y^2=25', '2x+2y\\frac{dy}{dx}=0']);
    expect(step).toMatchObject({ ruling: 'holds', notes: ['one-way'], evidence: { operation: 'differentiate' } });
  });

  it('says where a logarithm without bars has a value', () => {
    const [step] = judgeLines(['\\int\\frac1x\\,dx', '\\ln x+C']);
    expect(step).toMatchObject({ ruling: 'holds', notes: ['domain'], evidence: { excluded: ['x>0'] } });
  });

  it('gives the same ruling twice', () => {
    const lines = ['\\int_0^1 e^{x^2}\\,dx', '\\frac32'];
    expect(judgeLines(lines)).toEqual(judgeLines(lines));
  });
});
