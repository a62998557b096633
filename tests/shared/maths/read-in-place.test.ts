import { describe, expect, it } from 'vitest';
import type { Line } from '../../../shared/maths/expression.ts';
import { printLine } from '../../../shared/maths/print.ts';
import { DEFAULT_READ_SETTINGS } from '../../../shared/maths/read.ts';
import { readInPlace } from '../../../shared/maths/read-in-place.ts';
import { explainRefusal } from '../../../shared/maths/refusals.ts';

const { raw } = String;

/** How the last line is read behind the others: as it is shown, its flags after `!` and other ways after `?`. */
function shownBehind(...lines: readonly string[]): string {
  const before: Line[] = [];
  let shown = '';
  for (const tex of lines) {
    const reading = readInPlace(tex, DEFAULT_READ_SETTINGS, before);
    if (!reading.ok) return explainRefusal(reading.refusal).code;
    before.push(reading.line);
    shown = [
      printLine(reading.line),
      ...reading.flags.map((flag) => `!${flag}`),
      ...reading.alternatives.map((other) => `? ${printLine(other)}`),
    ].join(' ');
  }
  return shown;
}

describe('a line behind others', () => {
  it.each([
    [['x^2-2x-3=0', 'x_1=3, x_2=-1'], raw`x=3\text{ or }x=-1 !comma-or !numbered-values`],
    [['x^2-2x-3=0', 'x_1=3'], 'x=3 !numbered-values'],
    [['x_1+x_2=2', 'x_1=3, x_2=-1'], raw`x_1=3\text{ and }x_2=-1 !comma-and`],
    [['x^2+x=0', raw`x=0\quad x=-1`], raw`x=0\text{ or }x=-1 !comma-or`],
    [[raw`x=0\quad x=-1`], raw`x=0\text{ or }x=-1 !comma-or`],
    [['y=x^2, y=x+2'], raw`y=x^2\text{ and }y=x+2 !comma-and`],
    [['y^2=x^2', 'y=x, y=-x'], raw`y=x\text{ or }y=-x !comma-or`],
    [['x^2-4=0', 'x-2=0, x+2=0'], raw`x-2=0\text{ or }x+2=0 !comma-or ? x-2=0\text{ and }x+2=0`],
    [['x^2-4=0', raw`x-2=0\text{ and }x+2=0`], raw`x-2=0\text{ and }x+2=0`],
    [['x^2=4', 'x=2'], 'x=2'],
  ])('%j reads as %s', (lines, shown) => {
    expect(shownBehind(...lines)).toBe(shown);
  });

  it('has its errors in the places of what was written', () => {
    const reading = readInPlace(raw`x=0\quad x=`, DEFAULT_READ_SETTINGS, []);
    expect(!reading.ok && explainRefusal(reading.refusal)).toMatchObject({
      code: 'missing-operand',
      span: { start: 11, end: 11 },
    });
  });
});
