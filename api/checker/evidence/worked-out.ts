import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { mapExpr } from '../../../shared/maths/walk.ts';
import { limitOf } from '../calculus/limit.ts';
import type { CheckContext } from '../context.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { fraction, letter, neg, product, sum, termsOf, whole } from './build.ts';
import { signedTerm } from '../slips/relations.ts';
import { antiderivative } from './antiderivative.ts';
import { derive } from './derive.ts';
import type { Candidate } from './edits.ts';
import { expanded, monomialExpr, sumExpr, wholeValue } from './monomials.ts';
import { overOneDenominator } from './one-denominator.ts';
import { outer, type Aim, type MendQuestion } from './mend-question.ts';
import { nextExpression } from '../makers/next-expression.ts';
import { substituteLetter } from './substitute.ts';

const constantNames = ['C', 'c', 'K', 'k'];

/** Derivatives and integrals by the table; an indefinite integral with the constant that the other line has. */
export function workOut(expr: Expr, other: Expr, context: CheckContext): Expr {
  const constant = constantNames.find((name) => lettersOf(other).includes(name) && !lettersOf(expr).includes(name));
  return mapExpr(expr, (node) => {
    if (node.kind === 'derivative' && node.order === 1) return derive(node.operand, node.variable) ?? node;
    if (node.kind === 'sum') return flat(node);
    if (node.kind === 'series') return writtenOut(node) ?? node;
    if (node.kind === 'product') return multipliedMatrices(node) ?? node;
    if (node.kind === 'evaluated') return evaluatedTerms(node) ?? node;
    if (node.kind === 'limit' && !hasCalculus(other)) return limitValue(node, context) ?? node;
    if (node.kind !== 'integral') return node;
    const raw = antiderivative(node.integrand, node.variable, context);
    const found = raw && joined(raw);
    if (!found) return node;
    if (!node.from || !node.to) return constant ? sum(found, letter(constant)) : found;
    return sum(substituteLetter(found, node.variable, node.to), neg(substituteLetter(found, node.variable, node.from)));
  });
}

/** What was worked out to a sum is part of the sum in which it stands. */
function flat(node: Extract<Expr, { kind: 'sum' }>): Expr {
  const isNested = node.terms.some(({ sign, expr }) => sign === 'plus' && expr.kind === 'sum' && !expr.bracketed);
  if (!isNested) return node;
  const terms = node.terms.flatMap((term) =>
    term.sign === 'plus' && term.expr.kind === 'sum' && !term.expr.bracketed ? term.expr.terms : [term],
  );
  return { ...node, terms };
}

function joined(expr: Expr): Expr {
  const terms = expanded(expr);
  return terms ? sumExpr(terms) : expr;
}

/** The terms at the upper limit, each worked out, minus what the lower limit gives. */
function evaluatedTerms(expr: Extract<Expr, { kind: 'evaluated' }>): Expr | null {
  const [name, ...others] = expr.variable ? [expr.variable] : lettersOf(expr.operand);
  if (!name || others.length > 0 || !expr.from) return null;
  const upper = termsOf(substituteLetter(expr.operand, name, expr.to)).map((term) => joined(signedTerm(term)));
  const lower = joined(substituteLetter(expr.operand, name, expr.from));
  const minus: Expr = { kind: 'sum', terms: [{ sign: 'minus', expr: lower, span: expr.span }], span: expr.span };
  return sum(...upper, lower.kind === 'number' ? minus : neg(lower));
}

function limitValue(node: Extract<Expr, { kind: 'limit' }>, context: CheckContext): Expr | null {
  try {
    const found = limitOf(node, context);
    const terms = found.kind === 'finite' ? expanded(found.value) : null;
    return terms && sumExpr(terms);
  } catch (cause) {
    if (cause instanceof Unsettled) return null;
    throw cause;
  }
}

const mostWrittenOut = 12;

/** A short sum with numbers as bounds, its terms worked out one by one. */
function writtenOut(expr: Extract<Expr, { kind: 'series' }>): Expr | null {
  const [low, high] = [wholeValue(expr.from), wholeValue(expr.to)];
  if (expr.operation !== 'sum' || low === null || high === null || high - low >= mostWrittenOut || high < low)
    return null;
  const terms = Array.from({ length: high - low + 1 }, (_, k) =>
    substituteLetter(expr.body, expr.index, whole(low + k)),
  );
  const single = terms.map((term) => {
    const found = expanded(term);
    return found?.length === 1 && found[0] ? monomialExpr(found[0]) : term;
  });
  return sum(...single);
}

/** Two matrices multiplied, each entry as the sum that it comes from. */
function multipliedMatrices({ factors }: Extract<Expr, { kind: 'product' }>): Expr | null {
  const [left, right, ...more] = factors;
  if (left?.kind !== 'matrix' || right?.kind !== 'matrix' || more.length > 0) return null;
  const columns = right.rows[0]?.map((_, k) => right.rows.map((row) => row[k] as Expr)) ?? [];
  if (left.rows.some((row) => row.length !== right.rows.length)) return null;
  const rows = left.rows.map((row) =>
    columns.map((column) => sum(...row.map((entry, k) => product(entry, column[k] as Expr)))),
  );
  return { kind: 'matrix', rows, span: left.span };
}

const wholeCost = 4;

/** Two numbers, one minus the other, below an integral: the values at its limits. */
export function* valuesAtLimits(question: MendQuestion): Generator<Candidate> {
  const { above, line, context } = question;
  if (above.kind !== 'expression' || line.kind !== 'expression') return;
  const { expr: focus } = line;
  const isDifference = focus.kind === 'sum' && focus.terms.length === 2 && focus.terms[1]?.sign === 'minus';
  const limits = isDifference ? atBothLimits(above.expr, context) : null;
  if (limits) yield { edits: [{ ...outer(focus), text: printExpr(limits) }], cost: 1.05, touchesRight: false };
}

/** The whole expression written anew, for lines that no small change mends. */
export function* rewritten(
  aim: Aim,
  above: Expr,
  aboveTex: string | null,
  context: CheckContext,
): Generator<Candidate> {
  const [focus] = aim.roots;
  if (!focus || aim.roots.length !== 1) return;
  const anew = (text: string, cost: number): Candidate => ({
    edits: [{ ...outer(focus), text }],
    cost,
    touchesRight: false,
  });
  const worked = workOut(above, focus, context);
  if (hasCalculus(above) && !hasCalculus(worked)) {
    const terms = above.kind === 'integral' ? expanded(worked) : null;
    yield anew(printExpr(terms ? sumExpr(terms) : worked), wholeCost);
  }
  const next = nextExpression(above, focus.kind === 'product' ? 'factored' : 'simplified');
  const isReordered = next !== null && aboveTex !== null && sameButForOrder(next, above);
  if (next) yield anew(isReordered ? aboveTex : printExpr(next), wholeCost + 0.3);
  const joined = focus.kind === 'quotient' ? overOneDenominator(above) : null;
  if (joined) yield anew(printExpr(joined), wholeCost);
  const multiplied = focus.kind === 'sum' ? expanded(worked) : null;
  if (multiplied && multiplied.length <= 8) yield anew(printExpr(sumExpr(multiplied)), wholeCost + 0.5);
  // Where nothing more can be done the line above is the last.
  if (aboveTex !== null && !next && !hasCalculus(above)) yield anew(aboveTex, wholeCost + 1);
}

function sameButForOrder(a: Expr, b: Expr): boolean {
  const terms = (expr: Expr): string =>
    termsOf(expr)
      .map((term) => printExpr(signedTerm(term)))
      .sort()
      .join();
  return terms(a) === terms(b);
}

function hasCalculus(expr: Expr): boolean {
  let found = false;
  mapExpr(expr, (node) => {
    if (node.kind === 'integral' || node.kind === 'derivative' || node.kind === 'limit') found = true;
    return node;
  });
  return found;
}

/** F(b) - F(a), both worked out to fractions; null where they are none. */
function atBothLimits(above: Expr, context: CheckContext): Expr | null {
  const ends = limitsOf(above, context);
  const values = ends?.map((end) => {
    const terms = expanded(end);
    const [only] = terms ?? [];
    if (terms?.length === 0) return fraction({ num: 0n, den: 1n });
    return terms?.length === 1 && only?.powers.size === 0 ? fraction(only.coefficient) : null;
  });
  const [upper, lower] = values ?? [];
  return upper && lower ? sum(upper, neg(lower)) : null;
}

function limitsOf(above: Expr, context: CheckContext): readonly [Expr, Expr] | null {
  if (above.kind === 'evaluated' && above.from && above.variable) {
    return [
      substituteLetter(above.operand, above.variable, above.to),
      substituteLetter(above.operand, above.variable, above.from),
    ];
  }
  if (above.kind !== 'integral' || !above.from || !above.to) return null;
  const found = antiderivative(above.integrand, above.variable, context);
  return (
    found && [substituteLetter(found, above.variable, above.to), substituteLetter(found, above.variable, above.from)]
  );
}
