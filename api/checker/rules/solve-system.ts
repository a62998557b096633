import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { mapExpr } from '../../../shared/maths/walk.ts';
import { rationalOf } from '../calculus/build.ts';
import { createForms } from '../compare/normal-forms.ts';
import type { CheckContext } from '../context.ts';
import { constantOf } from '../numbers/form.ts';
import { equals, isZero, pow, rational, type Rational } from '../numbers/rational.ts';
import { toFraction } from '../solving/fraction.ts';
import { degreeIn } from '../solving/linear.ts';
import type { RealNumber } from '../solving/real-number.ts';
import { complement, isEmptySet, isFiniteSet, isWholeLine } from '../solving/real-set.ts';
import { quadraticRoots, toSurd } from '../solving/surd.ts';
import { approximate } from '../solving/real-number.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { truthAt } from '../statements/truth.ts';
import { differenceGraph, solveStatement, type SolveEnv } from '../statements/solve.ts';
import type { CompareStatement, Statement } from '../statements/statement.ts';
import {
  differenceExpr,
  letterExpr,
  minusExpr,
  numberExpr,
  powerExpr,
  productExpr,
  quotientExpr,
  sumExpr,
  termsOf,
} from './build-expr.ts';
import { clearedEquation } from './derived-equations.ts';
import { reduceRows, rowOf } from './linear-rows.ts';
import { freeLetters } from './meaning.ts';

/** Expressions in the place of letters. */
export type Solution = ReadonlyMap<string, Expr>;

/** A letter that stands for a number which no expression names. */
export interface Anchor {
  readonly letter: string;
  readonly number: RealNumber;
}

/** What each letter is worth, by letters that stay free and the anchor; letters that are not named are free themselves. */
export interface SystemSolution {
  readonly values: Solution;
  readonly anchor: Anchor | null;
}

interface Search {
  readonly context: CheckContext;
  readonly anchor: Anchor | null;
}

const mostSolutions = 32;

/** Puts expressions in the place of letters. */
export function substitute(expr: Expr, values: Solution): Expr {
  if (values.size === 0) return expr;
  return mapExpr(expr, (node) => (node.kind === 'letter' ? (values.get(node.name) ?? node) : node));
}

export function substituteIn(statement: Statement, values: Solution): Statement {
  switch (statement.kind) {
    case 'compare':
      return { ...statement, left: substitute(statement.left, values), right: substitute(statement.right, values) };
    case 'all':
    case 'any':
      return { ...statement, parts: statement.parts.map((part) => substituteIn(part, values)) };
    default:
      return statement;
  }
}

/** Whether a statement without letters but that of the anchor is true; null where that cannot be told. */
export function isTrueStatement(
  statement: Statement,
  context: CheckContext,
  anchor: Anchor | null = null,
): boolean | null {
  if (anchor && freeLetters(statement, context).includes(anchor.letter)) {
    return truthAt(statement, anchor.number, envFor(anchor.letter, context))?.isTrue ?? null;
  }
  const truth = solveStatement(statement, envFor('', context));
  if (isWholeLine(truth)) return true;
  return isEmptySet(truth) ? false : null;
}

function envFor(letter: string, context: CheckContext): SolveEnv {
  return { letter, given: new Map(), context, window: null, hints: [], families: new Set() };
}

/** The letters of a statement that no number is known for. */
export function openLetters(statement: Statement, context: CheckContext, anchor: Anchor | null): string[] {
  return freeLetters(statement, context).filter((name) => name !== anchor?.letter);
}

/** All that satisfies several equations together; throws Unsettled where elimination does not get there. */
export function solveSystem(equations: readonly CompareStatement[], context: CheckContext): SystemSolution[] {
  const plain = equations.map(withoutPowers).map(withoutDenominators);
  const found = eliminate(eliminateLinear(plain, context) ?? plain, new Map(), { context, anchor: null }, 0);
  const solutions = found.filter((solution) => isSolution(equations, solution, context));
  if (solutions.length > mostSolutions) throw new Unsettled('limit');
  return solutions;
}

/** Linear equations in reduced echelon form; null where they are few and short enough as they stand, or not all linear. */
function eliminateLinear(equations: readonly CompareStatement[], context: CheckContext): CompareStatement[] | null {
  const letters = [...new Set(equations.flatMap((equation) => freeLetters(equation, context)))];
  if (letters.length < 3) return null;
  const rows = equations.map((equation) => rowOf(equation, letters, context));
  if (rows.includes(null)) return null;
  context.budget.spend(10 * rows.length * rows.length * letters.length);
  const terms = (row: readonly Rational[]): Expr[] =>
    row.flatMap((value, k) => {
      if (isZero(value)) return [];
      const name = letters[k];
      return [name === undefined ? numberExpr(value) : productExpr([numberExpr(value), letterExpr(name)])];
    });
  return reduceRows(rows as Rational[][]).map((row) => ({
    kind: 'compare',
    left: sumExpr(terms(row)),
    sign: '=',
    right: numberExpr(rational(0)),
  }));
}

/** 2^{x+y}=8 is x+y=3. */
function withoutPowers(equation: CompareStatement): CompareStatement {
  const { left, right } = equation;
  const base = left.kind === 'power' && lettersOf(left.exponent).length > 0 ? rationalOf(left.base) : null;
  const value = base && rationalOf(right);
  if (left.kind !== 'power' || !base || !value || value.num <= 0n || base.num <= 0n) return equation;
  for (let n = 0; n <= 12; n += 1) {
    if (equals(pow(base, n), value)) return { ...equation, left: left.exponent, right: numberExpr(rational(n)) };
    if (equals(pow(base, -n), value)) return { ...equation, left: left.exponent, right: numberExpr(rational(-n)) };
  }
  return equation;
}

/** Letters below a line would hide what is linear; solutions are tried in the equations as they were. */
function withoutDenominators(equation: CompareStatement): CompareStatement {
  const terms = termsOf(differenceExpr(equation.left, equation.right));
  const isBelow = terms.some(({ expr }) => expr.kind === 'quotient' && lettersOf(expr.denominator).length > 0);
  return (isBelow ? clearedEquation(terms)[0]?.statement : null) ?? equation;
}

function isSolution(
  equations: readonly CompareStatement[],
  { values, anchor }: SystemSolution,
  context: CheckContext,
): boolean {
  return equations.every((equation) => {
    const put = substituteIn(equation, values);
    if (openLetters(put, context, anchor).length > 0) return true;
    const truth = isTrueStatement(put, context, anchor);
    if (truth === null) throw new Unsettled('not-settled');
    return truth;
  });
}

function eliminate(
  equations: readonly CompareStatement[],
  values: Solution,
  search: Search,
  depth: number,
): SystemSolution[] {
  const { context, anchor } = search;
  if (depth > 12) throw new Unsettled('limit');
  context.budget.spend(500);
  const open: { equation: CompareStatement; letters: string[] }[] = [];
  for (const equation of equations) {
    const letters = openLetters(equation, context, anchor);
    const always = letters.length > 0 ? isAlways(equation, context) : null;
    if (always === false) return [];
    if (letters.length > 0) {
      if (!always) open.push({ equation, letters });
    } else if (isTrueStatement(equation, context, anchor) === false) return [];
  }
  if (open.length === 0) return [{ values, anchor }];
  const rest = open.map((o) => o.equation);
  const single = open.find(
    ({ equation, letters }) => letters.length === 1 && freeLetters(equation, context).length === 1,
  );
  if (single) return fromOneLetter(single.equation, single.letters[0] as string, rest, values, search, depth);
  const best = bestWayOut(open, context);
  if (!best) return eliminate(combine(rest, context), values, search, depth + 1);
  return fromLinear(best, rest, values, search, depth);
}

/** Whether left minus right is zero once it is written out, or another number; null where it depends on letters. */
function isAlways(equation: CompareStatement, context: CheckContext): boolean | null {
  const graph = differenceGraph(equation.left, equation.right, envFor('', context));
  const form = createForms(graph.nodes, false).formOf(graph.root);
  if (!form) return null;
  const value = constantOf(form);
  return value === null ? null : value.num === 0n;
}

function fromOneLetter(
  equation: CompareStatement,
  letter: string,
  equations: readonly CompareStatement[],
  values: Solution,
  search: Search,
  depth: number,
): SystemSolution[] {
  const set = solveStatement(equation, envFor(letter, search.context));
  const rest = equations.filter((other) => other !== equation);
  // All but some numbers: at these a denominator of the equations is zero.
  if (isWholeLine(set) || (isFiniteSet(complement(set)) && !set.open))
    return eliminate(rest, values, search, depth + 1);
  if (!isFiniteSet(set) || set.open) throw new Unsettled('not-covered');
  return set.points.flatMap((point) => {
    const expr = toExpr(point);
    if (expr) return bind(letter, expr, rest, values, search, depth);
    // One letter may stand for its number throughout; a second one would have to be a number over the first.
    if (search.anchor) throw new Unsettled('not-covered');
    return eliminate(rest, values, { ...search, anchor: { letter, number: point } }, depth + 1);
  });
}

function bind(
  letter: string,
  value: Expr,
  rest: readonly CompareStatement[],
  values: Solution,
  search: Search,
  depth: number,
): SystemSolution[] {
  const one = new Map([[letter, value]]);
  const next = new Map([...values].map(([name, expr]) => [name, substitute(expr, one)] as const));
  next.set(letter, value);
  return eliminate(
    rest.map((equation) => substituteIn(equation, one) as CompareStatement),
    next,
    search,
    depth + 1,
  );
}

/** A number as an expression: a fraction, a surd or what the author wrote; null where it is none of them. */
function toExpr(point: RealNumber): Expr | null {
  if (point.kind === 'rational') return numberExpr(point.value);
  if (point.kind === 'computed') return point.expr;
  const [c0, c1, c2] = point.polynomial;
  const roots = point.polynomial.length === 3 ? quadraticRoots(c0 ?? 0n, c1 ?? 0n, c2 ?? 1n) : null;
  if (!roots) return null;
  const surd = roots[approximate(point) > -Number(c1) / (2 * Number(c2)) ? 1 : 0];
  const root = powerExpr(numberExpr(rational(surd.radicand)), rational(1, 2));
  return sumExpr([numberExpr(surd.whole), productExpr([numberExpr(surd.part), root])]);
}

/** An equation that is linear in a letter: slope * letter + offset = 0; the number is null where the slope has letters. */
interface WayOut {
  readonly equation: CompareStatement;
  readonly letter: string;
  readonly slopeExpr: Expr;
  readonly offset: Expr;
  readonly slope: Rational | null;
}

/** The first letter with a constant factor that is not zero, else the first that an equation is linear in. */
function bestWayOut(
  open: readonly { readonly equation: CompareStatement; readonly letters: readonly string[] }[],
  context: CheckContext,
): WayOut | null {
  let other: WayOut | null = null;
  for (const { equation, letters } of open) {
    for (const letter of letters) {
      const way = wayOut(equation, letter, context);
      if (way && way.slope !== null) return way;
      other ??= way;
    }
  }
  return other;
}

function wayOut(equation: CompareStatement, letter: string, context: CheckContext): WayOut | null {
  context.budget.spend(40);
  const graph = differenceGraph(equation.left, equation.right, envFor(letter, context));
  const f = differenceExpr(equation.left, equation.right);
  if (degreeIn(graph, letter) !== 1) return null;
  const at = (value: number): Expr => substitute(f, new Map([[letter, numberExpr(rational(value))]]));
  const slopeExpr = differenceExpr(at(1), at(0));
  return { equation, letter, slopeExpr, offset: at(0), slope: constantSlope(slopeExpr, context) };
}

function constantSlope(slope: Expr, context: CheckContext): Rational | null {
  const env = envFor('', context);
  const zero = numberExpr(rational(0));
  const names = freeLetters({ kind: 'compare', left: slope, sign: '=', right: zero }, context);
  const graph = differenceGraph(slope, zero, env);
  const values = [2, 5, 11].map((base) => {
    const given = new Map(names.map((name, k) => [name, rational(base + 3 * k, 1 + k)] as const));
    const fraction = toFraction(graph, '', given);
    if (fraction) return rational(fraction.num[0] ?? 0n, fraction.den[0] ?? 1n);
    const surd = toSurd(graph, given);
    return surd?.radicand === 1n ? surd.whole : null;
  });
  const [first] = values;
  if (!first || first.num === 0n) return null;
  return values.every((value) => value && value.num === first.num && value.den === first.den) ? first : null;
}

function fromLinear(
  way: WayOut,
  equations: readonly CompareStatement[],
  values: Solution,
  search: Search,
  depth: number,
): SystemSolution[] {
  const { equation, letter, slope, slopeExpr, offset } = way;
  const rest = equations.filter((other) => other !== equation);
  const divisor = slope ? numberExpr(slope) : slopeExpr;
  const solved = bind(letter, quotientExpr(minusExpr(offset), divisor), rest, values, search, depth);
  if (slope) return solved;
  // Where the slope is zero the letter drops out of this equation.
  const zero = numberExpr(rational(0));
  const equate = (left: Expr): CompareStatement => ({ kind: 'compare', left, sign: '=', right: zero });
  return [...solved, ...eliminate([equate(slopeExpr), equate(offset), ...rest], values, search, depth + 1)];
}

/** Two equations of one degree in a letter, added so that its highest power goes away. */
function combine(equations: readonly CompareStatement[], context: CheckContext): CompareStatement[] {
  const [first, second, ...rest] = equations;
  if (!first || !second) throw new Unsettled('not-covered');
  for (const letter of freeLetters(first, context)) {
    const [a, b] = [first, second].map((equation) => leadingIn(equation, letter, context));
    if (!a || !b) continue;
    const f = (equation: CompareStatement): Expr => differenceExpr(equation.left, equation.right);
    const left = differenceExpr(productExpr([numberExpr(b), f(first)]), productExpr([numberExpr(a), f(second)]));
    const joined: CompareStatement = { kind: 'compare', left, sign: '=', right: numberExpr(rational(0)) };
    if (freeLetters(joined, context).length === 0) continue;
    if (isFreeOf(joined, letter, context)) return [dropLetter(joined, letter), first, ...rest];
  }
  throw new Unsettled('not-covered');
}

/** The constant coefficient of the square of a letter. */
function leadingIn(equation: CompareStatement, letter: string, context: CheckContext): Rational | null {
  const graph = differenceGraph(equation.left, equation.right, envFor(letter, context));
  if (degreeIn(graph, letter) !== 2) return null;
  const names = freeLetters(equation, context).filter((name) => name !== letter);
  const coefficients = [3, 7].map((base) => {
    const given = new Map(names.map((name, k) => [name, rational(base + k)] as const));
    const fraction = toFraction(graph, letter, given);
    return fraction && fraction.num.length === 3 ? rational(fraction.num[2] ?? 0n, fraction.den[0] ?? 1n) : null;
  });
  const [p, q] = coefficients;
  return p && q && p.num === q.num && p.den === q.den ? p : null;
}

/** The value does not change with the letter, tried at several places. */
function isFreeOf(equation: CompareStatement, letter: string, context: CheckContext): boolean {
  const graph = differenceGraph(equation.left, equation.right, envFor(letter, context));
  const names = freeLetters(equation, context).filter((name) => name !== letter);
  return [2, 5, 9].every((base) => {
    const given = new Map(names.map((name, k) => [name, rational(base + k)] as const));
    const fraction = toFraction(graph, letter, given);
    return fraction !== null && fraction.num.length <= 1;
  });
}

function dropLetter(equation: CompareStatement, letter: string): CompareStatement {
  return substituteIn(equation, new Map([[letter, numberExpr(rational(0))]])) as CompareStatement;
}
