import type { Expr, Line, RelationSign, SetExpr } from '../../../shared/maths/expression.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';

/** A text that is the same for two lines exactly when they differ in order and layout only. */
export function layoutOf(line: Line): string {
  switch (line.kind) {
    case 'expression':
      return exprLayout(line.expr);
    case 'relation':
      return relationLayout(line.left, line.sign, line.right);
    case 'chain':
      return line.members.map(exprLayout).join(line.signs.join());
    case 'continuation':
      return `${line.signs.join()} ${line.members.map(exprLayout).join()}`;
    case 'any':
    case 'all':
      return `${line.kind}(${line.parts.map(layoutOf).sort().join(';')})`;
    case 'membership':
      return membershipLayout(line);
    case 'definition':
      return `${line.name}(${line.params.join()}):=${exprLayout(line.value)}`;
    case 'none':
      return 'none';
    case 'always':
      return 'always';
  }
}

const turned: Readonly<Record<RelationSign, RelationSign>> = {
  '=': '=',
  '!=': '!=',
  approx: 'approx',
  '<': '>',
  '>': '<',
  '<=': '>=',
  '>=': '<=',
};

function relationLayout(left: Expr, sign: RelationSign, right: Expr): string {
  const [a, b] = [exprLayout(left), exprLayout(right)];
  return a <= b ? `${a}${sign}${b}` : `${b}${turned[sign]}${a}`;
}

/** x in {2, 3} is the list x=2 or x=3. */
function membershipLayout(line: Extract<Line, { kind: 'membership' }>): string {
  const { letter, set } = line;
  if (letter && set.kind === 'finite' && !line.negated) {
    const parts = set.items.map((item) => relationLayout(letter, '=', item)).sort();
    return parts.length === 1 ? (parts[0] as string) : `any(${parts.join(';')})`;
  }
  return `${letter ? exprLayout(letter) : ''}${line.negated ? 'notin' : 'in'}${setLayout(set)}`;
}

function setLayout(set: SetExpr): string {
  switch (set.kind) {
    case 'finite':
      return `{${set.items.map(exprLayout).sort().join()}}`;
    case 'interval': {
      const [from, to] = [set.from, set.to].map((end) => (end ? exprLayout(end) : 'oo'));
      return `${set.fromClosed ? '[' : '('}${from},${to}${set.toClosed ? ']' : ')'}`;
    }
    case 'union':
    case 'intersection':
      return `${set.kind}(${set.parts.map(setLayout).sort().join()})`;
    case 'without':
      return `${setLayout(set.from)}without${setLayout(set.removed)}`;
    default:
      return set.kind;
  }
}

/** Sums and products in one order, brackets that change nothing left out. */
export function exprLayout(expr: Expr): string {
  switch (expr.kind) {
    case 'number':
      return expr.denominator === 1n ? `${expr.numerator}` : `quotient(${expr.numerator},${expr.denominator})`;
    case 'letter':
    case 'constant':
      return expr.name;
    case 'sum':
      return sumLayout(expr);
    case 'product':
      return productLayout(expr);
    case 'call':
    case 'apply':
      return `${expr.name}(${expr.args.map(exprLayout).join()})`;
    case 'rate':
      return `d${expr.of}/d${expr.by}${expr.order}`;
    case 'root':
      return `root(${expr.degree ? exprLayout(expr.degree) : '2'},${exprLayout(expr.radicand)})`;
    case 'series':
      return `${expr.operation}(${expr.index},${childrenOf(expr).map(exprLayout).join()})`;
    default:
      return `${expr.kind}(${childrenOf(expr).map(exprLayout).join()})`;
  }
}

function sumLayout(expr: Extract<Expr, { kind: 'sum' }>): string {
  const terms = expr.terms.flatMap((term): string[] => {
    if (term.expr.kind === 'sum' && term.sign === 'plus')
      return term.expr.terms.map((inner) => `${inner.sign} ${exprLayout(inner.expr)}`);
    return [`${term.sign} ${exprLayout(term.expr)}`];
  });
  if (terms.length === 1 && terms[0]?.startsWith('plus ')) return terms[0].slice(5);
  return `sum(${terms.sort().join()})`;
}

function productLayout(expr: Extract<Expr, { kind: 'product' }>): string {
  const factors = expr.factors
    .flatMap((factor) => (factor.kind === 'product' ? factor.factors : [factor]))
    .map(exprLayout);
  return `product(${factors.sort().join()})`;
}
