import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { mapExpr, mapLine } from '../../../shared/maths/walk.ts';
import { rateName } from './rates.ts';

/** Most derivations have no integral, derivative or limit, and are not walked for them. */
export function mayHaveCalculus(tex: string): boolean {
  return /\\(?:[io]*int|partial|prime|mathrm|operatorname|d?dot|lim)(?![a-z])|['′]|(?:^|[^a-zA-Z\\])d|D/.test(tex);
}

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
  if (node.kind === 'derivative' && node.operand.kind === 'letter' && !node.partial) {
    const { name } = node.operand;
    const isMoving = name !== node.variable && movingLetters.has(name.charAt(0)) && !defined.has(name);
    if (isMoving)
      return { kind: 'letter', name: rateName({ of: name, by: node.variable, order: node.order }), span: node.span };
  }
  return node;
}

/** Letters that stand for what varies: d/dx of one of them is dy/dx, while d/dx of a c is 0. */
const movingLetters: ReadonlySet<string> = new Set(['y', 'u', 'v', 'w', 'f', 'g']);

/** What a bare prime is by: x where the derivation has one, else t, else x. */
export function usualVariable(lines: readonly string[]): string {
  const letters = lines.join(' ').replace(/\\[a-zA-Z]+/g, ' ');
  return !letters.includes('x') && letters.includes('t') ? 't' : 'x';
}
