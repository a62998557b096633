import type { Expr, TermSign } from '../../../shared/maths/expression.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import { fraction, letter, neg, power, product, whole } from './build.ts';
import type { Complex } from './complex-double.ts';
import type { Candidate, Edit } from './edits.ts';
import { hole, replaceNode, solveHole } from './holes.ts';
import { isWholeNumber, leavesOf, nodesOf, signSpan, type PlacedNode, type PlacedTerm } from './line-parts.ts';
import { hits, outer, type Aim } from './mend-question.ts';

/** What one change costs: a sign least, then a number, then what is put in. */
const costs = {
  sign: 1,
  number: 1.1,
  signedNumber: 1.2,
  exponent: 1.15,
  factor: 1.15,
  letter: 1.1,
  drop: 1.25,
} as const;
/** Fractions where none was written are rarely what was meant. */
const fractionCost = 1.5;

/** Changes of one number, sign, exponent, coefficient or letter after which the tree has the wanted values. */
export function* leafEdits(
  aim: Aim,
  letters: readonly string[],
  tex: string,
  isRight: (node: Expr) => boolean,
  isWanted: (node: Expr) => boolean = () => true,
): Generator<Candidate> {
  const nodes = aim.roots.flatMap(nodesOf).filter(({ node }) => isWanted(node));
  for (const target of aim.targets) {
    for (const place of nodes) {
      aim.budget.spend(aim.cost);
      for (const found of editsAt(place, aim, target, letters, tex))
        yield { ...found, touchesRight: isRight(place.node) };
    }
  }
}

type Found = Omit<Candidate, 'touchesRight'>;

function* editsAt(
  place: PlacedNode,
  aim: Aim,
  target: readonly Complex[],
  letters: readonly string[],
  tex: string,
): Generator<Found> {
  const { node } = place;
  if (node.kind === 'number') {
    const value = solveHole(
      replaceNode(aim.tree, node, hole),
      Number(node.numerator) / Number(node.denominator),
      aim,
      target,
    );
    if (value) yield* changedNumber(place, value, tex);
    return;
  }
  if (place.leads && place.leads.term.expr === node && !place.isFactor)
    yield* changedTerm(place, place.leads, aim, target, tex);
  if (node.kind === 'letter') yield* changedLetter(place, aim, target, letters);
}

/** A line with fractions in it may well have one more. */
function costOfFraction(tex: string): number {
  return tex.includes('frac') ? 0.6 : fractionCost;
}

function* changedNumber(place: PlacedNode, value: Rational, tex: string): Generator<Found> {
  const { node, leads, isExponent, isFactor } = place;
  if (node.kind !== 'number') return;
  const before = { num: node.numerator, den: node.denominator };
  if (Q.equals(value, before)) return;
  const extra =
    value.den !== 1n && isWholeNumber(node)
      ? place.isFactor || place.isExponent || place.isInQuotient
        ? fractionCost
        : costOfFraction(tex)
      : 0;
  const span = outer(node);
  if (Q.isZero(value) && leads && !leads.isOnly) {
    yield { edits: [{ ...leads.term.span, text: '' }], cost: costs.drop + 0.1 * leavesOf(leads.term.expr).length };
    return;
  }
  if (isExponent && Q.equals(value, Q.one)) {
    const start = tex.lastIndexOf('^', span.start);
    const end = tex[span.end] === '}' ? span.end + 1 : span.end;
    if (start >= 0) yield { edits: [{ start, end, text: '' }], cost: costs.drop };
    return;
  }
  if (value.num >= 0n) {
    const isUnit =
      isFactor && leads !== null && Q.equals(value, Q.one) && !/^\s*(\\cdot|\\times|[0-9])/.test(tex.slice(span.end));
    yield { edits: [{ ...span, text: isUnit ? '' : numberText(value) }], cost: costs.number + extra };
    return;
  }
  const size = Q.negate(value);
  const turned = leads && turnedSign(leads, tex);
  if (leads && turned && Q.equals(size, before)) yield { edits: [turned], cost: costs.sign + frontMinus(leads) };
  else if (leads && turned)
    yield {
      edits: [turned, { ...span, text: numberText(size) }],
      cost: costs.signedNumber + extra + frontMinus(leads),
    };
  else if (!isFactor)
    yield {
      edits: [{ ...span, text: isExponent ? `{-${numberText(size)}}` : `-${numberText(size)}` }],
      cost: costs.signedNumber + extra,
    };
}

/** A sum that comes to begin with a minus reads worse than one whose other terms change. */
function frontMinus({ term, isFirst, isOnly }: PlacedTerm): number {
  return isFirst && !isOnly && term.sign === 'plus' ? 0.15 : 0;
}

export function numberText(value: Rational): string {
  return printExpr(fraction(value));
}

/** The edit that turns the sign of a term; null for a plus-or-minus. */
export function turnedSign(placed: PlacedTerm, tex: string): Edit | null {
  const span = signSpan(placed);
  const opposite: Partial<Record<TermSign, string>> = { plus: '-', minus: placed.isFirst ? '' : '+' };
  const text = opposite[placed.term.sign];
  if (text === undefined) return null;
  const isBlank = tex.slice(span.start, span.end).trim() === '' && placed.term.sign === 'minus';
  return isBlank ? null : { ...span, text };
}

/** A coefficient put in front of a term that has none; with it its sign, or the whole term taken out. */
function* changedTerm(
  place: PlacedNode,
  leads: PlacedTerm,
  aim: Aim,
  target: readonly Complex[],
  tex: string,
): Generator<Found> {
  const { node } = place;
  if (startsWithNumber(node)) return;
  const value = solveHole(replaceNode(aim.tree, node, product(hole, node)), 1, aim, target);
  if (!value) return;
  if (Q.isZero(value)) {
    if (!leads.isOnly)
      yield { edits: [{ ...leads.term.span, text: '' }], cost: costs.drop + 0.1 * leavesOf(node).length };
    return;
  }
  const size = Q.absolute(value);
  const turned = value.num < 0n ? turnedSign(leads, tex) : null;
  if (value.num < 0n && !turned) return;
  const front: Edit[] = turned ? [turned] : [];
  if (Q.equals(size, Q.one)) {
    if (turned) yield { edits: front, cost: costs.sign + frontMinus(leads) };
    return;
  }
  const at = outer(node).start;
  const extra = (size.den === 1n ? 0 : fractionCost) + (node.kind === 'quotient' ? 0.4 : 0);
  const bracketed = node.kind === 'sum' && !node.bracketed;
  if (!bracketed)
    yield {
      edits: [...front, { start: at, end: at, text: numberText(size) }],
      cost: costs.factor + (turned ? 0.1 : 0) + extra,
    };
}

function startsWithNumber(node: Expr): boolean {
  if (node.kind === 'product') return startsWithNumber(node.factors[0] as Expr);
  if (node.kind === 'quotient') return startsWithNumber(node.numerator);
  return node.kind === 'number';
}

/** Another letter, or another power of it. */
function* changedLetter(
  place: PlacedNode,
  aim: Aim,
  target: readonly Complex[],
  letters: readonly string[],
): Generator<Found> {
  const { node, isBase } = place;
  if (node.kind !== 'letter') return;
  const span = outer(node);
  for (const name of letters) {
    if (name !== node.name && hits(replaceNode(aim.tree, node, letter(name)), target, aim.places)) {
      yield { edits: [{ ...span, text: name }], cost: costs.letter };
    }
  }
  if (isBase) return;
  const value = solveHole(replaceNode(aim.tree, node, power(node, hole)), 1, aim, target);
  if (!value || value.den !== 1n || value.num < 2n) return;
  yield { edits: [{ start: span.end, end: span.end, text: `^${exponentText(value)}` }], cost: costs.exponent };
}

function exponentText({ num }: Rational): string {
  return num < 10n && num >= 0n ? String(num) : `{${num}}`;
}

interface SmallChange {
  readonly node: Expr;
  readonly by: Expr;
  readonly edit: Edit;
  readonly cost: number;
}

/** Small changes of which two together may mend a line: signs, squares put in and taken out. */
export function smallChanges(aim: Aim, tex: string): SmallChange[] {
  const found: SmallChange[] = [];
  for (const { node, leads, isBase } of aim.roots.flatMap(nodesOf)) {
    const turned = leads && leads.term.expr === node ? turnedSign(leads, tex) : null;
    if (leads && turned) found.push({ node, by: neg(node), edit: turned, cost: 1 + frontMinus(leads) });
    const end = outer(node).end;
    if (node.kind === 'letter' && !isBase)
      found.push({ node, by: power(node, whole(2)), edit: { start: end, end, text: '^2' }, cost: 1.05 });
    if (node.kind === 'power' && node.exponent.kind === 'number') {
      found.push({ node, by: node.base, edit: { start: outer(node.base).end, end, text: '' }, cost: 1.05 });
    }
  }
  return found;
}

const widestSearch = 24;
const mostNumbers = 4;

/** Two numbers changed at once: the first tried from small whole numbers, the second solved for. */
export function* numberPairs(aim: Aim, tex: string, isRight: (node: Expr) => boolean): Generator<Candidate> {
  const numbers = aim.roots
    .flatMap(nodesOf)
    .filter(({ node, isExponent }) => isWholeNumber(node) && !isExponent && !isRight(node));
  if (numbers.length < 2 || numbers.length > mostNumbers) return;
  for (const [k, one] of numbers.entries()) {
    for (const other of numbers.slice(k + 1)) {
      for (let size = -widestSearch; size <= widestSearch; size += 1) yield* pairAt(one, other, size, aim, tex);
    }
  }
}

function* pairAt(one: PlacedNode, other: PlacedNode, value: number, aim: Aim, tex: string): Generator<Candidate> {
  if (value === 0 || one.node.kind !== 'number' || other.node.kind !== 'number') return;
  aim.budget.spend(aim.cost);
  const tree = replaceNode(aim.tree, one.node, whole(value));
  const withHole = replaceNode(tree, other.node, hole);
  for (const target of aim.targets) {
    const found = solveHole(withHole, Number(other.node.numerator), aim, target);
    if (!found || found.den !== 1n || found.num === 0n) continue;
    const far = Math.abs(value - Number(one.node.numerator)) + Math.abs(Number(found.num - other.node.numerator));
    for (const first of changedNumber(one, Q.rational(value), tex)) {
      for (const second of changedNumber(other, found, tex)) {
        yield {
          edits: [...first.edits, ...second.edits],
          cost: first.cost + second.cost + 0.001 * far,
          touchesRight: false,
        };
      }
    }
  }
}
