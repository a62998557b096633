import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import type { CheckContext } from '../context.ts';
import { rational } from '../numbers/rational.ts';
import { subKnown, isKnown, toBall } from '../values/arithmetic.ts';
import { evaluatePrepared, prepare } from '../values/evaluate.ts';
import type { KnownValue } from '../values/value.ts';
import { magnitude } from '../numbers/ball.ts';
import { comparesOf, type CompareStatement, type Statement } from '../statements/statement.ts';
import { letterExpr, numberExpr } from './build-expr.ts';
import { freeLetters } from './meaning.ts';
import { substitute, substituteIn } from './solve-system.ts';
import type { StatementQuestion } from './statement-question.ts';

export interface WithFamilies {
  readonly question: StatementQuestion;
  /** Letters that run through all whole numbers, as k in a general solution. */
  readonly families: ReadonlySet<string>;
}

/**
 * The question with what is said of the numbers of turns taken in: `k\in\mathbb{Z}` beside a solution is dropped, `k=0,1,2`
 * makes one solution of each, and among complex numbers a general solution that repeats itself becomes a list.
 */
export function withFamilies(asked: StatementQuestion): WithFamilies {
  const declared = new Set(asked.context.wholeLetters);
  const change = (statement: Statement): Statement => withDeclared(statement, asked, declared);
  const [above, below] = [change(asked.above), change(asked.below)];
  const isChanged = above !== asked.above || below !== asked.below;
  const question = isChanged
    ? { ...asked, above, below, reference: change(asked.reference), known: asked.known.map(change) }
    : asked;
  const families = findFamilies(question, declared);
  if (families.size === 0 || asked.context.numbers === 'real') return { question, families };
  const list = (statement: Statement): Statement => withListed(statement, families, asked.context);
  return {
    question: { ...question, above: list(above), below: list(below), reference: list(question.reference) },
    families: new Set(),
  };
}

type Member = Extract<Statement, { kind: 'member' }>;

/** What an "all" says about a number of turns is taken out of it. */
function withDeclared(statement: Statement, asked: StatementQuestion, declared: Set<string>): Statement {
  if (statement.kind === 'any') {
    const parts = statement.parts.map((part) => withDeclared(part, asked, declared));
    return parts.every((part, k) => part === statement.parts[k]) ? statement : { ...statement, parts };
  }
  if (statement.kind !== 'all') return statement;
  for (const part of statement.parts) {
    const name = subjectOf(part);
    const others = statement.parts.filter((other) => other !== part);
    const rest: Statement = others.length === 1 ? (others[0] as Statement) : { kind: 'all', parts: others };
    const isCounter = name !== null && freeLetters(rest, asked.context).includes(name) && isCounting(rest, name, asked);
    if (!isCounter || name === null) continue;
    if (part.kind === 'member' && part.set.kind === 'integers') {
      declared.add(name);
      return withDeclared(rest, asked, declared);
    }
    const values = valuesOf(part);
    if (values)
      return { kind: 'any', parts: values.map((value) => withoutIndex(rest, name, new Map([[name, value]]))) };
  }
  return statement;
}

function isCounting(rest: Statement, name: string, { givenLetters, context }: StatementQuestion): boolean {
  const others = freeLetters(rest, context).filter((other) => other !== name);
  return others.length > 0 && (!givenLetters.includes(name) || countsTurns(rest, name));
}

/** The letter that a part of a line gives values to. */
function subjectOf(part: Statement): string | null {
  if (part.kind === 'member') return !part.negated && part.letter?.kind === 'letter' ? part.letter.name : null;
  const compares = comparesOf(part);
  const names = compares.map(({ left, sign }) => (sign === '=' && left.kind === 'letter' ? left.name : null));
  const [first = null] = names;
  return first !== null && ['k', 'n', 'm'].includes(first) && names.every((name) => name === first) ? first : null;
}

function valuesOf(part: Statement): readonly Expr[] | null {
  if (part.kind === 'member') return finiteItems(part);
  const values = comparesOf(part).map(({ right }) => right);
  return values.every((value) => lettersOf(value).length === 0) ? values : null;
}

function finiteItems({ set }: Member): readonly Expr[] | null {
  return set.kind === 'finite' && set.items.every((item) => lettersOf(item).length === 0) ? set.items : null;
}

/** z_k is z. */
function withoutIndex(statement: Statement, index: string, values: ReadonlyMap<string, Expr>): Statement {
  const names = comparesOf(statement).flatMap(({ left, right }) => [...lettersOf(left), ...lettersOf(right)]);
  const indexed = names.filter((name) => name.endsWith(`_${index}`));
  const plain = indexed.map((name) => [name, letterExpr(name.slice(0, -index.length - 1))] as const);
  return substituteIn(statement, new Map([...values, ...plain]));
}

/**
 * Letters that stand for whole numbers by custom or by what is said of them, occur in what a letter is said to be, and
 * the given does not have them, or has them as the number of turns of an angle.
 */
function findFamilies(question: StatementQuestion, whole: ReadonlySet<string>): ReadonlySet<string> {
  const { above, below, given, givenLetters, context } = question;
  const found = new Set<string>();
  for (const statement of [above, below]) {
    const letters = freeLetters(statement, context);
    for (const name of letters) {
      const isWhole = whole.has(name) || ['k', 'n', 'm'].includes(name);
      if (!isWhole || !letters.some((other) => other !== name)) continue;
      const isFree =
        !givenLetters.includes(name) || (given && [given, above, below].every((s) => countsTurns(s, name)));
      if (isFree) found.add(name);
    }
  }
  return found;
}

/** x = pi/6 + 2 k pi, wherever the letter occurs: one side an angle in k alone, the other without it, in one letter. */
function countsTurns(statement: Statement, name: string): boolean {
  const compares = comparesOf(statement).filter(({ left, right }) =>
    [left, right].some((side) => lettersOf(side).includes(name)),
  );
  return compares.every(({ left, sign, right }) => {
    const [other, angle] = lettersOf(right).includes(name) ? [left, right] : [right, left];
    const isAlone = lettersOf(angle).length === 1 && lettersOf(other).length === 1 && !lettersOf(other).includes(name);
    return sign === '=' && isAlone && isAngle(angle) && !isBelow(angle, name) && !mayTurn(other);
  });
}

/** In a denominator, where a number of turns never stands. */
function isBelow(expr: Expr, name: string): boolean {
  if (expr.kind === 'quotient' && lettersOf(expr.denominator).includes(name)) return true;
  return childrenOf(expr).some((part) => isBelow(part, name));
}

/** With pi or degrees in it. */
function isAngle(expr: Expr): boolean {
  if (expr.kind === 'constant' && expr.name === 'pi') return true;
  return (expr.kind === 'call' && expr.name === 'degrees') || childrenOf(expr).some(isAngle);
}

/** Only sums and multiples of a letter are angles. */
function mayTurn(expr: Expr): boolean {
  return ['call', 'power', 'root', 'log'].includes(expr.kind) || childrenOf(expr).some(mayTurn);
}

/** z = 2e^{2k pi i/3} as the list of its values, for whole k. */
function withListed(statement: Statement, families: ReadonlySet<string>, context: CheckContext): Statement {
  if (statement.kind === 'any' || statement.kind === 'all')
    return { ...statement, parts: statement.parts.map((part) => withListed(part, families, context)) };
  if (statement.kind !== 'compare' || statement.sign !== '=') return statement;
  const [index, ...others] = lettersOf(statement.right).filter((name) => families.has(name));
  if (!index || others.length > 0 || lettersOf(statement.right).length > 1) return statement;
  const period = periodOf(statement, index, context);
  if (!period) return statement;
  const values = Array.from({ length: period }, (_, k) => new Map([[index, numberExpr(rational(k))]]));
  return { kind: 'any', parts: values.map((value) => withoutIndex(statement, index, value)) };
}

const longestPeriod = 24;
const bits = 256;

/** The least shift of the index that changes none of the values, at as many places as two periods have. */
function periodOf({ right }: CompareStatement, index: string, context: CheckContext): number | null {
  const values: KnownValue[] = [];
  for (let k = 0; k < 3 * longestPeriod; k += 1) {
    const value = valueAt(right, index, k - longestPeriod, context);
    if (!value) return null;
    values.push(value);
  }
  for (let shift = 1; shift <= longestPeriod; shift += 1) {
    const isSame = (k: number): boolean => areClose(values[k] as KnownValue, values[k + shift] as KnownValue);
    if (Array.from({ length: 2 * longestPeriod }, (_, k) => k).every(isSame)) return shift;
  }
  return null;
}

function valueAt(expr: Expr, index: string, k: number, context: CheckContext): KnownValue | null {
  const put = substitute(expr, new Map([[index, numberExpr(rational(k))]]));
  const value = evaluatePrepared(prepare(put, context), new Map(), bits, context);
  return isKnown(value) ? value : null;
}

function areClose(a: KnownValue, b: KnownValue): boolean {
  const gap = toBall(subKnown(toBall(a, bits), toBall(b, bits), bits), bits);
  const parts = gap.im === null ? [gap.re] : [gap.re, gap.im];
  return parts.every((ball) => magnitude(ball.mid) + ball.rad < 1n << BigInt(bits - 200));
}
