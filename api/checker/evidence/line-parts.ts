import type { Expr, NumberExpr, Span, Term } from '../../../shared/maths/expression.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import { outer } from './mend-question.ts';

/** A node of a line, with the term whose leading number, or whose whole, it is. */
export interface PlacedNode {
  readonly node: Expr;
  /** The term of a sum that begins with this node, so that a sign of it is the sign of the term. */
  readonly leads: PlacedTerm | null;
  /** The exponent of something. */
  readonly isExponent: boolean;
  /** The base of something. */
  readonly isBase: boolean;
  /** What follows it in a product. */
  readonly isFactor: boolean;
  /** Part of a numerator or denominator. */
  readonly isInQuotient: boolean;
  /** Under a root or in the argument of a function. */
  readonly isInFunction: boolean;
}
export interface PlacedTerm {
  readonly term: Term;
  readonly isFirst: boolean;
  /** Alone in its sum: then the whole side is this term. */
  readonly isOnly: boolean;
}

interface Spot {
  readonly leads: PlacedTerm | null;
  readonly isExponent?: boolean;
  readonly isBase?: boolean;
  readonly isFactor?: boolean;
  readonly isInQuotient?: boolean;
  readonly isInFunction?: boolean;
}

/** Every node of an expression in reading order, outer first. A side without a sign is a term by itself. */
export function nodesOf(expr: Expr): PlacedNode[] {
  const found: PlacedNode[] = [];
  visit(expr, { leads: expr.kind === 'sum' ? null : standAlone(expr) }, found);
  return found;
}

function standAlone(expr: Expr): PlacedTerm {
  return { term: { sign: 'plus', expr, span: outer(expr) }, isFirst: true, isOnly: true };
}

function visit(node: Expr, spot: Spot, found: PlacedNode[]): void {
  const {
    leads,
    isExponent = false,
    isBase = false,
    isFactor = false,
    isInQuotient = false,
    isInFunction = false,
  } = spot;
  found.push({ node, leads, isExponent, isBase, isFactor, isInQuotient, isInFunction });
  const within = {
    isInQuotient: isInQuotient || node.kind === 'quotient',
    isInFunction: isInFunction || node.kind === 'root' || node.kind === 'call' || node.kind === 'log',
  };
  switch (node.kind) {
    case 'sum':
      for (const [k, term] of node.terms.entries()) {
        visit(term.expr, { leads: { term, isFirst: k === 0, isOnly: node.terms.length === 1 }, ...within }, found);
      }
      return;
    case 'product':
      node.factors.forEach((factor, k) =>
        visit(factor, { leads: k === 0 ? leads : inside(factor), isFactor: true, ...within }, found),
      );
      return;
    case 'quotient':
      visit(
        node.numerator,
        { leads: leads && node.numerator.kind !== 'sum' ? leads : inside(node.numerator), ...within },
        found,
      );
      visit(node.denominator, { leads: inside(node.denominator), ...within }, found);
      return;
    case 'power':
      visit(node.base, { leads: null, isBase: true, ...within }, found);
      visit(node.exponent, { leads: inside(node.exponent), isExponent: true, ...within }, found);
      return;
    default:
      for (const part of childrenOf(node)) visit(part, { leads: inside(part), ...within }, found);
  }
}

/** A factor in the middle of a product has no sign to change; what stands in braces or brackets by itself has. */
function inside(expr: Expr): PlacedTerm | null {
  return expr.kind === 'sum' || expr.kind === 'number' ? null : standAlone(expr);
}

/** Where the sign of a term stands: from the start of the term to its expression; empty where none is written. */
export function signSpan({ term }: PlacedTerm): Span {
  return { start: term.span.start, end: outer(term.expr).start };
}

/** Numbers, letters and constants in reading order. */
export function leavesOf(expr: Expr): Expr[] {
  const parts = childrenOf(expr);
  return parts.length === 0 ? [expr] : parts.flatMap(leavesOf);
}

export function isWholeNumber(expr: Expr): expr is NumberExpr {
  return expr.kind === 'number' && expr.written === 'integer';
}
