import { describe, expect, it } from 'vitest';
import { compare, verdictOf } from './reading.ts';
import type { Setting } from './reading.ts';

const r = String.raw;

describe('roots and bars over the reals', () => {
  it.each<[string, string, string, Setting]>([
    [r`\sqrt{(x-3)^2}`, 'x-3', 'different', {}],
    [r`\sqrt{(x-3)^2}`, 'x-3', 'equal', { assume: ['x>3'] }],
    [r`\sqrt{(x-3)^2}`, '|x-3|', 'equal', {}],
    [r`\sqrt{x^2y^2}`, 'xy', 'equal', { assume: ['x<0', 'y<0'] }],
    ['|x-100|', '100-x', 'different', {}],
    ['|x-1000000|', '1000000-x', 'different', {}],
    [r`|(x-100)(x-101)|`, '(x-100)(x-101)', 'different', {}],
    ['(-8)^{1/3}', '-2', 'equal', {}],
    ['(-8)^{2/6}', '-2', 'equal', {}],
    [r`\sqrt[4]{x^4}`, 'x', 'different', {}],
    [r`\sqrt[6]{x^2}`, r`\sqrt[3]{x}`, 'different', {}],
    [r`x^{1/2}x^{1/3}`, 'x^{5/6}', 'equal', {}],
    [r`\arcsin(\sin x)`, 'x', 'different', {}],
    [r`\lfloor x\rfloor+1`, r`\lceil x\rceil`, 'different', {}],
    [r`(x^2)^{1/2}`, 'x', 'different', {}],
    ['|x|^n', 'x^n', 'different', { whole: ['n'] }],
    ['x^n x', 'x^{n+1}', 'equal', { whole: ['n'] }],
    [r`\cos(n\pi)`, '(-1)^n', 'equal', { whole: ['n'] }],
  ])('%s to %s: %s', (above, below, verdict, setting) => {
    expect(verdictOf(above, below, setting)).toBe(verdict);
  });
});

describe('functions of the school', () => {
  it.each<[string, string, string, Setting]>([
    [r`\sin(x+2\pi n)`, r`\sin x`, 'equal', { whole: ['n'] }],
    [r`\sin(x+2\pi n)`, r`\sin x`, 'undecided no-agreed-meaning', {}],
    [r`\sqrt{1-\sin^2x}`, r`\cos x`, 'different', {}],
    [r`\sqrt{1-\sin^2x}`, r`|\cos x|`, 'equal', {}],
    [r`\sqrt{x+2\sqrt{x-1}}`, r`1+\sqrt{x-1}`, 'equal', {}],
    [r`2\arctan x`, r`\arctan\frac{2x}{1-x^2}`, 'different', {}],
    [r`\arccos x`, r`\arcsin\sqrt{1-x^2}`, 'different', {}],
    [r`\frac{|x|}{x}`, '1', 'different', {}],
    [r`\frac{|x|}{x}`, '1', 'equal', { assume: ['x>0'] }],
    ['2^x+2^x', '4^x', 'different', {}],
    ['(2^x)^2', '4^x', 'equal', {}],
    [r`(x^2)^a`, 'x^{2a}', 'equal', {}],
    [r`\sum_{k=1}^{n}k^2`, r`\frac{n(n+1)(2n+1)}{6}`, 'equal', {}],
    [r`\sum_{k=1}^{n}k^2`, r`\frac{n(n+1)(2n-1)}{6}`, 'different', {}],
    [r`\sqrt[n]{x^n}`, 'x', 'different', { whole: ['n'] }],
  ])('%s to %s: %s', (above, below, verdict, setting) => {
    expect(verdictOf(above, below, setting)).toBe(verdict);
  });
});

describe('numbers', () => {
  it.each<[string, string, string]>([
    [r`\frac{355}{113}`, r`\pi`, 'different'],
    [r`e^{\pi\sqrt{163}}`, '262537412640768744', 'different'],
    [r`\sqrt{3+2\sqrt2}`, r`1+\sqrt2`, 'equal'],
    [r`\sqrt[3]{2+\sqrt5}`, r`\frac{1+\sqrt5}{2}`, 'equal'],
    [r`\sqrt2+\sqrt3`, r`\sqrt5`, 'different'],
    [r`\sqrt2+\sqrt3`, '3.14626436994197', 'different'],
    [r`\sin 75^\circ`, r`\frac{\sqrt6+\sqrt2}{4}`, 'equal'],
    [r`\cos\frac{\pi}{5}`, r`\frac{1+\sqrt5}{4}`, 'equal'],
    [r`\arctan 1+\arctan 2+\arctan 3`, r`\pi`, 'equal'],
    [r`\log_2 8`, '3', 'equal'],
    ['0.333', r`\frac13`, 'different'],
    ['0^0', '1', 'undecided no-agreed-meaning'],
    [r`10^{10^{10}}`, r`10^{10^{10}}+1`, 'undecided limit'],
    ['1', r`\frac{1}{0}`, 'meaningless'],
    [r`\tan\frac{\pi}{2}`, '1', 'undecided no-domain'],
    [r`\gcd(12,18)`, '6', 'equal'],
  ])('%s to %s: %s', (above, below, verdict) => {
    expect(verdictOf(above, below)).toBe(verdict);
  });

  it('prove surds by a separation bound and say so', () => {
    expect(compare(r`\sqrt{5+2\sqrt6}`, r`\sqrt2+\sqrt3`)).toMatchObject({ kind: 'equal', reached: 'proved' });
  });

  it('show as many digits as tell the two numbers apart', () => {
    const comparison = compare(r`\frac{355}{113}`, r`\pi+\frac{1}{3748630}`);
    expect(comparison.kind).toBe('different');
    const values = comparison.kind === 'different' ? [comparison.witness.above, comparison.witness.below] : [];
    expect(new Set(values).size).toBe(2);
  });
});

describe('domains', () => {
  const conditions = (above: string, below: string, setting: Setting = {}) => {
    const comparison = compare(above, below, setting);
    if (comparison.kind !== 'equal') throw new Error(comparison.kind);
    return {
      excluded: comparison.excluded.map(({ tex }) => tex),
      cancelled: comparison.cancelled.map(({ tex }) => tex),
    };
  };

  it('shrink where the line below has no value', () => {
    expect(conditions(r`\ln(x^2)`, r`2\ln x`)).toEqual({ excluded: ['x>0'], cancelled: [] });
    expect(conditions('x+2', r`\frac{x^2-4}{x-2}`)).toEqual({ excluded: [r`x\ne2`], cancelled: [] });
    expect(conditions(r`\sqrt[4]{x^2}`, r`\sqrt{x}`)).toEqual({ excluded: [r`x\ge0`], cancelled: [] });
  });

  it('name what a cancelled factor took with it', () => {
    expect(conditions(r`\frac{x^2-4}{x-2}`, 'x+2')).toEqual({ excluded: [], cancelled: [r`x\ne2`] });
    expect(conditions(r`\frac{(x-1)(x+3)}{(x-1)(x+3)}`, '1').cancelled).toEqual([r`x\ne1`, r`x\ne-3`]);
    expect(conditions(r`\frac{xy}{y}`, 'x')).toEqual({ excluded: [], cancelled: [r`y\ne0`] });
  });

  it('stay when both lines lack the same points or an assumption covers them', () => {
    expect(conditions(r`\frac{x+1}{x^2-1}+\frac{1}{x+1}`, r`\frac{2x}{x^2-1}`)).toEqual({
      excluded: [],
      cancelled: [],
    });
    expect(conditions(r`\frac{1}{x}`, r`\frac{2}{2x}`)).toEqual({ excluded: [], cancelled: [] });
    expect(conditions(r`\frac{x^2}{x}`, 'x', { assume: [r`x\ne0`] })).toEqual({ excluded: [], cancelled: [] });
    expect(conditions(r`\ln(ab)`, r`\ln a+\ln b`, { assume: ['a>0', 'b>0'] })).toEqual({ excluded: [], cancelled: [] });
  });

  it('that do not meet leave nothing in common, and a line without any value is meaningless', () => {
    expect(verdictOf(r`\sqrt{x}`, r`\sqrt{-1-x}`)).toBe('nothing-in-common');
    expect(verdictOf(r`\sqrt{x-5}`, r`\sqrt{5-x}`)).toBe('nothing-in-common');
    expect(verdictOf('x', r`\sqrt{-x^2-1}`)).toBe('meaningless');
    expect(verdictOf('x', r`\frac{x}{x-x}`)).toBe('meaningless');
    expect(verdictOf('x', r`\ln(1-x)`, { assume: ['x>2'] })).toBe('meaningless');
    expect(verdictOf(r`\sqrt{-x^2-1}`, 'x')).toBe('undecided no-domain');
  });
});

describe('complex numbers', () => {
  it.each<[string, string, string]>([
    ['(1+i)^2', '2i', 'equal'],
    [r`\frac{1}{1+i}`, r`\frac{1-i}{2}`, 'equal'],
    [r`e^{i\pi}`, '-1', 'equal'],
    [r`e^{i\theta}`, r`\cos\theta+i\sin\theta`, 'equal'],
    [r`\sqrt{z^2}`, 'z', 'different'],
    [r`\ln(z^2)`, r`2\ln z`, 'different'],
    [r`\sqrt{-4}`, '2i', 'equal'],
    ['i^3', 'i', 'different'],
    [r`z\overline{z}`, '|z|^2', 'equal'],
    // Letters that are usually real, in an expression where that matters.
    ['|a+bi|', r`\sqrt{a^2+b^2}`, 'undecided no-agreed-meaning'],
  ])('%s to %s: %s', (above, below, verdict) => {
    expect(verdictOf(above, below, { numbers: 'complex' })).toBe(verdict);
  });
});

describe('matrices', () => {
  const m = (rows: string) => `\\begin{pmatrix}${rows}\\end{pmatrix}`;
  it.each<[string, string, string]>([
    [m(r`1&2\\3&4`) + m(r`x\\y`), m(r`x+2y\\3x+4y`), 'equal'],
    [m(r`1&2\\3&4`) + m(r`x\\y`), m(r`x+2y\\3x+5y`), 'different'],
    [`\\det${m(r`a&b\\c&d`)}`, 'ad-bc', 'equal'],
    [`${m(r`1&2\\3&4`)}^{-1}`, m(r`-2&1\\\frac32&-\frac12`), 'equal'],
    [`${m(r`1&1\\0&1`)}^5`, m(r`1&5\\0&1`), 'equal'],
    [`${m(r`1\\2\\3`)}\\cdot${m(r`4\\5\\6`)}`, '32', 'equal'],
    [`${m(r`1\\2\\3`)}\\times${m(r`4\\5\\6`)}`, m(r`-3\\6\\-3`), 'equal'],
    [m('1&2'), m(r`1\\2`), 'different'],
  ])('%s to %s: %s', (above, below, verdict) => {
    expect(verdictOf(above, below)).toBe(verdict);
  });

  it('show the whole matrices in a witness', () => {
    expect(compare(`2${m(r`1\\2`)}`, m(r`2\\2`))).toMatchObject({
      kind: 'different',
      witness: { above: m(r`2\\4`), below: m(r`2\\2`) },
    });
  });
});

describe('equations among the assumptions', () => {
  it('hold at the points that are compared', () => {
    expect(verdictOf('a^2+2ab', '1-b^2', { assume: ['a+b=1'] })).toBe('equal');
    expect(verdictOf('a^2+2ab', '1+b^2', { assume: ['a+b=1'] })).toBe('different');
    expect(verdictOf('x^2', '4t^2', { assume: ['x=2t'] })).toBe('equal');
  });
});

describe('large lines', () => {
  it('are decided exactly', () => {
    expect(compare('(x+y+z+1)^{40}', '(1+z+y+x)^{40}')).toMatchObject({ kind: 'equal', reached: 'proved' });
    expect(compare('(x+1)^{10000}', '(1+x)^{10000}')).toMatchObject({ kind: 'equal', reached: 'proved' });
    expect(verdictOf('(x+1)^{10000}', 'x^{10000}+1')).toBe('different');
    const long = Array.from({ length: 330 }, (_, k) => `${k + 1}x^{${k + 1}}`);
    expect(compare(long.join('+'), long.toReversed().join('+'))).toMatchObject({ kind: 'equal', reached: 'proved' });
    expect(verdictOf(long.join('+'), long.slice(1).toReversed().join('+'))).toBe('different');
  });
});
