import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import type { CheckContext } from '../context.ts';
import { isFiniteNumber, isNear, over, minus, real, sizeOf, type Complex } from '../evidence/complex-double.ts';
import { estimate, type Place } from '../evidence/estimate.ts';
import { choosePlaces } from '../evidence/places.ts';
import { roughTruth } from '../evidence/rough-truth.ts';

/** A quick look at whether a line may lead to the one below; false only where it certainly does not. */
export function mayFollow(below: Line, above: Line, context: CheckContext): (candidate: Line) => boolean {
  const letters = [...new Set([...lettersOf(below), ...lettersOf(above)])];
  const listed = valuesListed(below);
  const places = choosePlaces([above, below], 3, context);
  if (listed) {
    const tests = places.map((place) => listed.values.map((value) => withValue(place, listed.name, value)));
    return (candidate) => tests.every((points) => points.every((point) => roughTruth(candidate, point) !== false));
  }
  if (below.kind === 'relation' && below.sign === '=') {
    const wanted = places.map((place) => sides(below, place));
    // A mistake made in listing values shows in values only.
    return (candidate) =>
      candidate.kind !== 'relation'
        ? listOf(candidate) === null
        : candidate.sign === '=' &&
          isProportional(
            places.map((place) => sides(candidate, place)),
            wanted,
          );
  }
  const [name] = letters;
  if (letters.length !== 1 || name === undefined) return () => true;
  const points = samplePoints.map((x) => withValue(places[0] as Place, name, real(x)));
  const truths = points.map((point) => roughTruth(below, point));
  return (candidate) =>
    points.every((point, k) => {
      const found = roughTruth(candidate, point);
      return found === null || truths[k] === null || found === truths[k];
    });
}

const samplePoints = [
  -97.3, -31.7, -12.1, -8.3, -6.7, -5.4, -4.6, -3.3, -2.7, -1.9, -1.2, -0.7, -0.3, 0.2, 0.4, 0.8, 1.3, 1.7, 2.4, 3.4,
  4.3, 5.7, 6.2, 7.4, 8.8, 11.3, 14.9, 29.4, 88.1,
];

function withValue(place: Place, name: string, value: Complex): Place {
  return { ...place, letters: new Map(place.letters).set(name, value) };
}

function sides(line: Extract<Line, { kind: 'relation' }>, place: Place): Complex {
  return minus(estimate(line.left, place), estimate(line.right, place));
}

function isProportional(found: readonly Complex[], wanted: readonly Complex[]): boolean {
  let ratio: Complex | null = null;
  for (const [k, value] of found.entries()) {
    const other = wanted[k];
    if (!other || !isFiniteNumber(value) || !isFiniteNumber(other) || sizeOf(other) < 1e-9) continue;
    const own = over(value, other);
    if (sizeOf(own) < 1e-12) return false;
    if (ratio && !isNear(own, ratio)) return false;
    ratio ??= own;
  }
  return true;
}

interface Listed {
  readonly name: string;
  readonly values: readonly Complex[];
}

/** The values that a line lists for one letter, none of which has another letter in it. */
export function valuesListed(line: Line): Listed | null {
  const found = listOf(line);
  if (!found) return null;
  const place = { letters: new Map(), definitions: { letters: new Map(), functions: new Map() } };
  const values = found.values.flatMap(withSigns).map((value) => estimate(value, place));
  return values.every(isFiniteNumber) ? { name: found.name, values } : null;
}

export function listOf(line: Line): { name: string; values: readonly Expr[] } | null {
  if (
    line.kind === 'relation' &&
    line.sign === '=' &&
    line.left.kind === 'letter' &&
    lettersOf(line.right).length === 0
  ) {
    return { name: line.left.name, values: [line.right] };
  }
  if (line.kind === 'membership' && line.letter?.kind === 'letter' && line.set.kind === 'finite' && !line.negated) {
    return { name: line.letter.name, values: line.set.items };
  }
  if (line.kind !== 'any') return null;
  const parts = line.parts.map(listOf);
  const [first] = parts;
  if (!first || parts.some((part) => part?.name !== first.name)) return null;
  return { name: first.name, values: parts.flatMap((part) => part?.values ?? []) };
}

/** An expression with a plus-or-minus sign, both ways. */
function withSigns(expr: Expr): Expr[] {
  const upper = withPlus(expr);
  return upper === expr ? [expr] : [upper, chosen(expr, 'minus')];
}

/** The upper of the two readings of an expression with a plus-or-minus sign; the expression itself where it has none. */
export function withPlus(expr: Expr): Expr {
  return chosen(expr, 'plus');
}

function chosen(expr: Expr, sign: 'plus' | 'minus'): Expr {
  if (expr.kind === 'quotient') {
    const numerator = chosen(expr.numerator, sign);
    return numerator === expr.numerator ? expr : { ...expr, numerator };
  }
  if (expr.kind !== 'sum' || !expr.terms.some((term) => term.sign === 'plusminus')) return expr;
  return { ...expr, terms: expr.terms.map((term) => (term.sign === 'plusminus' ? { ...term, sign } : term)) };
}
