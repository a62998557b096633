import type { Expr } from '../../../shared/maths/expression.ts';
import { childrenOf, mapChildren } from '../../../shared/maths/walk.ts';
import { plainValue } from './plain-values.ts';

/** Expressions that differ from this one by one small edit: a number by one, a sign, a function. */
export function smallEdits(expr: Expr): Expr[] {
  const own = editsHere(expr);
  const inner = childrenOf(expr).flatMap((child, position) =>
    smallEdits(child).map((changed) => {
      let seen = -1;
      return mapChildren(expr, (part) => ((seen += 1) === position ? changed : part));
    }),
  );
  return [...own, ...inner];
}

const nowhere = { start: 0, end: 0 };

/** The same with the sign lost, one more, and twice as much. */
export function roughEdits(expr: Expr): Expr[] {
  const number = (value: bigint): Expr => ({
    kind: 'number',
    numerator: value,
    denominator: 1n,
    written: 'integer',
    decimals: 0,
    span: nowhere,
  });
  const term = (part: Expr, sign: 'plus' | 'minus') => ({ sign, expr: part, span: nowhere });
  return [
    { kind: 'sum', terms: [term(expr, 'minus')], span: nowhere },
    { kind: 'sum', terms: [term(expr, 'plus'), term(number(1n), 'plus')], span: nowhere },
    { kind: 'product', factors: [number(2n), expr], joins: ['implicit'], span: nowhere },
  ];
}

function editsHere(expr: Expr): Expr[] {
  switch (expr.kind) {
    case 'number':
      return expr.denominator === 1n ? [{ ...expr, numerator: expr.numerator + 1n }] : [];
    case 'sum':
      return expr.terms.map((_, k) => ({
        ...expr,
        terms: expr.terms.map((term, j) =>
          j === k ? { ...term, sign: term.sign === 'plus' ? ('minus' as const) : ('plus' as const) } : term,
        ),
      }));
    case 'call': {
      const swap = { sin: 'cos', cos: 'sin', tan: 'sin', sinh: 'cosh', cosh: 'sinh' } as const;
      const other = expr.name in swap ? swap[expr.name as keyof typeof swap] : undefined;
      return other === undefined ? [] : [{ ...expr, name: other }];
    }
    default:
      return [];
  }
}

const trials = [0.7, 1.3, 2.6, 0.31, 3.9, 1.9, 5.2, -0.6, -1.7, 0.45];

/** Whether doubles show two expressions clearly apart at some point. */
export function areClearlyApart(a: Expr, b: Expr, names: readonly string[], whole: boolean): boolean {
  return trials.some((start, k) => {
    const at = Object.fromEntries(
      names.map((name, j) => [name, whole ? ((k + 2 * j) % 5) + 1 : (trials[(k + 3 * j) % trials.length] ?? start)]),
    );
    const [x, y] = [plainValue(a, at), plainValue(b, at)];
    return Number.isFinite(x) && Number.isFinite(y) && Math.abs(x - y) > 1e-4 * Math.max(1, Math.abs(x), Math.abs(y));
  });
}

export function namesIn(expr: Expr, found: Set<string> = new Set()): Set<string> {
  if (expr.kind === 'letter') found.add(expr.name);
  for (const child of childrenOf(expr)) namesIn(child, found);
  return found;
}
