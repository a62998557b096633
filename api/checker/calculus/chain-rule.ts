import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { mapExpr } from '../../../shared/maths/walk.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import type { StatementQuestion } from '../rules/statement-question.ts';
import { fails, holds, undecided, type StepResult } from '../rules/step-result.ts';
import { comparesOf, exprsOfStatement, type CompareStatement, type Statement } from '../statements/statement.ts';
import { divExprs } from './build.ts';
import { differentiate } from './differentiate.ts';
import { rateExpr, rateName, rateNamed, type Rate } from './rates.ts';
import { substitute } from './substitute.ts';

/** What the lines before say outright: y = f(u), and dy/dt = g(t). */
interface Facts {
  readonly formulas: ReadonlyMap<string, Expr>;
  readonly rates: ReadonlyMap<string, Expr>;
  /** All rates that occur, in the claim as well. */
  readonly met: readonly Rate[];
  /** Whether the lines say nothing else, which could bind letters that look free. */
  readonly isComplete: boolean;
  readonly context: CheckContext;
}

/**
 * Rates of letters that depend on each other: along a curve x = x(t), y = y(t), or by way of a letter between,
 * dy/dx = (dy/dt)/(dx/dt) and dy/dx = (dy/du)(du/dx). Each equation below has to be an identity once they are put in.
 * Null where the lines say too little.
 */
export function judgeChainRule(question: StatementQuestion): StepResult | null {
  const { above, below, known, settings, context } = question;
  const claims = equationsOf(below);
  const facts = factsOf([...known, above], below, context);
  if (!claims || !concernsSeveral(facts)) return null;
  // Elsewhere rates by different letters would count as independent of each other.
  const open = bysOf(facts).size > 1 ? undecided('not-settled') : null;
  let reached: 'proved' | 'sampled' = 'proved';
  let isOpen = false;
  for (const { left, right } of claims) {
    const sides = [left, right].map((side) => putIn(side, facts));
    const [a, b] = sides;
    if (!a || !b) return open;
    isOpen ||= a.isOpen || b.isOpen;
    const found = compareExpressions(a.expr, b.expr, context);
    if (found.kind === 'different' && !isOpen && facts.isComplete) {
      const { atTex, above: worthAbove, below: worthBelow } = found.witness;
      return fails('proved', { witness: { at: { ...atTex }, above: worthAbove, below: worthBelow } });
    }
    if (found.kind !== 'equal') return open;
    if (found.reached === 'sampled') reached = 'sampled';
  }
  return settings.reversible ? null : holds(reached, ['one-way'], { operation: 'differentiate' });
}

function equationsOf(statement: Statement): readonly CompareStatement[] | null {
  if (statement.kind !== 'compare' && statement.kind !== 'all') return null;
  const compares = comparesOf(statement);
  const isWhole = statement.kind === 'compare' || statement.parts.every((part) => part.kind === 'compare');
  const hasRates = compares.some((compare) => ratesOf([compare]).length > 0);
  return isWhole && hasRates && compares.every(({ sign }) => sign === '=') ? compares : null;
}

function factsOf(known: readonly Statement[], below: Statement, context: CheckContext): Facts {
  const formulas = new Map<string, Expr>();
  const rates = new Map<string, Expr>();
  let isComplete = known.every((statement) => statement.kind === 'compare' || statement.kind === 'all');
  for (const { left, sign, right } of known.flatMap(certainCompares)) {
    if (sign !== '=' || left.kind !== 'letter' || lettersOf(right).includes(left.name)) {
      isComplete = false;
      continue;
    }
    const into = rateNamed(left.name) ? rates : formulas;
    if (!into.has(left.name)) into.set(left.name, right);
  }
  return { formulas, rates, met: ratesOf([...known, below]), isComplete, context };
}

function certainCompares(statement: Statement): CompareStatement[] {
  if (statement.kind === 'all') return statement.parts.flatMap(certainCompares);
  return statement.kind === 'compare' ? [statement] : [];
}

function ratesOf(statements: readonly Statement[]): Rate[] {
  return statements
    .flatMap(exprsOfStatement)
    .flatMap((expr) => lettersOf(expr).flatMap((name) => rateNamed(name) ?? []));
}

/** One rate by one letter is an ordinary derivative: that is judged elsewhere. */
function concernsSeveral(facts: Facts): boolean {
  const ofs = new Set(facts.met.map(({ of }) => of));
  return ofs.size > 1 || bysOf(facts).size > 1 || (ofs.size > 0 && facts.formulas.size > 1);
}

function bysOf({ met, context }: Facts): ReadonlySet<string> {
  return new Set(met.flatMap(({ of, by }) => [by, context.calculus?.dependents.get(of) ?? by]));
}

/** An expression by base letters alone; `isOpen` where a rate of unknown worth is left. */
function putIn(expr: Expr, facts: Facts): { expr: Expr; isOpen: boolean } | null {
  let isOpen = false;
  let isWhole = true;
  const withRates = mapExpr(expr, (node) => {
    const rate = node.kind === 'letter' ? rateNamed(node.name) : null;
    if (!rate) return node;
    const worth = worthOfRate(rate, facts, 0);
    if (worth === null && !isFreeRate(rate, facts)) isOpen = true;
    return worth ?? node;
  });
  const written = writtenOut(withRates, facts, 0);
  if (!written) isWhole = false;
  // A letter whose rate is stated is not free either.
  if (
    written &&
    lettersOf(written).some((name) => [...facts.rates.keys()].some((rate) => rateNamed(rate)?.of === name))
  )
    isOpen = true;
  return isWhole && written ? { expr: written, isOpen } : null;
}

/** How fast a letter changes that nothing is said of may be anything. */
function isFreeRate({ of, by, order }: Rate, { formulas, rates }: Facts): boolean {
  const isStated = [...rates.keys()].some((name) => rateNamed(name)?.of === of);
  return order === 1 && !isStated && !formulas.has(of) && !formulas.has(by);
}

const deepest = 6;

/** Formulas put in, down to the letters that have none. */
function writtenOut(expr: Expr, facts: Facts, depth: number): Expr | null {
  if (depth > deepest) return null;
  const name = lettersOf(expr).find((letter) => facts.formulas.has(letter));
  if (name === undefined) return expr;
  return writtenOut(substitute(expr, name, facts.formulas.get(name) as Expr), facts, depth + 1);
}

function worthOfRate(rate: Rate, facts: Facts, depth: number): Expr | null {
  if (depth > deepest) return null;
  if (rate.order > 1) {
    const lower = worthOfRate({ ...rate, order: rate.order - 1 }, facts, depth + 1);
    return lower && slopeBy(lower, rate.by, facts, depth + 1);
  }
  const formula = facts.formulas.get(rate.of);
  const direct = formula && slopeBy(formula, rate.by, facts, depth + 1);
  if (direct) return direct;
  const stated = facts.rates.get(rateName(rate));
  if (stated) return stated;
  return byWayOf(rate, facts, depth + 1) ?? null;
}

/** (dy/dt)/(dx/dt), for a t by which rates of both are met. */
function byWayOf({ of, by }: Rate, facts: Facts, depth: number): Expr | null {
  const bys = new Set(facts.met.filter((rate) => rate.of === of && rate.by !== by).map((rate) => rate.by));
  const middle = [...bys].find((name) => facts.met.some((rate) => rate.of === by && rate.by === name));
  if (middle === undefined) return null;
  const [top, bottom] = [of, by].map((name): Expr => {
    const rate: Rate = { of: name, by: middle, order: 1 };
    return worthOfRate(rate, facts, depth) ?? rateExpr(rate);
  }) as [Expr, Expr];
  return divExprs(top, bottom);
}

/** The derivative by a letter of an expression of others: by that letter itself, or by the base that both come down to. */
function slopeBy(expr: Expr, by: string, facts: Facts, depth: number): Expr | null {
  const { context } = facts;
  const partly = untilLetter(expr, by, facts, 0);
  if (partly && lettersOf(partly).includes(by)) return differentiate(partly, by, context, true);
  const written = writtenOut(expr, facts, 0);
  const below = facts.formulas.get(by);
  const bottom = below && writtenOut(below, facts, 0);
  if (!written || depth > deepest) return null;
  const [base, ...others] = bottom ? lettersOf(bottom) : [];
  if (bottom && base !== undefined && others.length === 0)
    return divExprs(differentiate(written, base, context, true), differentiate(bottom, base, context, true));
  const moving = lettersOf(written).filter((name) => facts.met.some((rate) => rate.of === name && rate.by === by));
  if (moving.length === 0 || !context.calculus) return null;
  const dependents = new Map(moving.map((name) => [name, by] as const));
  return differentiate(written, by, { ...context, calculus: { ...context.calculus, dependents } });
}

/** Formulas put in until the letter shows. */
function untilLetter(expr: Expr, letter: string, facts: Facts, depth: number): Expr | null {
  if (lettersOf(expr).includes(letter)) return expr;
  const name = lettersOf(expr).find((inner) => facts.formulas.has(inner));
  if (name === undefined || depth > deepest) return null;
  return untilLetter(substitute(expr, name, facts.formulas.get(name) as Expr), letter, facts, depth + 1);
}
