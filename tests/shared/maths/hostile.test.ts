import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { printLine } from '../../../shared/maths/print.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { readsAs, wordReadError } from '../../../shared/maths/reads-as.ts';
import { READ_LIMITS } from '../../../shared/maths/reader.ts';
import { sameLine } from '../../../shared/maths/same.ts';
import { markSpans, selectableParts } from '../../../shared/maths/terms.ts';

const PIECES =
  String.raw`x y 2 3 12 d e i ( ) [ ] { } \left( \right) \left| \right| | ^ _ + - \cdot / = < , ; ! ' \frac \sqrt \sin \ln \log \int \sum_{k=1}^n \lim_{x\to0} dx \text{or} \begin{pmatrix} \end{pmatrix} & \\ \{ \} \in \pm \% . \overline \binom f \left. \right. \pi \, \frac{d}{dx} \cup \text{x} or let \alpha \infty \begin{cases} \end{cases} \dot \text{ \begin 0.`.split(
    ' ',
  );
const soup = fc.array(fc.constantFrom(...PIECES), { maxLength: 60 }).map((pieces) => pieces.join(''));

function checkWhole(tex: string): void {
  const reading = readLine(tex);
  if (reading.ok) {
    const printed = printLine(reading.line);
    const again = readLine(printed);
    const isSame = again.ok ? sameLine(again.line, reading.line) : printed.length > READ_LIMITS.characters;
    expect(isSame).toBe(true);
    markSpans(
      tex,
      selectableParts(tex).map(({ span }) => ({ span, className: 'part' })),
    );
    readsAs(tex);
    return;
  }
  const { span, found } = reading.error;
  expect(tex.slice(span.start, span.end).startsWith(found)).toBe(true);
  expect(wordReadError(reading.error)).toMatch(/\.$/);
}

describe('hostile input', () => {
  it('is read or refused with a place inside the line, whatever the pieces', () => {
    fc.assert(fc.property(soup, checkWhole), { numRuns: 6000, seed: 3 });
  });

  it('is read or refused, whatever the characters', () => {
    fc.assert(fc.property(fc.string({ unit: 'binary', maxLength: 80 }), checkWhole), { numRuns: 2000, seed: 5 });
  });

  const REPEATED = [
    '(',
    '{',
    '[',
    '|',
    '-',
    'x^',
    'x^{',
    '1/',
    'x',
    'x!',
    '\\sin',
    '\\sqrt',
    '9',
    '+x',
    'x,',
    'x=',
    '\\int',
    '\\left(',
    'a|',
    '\\{',
    '\\text{',
    '0.\\dot1',
    '1\\,',
    '\\sum_{k=1}^n',
    '\\frac12',
    '\\frac{',
    '\\lim_{x\\to0}',
    "x'",
    'f(',
    '\\begin{pmatrix}',
    '(x,',
    '\\frac{d}{dx}',
    'sinx',
    '|x|y',
    '[(',
    '(x=1,',
    '\\\\',
    '&',
    '\\left.',
    '{}',
    '^',
    '_',
    '!=',
    '\\pm',
    '\\log_',
    '\\%',
    '.',
  ];
  it.each(REPEATED)('%s over and over is answered at once', (piece) => {
    const tex = piece.repeat(Math.floor(4000 / piece.length));
    for (const line of [tex, `${tex}x`, `x\\in${tex.slice(0, 3900)}`]) {
      const before = performance.now();
      checkWhole(line);
      expect(performance.now() - before).toBeLessThan(1500);
    }
  });

  it('is refused beyond the limits', () => {
    const code = (tex: string) => {
      const reading = readLine(tex);
      return reading.ok ? 'read' : reading.error.code;
    };
    expect(code('x'.repeat(4001))).toBe('too-long');
    expect(code(`${'('.repeat(59)}x${')'.repeat(59)}`)).toBe('read');
    expect(code(`${'('.repeat(61)}x${')'.repeat(61)}`)).toBe('too-deep');
    expect(code('+x'.repeat(1500))).toBe('read');
    expect(code('xy+'.repeat(1300) + '1')).toBe('too-many-nodes');
    expect(code('')).toBe('empty');
  });
});
