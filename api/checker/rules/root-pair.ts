import { lettersOf } from '../../../shared/maths/letters.ts';
import type { Line } from '../../../shared/maths/expression.ts';
import type { CheckContext } from '../context.ts';
import { rational, type Rational } from '../numbers/rational.ts';
import { reduceFraction, toFraction } from '../solving/fraction.ts';
import { nameNumber } from '../solving/naming.ts';
import type { Polynomial } from '../solving/polynomial.ts';
import { quadraticRoots, surdToNumber } from '../solving/surd.ts';
import { comparesOf, isListOfValues, toStatement, type Statement } from '../statements/statement.ts';
import { prepare } from '../values/evaluate.ts';
import { differenceExpr, letterExpr, numberExpr } from './build-expr.ts';
import { freeLetters } from './meaning.ts';
import { substituteIn } from './solve-system.ts';
import { fails, holds, undecided, type StepResult } from './step-result.ts';

/**
 * A line about x_1 and x_2 after a quadratic equation in x: these are its two roots (Vieta), in either order. Null where
 * the line is of another kind or says outright what the roots are.
 */
export function judgeRootPair(line: Line, from: Statement, context: CheckContext): StepResult | null {
  const [letter, ...others] = freeLetters(from, context);
  if (from.kind !== 'compare' || from.sign !== '=' || letter === undefined || others.length > 0) return null;
  const [first, second] = [`${letter}_1`, `${letter}_2`];
  const letters = lettersOf(line);
  if (letters.length !== 2 || !letters.includes(first) || !letters.includes(second)) return null;
  const statement = toStatement(line);
  if (!statement || statement.kind === 'any' || isList(statement, letters)) return null;
  const quadratic = quadraticOf(from, letter, context);
  const claims = comparesOf(statement);
  if (!quadratic || claims.length === 0 || claims.some(({ sign }) => sign !== '=')) return null;
  const [c0, c1, c2] = quadratic as [bigint, bigint, bigint];
  // The second root is the sum of both without the first.
  const sum = numberExpr(rational(-c1, c2));
  const values = new Map([[second, differenceExpr(sum, letterExpr(first))]]);
  for (const claim of claims) {
    const put = substituteIn(claim, values);
    if (put.kind !== 'compare') return null;
    const fraction = toFraction(prepare(differenceExpr(put.left, put.right), context), first);
    if (!fraction) return undecided('not-covered');
    const [r0, r1] = remainder(reduceFraction(fraction).num, quadratic);
    if (isZero(r0) && isZero(r1)) continue;
    // A remainder that vanishes at one of the roots is true for one order of the two.
    const root = isZero(r1) ? null : rational(-r0.num * r1.den, r0.den * r1.num);
    if (root && c2 * root.num ** 2n + c1 * root.num * root.den + c0 * root.den ** 2n === 0n)
      return undecided('no-agreed-meaning');
    const roots = quadraticRoots(c0, c1, c2);
    if (!roots) return undecided('not-settled');
    const names = roots.map((surd) => nameNumber(surdToNumber(surd)));
    const at = { [first]: names[0] as string, [second]: names[1] as string };
    return fails('proved', { witness: { at, above: 'true', below: 'false' } });
  }
  return holds('proved', ['remark']);
}

function isList(statement: Statement, letters: readonly string[]): boolean {
  const parts = statement.kind === 'all' ? statement.parts : [statement];
  return parts.every((part) => letters.some((letter) => isListOfValues(part, letter)));
}

function quadraticOf(from: Extract<Statement, { kind: 'compare' }>, letter: string, context: CheckContext) {
  const fraction = toFraction(prepare(differenceExpr(from.left, from.right), context), letter);
  return fraction && fraction.den.length === 1 && fraction.num.length === 3 ? fraction.num : null;
}

function isZero(value: Rational): boolean {
  return value.num === 0n;
}

/** The remainder of a division by a quadratic: its constant and its slope. */
function remainder(p: Polynomial, quadratic: Polynomial): [Rational, Rational] {
  const [c0, c1, c2] = quadratic as [bigint, bigint, bigint];
  const rest = p.map((c) => rational(c));
  for (let k = rest.length - 1; k >= 2; k -= 1) {
    const lead = rest[k] as Rational;
    const minus = (at: number, c: bigint): void => {
      const old = rest[at] as Rational;
      rest[at] = rational(old.num * lead.den * c2 - lead.num * c * old.den, old.den * lead.den * c2);
    };
    minus(k - 1, c1);
    minus(k - 2, c0);
  }
  return [rest[0] ?? rational(0), rest[1] ?? rational(0)];
}
