import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameExpr } from '../../../shared/maths/same.ts';
import { childrenOf, mapExpr } from '../../../shared/maths/walk.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { Comparison } from '../compare/comparison.ts';
import type { CheckContext } from '../context.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { isZeroExpr, letterOf, zeroExpr } from './build.ts';
import { differentiate } from './differentiate.ts';
import { isFree } from './integrand.ts';
import { compareOpenSeries, seriesAtZero } from './open-series.ts';
import { isEverywhere } from './needs.ts';
import { carriedOut } from './reduce.ts';
import { substitute } from './substitute.ts';

type IntegralExpr = Extract<Expr, { kind: 'integral' }>;

/**
 * Two lines with an integral up to a letter: equal where both are continuous, have the same derivative by that letter and
 * the same value where the integral is empty. Null where that does not show it.
 */
export function compareByUpperEnd(above: Expr, below: Expr, context: CheckContext): Comparison | null {
  const [integral] = [...integralsUpTo(above), ...integralsUpTo(below)];
  if (integral?.to?.kind !== 'letter' || !integral.from) return null;
  const { name } = integral.to;
  const { from } = integral;
  if (!isFree(from, name) || context.definitions.letters.has(name)) return null;
  if (
    ![above, below].every((expr) =>
      isEverywhere(
        mapExpr(expr, (node) => standIn(node, name)),
        name,
      ),
    )
  )
    return null;
  try {
    const slopes = [above, below].map((expr) => carriedOut(differentiate(expr, name, context, true), context));
    const found = compared(slopes[0] as Expr, slopes[1] as Expr, context);
    if (found.kind !== 'equal') return null;
    const starts = [above, below].map((expr) => carriedOut(atStart(expr, name, from), context));
    const start = compared(starts[0] as Expr, starts[1] as Expr, context);
    return start.kind === 'equal' ? found : null;
  } catch (cause) {
    if (cause instanceof Unsettled) return null;
    throw cause;
  }
}

function compared(above: Expr, below: Expr, context: CheckContext): Comparison {
  const found = compareExpressions(above, below, context);
  return (found.kind === 'undecided' ? compareOpenSeries(above, below, context) : null) ?? found;
}

function integralsUpTo(expr: Expr): IntegralExpr[] {
  const inside = childrenOf(expr).flatMap(integralsUpTo);
  return expr.kind === 'integral' && expr.to?.kind === 'letter' ? [expr, ...inside] : inside;
}

/** Integrals up to the letter and power series in it are continuous where they have a value. */
function standIn(node: Expr, name: string): Expr {
  const isIntegral = node.kind === 'integral' && node.to?.kind === 'letter' && node.to.name === name;
  const isSeries = node.kind === 'series' && lettersOf(node.body).includes(name) && isPowerSeries(node.body, name);
  return isIntegral || isSeries ? letterOf(name) : node;
}

/** The line where the integral is empty. */
function atStart(expr: Expr, name: string, from: Expr): Expr {
  const plain = mapExpr(expr, (node) => {
    if (standIn(node, name) === node) return node;
    if (node.kind === 'series') return (isZeroExpr(from) ? seriesAtZero(node, name) : null) ?? node;
    return node.kind === 'integral' && node.from && sameExpr(node.from, from) ? zeroExpr : node;
  });
  return substitute(plain, name, from);
}

function isPowerSeries(body: Expr, name: string): boolean {
  if (isFree(body, name) || body.kind === 'letter') return true;
  if (body.kind === 'power') return isPowerSeries(body.base, name) && isFree(body.exponent, name);
  if (body.kind === 'quotient') return isPowerSeries(body.numerator, name) && isFree(body.denominator, name);
  return (
    (body.kind === 'product' || body.kind === 'sum') && childrenOf(body).every((part) => isPowerSeries(part, name))
  );
}
