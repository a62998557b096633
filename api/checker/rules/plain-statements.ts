import type { Expr, RelationSign } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf, mapExpr } from '../../../shared/maths/walk.ts';
import { rationalOf } from '../calculus/build.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import { add, floor, isWhole, negate, one, rational, type Rational } from '../numbers/rational.ts';
import { toFraction } from '../solving/fraction.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { exprsOfStatement, type CompareStatement, type Statement } from '../statements/statement.ts';
import { prepare } from '../values/evaluate.ts';
import { differenceExpr, letterExpr, numberExpr, powerExpr, productExpr, quotientExpr } from './build-expr.ts';
import { freeLetters } from './meaning.ts';
import { isTrueStatement, substituteIn } from './solve-system.ts';
import type { StatementQuestion } from './statement-question.ts';

/**
 * The question with factorials, binomials and rounded down or up numbers written as products and inequalities, which can
 * be solved; null where there are none. Throws Unsettled.
 */
export function withPlainForms(question: StatementQuestion): StatementQuestion | null {
  const { above, below, known, reference, given, context } = question;
  if (![above, below, reference].some(hasCounting)) return null;
  const plain = (statement: Statement): Statement => plainStatement(statement, context);
  return {
    ...question,
    above: plain(above),
    below: plain(below),
    known: known.map(plain),
    reference: plain(reference),
    given: given && plain(given),
  };
}

function hasCounting(statement: Statement): boolean {
  return exprsOfStatement(statement).some((expr) => counts(expr) || rounds(expr));
}

function counts(expr: Expr): boolean {
  return expr.kind === 'factorial' || expr.kind === 'binomial' || childrenOf(expr).some(counts);
}

function rounds(expr: Expr): boolean {
  return (expr.kind === 'call' && (expr.name === 'floor' || expr.name === 'ceil')) || childrenOf(expr).some(rounds);
}

function plainStatement(statement: Statement, context: CheckContext): Statement {
  if (statement.kind === 'all' || statement.kind === 'any')
    return { ...statement, parts: statement.parts.map((part) => plainStatement(part, context)) };
  if (statement.kind !== 'compare' || !hasCounting(statement)) return statement;
  const [letter, ...others] = freeLetters(statement, context);
  if (letter === undefined || others.length > 0) return statement;
  return withoutRounding(statement) ?? withoutFactorials(statement, letter, context) ?? statement;
}

/** floor(e) against a number says between which whole numbers e is; null for anything else. */
function withoutRounding({ left, sign, right }: CompareStatement): Statement | null {
  const value = rationalOf(right);
  if (left.kind !== 'call' || (left.name !== 'floor' && left.name !== 'ceil') || !left.args[0] || !value) return null;
  const inner = left.args[0];
  if (rounds(inner)) return null;
  const is = (wanted: RelationSign, bound: Rational): Statement => {
    return { kind: 'compare', left: inner, sign: wanted, right: numberExpr(bound) };
  };
  const [down, up] = [rational(floor(value)), negate(rational(floor(negate(value))))];
  const isFloor = left.name === 'floor';
  const next = add(down, one);
  const before = add(up, negate(one));
  switch (sign) {
    case '=':
      if (!isWhole(value)) return { kind: 'never' };
      return { kind: 'all', parts: isFloor ? [is('>=', value), is('<', next)] : [is('>', before), is('<=', value)] };
    case '<':
      return isFloor ? is('<', up) : is('<=', before);
    case '<=':
      return isFloor ? is('<', next) : is('<=', down);
    case '>':
      return isFloor ? is('>=', next) : is('>', down);
    case '>=':
      return isFloor ? is('>=', up) : is('>', before);
    default:
      return null;
  }
}

/** From which value on the letter has what a factorial needs, and where custom differs about a binomial. */
interface Needs {
  from: bigint;
  readonly doubtful: bigint[];
}

const mostFactors = 12n;

/** The smallest of the factorials, that of letter + least, is a letter of its own: the others are products with it. */
interface Smallest {
  readonly whole: Expr;
  readonly least: bigint;
  /** How often all of them have the letter. */
  readonly times: bigint;
}

function shiftsIn(expr: Expr, letter: string, context: CheckContext): { times: bigint; plus: bigint }[] {
  const own = expr.kind === 'factorial' ? shiftOf(expr.operand, letter, context) : null;
  return [...(own && own.times > 0n ? [own] : []), ...childrenOf(expr).flatMap((p) => shiftsIn(p, letter, context))];
}

/** The first whole number with times * n not below a bound. */
function firstFrom(bound: bigint, times: bigint): bigint {
  return -floor(rational(-bound, times));
}

/** The smallest factorial goes away as a factor; the letter is a whole number from where on everything has a value. */
function withoutFactorials(statement: CompareStatement, letter: string, context: CheckContext): Statement | null {
  const whole: Expr = letterExpr(`${letter}_{!}`);
  const needs: Needs = { from: -(1n << 20n), doubtful: [] };
  const shifts = [statement.left, statement.right].flatMap((side) => shiftsIn(side, letter, context));
  const least = shifts.reduce((a, { plus }) => (plus < a ? plus : a), 1n << 20n);
  const smallest = { whole, least, times: shifts[0]?.times ?? 1n };
  let isOpen = false;
  const write = (expr: Expr): Expr =>
    mapExpr(expr, (node) => {
      if (node.kind !== 'factorial' && node.kind !== 'binomial') return node;
      const written =
        node.kind === 'factorial'
          ? factorialOf(node.operand, letter, smallest, needs, context)
          : binomialOf(node.top, node.bottom, letter, needs, context);
      isOpen ||= written === null;
      return written ?? node;
    });
  const put = { ...statement, left: write(statement.left), right: write(statement.right) };
  if (isOpen) return null;
  const whole1 = new Map([[whole.kind === 'letter' ? whole.name : '', numberExpr(one)]]);
  const alone = substituteIn(put, whole1) as CompareStatement;
  if (!isHomogeneous(put, alone, whole, context)) return factorialIs(statement, letter, context);
  for (const n of needs.doubtful) {
    const there = substituteIn(alone, new Map([[letter, numberExpr(rational(n))]]));
    if (isTrueStatement(there, context) !== false) throw new Unsettled('no-agreed-meaning');
  }
  return { kind: 'all', parts: [alone, fromOn(letter, needs.from)] };
}

function fromOn(letter: string, n: bigint): Statement {
  const span = { start: 0, end: 0 };
  const from = numberExpr(rational(n));
  return {
    kind: 'member',
    letter: letterExpr(letter),
    set: { kind: 'interval', from, to: null, fromClosed: true, toClosed: false, span },
    negated: false,
  };
}

/** times and plus where the expression is times * letter + plus, times from 0 to 3; null for anything else. */
function shiftOf(expr: Expr, letter: string, context: CheckContext): { times: bigint; plus: bigint } | null {
  const fraction = toFraction(prepare(expr, context), letter);
  if (!fraction || fraction.den.length !== 1 || fraction.den[0] !== 1n || fraction.num.length > 2) return null;
  const [plus = 0n, times = 0n] = fraction.num;
  return times >= 0n && times <= 3n ? { times, plus } : null;
}

function factorialOf(
  operand: Expr,
  letter: string,
  { whole, least, times }: Smallest,
  needs: Needs,
  context: CheckContext,
): Expr | null {
  const shift = shiftOf(operand, letter, context);
  if (!shift) return null;
  if (shift.times === 0n) return constantFactorial(shift.plus) ?? { kind: 'factorial', operand, span: operand.span };
  const more = shift.plus - least;
  if (shift.times !== times) return null;
  needs.from = max(needs.from, firstFrom(-shift.plus, times));
  return more > mostFactors ? null : productExpr([whole, ...fallingFrom(operand, more)]);
}

function constantFactorial(n: bigint): Expr | null {
  if (n < 0n || n > 20n) return null;
  let product = 1n;
  for (let k = 2n; k <= n; k += 1n) product *= k;
  return numberExpr(rational(product));
}

/** top (top-1) ..., as many factors as said. */
function fallingFrom(top: Expr, count: bigint): Expr[] {
  return Array.from({ length: Number(count) }, (_, k) =>
    k === 0 ? top : differenceExpr(top, numberExpr(rational(BigInt(k)))),
  );
}

/** n over 2, or n over n-2, as a product. */
function binomialOf(top: Expr, bottom: Expr, letter: string, needs: Needs, context: CheckContext): Expr | null {
  const [high, low] = [shiftOf(top, letter, context), shiftOf(bottom, letter, context)];
  if (high?.times === 0n && low?.times === 0n) return { kind: 'binomial', top, bottom, span: top.span };
  if (!high || !low || high.times !== 1n || low.times > 1n) return null;
  const count = low.times === 0n ? low.plus : high.plus - low.plus;
  if (count < 0n || count > mostFactors) return null;
  needs.from = max(needs.from, count - high.plus);
  for (let value = 0n; value < count; value += 1n) needs.doubtful.push(value - high.plus);
  const below = Array.from({ length: Number(count) }, (_, k) => numberExpr(rational(BigInt(k + 1))));
  return quotientExpr(productExpr(fallingFrom(top, count)), productExpr(below));
}

function max(a: bigint, b: bigint): bigint {
  return a > b ? a : b;
}

/** Whether the difference of the sides is a power of n! times what it is for n! = 1. */
function isHomogeneous(put: CompareStatement, alone: CompareStatement, whole: Expr, context: CheckContext): boolean {
  const [f, g] = [put, alone].map(({ left, right }) => differenceExpr(left, right)) as [Expr, Expr];
  const name = whole.kind === 'letter' ? whole.name : '';
  if (!lettersOf(f).includes(name)) return true;
  return [0, 1, -1, 2].some((degree) => {
    const scaled = productExpr([powerExpr(whole, rational(degree)), g]);
    return compareExpressions(f, scaled, context).kind === 'equal';
  });
}

/** (n+a)! = c, by trying: factorials grow. */
function factorialIs({ left, sign, right }: CompareStatement, letter: string, context: CheckContext): Statement | null {
  const shift = left.kind === 'factorial' ? shiftOf(left.operand, letter, context) : null;
  const value = rationalOf(right);
  if (sign !== '=' || !shift || shift.times !== 1n || !value) return null;
  const parts: Statement[] = [];
  let product = 1n;
  for (let n = 0n; product * value.den <= value.num; n += 1n, product *= n) {
    if (product * value.den !== value.num) continue;
    parts.push({ kind: 'compare', left: letterExpr(letter), sign, right: numberExpr(rational(n - shift.plus)) });
  }
  return parts.length === 0 ? { kind: 'never' } : { kind: 'any', parts };
}
