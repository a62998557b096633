import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import type { CheckContext, Definitions } from '../context.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import { fails, holds, undecided, type StepResult } from '../rules/step-result.ts';
import { withoutDefinition } from './antiderivative.ts';
import { callOf, numberOf, powExprs, rationalOf } from './build.ts';
import { differentialsIn, judgeDifferentials, withoutDifferentials } from './differentials.ts';
import { differentiate } from './differentiate.ts';
import { solvedFor } from './inverse.ts';
import { rateName, rateNamed } from './rates.ts';

export interface SubstitutionLine {
  readonly result: StepResult;
  readonly defines: Definitions | null;
}

/** u = x^2+1, du = 2x dx, or several of these, on the way from an integral; null for any other line. */
export function judgeSubstitution(line: Line, from: Expr, context: CheckContext): SubstitutionLine | null {
  const parts = line.kind === 'all' ? line.parts : [line];
  if (!hasIntegral(from) && context.definitions.letters.size === 0) return null;
  let current = context;
  let result: StepResult | null = null;
  // What defines a letter comes before what is said of its differential, in whatever order it is written.
  const ordered = [
    ...parts.filter((part) => differentialsOf(part).length === 0),
    ...parts.filter((part) => differentialsOf(part).length > 0),
  ];
  for (const part of ordered) {
    const next = judgePart(part, from, current);
    if (!next) return null;
    if (next.defines) current = { ...current, definitions: next.defines };
    if (!result || result.ruling === 'holds') result = next.result;
  }
  return result && { result, defines: current === context ? null : current.definitions };
}

function differentialsOf(line: Line): string[] {
  return line.kind === 'relation' ? [...differentialsIn(line.left), ...differentialsIn(line.right)] : [];
}

function judgePart(line: Line, from: Expr, context: CheckContext): SubstitutionLine | null {
  const judged = judgeDifferentials(line, context);
  if (judged) return { result: judged, defines: null };
  if (line.kind !== 'relation' || line.sign !== '=') return null;
  const announced = announcedOf(line.left, line.right, from, context);
  if (announced) return defined(announced.name, announced.value, context);
  if (line.left.kind === 'rate' && context.definitions.letters.has(line.left.of))
    return { result: judgeRemark(line.left, line.right, context), defines: null };
  if (line.left.kind !== 'letter') return null;
  const { name } = line.left;
  if (context.definitions.letters.has(name)) return judgeKnown(name, line.left, line.right, context);
  if (!hasIntegral(from) || rateNamed(name)) return null;
  const inside = lettersOf(line.right);
  if (isNew(name, from, context))
    return !inside.includes(name) && inside.some((letter) => lettersWithin(from).has(letter))
      ? defined(name, line.right, context)
      : null;
  return judgeOldLetter(name, line.right, from, context);
}

function defined(name: string, value: Expr, context: CheckContext): SubstitutionLine {
  return { result: holds('proved', ['definition']), defines: withDefinition(context.definitions, name, value) };
}

/** dv = e^x dx or v' = e^x before v is known: v will be an integral of it. */
function announcedOf(left: Expr, right: Expr, from: Expr, context: CheckContext): { name: string; value: Expr } | null {
  const rate = left.kind === 'letter' ? rateNamed(left.name) : null;
  if (rate) {
    const isFresh = rate.order === 1 && hasIntegral(from) && isNew(rate.of, from, context);
    return isFresh && lettersOf(right).includes(rate.by) ? { name: rate.of, value: integralOf(right, rate.by) } : null;
  }
  const [own, ...more] = differentialsIn(left);
  const [by, ...others] = differentialsIn(right);
  if (own === undefined || by === undefined || more.length + others.length > 0 || !isNew(own, from, context))
    return null;
  const names = [own, by];
  const [dv, f] = [left, right].map((side) => withoutDifferentials(side, names)) as [Expr, Expr];
  return isOne(dv) ? { name: own, value: integralOf(f, by) } : null;
}

function integralOf(integrand: Expr, variable: string): Expr {
  return { kind: 'integral', integrand, variable, from: null, to: null, span: integrand.span };
}

function isOne(expr: Expr): boolean {
  return expr.kind === 'number' && expr.numerator === expr.denominator;
}

/**
 * A line with an integral by a letter that nothing was said of, such as u, may go on by substitution: u is then the one part
 * of the integrand above with which it does. Null where there is no such part, or several.
 */
export function inferredDefinition(
  above: Expr,
  below: Expr,
  context: CheckContext,
  follows: (within: CheckContext) => boolean,
): Definitions | null {
  const [name, ...more] = new Set(variablesIn(below).filter((letter) => isNew(letter, above, context)));
  const [by, ...others] = new Set(variablesIn(above));
  if (name === undefined || by === undefined || more.length + others.length > 0 || rateNamed(name)) return null;
  const found: Definitions[] = [];
  for (const part of partsWith(above, by)) {
    const definitions = withDefinition(context.definitions, name, part);
    if (follows({ ...context, definitions })) found.push(definitions);
    if (found.length > 1) return null;
  }
  return found[0] ?? null;
}

const mostParts = 12;

/** The different parts of the integrands that depend on the letter and are not that letter. */
function partsWith(expr: Expr, letter: string): Expr[] {
  const parts: Expr[] = [];
  const visit = (node: Expr): void => {
    if (!lettersOf(node).includes(letter) || node.kind === 'letter') return;
    for (const part of node.kind === 'integral' ? [] : [node, ...halvesOf(node)])
      if (!parts.some((known) => sameExpr(known, part))) parts.push(part);
    childrenOf(node).forEach(visit);
  };
  const integrals = (node: Expr): void =>
    node.kind === 'integral' ? visit(node.integrand) : childrenOf(node).forEach(integrals);
  integrals(expr);
  return parts.slice(-mostParts);
}

/** x^2 in x^4, and cos x in tan x. */
function halvesOf(expr: Expr): Expr[] {
  const [argument] = expr.kind === 'call' && (expr.name === 'tan' || expr.name === 'cot') ? expr.args : [];
  if (expr.kind === 'call' && argument) return [callOf(expr.name === 'tan' ? 'cos' : 'sin', argument)];
  const times = expr.kind === 'power' && expr.base.kind === 'letter' ? rationalOf(expr.exponent) : null;
  if (expr.kind !== 'power' || times?.den !== 1n || times.num % 2n !== 0n || times.num < 4n) return [];
  return [powExprs(expr.base, numberOf(times.num / 2n))];
}

/** What is said of a letter that was defined before: v = e^x after dv = e^x dx, u' = 2x after u = x^2. */
function judgeKnown(name: string, left: Expr, right: Expr, context: CheckContext): SubstitutionLine | null {
  const value = context.definitions.letters.get(name);
  if (value?.kind !== 'integral' || value.from) return { result: judgeRemark(left, right, context), defines: null };
  const known = withoutDefinition(context, name);
  const result = judgeRemark(value.integrand, differentiate(right, value.variable, known), known);
  return { result, defines: result.ruling === 'holds' ? withDefinition(context.definitions, name, right) : null };
}

function judgeRemark(left: Expr, right: Expr, context: CheckContext): StepResult {
  const found = compareExpressions(left, right, context);
  if (found.kind === 'equal') return holds(found.reached, ['remark']);
  if (found.kind !== 'different') return undecided('not-settled');
  const { atTex, above, below } = found.witness;
  return fails('proved', { witness: { at: { ...atTex }, above, below } });
}

/** x = 2 sin t for the letter of the integral defines t; x = u^2 after u was defined is a remark. */
function judgeOldLetter(name: string, right: Expr, from: Expr, context: CheckContext): SubstitutionLine | null {
  const inside = lettersOf(right);
  const known = inside.filter((letter) => context.definitions.letters.has(letter));
  if (known.length > 0)
    return { result: judgeRemark({ kind: 'letter', name, span: right.span }, right, context), defines: null };
  const fresh = inside.filter((letter) => isNew(letter, from, context));
  const [letter] = fresh;
  if (letter === undefined || fresh.length > 1 || inside.includes(name) || !variablesIn(from).includes(name))
    return null;
  const value = solvedFor(right, letter, { kind: 'letter', name, span: right.span });
  return value && defined(letter, value, context);
}

function variablesIn(expr: Expr): string[] {
  const inside = childrenOf(expr).flatMap(variablesIn);
  return expr.kind === 'integral' ? [expr.variable, ...inside] : inside;
}

function isNew(name: string, from: Expr, context: CheckContext): boolean {
  return !context.definitions.letters.has(name) && !lettersWithin(from).has(name);
}

/** Letters that occur, bound ones as well. */
function lettersWithin(expr: Expr): Set<string> {
  const found = new Set(lettersOf(expr));
  if (expr.kind === 'integral') found.add(expr.variable);
  for (const part of childrenOf(expr)) for (const name of lettersWithin(part)) found.add(name);
  return found;
}

export function hasIntegral(expr: Expr): boolean {
  return expr.kind === 'integral' || childrenOf(expr).some(hasIntegral);
}

/** The definition, and the derivative of the new letter by the one that it depends on. */
export function withDefinition(definitions: Definitions, name: string, value: Expr): Definitions {
  const letters = new Map(definitions.letters).set(name, value);
  const [by, ...others] = lettersOf(value);
  if (by !== undefined && others.length === 0) {
    letters.set(rateName({ of: name, by, order: 1 }), {
      kind: 'derivative',
      variable: by,
      order: 1,
      partial: false,
      operand: value,
      span: value.span,
    });
  }
  return { ...definitions, letters };
}

/** A number that an integral, limit or sum is: what follows it with = has to be equal to it. */
export function isOperatorValue(expr: Expr): boolean {
  return lettersOf(expr).length === 0 && hasOperator(expr);
}

function hasOperator(expr: Expr): boolean {
  return ['integral', 'evaluated', 'limit', 'series'].includes(expr.kind) || childrenOf(expr).some(hasOperator);
}
