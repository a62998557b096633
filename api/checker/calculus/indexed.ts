import type { Expr, SeriesExpr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf, mapChildren } from '../../../shared/maths/walk.ts';
import { compareExpressions } from '../compare/compare-expressions.ts';
import type { Comparison } from '../compare/comparison.ts';
import type { CheckContext } from '../context.ts';
import { indexedName } from './indexed-letters.ts';
import { addExprs, letterOf, mulExprs, numberOf, rationalOf } from './build.ts';

const mostTerms = 5;

/**
 * Lines with sums of a_k: both are written out for the first values of the letter in the bounds. A difference at one of
 * them is certain; agreement at all of them counts as sampled.
 */
export function compareIndexed(above: Expr, below: Expr, context: CheckContext): Comparison {
  const open: Comparison = { kind: 'undecided', reason: 'not-covered' };
  const bounds = [above, below].flatMap(seriesIn);
  const ends = [...new Set(bounds.flatMap(({ from, to }) => [...lettersOf(from), ...lettersOf(to)]))];
  const starts = bounds.map(({ from }) => rationalOf(from));
  if (ends.length > 1 || starts.some((start) => start?.den !== 1n)) return open;
  const [letter] = ends;
  if (letter === undefined) return compareWritten(above, below, context);
  const first = starts.reduce((most, start) => (start && start.num > most ? start.num : most), 0n);
  let last: Comparison = open;
  for (let k = 0n; k < BigInt(mostTerms); k += 1n) {
    const [a, b] = [above, below].map((expr) => put(expr, letter, first + k)) as [Expr, Expr];
    last = compareWritten(a, b, context);
    // A bar may stand for the mean of what is summed.
    if (last.kind === 'different' && [above, below].some(hasBar)) return open;
    if (last.kind === 'different') return withValue(last, letter, first + k);
    if (last.kind !== 'equal') return open;
  }
  return last.kind === 'equal' ? { ...last, reached: 'sampled' } : open;
}

function hasBar(expr: Expr): boolean {
  return (expr.kind === 'call' && expr.name === 'conj') || childrenOf(expr).some(hasBar);
}

function seriesIn(expr: Expr): SeriesExpr[] {
  const inside = childrenOf(expr).flatMap(seriesIn);
  return expr.kind === 'series' ? [expr, ...inside] : inside;
}

function compareWritten(above: Expr, below: Expr, context: CheckContext): Comparison {
  const [a, b] = [writtenOut(above), writtenOut(below)];
  return a && b ? compareExpressions(a, b, context) : { kind: 'undecided', reason: 'not-covered' };
}

type Different = Extract<Comparison, { kind: 'different' }>;

function withValue(found: Different, letter: string, value: bigint): Different {
  const at = new Map(found.witness.at).set(letter, { kind: 'rational', value: { num: value, den: 1n } });
  return { ...found, witness: { ...found.witness, at, atTex: { [letter]: String(value), ...found.witness.atTex } } };
}

/** A number in place of a letter, in subscripts as well. */
function put(expr: Expr, letter: string, value: bigint): Expr {
  if (expr.kind === 'letter') {
    if (expr.name === letter) return numberOf(value);
    const name = indexedName(expr.name, letter, value);
    return name === null ? expr : letterOf(name);
  }
  if (expr.kind === 'series' && expr.index === letter)
    return { ...expr, from: put(expr.from, letter, value), to: put(expr.to, letter, value) };
  return mapChildren(expr, (part) => put(part, letter, value));
}

/** Sums and products term by term; null where a bound is no number, or there are too many terms. */
function writtenOut(expr: Expr): Expr | null {
  if (expr.kind !== 'series') {
    let isWhole = true;
    const copy = mapChildren(expr, (part) => {
      const written = writtenOut(part);
      if (!written) isWhole = false;
      return written ?? part;
    });
    return isWhole ? copy : null;
  }
  const [low, high] = [rationalOf(expr.from), rationalOf(expr.to)];
  if (low?.den !== 1n || high?.den !== 1n || high.num - low.num > 60n) return null;
  const terms: Expr[] = [];
  for (let k = low.num; k <= high.num; k += 1n) {
    const term = writtenOut(put(expr.body, expr.index, k));
    if (!term) return null;
    terms.push(term);
  }
  return expr.operation === 'sum' ? addExprs(...terms) : mulExprs(...terms);
}
