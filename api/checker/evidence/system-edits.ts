import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { sameLine } from '../../../shared/maths/same.ts';
import { printExpr } from '../../../shared/maths/print.ts';
import type { Rational } from '../numbers/rational.ts';
import { fraction } from './build.ts';
import { isFiniteNumber, real } from './complex-double.ts';
import type { Candidate } from './edits.ts';
import { estimate, type Place } from './estimate.ts';
import { simpleFraction } from './holes.ts';
import { leafEdits } from './leaf-edits.ts';
import { costOf, differenceAt, outer, type Aim, type MendQuestion } from './mend-question.ts';

type Relation = Extract<Line, { kind: 'relation' }>;

/** A linear equation as numbers: the coefficients of the letters, and what they add up to. */
interface Row {
  readonly coefficients: readonly number[];
  readonly total: number;
}

const mostLetters = 4;

/**
 * A line below a linear system: the one equation or value in it that the solution does not satisfy, mended so that it
 * follows. An equation gets the right side that the same combination of the equations above has; a value becomes that of
 * the solution.
 */
export function* systemEdits(question: MendQuestion): Generator<Candidate> {
  const { above, line, known } = question;
  const equations = [above, ...known].flatMap(equationsIn).filter((equation, k, all) => {
    return all.findIndex((other) => sameLine(other, equation)) === k;
  });
  const names = [...new Set(equations.flatMap((equation) => [...lettersOf(equation)]))];
  if (equations.length < 2 || names.length < 2 || names.length > mostLetters) return;
  const rows = equations.map((equation) => rowOf(equation, names, question));
  if (rows.includes(null)) return;
  const solution = solve(rows as Row[]);
  if (!solution) return;
  const place = placeOf(names, solution, question);
  const parts = (line.kind === 'all' ? line.parts : [line]).filter(
    (part): part is Relation => part.kind === 'relation' && part.sign === '=',
  );
  for (const part of parts) {
    const off = differenceAt(part, place);
    if (isFiniteNumber(off) && Math.abs(off.re) > 1e-9) yield* mendedPart(part, rows as Row[], names, place, question);
  }
}

function equationsIn(line: Line): Relation[] {
  if (line.kind === 'all') return line.parts.flatMap(equationsIn);
  return line.kind === 'relation' && line.sign === '=' ? [line] : [];
}

function* mendedPart(
  part: Relation,
  rows: readonly Row[],
  names: readonly string[],
  place: Place,
  question: MendQuestion,
): Generator<Candidate> {
  if (lettersOf(part.right).length === 0) {
    const isValue = part.left.kind === 'letter';
    const value = simpleFraction(estimate(part.left, place));
    const own = rowOf(part, names, question);
    // A number that an equation above has as well was copied.
    const written = estimate(part.right, place).re;
    const isCopied = written !== 0 && rows.some(({ total }) => total === written);
    const isPlain = isValue || (!isCopied && own !== null && hasWholeCombination(rows, own));
    if (value)
      yield { edits: [{ ...outer(part.right), text: textOf(value) }], cost: isPlain ? 1 : 1.3, touchesRight: false };
  }
  yield* leafEdits(aimAt(part, place, question), [], question.tex);
}

function textOf(value: Rational): string {
  return printExpr(fraction(value));
}

function aimAt(part: Relation, place: Place, { context }: MendQuestion): Aim {
  const tree: Expr = {
    kind: 'sum',
    terms: [
      { sign: 'plus', expr: part.left, span: part.left.span },
      { sign: 'minus', expr: part.right, span: part.right.span },
    ],
    span: part.span,
  };
  return {
    roots: [part.left, part.right],
    tree,
    wanted: null,
    places: [place],
    cost: costOf(part.left, part.right),
    budget: context.budget,
    targets: [[real(0)]],
    isRight: () => false,
    extra: 0.15,
  };
}

function placeOf(names: readonly string[], values: readonly number[], { context }: MendQuestion): Place {
  return {
    letters: new Map(names.map((name, k) => [name, real(values[k] as number)])),
    definitions: context.definitions,
  };
}

/** The numbers of an equation of first degree, found from values and checked; null for any other. */
function rowOf(equation: Relation, names: readonly string[], question: MendQuestion): Row | null {
  const at = (values: readonly number[]): number => differenceAt(equation, placeOf(names, values, question)).re;
  const zero = names.map(() => 0);
  const start = at(zero);
  const coefficients = names.map((_, k) => at(zero.map((_, at) => (at === k ? 1 : 0))) - start);
  const test = names.map((_, k) => 1.7 + 0.9 * k);
  const expected = coefficients.reduce((total, c, k) => total + c * (test[k] as number), start);
  return Number.isFinite(expected) && Math.abs(at(test) - expected) < 1e-9 * (1 + Math.abs(expected))
    ? { coefficients, total: -start }
    : null;
}

/** The only solution, null where there is none or more than one. */
function solve(rows: readonly Row[]): number[] | null {
  const width = rows[0]?.coefficients.length ?? 0;
  const left = rows.map(({ coefficients, total }) => [...coefficients, total]);
  for (let column = 0; column < width; column += 1) {
    if (column >= left.length) return null;
    const pivots = left.slice(column).map((row) => Math.abs(row[column] as number));
    const best = column + pivots.indexOf(Math.max(...pivots, 0));
    const pivot = left[best];
    if (!pivot || Math.abs(pivot[column] as number) < 1e-9) return null;
    [left[column], left[best]] = [pivot, left[column] as number[]];
    for (const [k, row] of left.entries()) {
      if (k === column) continue;
      const factor = (row[column] as number) / (pivot[column] as number);
      row.forEach((value, at) => (row[at] = value - factor * (pivot[at] as number)));
    }
  }
  if (left.slice(width).some((row) => Math.abs(row[width] as number) > 1e-9)) return null;
  return left.slice(0, width).map((row, k) => (row[width] as number) / (row[k] as number));
}

/** Whether the left side is a sum of whole multiples of those above, as adding and subtracting equations gives. */
function hasWholeCombination(rows: readonly Row[], own: Row): boolean {
  const turned = own.coefficients.map((total, k) => ({
    coefficients: rows.slice(0, own.coefficients.length).map((row) => row.coefficients[k] as number),
    total,
  }));
  const found = solve(turned);
  return found?.every((value) => Math.abs(value - Math.round(value)) < 1e-9) ?? false;
}
