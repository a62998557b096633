import { describe, expect, it } from 'vitest';
import { namesInWords } from '../../api/features/derivations/names-in-words.ts';
import { writingWindow } from '../../api/features/derivations/writing-window.ts';
import { GRACE_MS } from '../../shared/lib/round-times.ts';
import { givenLine, linesOf } from '../../shared/schemas/sheet.ts';
import { prose, sheet, step } from '../support/sheets.ts';

describe('names of the class list in an author’s words', () => {
  const list = ['Ana Brandão', 'Li Wu', 'Hanno Pell'];

  it.each([
    ['by first name, and the surname is not told', 'as hanno showed', ['hanno']],
    ['by surname, whatever its accents', 'see Brandao', ['Brandao']],
    ['once, as they were written', 'Ana, ANA and Ana’s', ['Ana', 'ANA']],
    ['not inside another word', 'analysis and bananas', []],
    ['not by parts of two letters', 'li and wu', []],
  ])('are found %s', (_how, words, found) => {
    expect(namesInWords(list, [words])).toEqual(found);
  });
});

describe('the lines of a sheet', () => {
  it('carry the words above them, and leave out what holds no maths', () => {
    const lines = linesOf(
      sheet(prose('First.'), step('a'), step(' ', 'only a reason'), prose('Then'), step('b', 'r')),
      [givenLine('g')],
    );
    expect(lines.map(({ tex }) => tex)).toEqual(['g', 'a', 'b']);
    expect(lines.map(({ prose: words }) => words)).toEqual(['', 'First.', 'only a reason\nThen']);
  });

  it('name only lines that stand above', () => {
    const b = step('b');
    const c = step('c', '', ['given', b.attrs.stepId]);
    const a = step('a', '', [c.attrs.stepId]);
    expect(linesOf(sheet(a, b, c), [givenLine('g')]).map(({ uses }) => uses)).toEqual([null, null, null, [0, 2]]);
  });
});

describe('the time for writing', () => {
  const writingEndsAt = new Date('2031-03-03T12:00:00Z');
  const after = (ms: number) => new Date(writingEndsAt.getTime() + ms);
  const round = { stage: 'writing', writingEndsAt, lateRule: 'closed', lateDealtAt: null } as const;

  it('ends two minutes after its end, to the millisecond', () => {
    expect(writingWindow(round, null, after(GRACE_MS))).toMatchObject({ open: true, late: false });
    expect(writingWindow(round, null, after(GRACE_MS + 1))).toMatchObject({ open: false, late: true });
  });

  it('is never shortened by an extension', () => {
    expect(writingWindow(round, after(-60_000), after(0)).endsAt).toEqual(writingEndsAt);
  });

  it('is over once the round answers, whatever the late rule', () => {
    const answering = { ...round, stage: 'answering', lateRule: 'late-batch' } as const;
    expect(writingWindow(answering, after(9_000_000), after(0)).open).toBe(false);
  });
});
