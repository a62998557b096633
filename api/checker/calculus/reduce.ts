import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf, countNodes, mapExpr } from '../../../shared/maths/walk.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { isKnown } from '../values/arithmetic.ts';
import { evaluate } from '../values/evaluate.ts';
import { findAntiderivative, withoutDefinition } from './antiderivative.ts';
import { withoutBars } from './bars.ts';
import { knownIntegral } from './known-integrals.ts';
import { addExprs, infinityExpr, negateExpr, noValueExpr, subExprs, zeroExpr } from './build.ts';
import { throughAntiderivative } from './definite.ts';
import { splitAt } from './continuity.ts';
import { bodyOf, differentiateTimes } from './differentiate.ts';
import { isFree } from './integrand.ts';
import { isEverywhere } from './needs.ts';
import { infinitySign, limitExpr, limitOf, limitFromSide } from './limit.ts';
import { rateExpr, rateNamed } from './rates.ts';
import { closedSeries } from './series.ts';
import { substitute } from './substitute.ts';

/** Carries out a derivative, definite integral, limit or sum: an ordinary expression, or null where that is not certain. */
export function reduceCalculus(expr: Expr, context: CheckContext): Expr | null {
  const known = context.calculus?.known;
  const memory = known?.get(context.definitions) ?? new WeakMap<Expr, Expr | null>();
  if (known && !known.has(context.definitions)) known.set(context.definitions, memory);
  const found = memory.get(expr);
  if (found !== undefined) return found;
  context.budget.spend(8 + 2 * countNodes(expr));
  const result = attempt(expr, context);
  memory.set(expr, result);
  return result;
}

function attempt(expr: Expr, context: CheckContext): Expr | null {
  try {
    return reduceNode(expr, context);
  } catch (cause) {
    if (cause instanceof Unsettled) return null;
    throw cause;
  }
}

function reduceNode(node: Expr, context: CheckContext): Expr | null {
  switch (node.kind) {
    case 'derivative': {
      // One by one, from the inside: where an inner one is out of reach, so are those around it.
      const operand =
        node.operand.kind === 'derivative' ? reduceCalculus(node.operand, context) : carriedOut(node.operand, context);
      // What a partial derivative of something unknown depends on is not said.
      if (!operand || (node.partial && lettersOf(operand).some((name) => rateNamed(name) !== null))) return null;
      return differentiateTimes(operand, node.variable, node.order, context, node.partial);
    }
    case 'rate':
      return reduceRate(node, context);
    case 'apply':
      return bodyOf(node, context);
    case 'integral':
      return reduceIntegral(node, context);
    case 'evaluated':
      return reduceEvaluated(node, context);
    case 'limit':
      return limitExpr(
        limitOf({ ...node, operand: carriedOut(node.operand, context) }, withoutDefinition(context, node.variable)),
      );
    case 'series':
      return closedSeries(node, context);
    default:
      return null;
  }
}

const operators: ReadonlySet<Expr['kind']> = new Set(['derivative', 'rate', 'integral', 'evaluated', 'limit']);

/** With the operators inside carried out where that can be done. */
export function carriedOut(expr: Expr, context: CheckContext): Expr {
  if (!hasOperatorBelow(expr)) return expr;
  return mapExpr(expr, (node) => (operators.has(node.kind) ? (reduceCalculus(node, context) ?? node) : node));
}

function hasOperatorBelow(expr: Expr): boolean {
  return operators.has(expr.kind) || childrenOf(expr).some(hasOperatorBelow);
}

/** The derivative of what a letter or function was said to be; else a quantity of its own. */
function reduceRate(node: Extract<Expr, { kind: 'rate' }>, context: CheckContext): Expr {
  const definition = context.definitions.letters.get(node.of);
  const own = context.definitions.functions.get(node.of);
  const body = definition ?? own?.value;
  if (body) return differentiateTimes(body, node.by, node.order, context, node.partial ?? false);
  return rateExpr(node);
}

function reduceIntegral(node: Extract<Expr, { kind: 'integral' }>, context: CheckContext): Expr | null {
  const { from, to, variable } = node;
  if (!from || !to) return null;
  const inner = withoutDefinition(context, variable);
  const integrand = carriedOut(node.integrand, inner);
  if (sameExpr(from, to)) return isKnownAt(integrand, variable, from, inner) ? zeroExpr : null;
  const primitive = findAntiderivative(integrand, variable, inner);
  if (primitive) return throughAntiderivative(primitive, { variable, from, to }, inner);
  const known = knownIntegral({ ...node, integrand }, inner);
  if (known) return known;
  const turned = inOtherOrder({ ...node, integrand }, inner);
  if (turned) return reduceCalculus(turned, context);
  const pieces = withoutBars({ ...node, integrand }, inner);
  const values = pieces?.map((piece) => reduceCalculus(piece, context));
  return values?.every((value) => value !== null) ? addExprs(...(values as Expr[])) : null;
}

/** An integral over a triangle, whose inner one is out of reach, in the other order (Fubini's theorem). */
function inOtherOrder(node: Extract<Expr, { kind: 'integral' }>, context: CheckContext): Expr | null {
  const { integrand: inside, variable, from, to } = node;
  if (inside.kind !== 'integral' || !from || !to || !inside.from || !inside.to) return null;
  if (![from, to].every((end) => isFree(end, variable) && isFree(end, inside.variable))) return null;
  if (!isEverywhere(inside.integrand, variable)) return null;
  if (!isEverywhere(inside.integrand, inside.variable) && !isBoundedBetween(inside, from, to, context)) return null;
  const isOuter = (end: Expr): boolean => end.kind === 'letter' && end.name === variable;
  const isSame = (a: Expr, b: Expr): boolean => compareExpressions(a, b, context).kind === 'equal';
  const at: Expr = { kind: 'letter', name: inside.variable, span: node.span };
  const swapped = (low: Expr, high: Expr): Expr => ({
    ...inside,
    from,
    to,
    integrand: { ...node, integrand: inside.integrand, from: low, to: high },
  });
  const found =
    isOuter(inside.from) && isSame(inside.to, to)
      ? swapped(from, at)
      : isOuter(inside.to) && isSame(inside.from, from)
        ? swapped(at, to)
        : null;
  return found?.kind === 'integral' && reduceCalculus(found.integrand, context) ? found : null;
}

/** Continuous between two numbers but for the ends, where it has limits. */
function isBoundedBetween(
  { integrand, variable }: Extract<Expr, { kind: 'integral' }>,
  from: Expr,
  to: Expr,
  context: CheckContext,
): boolean {
  const cuts = lettersOf(integrand).every((name) => name === variable)
    ? splitAt(integrand, variable, from, to, context)
    : null;
  if (cuts?.length !== 2) return false;
  return cuts.every(
    ({ at, isGap, isDescending }, k) =>
      !isGap ||
      limitFromSide(integrand, variable, { to: at, side: (k === 0) === isDescending ? 'left' : 'right' }, context)
        .kind === 'finite',
  );
}

function isKnownAt(expr: Expr, variable: string, at: Expr, context: CheckContext): boolean {
  return isKnown(evaluate(substitute(expr, variable, at), new Map(), 96, context)) || lettersOf(at).length > 0;
}

/** F at the upper end less F at the lower; an end without a value is approached from inside. */
function reduceEvaluated(node: Extract<Expr, { kind: 'evaluated' }>, context: CheckContext): Expr | null {
  const operand = carriedOut(node.operand, context);
  const variable = node.variable ?? onlyLetter(operand, context);
  if (variable === null) return lettersOf(operand).length === 0 && node.from ? zeroExpr : null;
  const inner = withoutDefinition(context, variable);
  const upper = valueAt(operand, variable, node.to, 'left', inner);
  if (!node.from) return upper;
  const lower = valueAt(operand, variable, node.from, 'right', inner);
  const [above, below] = [infinitySign(upper), infinitySign(lower)];
  if (above === null && below === null) return subExprs(upper, lower);
  if (above !== null && below === above) return noValueExpr;
  return (above ?? -(below ?? 1)) > 0 ? infinityExpr : negateExpr(infinityExpr);
}

function valueAt(operand: Expr, variable: string, at: Expr, side: 'left' | 'right', context: CheckContext): Expr {
  const put = substitute(operand, variable, at);
  if (
    infinitySign(at) === null &&
    (lettersOf(put).length > 0 || evaluate(put, new Map(), 96, context).kind !== 'undefined')
  ) {
    return put;
  }
  try {
    return limitExpr(limitFromSide(operand, variable, { to: at, side }, context));
  } catch (cause) {
    if (cause instanceof Unsettled && cause.reason === 'no-domain') return noValueExpr;
    throw cause;
  }
}

/** The letter that an evaluation bracket is about, where only one can be meant. */
export function onlyLetter(operand: Expr, context: CheckContext): string | null {
  const letters = lettersOf(operand);
  if (letters.length === 1) return letters[0] as string;
  const meant = letters.filter((name) => context.calculus?.variables.has(name));
  if (meant.length === 1) return meant[0] as string;
  return letters.length > 1 && letters.includes('x') && meant.length === 0 ? 'x' : null;
}
