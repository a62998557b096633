import { describe, expect, it } from 'vitest';
import { readLine } from '../../../shared/maths/read.ts';
import { readsAs, wordReadError } from '../../../shared/maths/reads-as.ts';
import { lineInWords } from '../../../shared/maths/words.ts';
import { explainRefusal } from '../../../shared/maths/refusals.ts';

const { raw } = String;

function words(tex: string): string {
  const reading = readLine(tex);
  return reading.ok ? lineInWords(reading.line) : explainRefusal(reading.refusal).code;
}

function refusal(tex: string): string {
  const reading = readLine(tex);
  return reading.ok ? '' : wordReadError(explainRefusal(reading.refusal));
}

describe('a line in words', () => {
  it.each([
    [raw`\frac{x^2+3x}{2}`, 'x squared plus 3 x, over 2'],
    [raw`\frac{1}{x+2}`, '1 over x plus 2, end of fraction'],
    [raw`2(x+1)=3y`, '2 times open bracket x plus 1 close bracket equals 3 y'],
    [raw`\sqrt[3]{-8}`, 'the cube root of minus 8, end of root'],
    [raw`2\frac12`, '2 and 1 over 2'],
    [raw`x=1\text{ or }x\ge 2`, 'x equals 1, or x is greater than or equal to 2'],
    [raw`x\in(-1,3]`, 'x is in the interval from minus 1, left out, to 3, included'],
    [raw`\int_0^1x^2\,dx`, 'the integral from 0 to 1 of x squared, by x'],
    [raw`\lim_{x\to0^+}\frac1x`, 'the limit as x goes to 0 from above of open bracket 1 over x close bracket'],
    [raw`\sum_{k=1}^{n}k`, 'the sum from k equals 1 to n of k'],
    [raw`\log_2x_1`, 'log base 2 of x sub 1'],
    [raw`\frac{d^2y}{dx^2}`, 'the second derivative of y by x'],
    [raw`=2x`, 'which equals 2 x'],
    [raw`\left|\alpha\right|^{n}`, 'open bracket the absolute value of alpha close bracket to the power n'],
  ])('says %s', (tex, said) => {
    expect(words(tex)).toBe(said);
  });
});

describe('what the sheet shows beside a line', () => {
  it('is nothing when the line is read as the eye expects', () => {
    expect(readsAs('x^2+3x=4').kind).toBe('silent');
    expect(readsAs(raw`2\sin x\cos x`).kind).toBe('silent');
  });

  it('is a note when the reading may surprise', () => {
    expect(readsAs('x^23')).toEqual({
      kind: 'note',
      tex: raw`x^2\left(3\right)`,
      words: 'x squared times 3',
      flags: ['power-digits'],
    });
    expect(readsAs(raw`\log x`)).toMatchObject({ kind: 'note', flags: ['log-base'] });
  });

  it('is a question when there are two readings, each in TeX that has only one', () => {
    const shown = readsAs('1/2x');
    if (shown.kind !== 'ask') throw new Error(shown.kind);
    expect(shown.choices).toEqual([
      { tex: raw`\left(1/2\right)x`, words: '1 over 2, x' },
      { tex: raw`1/\left(2x\right)`, words: '1 over 2 x' },
    ]);
    for (const { tex } of shown.choices) expect(readsAs(tex).kind).not.toBe('ask');
  });

  it('is the error where the line cannot be read', () => {
    expect(readsAs('2+')).toMatchObject({
      kind: 'error',
      error: { code: 'missing-operand', span: { start: 2, end: 2 } },
    });
  });
});

describe('an error in words', () => {
  it('says what is wrong, where, and how to mend it', () => {
    expect(refusal('(x+1')).toBe(
      'A bracket is missing at the end of the line. Add a closing bracket “)” so that it is clear what belongs together.',
    );
    expect(refusal(raw`\frac{\placeholder{}}{2}`)).toContain('Something is missing in an empty box.');
    expect(refusal(raw`4x\text{ at }x=3`)).toBe(
      'The words “at” are not read as maths (at character 3). Put them into the reason beside the line.',
    );
    expect(refusal(raw`\foo x`)).toContain(raw`The command \foo is not known here (at character 1).`);
  });
});
