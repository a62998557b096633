import type { Expr, Line, SetExpr } from './expression.ts';

/** The direct parts of an expression, in reading order. */
export function childrenOf(expr: Expr): readonly Expr[] {
  switch (expr.kind) {
    case 'number':
    case 'letter':
    case 'constant':
    case 'rate':
      return [];
    case 'sum':
      return expr.terms.map((term) => term.expr);
    case 'product':
      return expr.factors;
    case 'quotient':
      return [expr.numerator, expr.denominator];
    case 'power':
      return [expr.base, expr.exponent];
    case 'root':
      return expr.degree ? [expr.degree, expr.radicand] : [expr.radicand];
    case 'call':
    case 'apply':
      return expr.args;
    case 'log':
      return expr.base ? [expr.base, expr.argument] : [expr.argument];
    case 'factorial':
    case 'derivative':
      return [expr.operand];
    case 'binomial':
      return [expr.top, expr.bottom];
    case 'series':
      return [expr.from, expr.to, expr.body];
    case 'integral':
      return expr.from && expr.to ? [expr.from, expr.to, expr.integrand] : [expr.integrand];
    case 'evaluated':
      return expr.from ? [expr.operand, expr.from, expr.to] : [expr.operand, expr.to];
    case 'limit':
      return [expr.to, expr.operand];
    case 'matrix':
      return expr.rows.flat();
  }
}

/** A copy in which every direct part is replaced; the order of the calls is that of `childrenOf`. */
export function mapChildren(expr: Expr, change: (part: Expr) => Expr): Expr {
  switch (expr.kind) {
    case 'number':
    case 'letter':
    case 'constant':
    case 'rate':
      return expr;
    case 'sum':
      return { ...expr, terms: expr.terms.map((term) => ({ ...term, expr: change(term.expr) })) };
    case 'product':
      return { ...expr, factors: expr.factors.map(change) };
    case 'quotient':
      return { ...expr, numerator: change(expr.numerator), denominator: change(expr.denominator) };
    case 'power':
      return { ...expr, base: change(expr.base), exponent: change(expr.exponent) };
    case 'root':
      return { ...expr, degree: expr.degree && change(expr.degree), radicand: change(expr.radicand) };
    case 'call':
    case 'apply':
      return { ...expr, args: expr.args.map(change) };
    case 'log':
      return { ...expr, base: expr.base && change(expr.base), argument: change(expr.argument) };
    case 'factorial':
    case 'derivative':
      return { ...expr, operand: change(expr.operand) };
    case 'binomial':
      return { ...expr, top: change(expr.top), bottom: change(expr.bottom) };
    case 'series':
      return { ...expr, from: change(expr.from), to: change(expr.to), body: change(expr.body) };
    case 'integral':
      return {
        ...expr,
        from: expr.from && change(expr.from),
        to: expr.to && change(expr.to),
        integrand: change(expr.integrand),
      };
    case 'evaluated':
      return {
        ...expr,
        operand: change(expr.operand),
        from: expr.from && change(expr.from),
        to: change(expr.to),
      };
    case 'limit':
      return { ...expr, to: change(expr.to), operand: change(expr.operand) };
    case 'matrix':
      return { ...expr, rows: expr.rows.map((row) => row.map(change)) };
  }
}

/** Rebuilds from the leaves up: `change` sees each node after its parts were changed. */
export function mapExpr(expr: Expr, change: (node: Expr) => Expr): Expr {
  return change(mapChildren(expr, (part) => mapExpr(part, change)));
}

/** The expressions that a line states something about, in reading order. */
export function exprsOf(line: Line): readonly Expr[] {
  switch (line.kind) {
    case 'expression':
      return [line.expr];
    case 'relation':
      return [line.left, line.right];
    case 'chain':
    case 'continuation':
      return line.members;
    case 'any':
    case 'all':
      return line.parts.flatMap(exprsOf);
    case 'membership':
      return line.letter ? [line.letter, ...exprsOfSet(line.set)] : exprsOfSet(line.set);
    case 'none':
    case 'always':
      return [];
    case 'definition':
      return [line.value];
  }
}

/** The expressions that a set is written with. */
export function exprsOfSet(set: SetExpr): readonly Expr[] {
  switch (set.kind) {
    case 'finite':
      return set.items;
    case 'interval':
      return [set.from, set.to].filter((end) => end !== null);
    case 'union':
    case 'intersection':
      return set.parts.flatMap(exprsOfSet);
    case 'without':
      return [...exprsOfSet(set.from), ...exprsOfSet(set.removed)];
    default:
      return [];
  }
}

/** A copy of the line with each of its expressions replaced. */
export function mapLine(line: Line, change: (expr: Expr) => Expr): Line {
  switch (line.kind) {
    case 'expression':
      return { ...line, expr: change(line.expr) };
    case 'relation':
      return { ...line, left: change(line.left), right: change(line.right) };
    case 'chain':
    case 'continuation':
      return { ...line, members: line.members.map(change) };
    case 'any':
    case 'all':
      return { ...line, parts: line.parts.map((part) => mapLine(part, change)) };
    case 'membership':
      return { ...line, letter: line.letter && change(line.letter), set: mapSet(line.set, change) };
    case 'none':
    case 'always':
      return line;
    case 'definition':
      return { ...line, value: change(line.value) };
  }
}

function mapSet(set: SetExpr, change: (expr: Expr) => Expr): SetExpr {
  switch (set.kind) {
    case 'finite':
      return { ...set, items: set.items.map(change) };
    case 'interval':
      return { ...set, from: set.from && change(set.from), to: set.to && change(set.to) };
    case 'union':
    case 'intersection':
      return { ...set, parts: set.parts.map((part) => mapSet(part, change)) };
    case 'without':
      return { ...set, from: mapSet(set.from, change), removed: mapSet(set.removed, change) };
    default:
      return set;
  }
}

/** Number of nodes, the root counted. */
export function countNodes(expr: Expr): number {
  return childrenOf(expr).reduce((count, part) => count + countNodes(part), 1);
}
