import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import type { Note, UndecidedReason } from '../../../shared/schemas/verdict.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { Comparison } from '../compare/comparison.ts';
import type { CheckContext } from '../context.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { divExprs, oneExpr, zeroExpr } from './build.ts';
import { differentiate } from './differentiate.ts';
import { isFree, linearIn } from './integrand.ts';
import { compareOpenSeries } from './open-series.ts';
import { carriedOut } from './reduce.ts';
import { indefiniteVariables } from './scope.ts';
import { substitute } from './substitute.ts';

/** How two lines compare up to a free constant on each interval of their domain. */
export type AntiderivativeRuling =
  | {
      readonly kind: 'holds';
      readonly reached: 'proved' | 'sampled';
      readonly notes: readonly Note[];
      readonly found: Extract<Comparison, { kind: 'equal' }>;
    }
  /** The constant that the task asks for is missing. */
  | { readonly kind: 'no-constant'; readonly meant: string }
  | { readonly kind: 'compared'; readonly found: Comparison }
  | { readonly kind: 'undecided'; readonly reason: UndecidedReason };

/** Whether the step has an indefinite integral or a constant of integration; then its lines are compared by derivatives. */
export function concernsConstants(above: Expr, below: Expr, context: CheckContext): boolean {
  if (context.calculus?.variables.size === 0 && context.calculus.constants.size === 0) return false;
  if (indefiniteVariables(above).length + indefiniteVariables(below).length > 0) return true;
  return (
    [...constantsIn(above, context), ...constantsIn(below, context)].length > 0 &&
    baseVariables([], above, below, context).length > 0
  );
}

function constantsIn(expr: Expr, context: CheckContext): string[] {
  return lettersOf(expr).filter(
    (name) => context.calculus?.constants.has(name) && !context.definitions.letters.has(name),
  );
}

/** Rule 8: the derivatives agree where both have a value; a constant that is missing is noted. */
export function compareAntiderivatives(above: Expr, below: Expr, context: CheckContext): AntiderivativeRuling {
  try {
    return compareDerivatives(carriedOut(above, context), carriedOut(below, context), context);
  } catch (cause) {
    if (cause instanceof Unsettled) return { kind: 'undecided', reason: cause.reason };
    throw cause;
  }
}

function compareDerivatives(above: Expr, below: Expr, context: CheckContext): AntiderivativeRuling {
  const open = [...indefiniteVariables(above), ...indefiniteVariables(below)];
  const variables = baseVariables(open, above, below, context);
  const [variable] = variables;
  if (variable === undefined || variables.length > 1) return { kind: 'undecided', reason: 'not-covered' };
  const [a, b] = [differentiate(above, variable, context, true), differentiate(below, variable, context, true)];
  const plain = compareExpressions(a, b, context);
  const found = (plain.kind === 'undecided' ? compareOpenSeries(a, b, context) : null) ?? plain;
  if (found.kind === 'equal') return agreed(above, below, found, context);
  if (found.kind === 'different' && constantsIn(a, context).length > 0) {
    const absorbed = absorbs(above, below, variable, context);
    return absorbed
      ? { kind: 'holds', reached: absorbed.reached, notes: [], found: absorbed }
      : { kind: 'undecided', reason: 'not-settled' };
  }
  return { kind: 'compared', found };
}

function agreed(
  above: Expr,
  below: Expr,
  found: Extract<Comparison, { kind: 'equal' }>,
  context: CheckContext,
): AntiderivativeRuling {
  const isFreeAbove = indefiniteVariables(above).length > 0 || constantsIn(above, context).length > 0;
  const isMissing = isFreeAbove && indefiniteVariables(below).length === 0 && constantsIn(below, context).length === 0;
  if (isMissing && context.calculus?.constantNeeded) return { kind: 'no-constant', meant: `${printExpr(below)}+C` };
  return { kind: 'holds', reached: found.reached, notes: isMissing ? ['constant'] : [], found };
}

/** The letters to differentiate by: the variables of the integrals, or those that defined ones of them depend on. */
function baseVariables(open: readonly string[], above: Expr, below: Expr, context: CheckContext): string[] {
  const letters = new Set([...lettersOf(above), ...lettersOf(below)]);
  const named =
    open.length > 0
      ? open
      : [...(context.calculus?.variables ?? [])].filter(
          (name) => letters.has(name) || baseOf(name, context).some((b) => letters.has(b)),
        );
  const bases = [...new Set(named.flatMap((name) => baseOf(name, context)))];
  if (bases.length > 1 && open.length === 0) return bases.filter((name) => letters.has(name));
  return bases;
}

function baseOf(name: string, context: CheckContext, depth = 0): string[] {
  const definition = depth < 8 ? context.definitions.letters.get(name) : undefined;
  if (!definition) return [name];
  const inner = lettersOf(definition).filter((letter) => letter !== name);
  const moving = inner.length > 1 ? inner.filter((letter) => context.calculus?.variables.has(letter)) : inner;
  return (moving.length > 0 ? moving : inner).flatMap((letter) => baseOf(letter, context, depth + 1));
}

/** A constant factor that takes others up: h(x) e^C written as C g(x). */
function absorbs(
  above: Expr,
  below: Expr,
  variable: string,
  context: CheckContext,
): Extract<Comparison, { kind: 'equal' }> | null {
  for (const name of constantsIn(below, context)) {
    const linear = linearIn(below, name);
    if (!linear || !isFree(linear.slope, name)) continue;
    const unit = substitute(below, name, oneExpr);
    if (compareExpressions(linear.slope, unit, context).kind !== 'equal') continue;
    const slope = differentiate(divExprs(above, linear.slope), variable, context, true);
    const found = compareExpressions(slope, zeroExpr, context);
    if (found.kind === 'equal') return found;
  }
  return null;
}
