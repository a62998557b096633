import type { Expr, Line, Span } from '../../../shared/maths/expression.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { permutations } from '../slips/match.ts';

import { isFiniteNumber, isNear, minus, over, real, type Complex } from './complex-double.ts';
import type { Candidate, Edit } from './edits.ts';
import { estimate, type Place } from './estimate.ts';
import { isZero } from './build.ts';
import { hasTwoCases } from './case-edits.ts';
import { expanded, sumExpr } from './monomials.ts';
import { outer, type MendQuestion } from './mend-question.ts';
import { substituteLetter } from './substitute.ts';

/** One value that a line lists: where it stands, and what the whole entry is. */
interface Entry {
  readonly value: Complex;
  readonly span: Span;
  /** The text that would give the letter another value. */
  readonly textFor: (value: Expr) => string | null;
  readonly right: Span;
}

const nowhere: Place = { letters: new Map(), definitions: { letters: new Map(), functions: new Map() } };

/** Lost solutions put in and values that are none taken out or replaced. */
export function* valueListEdits(question: MendQuestion): Generator<Candidate> {
  const lost = question.lost.map((tex) => toValue(tex, question)).filter((value) => value !== null);
  if (lost.length < question.lost.length || (lost.length === 0 && question.gained.length === 0)) return;
  const listed = entriesOf(question.line);
  if (!listed) return;
  const gained = question.gained.map((tex) => toValue(tex, question)).filter((value) => value !== null);
  const wrong = listed.entries.filter(({ value }) => gained.some((other) => isNear(value, estimate(other, nowhere))));
  yield* replacements(listed, wrong, lost, question);
}

function toValue(tex: string, { settings }: MendQuestion): Expr | null {
  const reading = readLine(tex, settings);
  return reading.ok && reading.line.kind === 'expression' && isFiniteNumber(estimate(reading.line.expr, nowhere))
    ? reading.line.expr
    : null;
}

interface Listed {
  readonly name: string;
  readonly entries: readonly Entry[];
  readonly isSet: boolean;
  readonly cost: number;
}

const listCost = 0.9;
/** An equation that is not solved yet is rather mended in its terms. */
const equationCost = 2.3;

function entriesOf(line: Line): Listed | null {
  if (line.kind === 'relation') {
    const found = entryOf(line);
    const isSolved = line.left.kind === 'letter';
    return (
      found && { name: found.name, entries: [found.entry], isSet: false, cost: isSolved ? listCost : equationCost }
    );
  }
  if (line.kind === 'any') {
    const found = line.parts.map((part) => (part.kind === 'relation' ? entryOf(part) : null));
    const [first] = found;
    if (!first || found.some((part) => part?.name !== first.name)) return null;
    return {
      name: first.name,
      entries: found.flatMap((part) => (part ? [part.entry] : [])),
      isSet: false,
      cost: listCost,
    };
  }
  if (line.kind !== 'membership' || line.set.kind !== 'finite' || line.letter?.kind !== 'letter') return null;
  const entries = line.set.items.map((item): Entry => {
    return {
      value: estimate(item, nowhere),
      span: outer(item),
      right: outer(item),
      textFor: (value) => printExpr(value),
    };
  });
  return { name: line.letter.name, entries, isSet: true, cost: listCost };
}

/** letter = value, or an equation of first degree with a number on the right. */
function entryOf(line: Extract<Line, { kind: 'relation' }>): { name: string; entry: Entry } | null {
  const { left, right } = line;
  const name = onlyLetter(left);
  if (line.sign !== '=' || name === null || !isFiniteNumber(estimate(right, nowhere))) return null;
  const at = (x: number): Complex =>
    minus(estimate(left, { ...nowhere, letters: new Map([[name, real(x)]]) }), estimate(right, nowhere));
  const [f0, f1, f3] = [at(0), at(1), at(3)];
  const slope = minus(f1, f0);
  if (!isNear(minus(f3, f0), over(slope, real(1 / 3)))) return null;
  const textFor = (value: Expr): string | null => {
    if (left.kind === 'letter') return printExpr(value);
    const terms = expanded(substituteLetter(left, name, value));
    return terms && printExpr(sumExpr(terms));
  };
  return { name, entry: { value: over(minus(real(0), f0), slope), span: line.span, right: outer(right), textFor } };
}

function onlyLetter(expr: Expr): string | null {
  const names = new Set<string>();
  const visit = (node: Expr): void => {
    if (node.kind === 'letter') names.add(node.name);
    if (node.kind === 'sum') node.terms.forEach((term) => visit(term.expr));
    if (node.kind === 'product') node.factors.forEach(visit);
    if (node.kind === 'quotient') [node.numerator, node.denominator].forEach(visit);
  };
  visit(expr);
  return names.size === 1 ? ([...names][0] ?? null) : null;
}

function* replacements(
  listed: Listed,
  wrong: readonly Entry[],
  lost: readonly Expr[],
  question: MendQuestion,
): Generator<Candidate> {
  if (lost.length > 4 || wrong.length > 4) return;
  for (const order of permutations(lost)) {
    const edits: Edit[] = [];
    let cost = listed.cost;
    for (const [k, entry] of wrong.entries()) {
      const value = order[k];
      const text = value && entry.textFor(value);
      if (value && typeof text === 'string') {
        edits.push({ ...entry.right, text });
        cost += changeCost(question.tex.slice(entry.right.start, entry.right.end), text) * (1 - 0.01 * k);
      } else if (!value && listed.entries.length > 1) {
        edits.push(removal(listed, entry));
        cost += 0.3;
      } else return;
    }
    for (const value of order.slice(wrong.length)) {
      edits.push(addition(listed, value, question));
      cost += 0.4;
    }
    if (edits.length > 0) yield { edits, cost, touchesRight: false };
  }
}

function changeCost(before: string, after: string): number {
  const bare = (text: string): string => text.replace(/[-+\s]/g, '');
  if (bare(before) === bare(after)) return 0.1;
  // A power is rather mended in its numbers.
  if (before.includes('^')) return 0.8;
  return before.startsWith('-') === after.startsWith('-') ? 0.2 : 0.3;
}

/** An entry with the words that join it to its neighbour. */
function removal({ entries }: Listed, entry: Entry): Edit {
  const place = entries.indexOf(entry);
  const [before, after] = [entries[place - 1], entries[place + 1]];
  if (before) return { start: before.span.end, end: entry.span.end, text: '' };
  return { start: entry.span.start, end: after?.span.start ?? entry.span.end, text: '' };
}

/** Zero goes in front, every other value at the end. */
function addition({ name, entries, isSet }: Listed, value: Expr, { tex }: MendQuestion): Edit {
  const [first, second] = entries;
  const last = entries[entries.length - 1];
  const start = first?.span.start ?? 0;
  const end = last?.span.end ?? tex.length;
  const join = first && second ? tex.slice(first.span.end, second.span.start) : isSet ? ',' : '\\text{ or }';
  const text = isSet ? printExpr(value) : `${name}=${printExpr(value)}`;
  const isZero = value.kind === 'number' && value.numerator === 0n;
  return isZero ? { start, end: start, text: text + join } : { start: end, end, text: join + text };
}

/** x = 3 and x = -3 where a plus-or-minus stands: what is left of it, written out. */
export function* signChoices(question: MendQuestion): Generator<Candidate> {
  const { line } = question;
  yield* bothSigns(question);
  if (line.kind !== 'relation' || line.left.kind !== 'letter' || question.gained.length !== 1) return;
  const [only] = line.right.kind === 'sum' && line.right.terms.length === 1 ? line.right.terms : [];
  if (only?.sign !== 'plusminus') return;
  const gained = toValue(question.gained[0] ?? '', question);
  if (!gained) return;
  const value = estimate(only.expr, nowhere);
  const isUpper = isNear(value, estimate(gained, nowhere));
  yield {
    edits: [{ start: only.span.start, end: outer(only.expr).start, text: isUpper ? '-' : '' }],
    cost: 1,
    touchesRight: false,
  };
}

/** A plus-or-minus where one of two signs was forgotten. */
function* bothSigns({ above, line, lost, gained }: MendQuestion): Generator<Candidate> {
  if (line.kind !== 'relation' || line.sign !== '=' || gained.length > 0 || isZero(line.right)) return;
  const { right } = line;
  const isBare = right.kind === 'number' || right.kind === 'root' || right.kind === 'quotient';
  const isRooted = above.kind === 'relation' && [above.left, above.right].some(hasTwoCases);
  if (lost.length !== 1 && !(isRooted && isBare)) return;
  const { start } = outer(line.right);
  if (isBare) yield { edits: [{ start, end: start, text: '\\pm' }], cost: 1.2, touchesRight: false };
}
