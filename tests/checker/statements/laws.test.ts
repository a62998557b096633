import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

const equations = [
  '\\sqrt{2x+7}=x-4',
  '|3x-2|=x+6',
  '\\frac{3}{x-1}+\\frac{2}{x+4}=1',
  'x^3-4x^2+x+6=0',
  'x^2-2x-5=0',
  'e^{2x}-5e^x+6=0',
  '\\ln(x-1)+\\ln(x+3)=\\ln 12',
  '2^{x+1}=3^{x-1}',
  'x^2(x-3)=4x',
  '\\frac{x^2-9}{x-3}=2x',
  'x^4-5x^2+4=0',
  '\\sqrt{x}=x-2',
];
const equation = fc.constantFrom(...equations);
const added = fc.constantFrom('x', '3x^2', '7', '-x^3+2', '\\frac{x}{2}', 'e^x', '\\sin x', '|x|');

function sidesOf(tex: string): [string, string] {
  const [left, right] = tex.split('=') as [string, string];
  return [left, right];
}

function rule(lines: readonly string[]): string | undefined {
  return checkDerivation({ lines, assume: [], settings: { reversible: true } }).steps[0]?.ruling;
}

describe('a true rewriting of an equation', () => {
  it('holds when the same expression with values everywhere is added to both sides', () => {
    fc.assert(
      fc.property(equation, added, (tex, extra) => {
        const [left, right] = sidesOf(tex);
        expect([tex, extra, rule([tex, `${left}+(${extra})=${right}+(${extra})`])]).toEqual([tex, extra, 'holds']);
      }),
      { numRuns: 60 },
    );
  }, 60_000);

  it('holds when the sides are swapped or multiplied by a number that is not zero', () => {
    fc.assert(
      fc.property(
        equation,
        fc.integer({ min: -9, max: 9 }).filter((n) => n !== 0),
        (tex, n) => {
          const [left, right] = sidesOf(tex);
          expect(rule([tex, `${right}=${left}`])).toBe('holds');
          expect(rule([tex, `${n}(${left})=${n}(${right})`])).toBe('holds');
        },
      ),
      { numRuns: 40 },
    );
  }, 60_000);

  it('is never ruled otherwise for another letter', () => {
    fc.assert(
      fc.property(equation, equation, (above, below) => {
        const rename = (tex: string): string => tex.replace(/x/g, 'w').replaceAll('ewp', 'exp');
        expect(rule([rename(above), rename(below)])).toBe(rule([above, below]));
      }),
      { numRuns: 40 },
    );
  }, 60_000);

  it('fails when one side is changed by a number, and names a value that shows it', () => {
    for (const tex of equations) {
      const [left, right] = sidesOf(tex);
      const verdict = checkDerivation({
        lines: [tex, `${left}+1=${right}`],
        assume: [],
        settings: { reversible: true },
      });
      expect([tex, verdict.outcome]).toEqual([tex, 'faulty']);
      expect(verdict.steps[0]?.evidence.witness).toBeDefined();
    }
  });
});
