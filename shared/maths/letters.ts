import type { Expr, Line } from './expression.ts';
import { childrenOf, exprsOf } from './walk.ts';

/**
 * The free letters of an expression or a line, in reading order and once each. The index of a sum, the variable of a
 * definite integral or a limit and the parameters of a definition are bound; dy/dx names both y and x.
 */
export function lettersOf(subject: Expr | Line): readonly string[] {
  const found = new Set<string>();
  if (isLine(subject)) addLine(subject, found);
  else addExpr(subject, NOTHING, found);
  return [...found];
}

const NOTHING: ReadonlySet<string> = new Set();
const LINE_KINDS: ReadonlySet<string> = new Set([
  'expression',
  'relation',
  'chain',
  'continuation',
  'any',
  'all',
  'membership',
  'none',
  'always',
  'definition',
]);

function isLine(subject: Expr | Line): subject is Line {
  return LINE_KINDS.has(subject.kind);
}

function addLine(line: Line, found: Set<string>): void {
  if (line.kind === 'any' || line.kind === 'all') {
    for (const part of line.parts) addLine(part, found);
    return;
  }
  if (line.kind === 'always' && line.letter !== null) found.add(line.letter);
  if (line.kind === 'definition' && line.params.length === 0) found.add(line.name);
  const bound = line.kind === 'definition' ? new Set(line.params) : NOTHING;
  for (const expr of exprsOf(line)) addExpr(expr, bound, found);
}

function addExpr(expr: Expr, bound: ReadonlySet<string>, found: Set<string>): void {
  switch (expr.kind) {
    case 'number':
    case 'constant':
      return;
    case 'letter':
      return addName(expr.name, bound, found);
    case 'rate':
      addName(expr.of, bound, found);
      return addName(expr.by, bound, found);
    case 'apply':
      if (expr.args.length === 0) addName(expr.name, bound, found);
      break;
    case 'derivative':
      addName(expr.variable, bound, found);
      break;
    case 'series':
      addExpr(expr.from, bound, found);
      addExpr(expr.to, bound, found);
      return addExpr(expr.body, new Set([...bound, expr.index]), found);
    case 'limit':
      addExpr(expr.to, bound, found);
      return addExpr(expr.operand, new Set([...bound, expr.variable]), found);
    case 'integral':
      if (!expr.from || !expr.to) break;
      addExpr(expr.from, bound, found);
      addExpr(expr.to, bound, found);
      return addExpr(expr.integrand, new Set([...bound, expr.variable]), found);
    default:
  }
  for (const part of childrenOf(expr)) addExpr(part, bound, found);
}

function addName(name: string, bound: ReadonlySet<string>, found: Set<string>): void {
  if (!bound.has(name)) found.add(name);
}
