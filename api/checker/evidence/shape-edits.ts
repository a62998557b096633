import type { Expr, FunctionName } from '../../../shared/maths/expression.ts';
import { glue } from '../../../shared/maths/print-expression.ts';
import { call, letter, neg, power, product, quotient, root, sum, whole } from './build.ts';
import type { Candidate, Edit } from './edits.ts';
import { hole, replaceNode, solveHole } from './holes.ts';
import { nodesOf } from './line-parts.ts';
import { hits, outer, type Aim } from './mend-question.ts';

interface Shape {
  readonly by: Expr;
  readonly edits: readonly Edit[];
  readonly cost: number;
}

/** Changes of how parts are joined after which the tree has the wanted values. */
export function* shapeEdits(aim: Aim, tex: string): Generator<Candidate> {
  for (const { node } of aim.roots.flatMap(nodesOf)) {
    for (const { by, edits, cost } of shapesOf(node, tex)) {
      aim.budget.spend(aim.cost);
      const changed = replaceNode(aim.tree, node, by);
      if (aim.targets.some((target) => hits(changed, target, aim.places)))
        yield { edits, cost: cost + aim.extra, touchesRight: aim.isRight(node) };
    }
  }
}

function* shapesOf(node: Expr, tex: string): Generator<Shape> {
  switch (node.kind) {
    case 'product':
      yield* productAsSum(node);
      yield* factorBelow(node, tex);
      yield* squared(node, tex);
      return;
    case 'quotient':
      yield* turnedOver(node, tex);
      yield* multipliedInstead(node, tex);
      return;
    case 'sum':
      yield* lastTermBelow(node);
      yield* exchanged(node, tex);
      yield* squared(node, tex);
      yield* sumAsProduct(node);
      return;
    case 'power':
      yield* exponentsAdded(node, tex);
      return;
    case 'call':
    case 'log':
      yield* factorMoved(node, tex);
      yield* otherFunction(node, tex);
      return;
    default:
  }
}

/** f(a) f(b) for f(a) + f(b), and the like. */
function* productAsSum(node: Extract<Expr, { kind: 'product' }>): Generator<Shape> {
  for (const k of node.joins.keys()) {
    const [before, after] = [node.factors.slice(0, k + 1), node.factors.slice(k + 1)];
    const [left, right] = [before[before.length - 1], after[0]];
    if (!left || !right) continue;
    const place = { start: outer(left).end, end: outer(right).start };
    yield { by: sum(product(...before), product(...after)), edits: [{ ...place, text: '+' }], cost: 1.3 };
    yield { by: sum(product(...before), neg(product(...after))), edits: [{ ...place, text: '-' }], cost: 1.35 };
  }
}

/** a b for a + b. */
function* sumAsProduct(node: Extract<Expr, { kind: 'sum' }>): Generator<Shape> {
  for (const [k, term] of node.terms.entries()) {
    const next = node.terms[k + 1];
    if (next?.sign !== 'plus') continue;
    const joined = { ...term, expr: product(term.expr, next.expr) };
    yield {
      by: { ...node, terms: [...node.terms.slice(0, k), joined, ...node.terms.slice(k + 2)] },
      edits: [{ start: outer(term.expr).end, end: outer(next.expr).start, text: '\\cdot' }],
      cost: 1.3,
    };
  }
}

/** a^{2n+3} for a^{6n}: exponents that were multiplied and should have been added. */
function* exponentsAdded({ base, exponent }: Extract<Expr, { kind: 'power' }>, tex: string): Generator<Shape> {
  const [first, second] = exponent.kind === 'product' ? exponent.factors : [];
  if (exponent.kind !== 'product' || !second || first?.kind !== 'number' || first.denominator !== 1n) return;
  const rest = product(...exponent.factors.slice(1));
  const text = tex.slice(outer(second).start, outer(exponent).end);
  for (let own = 1n; own < first.numerator && own < 20n; own += 1n) {
    if (first.numerator % own !== 0n) continue;
    const other = whole(first.numerator / own);
    const front = own === 1n ? '' : String(own);
    yield {
      by: power(base, sum(product(whole(own), rest), other)),
      edits: [{ ...outer(exponent), text: `${front}${text}+${first.numerator / own}` }],
      cost: 1.4,
    };
  }
}

/** Numerator and denominator exchanged. */
function* turnedOver(node: Extract<Expr, { kind: 'quotient' }>, tex: string): Generator<Shape> {
  const { numerator, denominator } = node;
  if (node.written !== 'fraction') return;
  const [above, below] = [outer(numerator), outer(denominator)];
  const edits: Edit[] = [
    { ...above, text: tex.slice(below.start, below.end) },
    { ...below, text: tex.slice(above.start, above.end) },
  ];
  yield { by: { ...node, numerator: denominator, denominator: numerator }, edits, cost: 1.4 };
}

/** y/4 for 4y: divided where it should have been multiplied. */
function* multipliedInstead(node: Extract<Expr, { kind: 'quotient' }>, tex: string): Generator<Shape> {
  const { numerator, denominator } = node;
  const text = (part: Expr): string => tex.slice(outer(part).start, outer(part).end);
  const isPlain = (part: Expr): boolean =>
    part.kind !== 'sum' && !(part.kind === 'product' && part.factors.some((factor) => factor.kind === 'number'));
  if (!isPlain(denominator) || !isPlain(numerator) || numerator.kind === 'number') return;
  yield {
    by: product(denominator, numerator),
    edits: [
      {
        ...node.span,
        text:
          denominator.kind === 'number'
            ? glue(text(denominator), text(numerator))
            : glue(text(numerator), text(denominator)),
      },
    ],
    cost: 1.45,
  };
}

/** 4y for y/4, the other way round; also with a letter or a bracket. */
function* factorBelow(node: Extract<Expr, { kind: 'product' }>, tex: string): Generator<Shape> {
  for (const [k, factor] of node.factors.entries()) {
    if (factor.kind !== 'number' && factor.kind !== 'letter') continue;
    const rest = node.factors.filter((other) => other !== factor);
    const [first, last] = [rest[0], rest[rest.length - 1]];
    if (!first || !last || (k > 0 && k < node.factors.length - 1)) continue;
    const inner = rest.length === 1 ? first.span : { start: outer(first).start, end: outer(last).end };
    const text = `\\frac{${tex.slice(inner.start, inner.end)}}{${tex.slice(outer(factor).start, outer(factor).end)}}`;
    yield { by: quotient(product(...rest), factor), edits: [{ ...outer(node), text }], cost: 1.45 };
  }
}

/** A sum or product that should have been squared. */
function* squared(node: Expr, tex: string): Generator<Shape> {
  const { start, end } = outer(node);
  const edit = node.bracketed ? { start: end, end, text: '^2' } : { start, end, text: `(${tex.slice(start, end)})^2` };
  yield { by: power(node, whole(2)), edits: [edit], cost: 1.35 };
}

/** b - a for a - b. */
function* exchanged(node: Extract<Expr, { kind: 'sum' }>, tex: string): Generator<Shape> {
  const [first, second, ...more] = node.terms;
  if (!first || !second || more.length > 0 || first.sign !== 'plus' || second.sign !== 'minus') return;
  const [a, b] = [outer(first.expr), outer(second.expr)];
  const edits: Edit[] = [
    { start: first.span.start, end: a.end, text: tex.slice(b.start, b.end) },
    { ...b, text: tex.slice(a.start, a.end) },
  ];
  yield { by: sum(second.expr, neg(first.expr)), edits, cost: 1.1 };
}

/** The whole of a side or expression: under a root, or divided by a letter or a number. */
export function* wholeShapes(aim: Aim, letters: readonly string[], tex: string): Generator<Candidate> {
  const [focus] = aim.roots;
  if (!focus || aim.roots.length !== 1 || aim.tree !== focus) return;
  const { start, end } = outer(focus);
  const inner = tex.slice(focus.span.start, focus.span.end);
  const anew = (text: string, cost: number): Candidate => ({
    edits: [{ start, end, text }],
    cost,
    touchesRight: false,
  });
  const fits = (by: Expr): boolean => aim.targets.some((target) => hits(by, target, aim.places));
  aim.budget.spend(aim.cost);
  if (fits(root(focus))) yield anew(`\\sqrt{${inner}}`, 1.5);
  for (const name of letters) if (fits(quotient(focus, letter(name)))) yield anew(`\\frac{${inner}}{${name}}`, 1.5);
  const value = focus.kind === 'number' ? null : solveHole(quotient(focus, hole), 2, aim, aim.targets[0] ?? []);
  if (value?.den === 1n && value.num > 1n) yield anew(`\\frac{${inner}}{${value.num}}`, 1.5);
}

/** A - B for A over B: subtracted where it should have been divided by. */
function* lastTermBelow(node: Extract<Expr, { kind: 'sum' }>): Generator<Shape> {
  const last = node.terms[node.terms.length - 1];
  if (!last || node.terms.length < 2 || last.sign !== 'minus') return;
  const rest: Expr = { ...node, terms: node.terms.slice(0, -1) };
  const edits: Edit[] = [
    { start: node.span.start, end: node.span.start, text: '\\frac{' },
    { start: last.span.start, end: outer(last.expr).start, text: '}{' },
    { start: outer(last.expr).end, end: outer(last.expr).end, text: '}' },
  ];
  yield { by: quotient(rest, last.expr), edits, cost: 1.6 };
}

type FunctionExpr = Extract<Expr, { kind: 'call' | 'log' }>;

function argumentOf(node: FunctionExpr): Expr | null {
  if (node.kind === 'log') return node.argument;
  return node.args.length === 1 ? (node.args[0] ?? null) : null;
}

function withArgument(node: FunctionExpr, argument: Expr): Expr {
  return node.kind === 'log' ? { ...node, argument } : { ...node, args: [argument] };
}

/** f(5z) for 5 f(z) or f(z^5). */
function* factorMoved(node: FunctionExpr, tex: string): Generator<Shape> {
  const argument = argumentOf(node);
  const [first, second, ...others] = argument?.kind === 'product' ? argument.factors : [];
  if (!argument || !first || !second || others.length > 0 || first.kind !== 'number') return;
  const factor = outer(first);
  const digits = tex.slice(factor.start, factor.end);
  const removed: Edit = { start: factor.start, end: outer(second).start, text: '' };
  const start = node.span.start;
  const bare = second.kind === 'letter' && /\\left\($|\($/.test(tex.slice(0, factor.start));
  const unbracketed: Edit[] = bare
    ? [
        {
          start: tex.slice(0, factor.start).replace(/(\\left)?\($/, '').length,
          end: node.span.end,
          text: ` ${tex.slice(outer(second).start, outer(second).end)}`,
        },
      ]
    : [removed];
  yield {
    by: product(first, withArgument(node, second)),
    edits: [{ start, end: start, text: digits }, ...unbracketed],
    cost: 1.5,
  };
  const end = outer(second).end;
  yield {
    by: withArgument(node, power(second, first)),
    edits: [removed, { start: end, end, text: `^{${digits}}` }],
    cost: 1.55,
  };
}

const partners: Partial<Record<FunctionName, readonly FunctionName[]>> = {
  sin: ['cos'],
  cos: ['sin'],
  tan: ['cot'],
  cot: ['tan'],
  sec: ['csc', 'cos'],
  csc: ['sec', 'sin'],
  sinh: ['cosh'],
  cosh: ['sinh'],
};

/** The partner function in its place. */
function* otherFunction(node: FunctionExpr, tex: string): Generator<Shape> {
  if (node.kind !== 'call') return;
  const start = node.span.start;
  const command = `\\${node.name}`;
  if (!tex.startsWith(command, start)) return;
  for (const name of partners[node.name] ?? []) {
    yield {
      by: call(name, ...node.args),
      edits: [{ start, end: start + command.length, text: `\\${name}` }],
      cost: 1.2,
    };
  }
}
