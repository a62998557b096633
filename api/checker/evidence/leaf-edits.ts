import type { Expr, NumberExpr, TermSign } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import { fraction, isOne, letter, neg, power, product, whole } from './build.ts';
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
/** What stands under a root or in a function was rather copied than worked out. */
const functionCost = 0.15;

/** Changes of one number, sign, exponent, coefficient or letter after which the tree has the wanted values. */
export function* leafEdits(
  aim: Aim,
  letters: readonly string[],
  tex: string,
  isWanted: (node: Expr) => boolean = () => true,
): Generator<Candidate> {
  const nodes = aim.roots.flatMap(nodesOf).filter(({ node }) => isWanted(node));
  for (const target of aim.targets) {
    for (const place of nodes) {
      aim.budget.spend(aim.cost);
      for (const found of editsAt(place, aim, target, letters, tex))
        yield { ...found, cost: found.cost + aim.extra, touchesRight: aim.isRight(place.node) };
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
  } else if (place.leads && place.leads.term.expr === node && !place.isFactor)
    yield* changedTerm(place, place.leads, aim, target, tex);
  if (place.leads?.term.expr === node && !place.isFactor) yield* letterPutIn(node, aim, target, letters);
  if (node.kind === 'product') yield* letterTakenOut(node, aim, target);
  if (node.kind === 'letter') yield* changedLetter(place, aim, target, letters);
}

/** A line with fractions in it may well have one more. */
function costOfFraction(tex: string): number {
  return tex.includes('frac') ? 0.6 : fractionCost;
}

function* changedNumber(place: PlacedNode, value: Rational, tex: string): Generator<Found> {
  const { node, leads, isExponent, isFactor, isInFunction } = place;
  if (node.kind !== 'number') return;
  const before = { num: node.numerator, den: node.denominator };
  if (Q.equals(value, before)) return;
  const inside = isInFunction ? functionCost : 0;
  const extra =
    inside +
    (value.den !== 1n && isWholeNumber(node)
      ? place.isFactor || place.isExponent || place.isInQuotient
        ? fractionCost
        : costOfFraction(tex)
      : 0);
  const span = outer(node);
  if (Q.isZero(value) && leads && !leads.isOnly) {
    yield { edits: [{ ...leads.term.span, text: '' }], cost: costs.drop + 0.1 * leavesOf(leads.term.expr).length };
    return;
  }
  if (isExponent && Q.equals(value, Q.one)) {
    const start = tex.lastIndexOf('^', span.start);
    const isBraced = tex.slice(start + 1, span.start).trim() === '{' && tex[span.end] === '}';
    const end = isBraced ? span.end + 1 : span.end;
    if (start >= 0) yield { edits: [{ start, end, text: '' }], cost: costs.drop };
    return;
  }
  if (value.num >= 0n) {
    const isUnit =
      isFactor && leads !== null && Q.equals(value, Q.one) && !/^\s*(\\cdot|\\times|[0-9])/.test(tex.slice(span.end));
    yield { edits: [{ ...span, text: isUnit ? '' : numberTextFor(node, value, tex) }], cost: costs.number + extra };
    return;
  }
  const size = Q.negate(value);
  const turned = leads && turnedSign(leads, tex);
  if (leads && turned && Q.equals(size, before))
    yield { edits: [turned], cost: costs.sign + frontMinus(leads) + below(place) + inside };
  else if (leads && turned)
    yield {
      edits: [turned, { ...span, text: numberTextFor(node, size, tex) }],
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
  if (!isFirst || term.sign !== 'plus') return 0;
  const isDifference = term.expr.kind === 'quotient' && term.expr.numerator.kind === 'sum';
  return isOnly && !isDifference ? 0 : 0.15;
}

/** A minus for a whole denominator is rather written in front or above. */
function below({ leads, isInQuotient }: PlacedNode): number {
  return leads?.isOnly && isInQuotient && leads.term.sign === 'plus' ? 0.15 : 0;
}

export function numberText(value: Rational): string {
  return printExpr(fraction(value));
}

/** As a decimal where one stood there and the value has one that is not much longer. */
function numberTextFor(node: NumberExpr, value: Rational, tex: string): string {
  if (node.written !== 'decimal' || value.den === 1n) return numberText(value);
  const decimal = decimalText(value, node.decimals + 2);
  return decimal && tex.slice(node.span.start, node.span.end).includes(',')
    ? decimal.replace('.', ',')
    : (decimal ?? numberText(value));
}

/** All digits of a positive decimal; null where it has more than so many after the point. */
function decimalText({ num, den }: Rational, most: number): string | null {
  const scale = 10n ** BigInt(most);
  if (num < 0n || (num * scale) % den !== 0n) return null;
  const digits = String((num * scale) / den).padStart(most + 1, '0');
  return `${digits.slice(0, -most)}.${digits.slice(-most)}`.replace(/\.?0+$/, '');
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

/** A letter as one more factor of a term; in place of a 1. */
function* letterPutIn(node: Expr, aim: Aim, target: readonly Complex[], letters: readonly string[]): Generator<Found> {
  if (node.kind === 'sum' && !node.bracketed) return;
  const { start, end } = outer(node);
  const factors = node.kind === 'product' ? node.factors : [node];
  const [first] = factors;
  const isNumber = first?.kind === 'number';
  for (const name of letters) {
    if (factors.some((factor) => lettersOf(factor.kind === 'power' ? factor.base : factor).includes(name))) continue;
    aim.budget.spend(aim.cost >> 2);
    if (!hits(replaceNode(aim.tree, node, product(letter(name), node)), target, aim.places)) continue;
    if (isOne(node)) yield { edits: [{ start, end, text: name }], cost: costs.letter };
    else {
      const at = isNumber && first ? outer(first).end : start;
      yield { edits: [{ start: at, end: at, text: name }], cost: costs.factor };
    }
  }
}

/** A letter that a product has too much, in front of it, at its end or between. */
function* letterTakenOut(
  node: Extract<Expr, { kind: 'product' }>,
  aim: Aim,
  target: readonly Complex[],
): Generator<Found> {
  for (const [k, factor] of node.factors.entries()) {
    if (factor.kind !== 'letter') continue;
    const others = node.factors.filter((other) => other !== factor);
    if (!hits(replaceNode(aim.tree, node, product(...others)), target, aim.places)) continue;
    const [before, after] = [node.factors[k - 1], node.factors[k + 1]];
    const start = before && !after ? outer(before).end : outer(factor).start;
    yield { edits: [{ start, end: after ? outer(after).start : outer(factor).end, text: '' }], cost: costs.drop };
  }
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
    const inside = place.isInFunction ? 2 * functionCost : 0;
    if (turned) yield { edits: front, cost: costs.sign + frontMinus(leads) + below(place) + inside };
    return;
  }
  // A number before a fraction rather goes into its numerator.
  const isAbove =
    node.kind === 'quotient' &&
    node.written === 'fraction' &&
    node.numerator.kind !== 'sum' &&
    node.denominator.kind !== 'number';
  const at = isAbove ? outer(node.numerator).start : outer(node).start;
  const extra = (size.den === 1n ? 0 : fractionCost) + (node.kind === 'quotient' && !isAbove ? 0.4 : 0);
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

const mostFlipped = 6;

/**
 * Two or three signs turned, the numbers as they are: two terms of one sum, as a pair of factors the wrong way round
 * leaves, or signs within a sum of products.
 */
export function* signChanges(aim: Aim, tex: string): Generator<Candidate> {
  const flips = aim.roots.flatMap(nodesOf).flatMap(({ node, leads, isFactor, isBase }): SmallChange[] => {
    const turned = leads?.term.expr === node && !isFactor && !isBase ? turnedSign(leads, tex) : null;
    return leads && turned ? [{ node, by: neg(node), edit: turned, cost: 1 + frontMinus(leads) }] : [];
  });
  if (flips.length < 2 || flips.length > mostFlipped) return;
  for (const chosen of subsets(flips)) {
    aim.budget.spend(aim.cost >> 2);
    const changed = chosen.reduce((tree, { node, by }) => replaceNode(tree, node, by), aim.tree);
    if (!aim.targets.some((target) => hits(changed, target, aim.places))) continue;
    const fronts = chosen.reduce((total, { cost }) => total + cost - 1, 0);
    yield {
      edits: chosen.map(({ edit }) => edit),
      cost: 1.05 + 0.02 * (chosen.length - 2) + fronts + aim.extra,
      touchesRight: chosen.some(({ node }) => aim.isRight(node)),
    };
  }
}

function subsets(flips: readonly SmallChange[]): SmallChange[][] {
  const pairs = flips.flatMap((one, k) => flips.slice(k + 1).map((other) => [one, other]));
  const triples = pairs.flatMap((pair) =>
    flips.slice(flips.indexOf(pair[1] as SmallChange) + 1).map((one) => [...pair, one]),
  );
  return [...pairs, ...triples];
}

const widestSearch = 24;
const mostNumbers = 4;

/** Two numbers changed at once: the first tried from small whole numbers, the second solved for. */
export function* numberPairs(aim: Aim, tex: string): Generator<Candidate> {
  const numbers = aim.roots
    .flatMap(nodesOf)
    .filter(({ node, isExponent }) => isWholeNumber(node) && !isExponent && !aim.isRight(node));
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
          cost: first.cost + second.cost + 0.001 * far + aim.extra,
          touchesRight: false,
        };
      }
    }
  }
}
