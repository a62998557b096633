import type { Expr, Span, Term } from '../../../shared/maths/expression.ts';
import type { Rational } from '../numbers/rational.ts';
import type { GraphNode } from './graph.ts';

const nowhere: Span = { start: 0, end: 0 };

export function numberExpr(value: Rational): Expr {
  const whole: Expr = {
    kind: 'number',
    numerator: value.num < 0n ? -value.num : value.num,
    denominator: 1n,
    written: 'integer',
    decimals: 0,
    span: nowhere,
  };
  const size: Expr =
    value.den === 1n
      ? whole
      : {
          kind: 'quotient',
          numerator: whole,
          written: 'fraction',
          span: nowhere,
          denominator: {
            kind: 'number',
            numerator: value.den,
            denominator: 1n,
            written: 'integer',
            decimals: 0,
            span: nowhere,
          },
        };
  return value.num < 0n ? negated(size) : size;
}

export function letterExpr(name: string): Expr {
  return { kind: 'letter', name, span: nowhere };
}

export function callExpr(name: Extract<Expr, { kind: 'call' }>['name'], args: readonly Expr[]): Expr {
  return { kind: 'call', name, args, span: nowhere };
}

function negated(expr: Expr): Expr {
  return { kind: 'sum', terms: [{ sign: 'minus', expr, span: nowhere }], span: nowhere };
}

function fractionPower(base: Expr, times: number, degree: number): Expr {
  const root: Expr = {
    kind: 'root',
    radicand: base,
    span: nowhere,
    degree: degree === 2 ? null : numberExpr({ num: BigInt(degree), den: 1n }),
  };
  return times === 1
    ? root
    : { kind: 'power', base: root, exponent: numberExpr({ num: BigInt(times), den: 1n }), span: nowhere };
}

/** A node as an expression again; null for what has no written form, such as a sum with open bounds. */
export function nodeToExpr(nodes: readonly GraphNode[], index: number): Expr | null {
  const node = nodes[index];
  if (node === undefined) return null;
  const args: Expr[] = [];
  for (const arg of node.args) {
    const expr = nodeToExpr(nodes, arg);
    if (expr === null) return null;
    args.push(expr);
  }
  return build(node, args);
}

function build(node: GraphNode, args: readonly Expr[]): Expr | null {
  const [a, b] = args;
  switch (node.op) {
    case 'number':
      return numberExpr(node.value);
    case 'letter':
      return letterExpr(node.name);
    case 'constant':
      return { kind: 'constant', name: node.name, span: nowhere };
    case 'add':
      return {
        kind: 'sum',
        terms: [...args.filter((arg) => !isNumber(arg)), ...args.filter(isNumber)].map(toTerm),
        span: nowhere,
      };
    case 'mul':
      return productExpr(args);
    case 'negate':
      return a === undefined ? null : negated(a);
    case 'div':
      return a && b ? { kind: 'quotient', numerator: a, denominator: b, written: 'fraction', span: nowhere } : null;
    case 'power':
      return a
        ? { kind: 'power', base: a, exponent: numberExpr({ num: BigInt(node.exponent), den: 1n }), span: nowhere }
        : null;
    case 'root':
      return a ? fractionPower(a, node.times, node.degree) : null;
    case 'pow':
      return a && b ? { kind: 'power', base: a, exponent: b, span: nowhere } : null;
    case 'call':
      return callNode(node.name, args);
    case 'series':
    case 'opaque':
      return null;
  }
}

function toTerm(expr: Expr): Term {
  const [only] = expr.kind === 'sum' && expr.terms.length === 1 ? expr.terms : [];
  return only?.sign === 'minus' ? only : { sign: 'plus', expr, span: nowhere };
}

function isNumber(expr: Expr): boolean {
  if (expr.kind === 'sum') return expr.terms.length === 1 && expr.terms.every((term) => isNumber(term.expr));
  return expr.kind === 'number' || (expr.kind === 'quotient' && expr.numerator.kind === 'number');
}

/** Numbers first, as people write products. */
function productExpr(args: readonly Expr[]): Expr {
  const factors = [...args.filter(isNumber), ...args.filter((arg) => !isNumber(arg))];
  return { kind: 'product', factors, joins: factors.slice(1).map(() => 'implicit' as const), span: nowhere };
}

function callNode(name: Extract<GraphNode, { op: 'call' }>['name'], args: readonly Expr[]): Expr | null {
  const [a, b] = args;
  if (a === undefined) return null;
  switch (name) {
    case 'factorial':
      return { kind: 'factorial', operand: a, span: nowhere };
    case 'binomial':
      return b ? { kind: 'binomial', top: a, bottom: b, span: nowhere } : null;
    case 'log':
      return b ? { kind: 'log', base: a, argument: b, span: nowhere } : null;
    case 'exp':
      return { kind: 'power', base: { kind: 'constant', name: 'e', span: nowhere }, exponent: a, span: nowhere };
    default:
      return callExpr(name, args);
  }
}
