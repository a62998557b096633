import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import type { CheckContext, Definitions } from '../context.ts';
import { holds, type StepResult } from '../rules/step-result.ts';
import { differentialsIn, judgeDifferentials } from './differentials.ts';
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
  // dv = e^x dx before v is known: it says what v will be.
  const [own, ...others] = differentialsIn(line.left);
  if (
    own !== undefined &&
    others.length === 0 &&
    isNew(own, from, context) &&
    differentialsIn(line.right).length === 1
  ) {
    return { result: holds('proved', ['definition']), defines: null };
  }
  if (line.left.kind !== 'letter' || !hasIntegral(from)) return null;
  const { name } = line.left;
  const inside = lettersOf(line.right);
  if (
    !isNew(name, from, context) ||
    inside.includes(name) ||
    rateNamed(name) ||
    !inside.some((letter) => lettersWithin(from).has(letter))
  )
    return null;
  return { result: holds('proved', ['definition']), defines: withDefinition(context.definitions, name, line.right) };
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
