import { describe, expect, it } from 'vitest';
import { printLine } from '../../../shared/maths/print.ts';
import { readLine } from '../../../shared/maths/read.ts';
import type { Evidence } from '../../../shared/schemas/verdict.ts';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';
import { handMends } from './hand-mends.ts';
import document from './mended-lines.json';

const r = String.raw;

/** One spelling for lines that read the same. */
function canonical(tex: string, numbers: 'real' | 'complex' = 'real'): string {
  const reading = readLine(tex, { numbers, decimal: 'point', functions: [] });
  return reading.ok ? printLine(reading.line) : `not read: ${tex}`;
}

function evidenceOf(lines: readonly string[], step: number): Evidence {
  const verdict = checkDerivation({ lines, assume: [], settings: {} });
  expect(verdict.firstFault).toBe(step);
  return verdict.steps[step - 1]?.evidence ?? {};
}

describe('the evidence of a first fault', { timeout: 30_000 }, () => {
  it.each(document.rows)('$id: the line is mended as a person would', ({ lines, firstFault, mended }) => {
    expect(canonical(evidenceOf(lines, firstFault).mended?.line ?? '')).toBe(canonical(mended));
  });

  it('carries the later lines through, or leaves the ending out', () => {
    const endings = document.rows.map(({ lines, firstFault, ending }) => {
      const found = evidenceOf(lines, firstFault).mendedEnding;
      return { found: found?.map((tex) => canonical(tex)), expected: ending.map((tex) => canonical(tex)) };
    });
    for (const { found, expected } of endings) if (found) expect(found).toEqual(expected);
    expect(endings.filter(({ found }) => found).length).toBeGreaterThanOrEqual(31);
  });

  it('says which part is wrong, with its sign and its place', () => {
    const tex = '3x-7-9x-21';
    const { wrongPart, mended, difference, slip } = evidenceOf(['3x-7-3(3x-7)', tex], 1);
    expect(wrongPart).toEqual({ span: { start: 7, end: 10 }, is: '-21', shouldBe: '+21' });
    expect(mended).toEqual({ line: '3x-7-9x+21', changed: [{ start: 7, end: 8 }] });
    expect(difference).toBe('42');
    expect(slip?.kind).toBe('sign');
  });

  it.each([
    ['one side', '5(x-2)=3x+4', '5x-2=3x+4', '-2', '-10'],
    ['a term of a numerator', r`\frac{4}{n}-\frac{n-2}{n}`, r`\frac{4-n-2}{n}`, '-2', '+2'],
    ['a denominator', r`\frac{d}{dx}\frac{x}{x^2+1}`, r`\frac{x^2+1-x\cdot2x}{x^2+1}`, 'x^2+1', '(x^2+1)^2'],
    ['a factor', '(x-2)(x+7)', '(x+2)(x+7)', '+2', '-2'],
    ['inside a limit', r`\lim_{x\to2}\frac{(x-2)(x+2)}{x-2}`, r`\lim_{x\to2}(x-2)`, '-2', '+2'],
    ['inside brackets of evaluation', r`\int_0^2(3x^2+1)\,dx`, '[x^3+1]_0^2', '+1', '+x'],
    ['one case', '2x-1=7\\text{ or }2x-1=-7', r`2x=8\text{ or }2x=-8`, '-8', '-6'],
    ['one value of a system', r`2x+y=7,\ x-y=2`, r`x=3,\ y=-1`, '-1', '1'],
    ['a rounded value', r`7\pi`, r`\approx21.98`, '21.98', '21.99'],
  ])('says what is wrong in %s', (_, above, below, is, shouldBe) => {
    const { wrongPart } = evidenceOf([above, below], 1);
    expect(wrongPart).toMatchObject({ is, shouldBe });
    expect(below.slice(wrongPart?.span.start, wrongPart?.span.end)).toBe(is);
  });

  it('names no single part where a term is missing or several are wrong', () => {
    expect(evidenceOf(['(x+3)^2', 'x^2+9'], 1)).toMatchObject({ mended: { line: 'x^2+6x+9' }, difference: '6x' });
    expect(evidenceOf(['(x+3)^2', 'x^2+9'], 1).wrongPart).toBeUndefined();
  });

  it.each([
    ['x^2=49', 'x=7', 'x=\\pm7'],
    ['(x+5)^2=16', 'x+5=4', 'x+5=\\pm4'],
    ['\\frac{2}{x}=\\frac{3}{x+1}', '2x+1=3x', '2x+2=3x'],
    ['\\int_0^1(x^2+x)\\,dx', '\\frac13+1', '\\frac13+\\frac12'],
    ['\\frac{x}{2}+\\frac{x}{3}=5', '\\frac{2x}{5}=5', '\\frac{5x}{6}=5'],
    ['x^2=5x', 'x=5', 'x=0\\text{ or }x=5'],
    ['\\sqrt{x+6}=x', 'x=-2\\text{ or }x=3', 'x=3'],
    ['-2x<10', 'x<-5', 'x>-5'],
    ['|y-4|<3', 'y<7', '1<y<7'],
    ['2x+6=14', 'x+6=7', 'x+3=7'],
    ['n^2+8n+12', '(n+3)(n+4)', '(n+2)(n+6)'],
    ['\\int x\\cos x\\,dx', '\\frac12x^2\\sin x+C', 'x\\sin x+\\cos x+C'],
    ['\\sqrt{50}+\\sqrt{8}', '5\\sqrt2+4\\sqrt2', '5\\sqrt2+2\\sqrt2'],
    ['y=\\frac{x}{4}', 'x=\\frac{y}{4}', 'x=4y'],
  ])('mends %s to %s', (above, below, expected) => {
    expect(canonical(evidenceOf([above, below], 1).mended?.line ?? '')).toBe(canonical(expected));
  });
});

describe('derivations over all topics', { timeout: 120_000 }, () => {
  const rows = handMends.map((row, k) => {
    const settings = { numbers: row.numbers, ...(row.goal ? { unknown: row.goal } : {}) };
    const verdict = checkDerivation({ lines: row.lines, assume: row.assume, settings });
    const spelled = (lines: readonly string[]): string[] => lines.map((tex) => canonical(tex, row.numbers));
    const { mended, mendedEnding } = verdict.steps[row.fault - 1]?.evidence ?? {};
    const rest = row.lines.slice(0, row.fault);
    const check = (lines: readonly string[]) =>
      checkDerivation({ lines: [...rest, ...lines], assume: row.assume, settings });
    return { k, row, verdict, mended, mendedEnding, spelled, check };
  });

  it('have the fault where they are said to, and what should have been is sound', () => {
    for (const { k, row, verdict, check } of rows) {
      expect(verdict.firstFault, `row ${k}`).toBe(row.fault);
      expect(check(row.ending).outcome, `row ${k}`).toBe('sound');
    }
  });

  it('are mended as a person would: at least 9 of 10', () => {
    const right = rows.filter(
      ({ row, mended, spelled }) => mended && spelled([mended.line])[0] === spelled(row.ending)[0],
    );
    expect(right.length / rows.length).toBeGreaterThanOrEqual(0.95);
  });

  it('are carried on to the end where that is said: sound always, and as a person would mostly', () => {
    const found = rows.filter(({ mendedEnding }) => mendedEnding);
    for (const { k, mendedEnding, check } of found) expect(check(mendedEnding ?? []).outcome, `row ${k}`).toBe('sound');
    const right = found.filter(
      ({ row, mendedEnding, spelled }) => String(spelled(mendedEnding ?? [])) === String(spelled(row.ending)),
    );
    expect(right.length / rows.length).toBeGreaterThanOrEqual(0.88);
  });

  it('read as a person writes: no zero put in, no factor 1, no two signs, no sign in front', () => {
    for (const { mended, mendedEnding, row } of rows) {
      for (const line of [mended?.line ?? '', ...(mendedEnding ?? [])].filter((tex) => !row.lines.includes(tex))) {
        expect(line).not.toMatch(/(^|[=({])[+]|[+-]\s*[+-]|(^|[^0-9.^_{])1\\cdot|(^|[=({])0[+-]/);
      }
    }
  });
});
