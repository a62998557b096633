import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { mapExpr, mapLine } from '../../../shared/maths/walk.ts';
import {
  divExprs,
  isZeroExpr,
  mulExprs,
  negateExpr,
  numberOf,
  rationalExpr,
  sqrtExpr,
  subExprs,
  zeroExpr,
} from '../calculus/build.ts';
import type { CheckContext } from '../context.ts';
import { equals, isZero, mul, rational, type Rational } from '../numbers/rational.ts';
import { toFraction } from '../solving/fraction.ts';
import { degreeIn } from '../solving/linear.ts';
import { isKnown } from '../values/arithmetic.ts';
import { evaluatePrepared, prepare, type Prepared } from '../values/evaluate.ts';
import { lettersBelow } from '../values/graph.ts';
import { relationLine, truthAt } from '../values/truth.ts';
import { valueTex } from '../values/value-tex.ts';
import type { Comparison, Witness } from './comparison.ts';
import { flattenLines, lettersOf } from './points.ts';

type Compare = (above: Expr, below: Expr, context: CheckContext) => Comparison;

const bits = 192;

/**
 * Under an assumption of second degree in a letter, as a^2=2 or x^2+y^2=1, the lines are compared with either solution in
 * the place of the letter: equal where both say so, different where one does. Null where there is none or one is open.
 */
export function compareOnBranches(
  above: Expr,
  below: Expr,
  context: CheckContext,
  compare: Compare,
): Comparison | null {
  const assumptions = flattenLines(context.assumptions);
  const found = quadraticAmong(assumptions, lettersOf([above, below]), context);
  if (!found) return null;
  const others = assumptions.filter((line) => line !== found.line);
  const results: Comparison[] = [];
  for (const [k, root] of found.roots.entries()) {
    if (found.isMirrored && others.some((line) => shutsOut(line, found.letter, k === 0 ? '<' : '>'))) continue;
    const put = (expr: Expr): Expr => replace(expr, found.letter, root);
    const moved = others.map((line) => mapLine(line, put));
    const isOut = moved.some(
      (line) => lettersOf(line).length === 0 && truthAt(line, new Map(), bits, context) === false,
    );
    if (isOut) continue;
    const branch = { ...context, assumptions: [...moved, ...found.needs] };
    const result = compare(put(above), put(below), branch);
    if (result.kind === 'different')
      return { kind: 'different', witness: withLetter(result.witness, found.letter, root, context) };
    if (result.kind !== 'equal') return null;
    results.push(result);
  }
  return results.reduce<Comparison | null>(join, null);
}

function join(a: Comparison | null, b: Comparison): Comparison {
  if (a?.kind !== 'equal' || b.kind !== 'equal') return b;
  return {
    kind: 'equal',
    reached: a.reached === 'proved' ? b.reached : a.reached,
    excluded: [...a.excluded, ...b.excluded],
    cancelled: [...a.cancelled, ...b.cancelled],
  };
}

interface Quadratic {
  readonly line: Line;
  readonly letter: string;
  readonly roots: readonly Expr[];
  /** Whether the first root is never negative and the other its opposite. */
  readonly isMirrored: boolean;
  /** What the roots need to be real. */
  readonly needs: readonly Line[];
}

/** An equation with a letter of the lines in it to the second power at most, the last such letter first. */
function quadraticAmong(
  assumptions: readonly Line[],
  letters: readonly string[],
  context: CheckContext,
): Quadratic | null {
  for (const line of assumptions) {
    if (line.kind !== 'relation' || line.sign !== '=') continue;
    const f = subExprs(line.left, line.right);
    for (const letter of [...lettersOf(line)].reverse()) {
      if (!letters.includes(letter) || context.wholeLetters.has(letter)) continue;
      const solved = solveQuadratic(f, letter, context);
      if (solved) return { line, letter, ...solved };
    }
  }
  return null;
}

/** An order against zero that the letter on one side has: x>0 or 0<x. */
function shutsOut(line: Line, letter: string, sign: '<' | '>'): boolean {
  if (line.kind !== 'relation') return false;
  const is = (expr: Expr): boolean => expr.kind === 'letter' && expr.name === letter;
  if (is(line.left) && isZeroExpr(line.right)) return line.sign === sign;
  return is(line.right) && isZeroExpr(line.left) && line.sign === (sign === '<' ? '>' : '<');
}

function solveQuadratic(f: Expr, letter: string, context: CheckContext): Omit<Quadratic, 'line' | 'letter'> | null {
  const graph = prepare(f, context);
  const a = degreeIn(graph, letter) === 2 ? coefficientOf(graph, letter, 2) : null;
  // Where the first coefficient has letters it may be zero.
  if (a === null || isZero(a)) return null;
  const [low, c, high] = [-1, 0, 1].map((at) => replace(f, letter, numberOf(at))) as [Expr, Expr, Expr];
  const linear = coefficientOf(graph, letter, 1);
  const b = linear ? rationalExpr(linear) : divExprs(subExprs(high, low), numberOf(2));
  const inside = simple(subExprs(mulExprs(b, b), mulExprs(rationalExpr(mul(rational(4), a)), c)), context);
  const needs =
    context.numbers === 'real' && lettersOf(inside).length > 0 ? [relationLine(inside, '>=', zeroExpr)] : [];
  const root = sqrtExpr(inside);
  const divisor = rationalExpr(mul(rational(2), a));
  const tops = [subExprs(root, b), subExprs(negateExpr(root), b)];
  const isMirrored = linear !== null && isZero(linear) && a.num > 0n && context.numbers === 'real';
  return { roots: tops.map((top) => divExprs(top, divisor)), isMirrored, needs };
}

/** A coefficient of a polynomial in the letter, where it is the same number whatever the other letters are. */
function coefficientOf(graph: Prepared, letter: string, power: number): Rational | null {
  const names = [...lettersBelow(graph.nodes, graph.root)].filter((name) => name !== letter);
  const [first, ...others] = [3, 7, 19].map((base) => {
    const fraction = toFraction(graph, letter, new Map(names.map((name, k) => [name, rational(base + k)] as const)));
    return fraction && fraction.den.length === 1 ? rational(fraction.num[power] ?? 0n, fraction.den[0] ?? 1n) : null;
  });
  return first && others.every((other) => other && equals(other, first)) ? first : null;
}

/** A number instead of an expression without letters. */
function simple(expr: Expr, context: CheckContext): Expr {
  if (lettersOf(expr).length > 0) return expr;
  const value = evaluatePrepared(prepare(expr, context), new Map(), bits, context);
  return value.kind === 'rational' ? numberOf(value.value.num, value.value.den) : expr;
}

function replace(expr: Expr, letter: string, by: Expr): Expr {
  return mapExpr(expr, (node) => (node.kind === 'letter' && node.name === letter ? by : node));
}

function withLetter(witness: Witness, letter: string, root: Expr, context: CheckContext): Witness {
  const value = evaluatePrepared(prepare(root, context), new Map(witness.at), bits, context);
  if (!isKnown(value)) return witness;
  return {
    ...witness,
    at: new Map(witness.at).set(letter, value),
    atTex: { ...witness.atTex, [letter]: valueTex(value, bits) },
  };
}
