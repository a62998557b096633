import katex from 'katex';
import { describe, expect, it } from 'vitest';
import { markSpans, selectableParts } from '../../../shared/maths/terms.ts';
import caseLines from './case-lines.json' with { type: 'json' };
import { READINGS } from './reading-table.ts';

function render(tex: string): string {
  return katex.renderToString(tex, { trust: true, strict: 'ignore', throwOnError: true });
}

describe('parts to mark', () => {
  it('are sides, signed terms and factors, in reading order and outer ones first', () => {
    expect(selectableParts('2x-3=\\frac{y}{4}').map(({ tex }) => tex)).toEqual([
      '2x-3',
      '2x',
      '2',
      'x',
      '-3',
      '\\frac{y}{4}',
      'y',
      '4',
    ]);
  });

  it('are none where the line cannot be read', () => {
    expect(selectableParts('2+')).toEqual([]);
  });
});

describe('marking', () => {
  it('wraps a term with its sign and keeps the spacing of the sign', () => {
    expect(markSpans('3x^2-6x', [{ span: { start: 4, end: 7 }, className: 'wrong' }])).toBe(
      '3x^2{\\htmlClass{wrong}{{}-6x}}',
    );
  });

  it('leaves out a mark that would cut a group or a command in two', () => {
    expect(markSpans('\\frac{1}{2}', [{ span: { start: 6, end: 10 }, className: 'wrong' }])).toBe('\\frac{1}{2}');
    expect(markSpans('\\alpha x', [{ span: { start: 2, end: 8 }, className: 'wrong' }])).toBe('\\alpha x');
    expect(markSpans('x+1', [{ span: { start: 0, end: 1 }, className: 'a}{' }])).toBe('x+1');
  });

  it('leaves out the later of two marks that overlap', () => {
    const marks = [
      { span: { start: 0, end: 3 }, className: 'one' },
      { span: { start: 2, end: 5 }, className: 'two' },
    ];
    expect(markSpans('a+b+c', marks)).toBe('{\\htmlClass{one}{a+b}}+c');
  });

  it('gives TeX that KaTeX renders for every part of many lines, alone and all at once', { timeout: 30_000 }, () => {
    const lines = [...READINGS.map(([tex]) => tex), ...caseLines.flatMap((group) => group.lines.slice(0, 2))];
    for (const tex of lines) {
      const parts = selectableParts(tex);
      for (const { span } of parts) {
        const marked = markSpans(tex, [{ span, className: 'part' }]);
        expect(marked).toContain('\\htmlClass');
        expect(render(marked)).toContain('enclosing part');
      }
      if (parts.length > 0)
        render(
          markSpans(
            tex,
            parts.map(({ span }) => ({ span, className: 'part' })),
          ),
        );
    }
  });
});
