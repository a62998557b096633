import fc from 'fast-check';
import type {
  Expr,
  FunctionName,
  Line,
  RelationSign,
  SetExpr,
  Term,
  TermSign,
} from '../../../shared/maths/expression.ts';

const span = { start: 0, end: 0 };

const digits = fc.bigInt({ min: 0n, max: 9999n });
const integer = digits.map((numerator): Expr => ({
  kind: 'number',
  numerator,
  denominator: 1n,
  written: 'integer',
  decimals: 0,
  span,
}));

function lowest(numerator: bigint, denominator: bigint): { numerator: bigint; denominator: bigint } {
  let [a, b] = [numerator, denominator];
  while (b > 0n) [a, b] = [b, a % b];
  return { numerator: numerator / a, denominator: denominator / a };
}

const otherNumber: fc.Arbitrary<Expr> = fc.oneof(
  fc.tuple(digits, fc.integer({ min: 1, max: 4 })).map(([value, decimals]): Expr => ({
    kind: 'number',
    ...lowest(value, 10n ** BigInt(decimals)),
    written: 'decimal',
    decimals,
    span,
  })),
  fc
    .tuple(digits, fc.bigInt({ min: 1n, max: 60n }))
    .map(([value, below]): Expr => ({ kind: 'number', ...lowest(value, below), written: 'mixed', decimals: 0, span })),
  digits.map((value): Expr => ({ kind: 'number', ...lowest(value, 100n), written: 'percent', decimals: 0, span })),
  fc.tuple(digits, fc.constantFrom(3n, 7n, 9n, 11n, 12n, 33n)).map(([value, below]): Expr => ({
    kind: 'number',
    ...lowest(value * below + 1n, below),
    written: 'repeating',
    decimals: 0,
    span,
  })),
);

export const letterName = fc.constantFrom(
  'x',
  'y',
  'a',
  'b',
  'd',
  'n',
  's',
  'i',
  'o',
  'r',
  'p',
  'x_1',
  'v_{max}',
  '\\alpha',
  '\\theta',
  'R_2',
  '\\vec{a}',
);
const letter = letterName.map((name): Expr => ({ kind: 'letter', name, span }));
const constant = fc
  .constantFrom('pi' as const, 'e' as const, 'i' as const)
  .map((name): Expr => ({ kind: 'constant', name, span }));
const FUNCTIONS: readonly FunctionName[] = [
  'sin',
  'cos',
  'tan',
  'cot',
  'sec',
  'csc',
  'arcsin',
  'arccos',
  'arctan',
  'arccot',
  'arcsec',
  'arccsc',
  'sinh',
  'cosh',
  'tanh',
  'coth',
  'sech',
  'csch',
  'arsinh',
  'arcosh',
  'artanh',
  'ln',
  'exp',
  'abs',
  'sign',
  'floor',
  'ceil',
  're',
  'im',
  'conj',
  'arg',
  'det',
  'transpose',
  'degrees',
];
const sign: fc.Arbitrary<TermSign> = fc.constantFrom('plus', 'minus', 'plusminus', 'minusplus');
const variable = fc.constantFrom('x', 't', 'y', '\\theta', 'i', 'x_1');

/** Every kind of expression, a few levels deep, as the reader itself could have built it. */
export const arbitraryExpr: fc.Arbitrary<Expr> = fc.letrec<{ expr: Expr }>((tie) => {
  const expr = tie('expr');
  const term: fc.Arbitrary<Term> = fc.record({ sign, expr, span: fc.constant(span) });
  const pair = fc.tuple(expr, expr);
  const bounds = fc.oneof(fc.constant([null, null] as const), pair);
  const nodes: fc.Arbitrary<Expr>[] = [
    fc.array(term, { minLength: 1, maxLength: 4 }).map((terms): Expr => ({ kind: 'sum', terms, span })),
    fc.array(expr, { minLength: 2, maxLength: 4 }).chain((factors) =>
      fc
        .array(fc.constantFrom('implicit' as const, 'dot' as const, 'times' as const), {
          minLength: factors.length - 1,
          maxLength: factors.length - 1,
        })
        .map((joins): Expr => ({ kind: 'product', factors, joins, span })),
    ),
    fc
      .tuple(pair, fc.constantFrom('fraction' as const, 'slash' as const, 'divide' as const))
      .map(([[numerator, denominator], written]): Expr => ({
        kind: 'quotient',
        numerator,
        denominator,
        written,
        span,
      })),
    pair.map(([base, exponent]): Expr => ({ kind: 'power', base, exponent, span })),
    fc.tuple(fc.option(expr), expr).map(([degree, radicand]): Expr => ({ kind: 'root', degree, radicand, span })),
    fc
      .tuple(fc.constantFrom(...FUNCTIONS), expr)
      .map(([name, arg]): Expr => ({ kind: 'call', name, args: [arg], span })),
    fc
      .tuple(
        fc.constantFrom('gcd' as const, 'lcm' as const, 'min' as const, 'max' as const),
        fc.array(expr, { minLength: 1, maxLength: 3 }),
      )
      .map(([name, args]): Expr => ({ kind: 'call', name, args, span })),
    fc.tuple(fc.option(expr), expr).map(([base, argument]): Expr => ({ kind: 'log', base, argument, span })),
    fc
      .tuple(fc.integer({ min: 1, max: 3 }), fc.option(letter))
      .map(([primes, arg]): Expr => ({ kind: 'apply', name: 'f', primes, args: arg ? [arg] : [], span })),
    expr.map((operand): Expr => ({ kind: 'factorial', operand, span })),
    pair.map(([top, bottom]): Expr => ({ kind: 'binomial', top, bottom, span })),
    fc
      .tuple(fc.constantFrom('sum' as const, 'product' as const), fc.constantFrom('k', 'n', 'i'), expr, pair)
      .map(([operation, index, body, [from, to]]): Expr => ({
        kind: 'series',
        operation,
        index,
        from,
        to,
        body,
        span,
      })),
    fc
      .tuple(
        variable,
        fc.integer({ min: 1, max: 3 }),
        fc.boolean(),
        expr.filter((operand) => operand.kind !== 'letter'),
      )
      .map(([name, order, partial, operand]): Expr => ({
        kind: 'derivative',
        variable: name,
        order,
        partial,
        operand,
        span,
      })),
    fc
      .tuple(letterName, variable, fc.integer({ min: 1, max: 3 }))
      .map(([of, by, order]): Expr => ({ kind: 'rate', of, by, order, span })),
    fc
      .tuple(expr, fc.constantFrom('x', 't', '\\theta'), bounds)
      .map(([integrand, name, [from, to]]): Expr => ({ kind: 'integral', integrand, variable: name, from, to, span })),
    fc
      .tuple(expr, fc.option(fc.constantFrom('x', 't')), fc.option(expr), expr)
      .map(([operand, name, from, to]): Expr => ({ kind: 'evaluated', operand, variable: name, from, to, span })),
    fc
      .tuple(fc.constantFrom('x', 't'), expr, fc.constantFrom('both' as const, 'left' as const, 'right' as const), expr)
      .map(([name, to, side, operand]): Expr => ({ kind: 'limit', variable: name, to, side, operand, span })),
    fc
      .integer({ min: 1, max: 3 })
      .chain((width) =>
        fc
          .array(fc.array(expr, { minLength: width, maxLength: width }), { minLength: 1, maxLength: 3 })
          .map((rows): Expr => ({ kind: 'matrix', rows, span })),
      ),
  ];
  return {
    expr: fc.oneof(
      { maxDepth: 4, depthSize: 'small', withCrossShrink: true },
      integer,
      letter,
      constant,
      otherNumber,
      ...nodes,
    ),
  };
}).expr;

const relationSign: fc.Arbitrary<RelationSign> = fc.constantFrom('=', '<', '>', '<=', '>=', '!=', 'approx');

const arbitrarySet: fc.Arbitrary<SetExpr> = fc.letrec<{ set: SetExpr }>((tie) => ({
  set: fc.oneof(
    { maxDepth: 2 },
    fc
      .constantFrom(
        'empty' as const,
        'reals' as const,
        'integers' as const,
        'naturals' as const,
        'rationals' as const,
        'complex' as const,
      )
      .map((kind): SetExpr => ({ kind, span })),
    fc.array(arbitraryExpr, { minLength: 1, maxLength: 3 }).map((items): SetExpr => ({ kind: 'finite', items, span })),
    fc
      .tuple(fc.option(arbitraryExpr), fc.option(arbitraryExpr), fc.boolean(), fc.boolean())
      .map(([from, to, fromClosed, toClosed]): SetExpr => ({
        kind: 'interval',
        from,
        to,
        fromClosed: fromClosed && from !== null,
        toClosed: toClosed && to !== null,
        span,
      })),
    fc
      .tuple(
        fc.constantFrom('union' as const, 'intersection' as const),
        fc.array(tie('set'), { minLength: 2, maxLength: 3 }),
      )
      .map(([kind, parts]): SetExpr => ({ kind, parts, span })),
    fc.tuple(tie('set'), tie('set')).map(([from, removed]): SetExpr => ({ kind: 'without', from, removed, span })),
  ),
})).set;

const relation: fc.Arbitrary<Line> = fc
  .tuple(arbitraryExpr, relationSign, arbitraryExpr)
  .map(([left, sign_, right]): Line => ({ kind: 'relation', left, sign: sign_, right, span }));

/** Every kind of line. */
export const arbitraryLine: fc.Arbitrary<Line> = fc.oneof(
  arbitraryExpr.map((expr): Line => ({ kind: 'expression', expr, span })),
  relation,
  fc.array(fc.tuple(arbitraryExpr, relationSign), { minLength: 3, maxLength: 4 }).map((links): Line => ({
    kind: 'chain',
    members: links.map(([member]) => member),
    signs: links.slice(1).map(([, link]) => link),
    span,
  })),
  fc.array(fc.tuple(arbitraryExpr, relationSign), { minLength: 1, maxLength: 3 }).map((links): Line => ({
    kind: 'continuation',
    members: links.map(([member]) => member),
    signs: links.map(([, link]) => link),
    span,
  })),
  fc
    .tuple(fc.constantFrom('any' as const, 'all' as const), fc.array(relation, { minLength: 2, maxLength: 3 }))
    .map(([kind, parts]): Line => ({ kind, parts, span })),
  fc
    .tuple(fc.option(letter), arbitrarySet, fc.boolean())
    .filter(
      ([name, set]) =>
        name !== null ||
        (set.kind !== 'empty' && set.kind !== 'union' && set.kind !== 'intersection' && set.kind !== 'without'),
    )
    .map(([name, set, negated]): Line => ({
      kind: 'membership',
      letter: name,
      set,
      negated: name !== null && negated,
      span,
    })),
  fc.constant<Line>({ kind: 'none', span }),
  fc.constantFrom<Line>({ kind: 'always', letter: null, span }, { kind: 'always', letter: 'x', span }),
  fc
    .tuple(fc.constantFrom('u', 'w'), arbitraryExpr)
    .map(([name, value]): Line => ({ kind: 'definition', name, params: [], value, span })),
  fc
    .tuple(fc.constantFrom('f', 'P'), arbitraryExpr)
    .map(([name, value]): Line => ({ kind: 'definition', name, params: ['x'], value, span })),
);
