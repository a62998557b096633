import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { mapExpr, mapLine } from '../../../shared/maths/walk.ts';
import { rateName } from './rates.ts';

/**
 * The line with dy/dx and y' as letters of their own, so that equations are solved for them like for any letter; those of
 * what was defined stay operators. A bare prime is by `by`.
 */
export function nameRates(line: Line, defined: ReadonlySet<string>, by: string): Line {
  return mapLine(line, (expr) => mapExpr(expr, (node) => nameRate(node, defined, by)));
}

function nameRate(node: Expr, defined: ReadonlySet<string>, by: string): Expr {
  if (node.kind === 'rate' && !defined.has(node.of)) {
    return { kind: 'letter', name: rateName(node), span: node.span };
  }
  if (node.kind === 'apply' && node.primes > 0 && node.args.length === 0 && !defined.has(node.name)) {
    return { kind: 'letter', name: rateName({ of: node.name, by, order: node.primes }), span: node.span };
  }
  return node;
}

/** What a bare prime is by: x where the derivation has one, else t, else x. */
export function usualVariable(lines: readonly string[]): string {
  const letters = lines.join(' ').replace(/\\[a-zA-Z]+/g, ' ');
  return !letters.includes('x') && letters.includes('t') ? 't' : 'x';
}
