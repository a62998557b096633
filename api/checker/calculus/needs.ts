import type { Expr } from '../../../shared/maths/expression.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import { rationalOf } from './build.ts';
import { isFree, linearIn } from './integrand.ts';
import * as Q from '../numbers/rational.ts';

/** What must not change its sign for an expression to be continuous; `strict`: nor be zero. */
export interface Need {
  readonly expr: Expr;
  readonly strict: boolean;
}

const entire: ReadonlySet<string> = new Set([
  'sin',
  'cos',
  'exp',
  'arctan',
  'sinh',
  'cosh',
  'tanh',
  'sech',
  'arsinh',
  'degrees',
  'abs',
]);

/** What the expression needs to be continuous in the letter over the real numbers; null where more is needed than signs. */
export function needsOf(expr: Expr, letter: string): Need[] | null {
  if (isFree(expr, letter)) return [];
  const inside: Need[] = [];
  for (const part of childrenOf(expr)) {
    const needs = needsOf(part, letter);
    if (needs === null) return null;
    inside.push(...needs);
  }
  const own = ownNeed(expr, letter);
  if (own === undefined) return null;
  return own === null || isPositive(own.expr) ? inside : [...inside, own];
}

/** Above zero wherever it has a value, by its form alone. */
function isPositive(expr: Expr): boolean {
  switch (expr.kind) {
    case 'number':
      return expr.numerator > 0n;
    case 'constant':
      return expr.name === 'pi' || expr.name === 'e';
    case 'sum':
      return (
        expr.terms.every(({ sign, expr: term }) => sign === 'plus' && isNotNegative(term)) &&
        expr.terms.some(({ expr: term }) => isPositive(term))
      );
    case 'product':
      return expr.factors.every(isPositive);
    case 'quotient':
      return isPositive(expr.numerator) && isPositive(expr.denominator);
    case 'power':
      return isPositive(expr.base);
    case 'root':
      return isPositive(expr.radicand);
    case 'call':
      if (expr.name === 'abs') return expr.args[0] !== undefined && isPositive(expr.args[0]);
      return expr.name === 'exp' || expr.name === 'cosh';
    default:
      return false;
  }
}

function isNotNegative(expr: Expr): boolean {
  if (isPositive(expr)) return true;
  if (expr.kind === 'product') return expr.factors.every(isNotNegative);
  if (expr.kind === 'call') return expr.name === 'abs';
  if (expr.kind === 'root') return expr.degree === null;
  const times = expr.kind === 'power' ? rationalOf(expr.exponent) : null;
  return times !== null && times.den === 1n && times.num > 0n && times.num % 2n === 0n;
}

/** null for none, undefined where it cannot be said. */
function ownNeed(expr: Expr, letter: string): Need | null | undefined {
  switch (expr.kind) {
    case 'letter':
    case 'sum':
    case 'product':
      return null;
    case 'quotient':
      return isFree(expr.denominator, letter) ? null : { expr: expr.denominator, strict: true };
    case 'power':
      return powerNeed(expr, letter);
    case 'root':
      return expr.degree === null || isFree(expr.degree, letter) ? { expr: expr.radicand, strict: false } : undefined;
    case 'log':
      return expr.base === null || isFree(expr.base, letter)
        ? { expr: withoutBars(expr.argument), strict: true }
        : undefined;
    case 'call':
      return callNeed(expr);
    default:
      return undefined;
  }
}

function callNeed(expr: Extract<Expr, { kind: 'call' }>): Need | null | undefined {
  const [argument] = expr.args;
  if (entire.has(expr.name)) return null;
  if (!argument) return undefined;
  switch (expr.name) {
    case 'ln':
      return { expr: withoutBars(argument), strict: true };
    case 'tan':
    case 'sec':
      return { expr: { ...expr, name: 'cos' }, strict: true };
    case 'cot':
    case 'csc':
      return { expr: { ...expr, name: 'sin' }, strict: true };
    default:
      return undefined;
  }
}

/** ln|u| needs of u what ln u does: that it is not zero. */
function withoutBars(expr: Expr): Expr {
  return expr.kind === 'call' && expr.name === 'abs' && expr.args[0] ? withoutBars(expr.args[0]) : expr;
}

function powerNeed(expr: Extract<Expr, { kind: 'power' }>, letter: string): Need | null {
  if (isFree(expr.base, letter)) return null;
  const times = rationalOf(expr.exponent);
  if (times && times.den === 1n && times.num >= 0n) return null;
  return { expr: expr.base, strict: !times || Q.sign(times) < 0 };
}

/** The needs that depend on the letter, where all of them are linear in it. */
export function linearNeeds(expr: Expr, letter: string): Need[] | null {
  const needs = needsOf(expr, letter);
  return needs?.every((need) => linearIn(need.expr, letter)) ? needs : null;
}

/** Continuous in the letter on the whole real line. */
export function isEverywhere(expr: Expr, letter: string): boolean {
  return needsOf(expr, letter)?.length === 0;
}
