import { describe, expect, it } from 'vitest';
import { createBudget, createContext, BudgetSpent } from '../../../api/checker/context.ts';
import { ballToNumber } from '../../../api/checker/numbers/ball.ts';
import { rational } from '../../../api/checker/numbers/rational.ts';
import { fromPi, fromRational } from '../../../api/checker/values/arithmetic.ts';
import { evaluate } from '../../../api/checker/values/evaluate.ts';
import { truthAt } from '../../../api/checker/values/truth.ts';
import { valueTex } from '../../../api/checker/values/value-tex.ts';
import type { KnownValue, Point } from '../../../api/checker/values/value.ts';
import { expression, line } from '../compare/reading.ts';

const r = String.raw;
const bits = 160;
const at = (values: Readonly<Record<string, KnownValue>>): Point => new Map(Object.entries(values));
const whole = (n: number) => fromRational(rational(n));

function show(tex: string, point: Point = new Map(), numbers: 'real' | 'complex' = 'real'): string {
  const value = evaluate(expression(tex, numbers), point, bits, createContext({ numbers }));
  if (value.kind === 'unknown') return `unknown ${value.reason}`;
  return value.kind === 'undefined' ? 'undefined' : valueTex(value, bits);
}

describe('values that are exact', () => {
  it.each<[string, string]>([
    [r`\frac12+\frac13`, r`\frac{5}{6}`],
    [r`2\frac12`, r`\frac{5}{2}`],
    [r`\sqrt{\frac{9}{4}}`, r`\frac{3}{2}`],
    [r`\sqrt[3]{-8}`, '-2'],
    ['8^{-2/3}', r`\frac{1}{4}`],
    [r`\sin\frac{\pi}{6}`, r`\frac{1}{2}`],
    [r`\cos 3\pi`, '-1'],
    [r`\arcsin 1`, r`\frac{\pi}{2}`],
    [r`\arctan(-1)`, r`-\frac{\pi}{4}`],
    [r`\log_8 4`, r`\frac{2}{3}`],
    [r`\ln 1`, '0'],
    ['5!', '120'],
    [r`\binom{6}{2}`, '15'],
    [r`\sum_{k=1}^{10}k^2`, '385'],
    [r`\prod_{k=1}^{4}k`, '24'],
    [r`\lfloor-2.5\rfloor`, '-3'],
    [r`\operatorname{lcm}(4,6)`, '12'],
  ])('%s is %s', (tex, value) => {
    expect(show(tex)).toBe(value);
  });

  it('over the complex numbers too', () => {
    expect(show('(1+2i)(3-i)', new Map(), 'complex')).toBe('5+5i');
    expect(show(r`\sqrt{-4}`, new Map(), 'complex')).toBe('2i');
    expect(show(r`|3+4i|`, new Map(), 'complex')).toBe('5');
  });
});

describe('places without a value', () => {
  it.each<[string, Readonly<Record<string, KnownValue>>]>([
    [r`\frac{1}{x-2}`, { x: whole(2) }],
    [r`\ln x`, { x: whole(0) }],
    [r`\ln x`, { x: whole(-1) }],
    [r`\sqrt{x}`, { x: whole(-1) }],
    [r`\tan x`, { x: fromPi(rational(1, 2)) }],
    [r`\cot x`, { x: fromPi(rational(2)) }],
    [r`\arcsin x`, { x: whole(2) }],
    ['x!', { x: fromRational(rational(1, 2)) }],
    ['x^{0.5}', { x: whole(-4) }],
    [r`0\cdot\frac{1}{x}`, { x: whole(0) }],
  ])('%s at %o', (tex, point) => {
    expect(show(tex, at(point))).toBe('undefined');
  });

  it('differ from what has no agreed meaning and from what is out of reach', () => {
    expect(show('x^0', at({ x: whole(0) }))).toBe('unknown no-agreed-meaning');
    expect(show(r`\operatorname{arccot}x`, at({ x: whole(-1) }))).toBe('unknown no-agreed-meaning');
    expect(show('10^{10^{10}}')).toBe('unknown limit');
    expect(show('x')).toBe('unknown not-covered');
  });
});

describe('values in decimals', () => {
  it('are rounded to six digits unless more are asked for', () => {
    expect(show(r`\sqrt2`)).toBe('1.41421');
    expect(show('e^{30}')).toBe(r`1.06865\cdot 10^{13}`);
    expect(show('e^{-30}')).toBe(r`9.35762\cdot 10^{-14}`);
    const value = evaluate(expression(r`\sqrt2`), new Map(), bits, createContext());
    expect(valueTex(value, bits, 12)).toBe('1.41421356237');
  });

  it('come from balls that hold the number', () => {
    const value = evaluate(expression(r`\sqrt2\cdot\sqrt2-2`), new Map(), bits, createContext());
    if (value.kind !== 'ball') throw new Error('expected a ball');
    expect(Math.abs(ballToNumber(value.re, bits))).toBeLessThan(1e-40);
    expect(value.re.rad).toBeGreaterThan(0n);
  });
});

describe('definitions and own functions', () => {
  const context = createContext({
    definitions: {
      letters: new Map([['u', expression('x^2')]]),
      functions: new Map([['f', { params: ['t'], value: expression('t^2+x') }]]),
    },
  });

  it('are put in', () => {
    expect(evaluate(expression('u+1'), at({ x: whole(3) }), bits, context)).toEqual(whole(10));
    const apply = { kind: 'apply', name: 'f', primes: 0, args: [expression('2')], span: { start: 0, end: 0 } } as const;
    expect(evaluate(apply, at({ x: whole(3) }), bits, context)).toEqual(whole(7));
  });

  it('that call themselves are refused', () => {
    const span = { start: 0, end: 0 };
    const endless = createContext({
      definitions: {
        letters: new Map(),
        functions: new Map([
          ['f', { params: ['t'], value: { kind: 'apply', name: 'f', primes: 0, args: [expression('t')], span } }],
        ]),
      },
    });
    expect(
      evaluate({ kind: 'apply', name: 'f', primes: 0, args: [expression('1')], span }, new Map(), bits, endless).kind,
    ).toBe('unknown');
  });
});

describe('truth of lines at a point', () => {
  const truth = (tex: string, point: Point) => truthAt(line(tex), point, bits, createContext());

  it('is decided for relations, chains and sets', () => {
    expect(truth('x^2=4', at({ x: whole(-2) }))).toBe(true);
    expect(truth('x>2', at({ x: whole(2) }))).toBe(false);
    expect(truth('1<x<3', at({ x: whole(2) }))).toBe(true);
    expect(truth(r`x\in\{2,3\}`, at({ x: whole(3) }))).toBe(true);
    expect(truth(r`x\in[0,3)`, at({ x: whole(3) }))).toBe(false);
    expect(truth(r`\frac1x>0`, at({ x: whole(0) }))).toBe('undefined');
  });

  it('stays open where numbers may be equal', () => {
    expect(truth(r`\sqrt2\cdot\sqrt3=\sqrt6`, new Map())).toBeNull();
    expect(truth(r`\sqrt2<1.5`, new Map())).toBe(true);
  });
});

describe('the budget', () => {
  it('is counted and ends the work', () => {
    const budget = createBudget(100);
    budget.spend(60);
    expect(budget.left()).toBe(40);
    expect(() => budget.spend(41)).toThrow(BudgetSpent);
  });
});
