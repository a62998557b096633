import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Expr } from '../../../shared/maths/expression.ts';
import { mapExpr } from '../../../shared/maths/walk.ts';
import { compareExpressions } from '../../../api/checker/compare/compare-expressions.ts';
import { evaluate } from '../../../api/checker/values/evaluate.ts';
import { contextOf } from './reading.ts';

const nowhere = { start: 0, end: 0 };
const number = (value: number): Expr => ({
  kind: 'number',
  numerator: BigInt(value),
  denominator: 1n,
  written: 'integer',
  decimals: 0,
  span: nowhere,
});
const letter = (name: string): Expr => ({ kind: 'letter', name, span: nowhere });
const sum = (parts: readonly Expr[], minus = false): Expr => ({
  kind: 'sum',
  terms: parts.map((expr, k) => ({ sign: minus && k === 1 ? 'minus' : 'plus', expr, span: nowhere })),
  span: nowhere,
});
const product = (factors: readonly Expr[]): Expr => ({
  kind: 'product',
  factors,
  joins: factors.slice(1).map(() => 'dot' as const),
  span: nowhere,
});
const quotient = (numerator: Expr, denominator: Expr): Expr => ({
  kind: 'quotient',
  numerator,
  denominator,
  written: 'fraction',
  span: nowhere,
});
const power = (base: Expr, exponent: number): Expr => ({
  kind: 'power',
  base,
  exponent: number(exponent),
  span: nowhere,
});
const call = (name: 'sin' | 'cos' | 'exp' | 'abs', arg: Expr): Expr => ({
  kind: 'call',
  name,
  args: [arg],
  span: nowhere,
});

const leaf = fc.oneof(fc.integer({ min: 1, max: 9 }).map(number), fc.constantFrom('x', 'y', 'z').map(letter));
const polynomial = fc.letrec<{ tree: Expr }>((tie) => ({
  tree: fc.oneof(
    { maxDepth: 4, depthSize: 'small' },
    leaf,
    fc.tuple(tie('tree'), tie('tree'), fc.boolean()).map(([a, b, minus]) => sum([a, b], minus)),
    fc.tuple(tie('tree'), tie('tree')).map(product),
    fc.tuple(tie('tree'), fc.integer({ min: 2, max: 4 })).map(([a, n]) => power(a, n)),
  ),
})).tree;
const expr = fc.oneof(
  polynomial,
  fc.tuple(polynomial, polynomial).map(([a, b]) => quotient(a, sum([power(b, 2), number(1)]))),
  fc
    .tuple(fc.constantFrom('sin' as const, 'cos' as const, 'abs' as const), polynomial)
    .map(([name, a]) => call(name, a)),
);

const kindOf = (a: Expr, b: Expr, seed = 1) => compareExpressions(a, b, contextOf({ seed })).kind;

describe('equality of expressions with a value everywhere', () => {
  it('is reflexive under reordering', () => {
    fc.assert(
      fc.property(expr, (a) => {
        const turned = mapExpr(a, (node) => {
          if (node.kind === 'sum') return { ...node, terms: [...node.terms].reverse() };
          return node.kind === 'product' ? { ...node, factors: [...node.factors].reverse() } : node;
        });
        expect(kindOf(a, turned)).toBe('equal');
      }),
      { numRuns: 150 },
    );
  });

  it('is symmetric and does not depend on the seed', () => {
    fc.assert(
      fc.property(polynomial, polynomial, fc.integer({ min: 1, max: 10 ** 6 }), (a, b, seed) => {
        expect(kindOf(a, b)).toBe(kindOf(b, a));
        expect(kindOf(a, b, seed)).toBe(kindOf(a, b));
      }),
      { numRuns: 150 },
    );
  });

  it('survives the laws of rings', () => {
    fc.assert(
      fc.property(expr, polynomial, polynomial, (a, b, c) => {
        expect(kindOf(product([a, sum([b, c])]), sum([product([a, b]), product([a, c])]))).toBe('equal');
        expect(kindOf(sum([a, b], true), sum([product([number(1), a]), b], true))).toBe('equal');
        expect(kindOf(power(sum([b, c]), 2), sum([power(b, 2), product([number(2), b, c]), power(c, 2)]))).toBe(
          'equal',
        );
      }),
      { numRuns: 100 },
    );
  });

  it('is lost by adding one, and a term added to both sides changes nothing', () => {
    fc.assert(
      fc.property(expr, expr, (a, t) => {
        expect(kindOf(a, sum([a, number(1)]))).toBe('different');
        expect(kindOf(sum([a, t]), sum([t, a]))).toBe('equal');
      }),
      { numRuns: 100 },
    );
  });

  it('does not depend on the names of letters', () => {
    fc.assert(
      fc.property(polynomial, polynomial, (a, b) => {
        const renamed = (e: Expr) =>
          mapExpr(e, (node) => (node.kind === 'letter' ? { ...node, name: `${node.name}_1` } : node));
        expect(kindOf(renamed(a), renamed(b))).toBe(kindOf(a, b));
      }),
      { numRuns: 100 },
    );
  });

  it('is refuted only by witnesses that exact evaluation confirms', () => {
    fc.assert(
      fc.property(polynomial, polynomial, (a, b) => {
        const context = contextOf();
        const comparison = compareExpressions(a, b, context);
        if (comparison.kind !== 'different') return;
        const [x, y] = [a, b].map((e) => evaluate(e, comparison.witness.at, 64, context));
        expect(x).toMatchObject({ kind: 'rational' });
        expect(x).not.toEqual(y);
      }),
      { numRuns: 150 },
    );
  });
});
