import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { listOf } from '../slips/may-follow.ts';
import { isFiniteNumber } from './complex-double.ts';
import type { Candidate } from './edits.ts';
import { estimate, type Place } from './estimate.ts';
import { outer, type MendQuestion } from './mend-question.ts';

const nowhere: Place = { letters: new Map(), definitions: { letters: new Map(), functions: new Map() } };
/** Beyond this a double may not have all digits right. */
const mostDecimals = 9;

/** A value behind an approximation sign: the exact one above, rounded rightly to as many digits. */
export function* roundedValues({ above, line, tex, lost }: MendQuestion): Generator<Candidate> {
  const written = approximations(line);
  if (written.length === 0) return;
  const exact = exactValues(above, lost);
  for (const expr of written) {
    const own = numberIn(expr);
    if (!own) continue;
    const span = outer(own.number);
    const near = [...exact].sort((a, b) => Math.abs(a - own.value) - Math.abs(b - own.value))[0];
    if (near === undefined || Math.sign(near) !== Math.sign(own.value)) continue;
    const text = Math.abs(near).toFixed(own.decimals);
    const isComma = tex.slice(span.start, span.end).includes(',');
    yield { edits: [{ ...span, text: isComma ? text.replace('.', ',') : text }], cost: 0.9, touchesRight: false };
  }
}

function approximations(line: Line): Expr[] {
  switch (line.kind) {
    case 'relation':
      return line.sign === 'approx' ? [line.right] : [];
    case 'continuation':
      return line.members.filter((_, k) => line.signs[k] === 'approx');
    case 'chain':
      return line.members.slice(1).filter((_, k) => line.signs[k] === 'approx');
    case 'any':
    case 'all':
      return line.parts.flatMap(approximations);
    default:
      return [];
  }
}

type NumberExpr = Extract<Expr, { kind: 'number' }>;

function numberIn(expr: Expr): { number: NumberExpr; value: number; decimals: number } | null {
  const [only] = expr.kind === 'sum' && expr.terms.length === 1 ? expr.terms : [];
  const number = only?.sign === 'minus' ? only.expr : expr;
  if (number.kind !== 'number' || number.decimals > mostDecimals) return null;
  if (number.written !== 'decimal' && number.written !== 'integer') return null;
  const size = Number(number.numerator) / Number(number.denominator);
  return { number, value: only ? -size : size, decimals: number.decimals };
}

function readValue(tex: string): Expr[] {
  const reading = readLine(tex);
  return reading.ok && reading.line.kind === 'expression' ? [reading.line.expr] : [];
}

/** What the line above is worth, or the values that it gives its letter. */
function exactValues(above: Line, lost: readonly string[]): number[] {
  const listed = above.kind === 'expression' ? [above.expr] : (listOf(above)?.values ?? []);
  return [...listed, ...lost.flatMap(readValue)]
    .filter((value) => lettersOf(value).length === 0)
    .map((value) => estimate(value, nowhere))
    .flatMap((value) => (isFiniteNumber(value) && Math.abs(value.im) < 1e-12 ? [value.re] : []));
}
