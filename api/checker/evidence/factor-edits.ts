import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { exprsOf, childrenOf } from '../../../shared/maths/walk.ts';
import { call, letter, power, product, quotient, root, sum, whole } from './build.ts';
import type { Candidate } from './edits.ts';
import { hole, replaceNode, solveHole } from './holes.ts';
import { numberText } from './leaf-edits.ts';
import { nodesOf, type PlacedNode } from './line-parts.ts';
import { hits, outer, type Aim } from './mend-question.ts';
import * as Q from '../numbers/rational.ts';

const mostNumbers = 6;

/** Two numbers that stand in each other's place, as base and exponent may. */
export function* exchangedNumbers(aim: Aim, tex: string): Generator<Candidate> {
  const numbers = aim.roots.flatMap(nodesOf).flatMap(({ node }) => (node.kind === 'number' ? [node] : []));
  if (numbers.length > mostNumbers) return;
  for (const [k, one] of numbers.entries()) {
    for (const other of numbers.slice(k + 1)) {
      if (one.numerator === other.numerator || one.denominator !== 1n || other.denominator !== 1n) continue;
      aim.budget.spend(aim.cost);
      const changed = swap(aim.tree, one, other);
      if (!aim.targets.some((target) => hits(changed, target, aim.places))) continue;
      const [a, b] = [outer(one), outer(other)];
      yield {
        edits: [
          { ...a, text: tex.slice(b.start, b.end) },
          { ...b, text: tex.slice(a.start, a.end) },
        ],
        cost: 1.5 + aim.extra,
        touchesRight: aim.isRight(one) || aim.isRight(other),
      };
    }
  }
}

function swap(tree: Expr, one: Expr, other: Expr): Expr {
  const kept = { ...other };
  return replaceNode(replaceNode(replaceNode(tree, other, hole), one, kept), hole, one);
}

/** A term divided by a letter. */
export function* letterPutUnder(aim: Aim, letters: readonly string[], tex: string): Generator<Candidate> {
  for (const { node, leads, isFactor } of aim.roots.flatMap(nodesOf)) {
    if (leads?.term.expr !== node || isFactor || node.kind === 'quotient' || node.kind === 'sum') continue;
    for (const name of letters) {
      if (lettersOf(node).includes(name)) continue;
      aim.budget.spend(aim.cost >> 2);
      const changed = replaceNode(aim.tree, node, quotient(node, letter(name)));
      if (!aim.targets.some((target) => hits(changed, target, aim.places))) continue;
      const { start, end } = outer(node);
      const text = `\\frac{${tex.slice(node.span.start, node.span.end)}}{${name}}`;
      yield { edits: [{ start, end, text }], cost: 1.3 + aim.extra, touchesRight: aim.isRight(node) };
    }
  }
}

const largestPower = 3;
const monomialCost = 2;

/** A number and a power of a letter as one more factor of a term, as an inner derivative is. */
export function* monomialPutIn(aim: Aim, letters: readonly string[]): Generator<Candidate> {
  for (const place of aim.roots.flatMap(nodesOf)) {
    const { node, leads, isFactor } = place;
    if (leads?.term.expr !== node || isFactor || (node.kind === 'sum' && !node.bracketed)) continue;
    for (const name of letters) {
      for (let exponent = 1; exponent <= largestPower; exponent += 1) {
        aim.budget.spend(aim.cost);
        const factor = power(letter(name), whole(exponent));
        for (const target of aim.targets) {
          const value = solveHole(replaceNode(aim.tree, node, product(hole, factor, node)), 1, aim, target);
          if (value && value.num > 0n && value.den === 1n) yield withFactor(place, value, factor, exponent, aim);
        }
      }
    }
  }
}

/** Joined to the number that the term begins with. */
function withFactor({ node }: PlacedNode, value: Q.Rational, factor: Expr, exponent: number, aim: Aim): Candidate {
  const first = node.kind === 'product' ? node.factors[0] : node;
  const name = factor.kind === 'power' ? factor.base : factor;
  const text = `${name.kind === 'letter' ? name.name : ''}${exponent === 1 ? '' : `^${exponent}`}`;
  const cost = monomialCost + 0.02 * exponent + aim.extra;
  if (first?.kind === 'number' && first.denominator === 1n) {
    const number = Q.mul(value, { num: first.numerator, den: 1n });
    return { edits: [{ ...outer(first), text: `${numberText(number)}${text}` }], cost, touchesRight: false };
  }
  const { start } = outer(node);
  const front = Q.equals(value, Q.one) ? '' : numberText(value);
  return { edits: [{ start, end: start, text: `${front}${text}` }], cost, touchesRight: false };
}

/** Bars around some terms or a part, where the line above has the root of a power. */
export function* barsPutIn(aim: Aim, above: Line, tex: string): Generator<Candidate> {
  if (tex.includes('|') || !exprsOf(above).some(hasRootOfPower)) return;
  for (const { node, leads, isFactor } of aim.roots.flatMap(nodesOf)) {
    for (const { by, start, end } of barred(node, leads?.term.expr === node && !isFactor)) {
      aim.budget.spend(aim.cost);
      const changed = replaceNode(aim.tree, node, by);
      if (aim.targets.some((target) => hits(changed, target, aim.places))) {
        const edits = [
          { start, end: start, text: '|' },
          { start: end, end, text: '|' },
        ];
        yield { edits, cost: 1.4 + aim.extra, touchesRight: false };
      }
    }
  }
}

interface Barred {
  readonly by: Expr;
  readonly start: number;
  readonly end: number;
}

/** A run of neighbouring terms of a sum, the first without a minus; a part by itself. */
function* barred(node: Expr, isTerm: boolean): Generator<Barred> {
  if (node.kind !== 'sum') {
    if (isTerm && lettersOf(node).length > 0) yield { by: call('abs', node), ...outer(node) };
    return;
  }
  for (const [from, first] of node.terms.entries()) {
    if (first.sign !== 'plus') continue;
    for (let to = from + 1; to < node.terms.length; to += 1) {
      const run: Expr = { ...node, terms: node.terms.slice(from, to + 1) };
      const last = node.terms[to];
      if (!last || lettersOf(run).length === 0) continue;
      const by: Expr = {
        ...node,
        terms: [...node.terms.slice(0, from), { ...first, expr: call('abs', run) }, ...node.terms.slice(to + 1)],
      };
      yield {
        by: by.terms.length === 1 ? sum(call('abs', run)) : by,
        start: outer(first.expr).start,
        end: outer(last.expr).end,
      };
    }
  }
}

function hasRootOfPower(expr: Expr): boolean {
  const { kind } = expr;
  return (kind === 'root' && expr.radicand.kind === 'power') || childrenOf(expr).some(hasRootOfPower);
}

/** The root of a number in place of a number, among numbers only. */
export function* rootPutIn(aim: Aim, texts: string): Generator<Candidate> {
  if (!texts.includes('\\sqrt') || lettersOf(aim.tree).length > 0) return;
  for (const { node } of aim.roots.flatMap(nodesOf)) {
    if (node.kind !== 'number') continue;
    for (const target of aim.targets) {
      aim.budget.spend(aim.cost);
      const value = solveHole(replaceNode(aim.tree, node, root(hole)), 2, aim, target);
      if (value?.den === 1n && value.num > 1n)
        yield {
          edits: [{ ...outer(node), text: `\\sqrt{${value.num}}` }],
          cost: 1.4 + aim.extra,
          touchesRight: aim.isRight(node),
        };
    }
  }
}
