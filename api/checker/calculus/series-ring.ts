import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import { Unsettled } from '../solving/unsettled.ts';
import { isExactZero, isKnown, isNonZero } from '../values/arithmetic.ts';
import { evaluate } from '../values/evaluate.ts';
import { signOf } from '../values/powers.ts';
import {
  addExprs,
  callOf,
  divExprs,
  mulExprs,
  negateExpr,
  numberOf,
  oneExpr,
  powExprs,
  rationalExpr,
  rationalOf,
  zeroExpr,
} from './build.ts';

/**
 * Expansions at a point, in a letter t > 0 that tends to 0: sums of c exp(E) t^p L^q with L = ln(1/t), the largest first,
 * E itself a sum of growing terms c t^p L^q. After Gruntz, On computing limits in a symbolic manipulation system (1996),
 * with one level of exponentials.
 */
export interface Scale {
  readonly growth: readonly GrowthTerm[];
  readonly p: Rational;
  readonly q: number;
}
export interface GrowthTerm {
  readonly coef: Expr;
  readonly p: Rational;
  readonly q: number;
}
export interface SeriesTerm {
  readonly coef: Expr;
  readonly scale: Scale;
}
/** How many powers of what tends to 0 are kept. */
export interface Expansion extends CheckContext {
  readonly steps: number;
}
/** Terms from the largest on; `error`: what is left out is at most a constant times this, null where nothing is. */
export interface Series {
  readonly terms: readonly SeriesTerm[];
  readonly error: Scale | null;
}

const mostTerms = 24;
export const unitScale: Scale = { growth: [], p: Q.zero, q: 0 };

export function constantSeries(coef: Expr): Series {
  const value = rationalOf(coef);
  if (value && Q.isZero(value)) return { terms: [], error: null };
  return { terms: [{ coef, scale: unitScale }], error: null };
}

export function powerSeries(coef: Expr, p: Rational): Series {
  return { terms: [{ coef, scale: { growth: [], p, q: 0 } }], error: null };
}

/** What is only known to be of some size. */
export function boundedSeries(error: Scale): Series {
  return { terms: [], error };
}

/** -1, 0 or 1; throws Unsettled where the sign is not certain. */
export function signOfCoefficient(coef: Expr, context: CheckContext): -1 | 0 | 1 {
  const value = rationalOf(coef);
  if (value !== null) return Q.sign(value);
  if (isZeroCoefficient(coef, context)) return 0;
  const worth = evaluate(coef, new Map(), 192, context);
  const known = isKnown(worth) ? signOf(worth) : null;
  if (known === null || known === 0) throw new Unsettled('not-settled');
  return known;
}

export function isZeroCoefficient(coef: Expr, context: CheckContext): boolean {
  const value = rationalOf(coef);
  if (value !== null) return Q.isZero(value);
  if (lettersOf(coef).length === 0) {
    const worth = evaluate(coef, new Map(), 128, context);
    if (isKnown(worth) && worth.kind !== 'ball') return isExactZero(worth);
    if (isKnown(worth) && isNonZero(worth)) return false;
  }
  const found = compareExpressions(coef, zeroExpr, context);
  if (found.kind === 'equal' && found.reached === 'proved') return true;
  if (found.kind === 'different') return false;
  throw new Unsettled('not-settled');
}

/** Positive where a is the larger one as t tends to 0. */
export function compareScales(a: Scale, b: Scale, context: Expansion): number {
  const lead = joinGrowth(a.growth, b.growth, -1, context)[0];
  if (lead) return signOfCoefficient(lead.coef, context);
  const order = Q.compare(b.p, a.p);
  return order !== 0 ? order : a.q - b.q;
}

function joinGrowth(
  a: readonly GrowthTerm[],
  b: readonly GrowthTerm[],
  times: number,
  context: Expansion,
): GrowthTerm[] {
  const result = [...a];
  for (const term of b) {
    const coef = times === 1 ? term.coef : negateExpr(term.coef);
    const at = result.findIndex((other) => Q.equals(other.p, term.p) && other.q === term.q);
    if (at < 0) result.push({ ...term, coef });
    else result[at] = { ...term, coef: addExprs((result[at] as GrowthTerm).coef, coef) };
  }
  return result
    .filter((term) => !isZeroCoefficient(term.coef, context))
    .sort((x, y) => Q.compare(x.p, y.p) || y.q - x.q);
}

function mulScales(a: Scale, b: Scale, context: Expansion): Scale {
  const growth = a.growth.length + b.growth.length === 0 ? [] : joinGrowth(a.growth, b.growth, 1, context);
  return { growth, p: Q.add(a.p, b.p), q: a.q + b.q };
}

function powScale(a: Scale, r: Rational): Scale {
  if (!Number.isInteger(a.q)) throw new Unsettled('not-covered');
  const q = Q.mul(Q.rational(a.q), r);
  if (q.den !== 1n) throw new Unsettled('not-covered');
  return {
    growth: a.growth.map((term) => ({ ...term, coef: mulExprs(rationalExpr(r), term.coef) })),
    p: Q.mul(a.p, r),
    q: Number(q.num),
  };
}

function larger(a: Scale | null, b: Scale | null, context: Expansion): Scale | null {
  if (!a || !b) return a ?? b;
  return compareScales(a, b, context) >= 0 ? a : b;
}

/** Sorted, equal scales joined, zeros and what is below the error left out. */
function normalised(terms: readonly SeriesTerm[], error: Scale | null, context: Expansion): Series {
  context.budget.spend(4 + terms.length);
  const joined: SeriesTerm[] = [];
  for (const term of terms) {
    if (error && compareScales(term.scale, error, context) <= 0) continue;
    const at = joined.findIndex((other) => compareScales(other.scale, term.scale, context) === 0);
    if (at < 0) joined.push(term);
    else joined[at] = { coef: addExprs((joined[at] as SeriesTerm).coef, term.coef), scale: term.scale };
  }
  const kept = joined.filter((term) => !isZeroCoefficient(term.coef, context));
  kept.sort((a, b) => compareScales(b.scale, a.scale, context));
  const dropped = kept[mostTerms];
  return dropped
    ? { terms: kept.slice(0, mostTerms), error: larger(error, dropped.scale, context) }
    : { terms: kept, error };
}

export function addSeries(a: Series, b: Series, context: Expansion): Series {
  return normalised([...a.terms, ...b.terms], larger(a.error, b.error, context), context);
}

export function scaleSeries(a: Series, coef: Expr, context: Expansion): Series {
  return normalised(
    a.terms.map((term) => ({ ...term, coef: mulExprs(coef, term.coef) })),
    a.error,
    context,
  );
}

export function negateSeries(a: Series): Series {
  return { ...a, terms: a.terms.map((term) => ({ ...term, coef: negateExpr(term.coef) })) };
}

export function mulSeries(a: Series, b: Series, context: Expansion): Series {
  const terms = a.terms.flatMap((x) =>
    b.terms.map((y) => ({ coef: mulExprs(x.coef, y.coef), scale: mulScales(x.scale, y.scale, context) })),
  );
  const [sizeA, sizeB] = [a.terms[0]?.scale ?? a.error, b.terms[0]?.scale ?? b.error];
  let error: Scale | null = null;
  if (a.error && sizeB) error = mulScales(a.error, sizeB, context);
  if (b.error && sizeA) error = larger(error, mulScales(sizeA, b.error, context), context);
  return normalised(terms, error, context);
}

/** The leading term and what the rest is of it. */
function splitLead(a: Series, context: Expansion): { lead: SeriesTerm; rest: Series } {
  const [lead, ...others] = a.terms;
  if (!lead) throw new Unsettled('not-settled');
  const inverse: SeriesTerm = { coef: divExprs(oneExpr, lead.coef), scale: powScale(lead.scale, Q.minusOne) };
  const rest = mulSeries({ terms: others, error: a.error }, { terms: [inverse], error: null }, context);
  return { lead, rest };
}

/** Sum of c_k d^k for a d that tends to 0; `coefficient` gives c_k. */
export function composeSeries(coefficient: (k: number) => Expr, small: Series, context: Expansion): Series {
  const size = small.terms[0]?.scale ?? small.error;
  let total = constantSeries(coefficient(0));
  if (!size) return total;
  if (compareScales(size, unitScale, context) >= 0) throw new Unsettled('not-settled');
  let power = constantSeries(oneExpr);
  for (let k = 1; k <= context.steps; k += 1) {
    power = mulSeries(power, small, context);
    const coef = coefficient(k);
    if (!isZeroCoefficient(coef, context)) total = addSeries(total, scaleSeries(power, coef, context), context);
  }
  const error = larger(total.error, powScale(size, Q.rational(context.steps + 1)), context);
  return normalised(total.terms, error, context);
}

export function inverseSeries(a: Series, context: Expansion): Series {
  return rationalPower(a, Q.minusOne, context);
}

/** a^r; a leading coefficient below zero has real powers with an odd denominator only. */
export function rationalPower(a: Series, r: Rational, context: Expansion): Series {
  if (Q.isZero(r)) return constantSeries(oneExpr);
  if (a.terms.length === 0 && Q.sign(r) > 0) return { terms: [], error: a.error && powScale(a.error, r) };
  const { lead, rest } = splitLead(a, context);
  let head: Expr;
  if (r.den === 1n) head = powExprs(lead.coef, rationalExpr(r));
  else {
    // With letters: where it is negative an even root has no value, and an odd one is the same power.
    const known = lettersOf(lead.coef).length > 0 ? 1 : signOfCoefficient(lead.coef, context);
    if (known < 0 && (r.den % 2n === 0n || context.numbers === 'complex')) throw new Unsettled('no-domain');
    const size = powExprs(known < 0 ? negateExpr(lead.coef) : lead.coef, rationalExpr(r));
    head = known < 0 && r.num % 2n !== 0n ? negateExpr(size) : size;
  }
  const binomials = [oneExpr];
  const tail = composeSeries(
    (k) => {
      for (let j = binomials.length; j <= k; j += 1) {
        binomials.push(
          mulExprs(binomials[j - 1] as Expr, rationalExpr(Q.div(Q.sub(r, Q.rational(j - 1)), Q.rational(j)))),
        );
      }
      return binomials[k] as Expr;
    },
    rest,
    context,
  );
  return mulSeries({ terms: [{ coef: head, scale: powScale(lead.scale, r) }], error: null }, tail, context);
}

export function expSeries(a: Series, context: Expansion): Series {
  if (isOnlyBounded(a, context)) return boundedSeries(unitScale);
  const split = splitBySize(a, context);
  let p = Q.zero;
  const growth: GrowthTerm[] = [];
  for (const { coef, scale } of split.large) {
    if (scale.growth.length > 0) throw new Unsettled('not-covered');
    const times = rationalOf(coef);
    if (Q.isZero(scale.p) && scale.q === 1 && times) p = Q.sub(p, times);
    else growth.push({ coef, p: scale.p, q: scale.q });
  }
  const head: SeriesTerm = {
    coef: split.constant ? callOf('exp', split.constant) : oneExpr,
    scale: { growth, p, q: 0 },
  };
  let factorial = 1n;
  const factorials = [1n];
  const tail = composeSeries(
    (k) => {
      for (let j = factorials.length; j <= k; j += 1) factorials.push((factorial *= BigInt(j)));
      return numberOf(1, factorials[k] as bigint);
    },
    split.small,
    context,
  );
  return mulSeries({ terms: [head], error: null }, tail, context);
}

export function lnSeries(a: Series, context: Expansion): Series {
  const { lead, rest } = splitLead(a, context);
  if (lettersOf(lead.coef).length === 0 && signOfCoefficient(lead.coef, context) <= 0) throw new Unsettled('no-domain');
  if (lead.scale.q !== 0) throw new Unsettled('not-covered');
  const terms: SeriesTerm[] = lead.scale.growth.map(({ coef, p, q }) => ({ coef, scale: { growth: [], p, q } }));
  terms.push({ coef: callOf('ln', lead.coef), scale: unitScale });
  terms.push({ coef: rationalExpr(Q.negate(lead.scale.p)), scale: { growth: [], p: Q.zero, q: 1 } });
  const tail = composeSeries((k) => (k === 0 ? zeroExpr : numberOf(k % 2 === 1 ? 1 : -1, k)), rest, context);
  return addSeries(normalised(terms, null, context), tail, context);
}

/** Whether nothing more is known than that it stays within bounds. */
export function isOnlyBounded({ terms, error }: Series, context: Expansion): boolean {
  if (!error || compareScales(error, unitScale, context) !== 0) return false;
  return terms.every(({ scale }) => compareScales(scale, unitScale, context) <= 0);
}

/** Growing terms, the constant and what tends to 0. */
export function splitBySize(
  a: Series,
  context: Expansion,
): { large: SeriesTerm[]; constant: Expr | null; small: Series } {
  if (a.error && compareScales(a.error, unitScale, context) >= 0) throw new Unsettled('not-settled');
  const large: SeriesTerm[] = [];
  const small: SeriesTerm[] = [];
  let constant: Expr | null = null;
  for (const term of a.terms) {
    const order = compareScales(term.scale, unitScale, context);
    if (order > 0) large.push(term);
    else if (order === 0) constant = term.coef;
    else small.push(term);
  }
  return { large, constant, small: { terms: small, error: a.error } };
}
