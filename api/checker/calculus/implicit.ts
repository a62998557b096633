import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import { mapExpr } from '../../../shared/maths/walk.ts';
import type { CheckContext } from '../context.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { comparesOf, isLetter, type CompareStatement, type Statement } from '../statements/statement.ts';
import { judgeFormula } from '../rules/formula.ts';
import { judgeSameEquation } from '../rules/same-equation.ts';
import { freeLetters } from '../rules/meaning.ts';
import type { StatementAnswer, StatementQuestion } from '../rules/statement-step.ts';
import { fails, holds, undecided, type StepResult } from '../rules/step-result.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import { divExprs, negateExpr, subExprs } from './build.ts';
import { judgeChainRule } from './chain-rule.ts';
import { tryOnCurve } from './curve.ts';
import { differentiate } from './differentiate.ts';
import { linearIn } from './integrand.ts';
import { judgeIntegralEquations } from './integral-equations.ts';
import { judgeMixedPartials } from './mixed-partials.ts';
import { rateNamed } from './rates.ts';
import { carriedOut } from './reduce.ts';

type Judge = (question: StatementQuestion) => StatementAnswer;

/** Rules 2 and 8 on statements with dy/dx or integrals; all others go on to `judge`. Throws Unsettled. */
export function judgeWithRates(asked: StatementQuestion, judge: Judge): StatementAnswer {
  const mixed = asked.context.calculus?.dependents.size ? judgeMixedPartials(asked) : null;
  if (mixed) return { ...mixed, candidates: [] };
  const question = withoutOperators(asked);
  const { above, below, context } = question;
  const chained = context.calculus?.dependents.size ? judgeChainRule(question) : null;
  if (chained) return { ...chained, candidates: [] };
  const integrals = judgeIntegralEquations(question);
  if (integrals) return { ...integrals, candidates: [] };
  const [before, after] = [ratesIn(above, context), ratesIn(below, context)];
  if (before.length + after.length === 0) return withConstants(question, judge);
  const fresh = after.filter((name) => !before.includes(name) && orderOf(name) > Math.max(0, ...before.map(orderOf)));
  if (fresh.length > 0) return { ...judgeDerived(question, fresh), candidates: [] };
  return confirmed(question, judge);
}

function orderOf(name: string): number {
  return rateNamed(name)?.order ?? 0;
}

/** Derivatives carried out, so that dy/dx shows as a letter. */
function withoutOperators(question: StatementQuestion): StatementQuestion {
  const { above, below, known, context } = question;
  if (!context.calculus?.dependents.size) return question;
  const carried = (statement: Statement): Statement => {
    if (statement.kind === 'all' || statement.kind === 'any')
      return { ...statement, parts: statement.parts.map(carried) };
    if (statement.kind !== 'compare') return statement;
    return { ...statement, left: carriedOut(statement.left, context), right: carriedOut(statement.right, context) };
  };
  return { ...question, above: carried(above), below: carried(below), known: known.map(carried) };
}

/** A constant of integration may take up another one: where the lines differ as they stand, nothing is said. */
function withConstants(question: StatementQuestion, judge: Judge): StatementAnswer {
  const result = judge(question);
  const { above, below, context } = question;
  const names = [...freeLetters(above, context), ...freeLetters(below, context)];
  const isFree = context.calculus?.hasIntegral && names.some((name) => context.calculus?.constants.has(name));
  return result.ruling === 'fails' && isFree ? { ...undecided('not-settled'), candidates: [] } : result;
}

export function ratesIn(statement: Statement, context: CheckContext): string[] {
  return freeLetters(statement, context).filter((name) => rateNamed(name) !== null);
}

function equationOf(statement: Statement): CompareStatement | null {
  return statement.kind === 'compare' && statement.sign === '=' ? statement : null;
}

/** The line below follows from the derivative of an equation that is known. */
function judgeDerived(question: StatementQuestion, fresh: readonly string[]): StepResult {
  const { above, known, context } = question;
  const below = equationOf(question.below);
  const sources = [above, ...[...known].reverse()].flatMap((statement) => equationOf(statement) ?? []);
  const [target] = fresh;
  const rate = target === undefined ? null : rateNamed(target);
  if (!below || !rate || sources.length === 0) return undecided('not-covered');
  const derived = derivedFrom(sources, rate.by, rate.order, context);
  for (const equation of derived) {
    const found = judgeSameEquation(equation, below, context);
    if (found) return oneWay(found, sources[0] as CompareStatement, question);
  }
  const relations = sources.filter((equation) => ratesIn(equation, context).length === 0);
  const rated = [...derived, ...sources.filter((equation) => ratesIn(equation, context).length > 0)];
  const first = derived.find((equation) => ratesIn(equation, context).includes(target ?? ''));
  if (first && target !== undefined) {
    const formula = tryFormula(question, first, target);
    if (formula?.ruling === 'holds') return oneWay(formula, sources[0] as CompareStatement, question);
  }
  return onCurve(relations, rated, below, question, (found) => oneWay(found, sources[0] as CompareStatement, question));
}

function tryFormula(question: StatementQuestion, above: CompareStatement, letter: string): StepResult | null {
  const { below, settings, context } = question;
  try {
    return judgeFormula({
      above,
      below,
      letter,
      reference: above,
      families: new Set(),
      settings,
      context,
    });
  } catch (cause) {
    if (cause instanceof Unsettled) return null;
    throw cause;
  }
}

function derivedFrom(
  sources: readonly CompareStatement[],
  by: string,
  order: number,
  context: CheckContext,
): CompareStatement[] {
  const result: CompareStatement[] = [];
  for (const { left, right, sign } of sources) {
    let sides = [carriedOut(left, context), carriedOut(right, context)] as const;
    for (let k = 0; k < order; k += 1) {
      sides = [differentiate(sides[0], by, context), differentiate(sides[1], by, context)];
      result.push({ kind: 'compare', left: sides[0], sign, right: sides[1] });
    }
  }
  return result;
}

/** Differentiating forgets a constant: it is a gain, which counts where every step has to be reversible. */
function oneWay(found: StepResult, source: CompareStatement, { settings }: StatementQuestion): StepResult {
  if (settings.reversible) {
    const gained = `${printExpr(source.left)}=${printExpr(source.right)}+C`;
    return fails(found.reached ?? 'proved', { gained: [gained], operation: 'differentiate' });
  }
  return holds(found.reached ?? 'sampled', [...found.notes, 'one-way'], {
    ...found.evidence,
    operation: 'differentiate',
  });
}

/** Of several rates by one letter all but one may be anything: they are letters like others. */
function withOneRate(below: CompareStatement, rated: readonly CompareStatement[], context: CheckContext) {
  const rates = [...new Set([below, ...rated].flatMap((equation) => ratesIn(equation, context)))];
  const bys = new Set(rates.map((name) => rateNamed(name)?.by));
  const isPlain = rates.length > 1 && bys.size === 1 && rates.every((name) => orderOf(name) === 1);
  if (!isPlain) return { claim: below, others: rated };
  const kept = rates.find((name) => isLetter(below.left, name)) ?? rates[0];
  const change = (expr: Expr): Expr =>
    mapExpr(expr, (node) =>
      node.kind === 'letter' && rates.includes(node.name) && node.name !== kept
        ? { ...node, name: `q_{${rates.indexOf(node.name) + 1}}` }
        : node,
    );
  const renamed = (equation: CompareStatement): CompareStatement => ({
    ...equation,
    left: change(equation.left),
    right: change(equation.right),
  });
  return { claim: renamed(below), others: rated.map(renamed) };
}

function onCurve(
  relations: readonly CompareStatement[],
  rated: readonly CompareStatement[],
  below: CompareStatement,
  { context }: StatementQuestion,
  agreed: (found: StepResult) => StepResult,
): StepResult {
  const { claim, others } = withOneRate(below, rated, context);
  const found = tryOnCurve(relations, others, claim, context);
  if (found.kind === 'apart')
    return fails('proved', { witness: { at: { ...found.at }, above: 'true', below: 'false' } });
  return found.kind === 'agreed' ? agreed(holds('sampled')) : undecided('not-settled');
}

/** Two equations that are linear in the one rate that both have: they say the same of it where both have a value. */
function compareRates(above: CompareStatement | null, below: CompareStatement, question: StatementQuestion) {
  const { context, known } = question;
  const [rate, ...more] = new Set([...ratesIn(question.above, context), ...ratesIn(question.below, context)]);
  const isFirst = [...known].every((statement) => ratesIn(statement, context).length > 0);
  if (!above || rate === undefined || more.length > 0 || !isFirst) return null;
  const [a, b] = [above, below].map(({ left, right }) => linearIn(subExprs(left, right), rate));
  if (!a || !b) return null;
  const [p, q] = [a, b].map(({ slope, constant }) => negateExpr(divExprs(constant, slope))) as [Expr, Expr];
  const found = compareExpressions(p, q, context);
  if (found.kind === 'equal') return holds(found.reached);
  if (found.kind !== 'different') return null;
  const { atTex, above: worthAbove, below: worthBelow } = found.witness;
  return fails('proved', { witness: { at: { ...atTex }, above: worthAbove, below: worthBelow } });
}

/** What the lines say of independent letters is tried on the curve that they belong to before it counts as a fault. */
function confirmed(question: StatementQuestion, judge: Judge): StatementAnswer {
  const { known, above, context } = question;
  // What does not satisfy the curve may not be dropped here: x and y stand for any of its points.
  const rates = ratesIn(question.below, context);
  // A value at one point, such as dy/dx = -3/4 at (3, 4), follows from a point that the line does not name.
  if (rates.length === 0 || freeLetters(question.below, context).length === rates.length) {
    const isSame = freeLetters(above, context).length === ratesIn(above, context).length;
    if (!isSame) return { ...undecided('not-settled'), candidates: [] };
  }
  const result = judge({ ...question, reference: above });
  const below = equationOf(question.below);
  if (result.ruling === 'holds' || !below) return result;
  const slopes = result.ruling === 'undecided' ? compareRates(equationOf(above), below, question) : null;
  if (slopes) return { ...slopes, candidates: [] };
  const equations = [above, ...known].flatMap(comparesOf).filter(({ sign }) => sign === '=');
  const relations = equations.filter(
    (equation) =>
      ratesIn(equation, context).length === 0 && lettersOf(equation.left).length + lettersOf(equation.right).length > 0,
  );
  if (relations.length === 0) return result;
  const rated = equations.filter((equation) => ratesIn(equation, context).length > 0);
  return { ...onCurve(relations.slice(0, 1), rated, below, question, (found) => found), candidates: [] };
}
