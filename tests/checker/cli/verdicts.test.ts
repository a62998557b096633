import { describe, expect, it } from 'vitest';
import { explainVerdict } from '../../../api/checker/cli/explain.ts';
import { parseDerivationLine } from '../../../api/checker/cli/derivation-line.ts';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

describe('a line of the command', () => {
  it('is a derivation with its settings', () => {
    const parsed = parseDerivationLine(
      '{"id":"a","lines":["x+x","2x"],"assume":["x>0"],"settings":{"reversible":true}}',
    );
    expect(parsed).toEqual({
      ok: true,
      id: 'a',
      input: { lines: ['x+x', '2x'], assume: ['x>0'], settings: { reversible: true } },
    });
  });

  it.each([
    ['no JSON', null],
    ['{"id":7,"lines":[3]}', 7],
    ['{"id":"b"}', 'b'],
    ['[]', null],
    ['{"id":"c","lines":["x"],"settings":{"numbers":"natural"}}', 'c'],
  ])('that is wrong (%s) says so with its id', (text, id) => {
    const parsed = parseDerivationLine(text);
    expect(parsed).toMatchObject({ ok: false, id });
  });
});

describe('a verdict for people', () => {
  it('names the first fault, what was lost and where to try', () => {
    const input = { lines: ['x^2=7x', 'x=7'], assume: [], settings: {} };
    const text = explainVerdict(input, checkDerivation(input));
    expect(text).toContain('The first fault is step 1.');
    expect(text).toContain('0 solves the line above, but not this one: it was lost.');
    expect(text).toContain('At x=0 the line above is true, this one is not true.');
  });

  it('tell people the slip, the mended line and the ending', () => {
    const input = { lines: ['(x+5)^2-x^2', 'x^2+25-x^2', '25'], assume: [], settings: {} };
    const text = explainVerdict(input, checkDerivation(input));
    expect(text).toContain('Nearest to what was written, this would follow: x^2+10x+25-x^2.');
    expect(text).toContain('From there on: 10x+25');
    expect(text).toMatch(/What likely happened: [a-z ]*square/);
    expect(text).toContain('Step 2 follows from its own line above, which carries the fault on.');
  });
});
