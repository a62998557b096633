import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { printLine } from '../../../shared/maths/print.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { readsAs, wordReadError } from '../../../shared/maths/reads-as.ts';
import { READ_LIMITS } from '../../../shared/maths/reader.ts';
import { sameLine } from '../../../shared/maths/same.ts';
import { explainRefusal } from '../../../shared/maths/refusals.ts';
import { markSpans, selectableParts } from '../../../shared/maths/terms.ts';

const PIECES =
  String.raw`x y 2 3 12 d e i ( ) [ ] { } \left( \right) \left| \right| | ^ _ + - \cdot / = < , ; ! ' \frac \sqrt \sin \ln \log \int \sum_{k=1}^n \lim_{x\to0} dx \text{or} \begin{pmatrix} \end{pmatrix} & \\ \{ \} \in \pm \% . \overline \binom f \left. \right. \pi \, \frac{d}{dx} \cup \text{x} or let \alpha \infty \begin{cases} \end{cases} \dot \text{ \begin 0.`.split(
    ' ',
  );
const soup = fc.array(fc.constantFrom(...PIECES), { maxLength: 60 }).map((pieces) => pieces.join(''));

/** What is wrong with the answer to this text; null when nothing is. */
function complaint(tex: string): string | null {
  const reading = readLine(tex);
  if (!reading.ok) {
    const { span, found } = explainRefusal(reading.refusal);
    if (!wordReadError(explainRefusal(reading.refusal)).endsWith('.')) return 'not worded';
    return tex.slice(span.start, span.end).startsWith(found) ? null : 'misplaced error';
  }
  const parts = selectableParts(tex).map(({ span }) => ({ span, className: 'part' }));
  if (markSpans(tex, parts).length < tex.length / 2) return 'lost text';
  if (readsAs(tex).kind === 'error') return 'two answers';
  const printed = printLine(reading.line);
  const again = readLine(printed);
  if (!again.ok) return printed.length > READ_LIMITS.characters ? null : `printed as ${printed}`;
  return sameLine(again.line, reading.line) ? null : `printed as ${printed}`;
}

describe('hostile input', () => {
  it('is read or refused with a place inside the line, whatever the pieces', () => {
    expect(
      fc.check(
        fc.property(soup, (tex) => complaint(tex) === null),
        { numRuns: 6000, seed: 3 },
      ).counterexample,
    ).toBeNull();
  });

  it('is read or refused, whatever the characters', () => {
    const text = fc.string({ unit: 'binary', maxLength: 80 });
    expect(
      fc.check(
        fc.property(text, (tex) => complaint(tex) === null),
        { numRuns: 2000, seed: 5 },
      ).counterexample,
    ).toBeNull();
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
      expect(complaint(line)).toBeNull();
      expect(performance.now() - before).toBeLessThan(1500);
    }
  });

  it('is refused beyond the limits', () => {
    const code = (tex: string) => {
      const reading = readLine(tex);
      return reading.ok ? 'read' : explainRefusal(reading.refusal).code;
    };
    expect(code('x'.repeat(4001))).toBe('too-long');
    expect(code(`${'('.repeat(59)}x${')'.repeat(59)}`)).toBe('read');
    expect(code(`${'('.repeat(61)}x${')'.repeat(61)}`)).toBe('too-deep');
    expect(code('+x'.repeat(1500))).toBe('read');
    expect(code('xy+'.repeat(1300) + '1')).toBe('too-many-nodes');
    expect(code('')).toBe('empty');
  });
});
