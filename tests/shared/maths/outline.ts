import type { Expr, Line, ReadSettings } from '../../../shared/maths/expression.ts';
import { printLine } from '../../../shared/maths/print.ts';
import { DEFAULT_READ_SETTINGS, readLine } from '../../../shared/maths/read.ts';
import { explainRefusal } from '../../../shared/maths/refusals.ts';

const SIGNS = { plus: '+', minus: '-', plusminus: '±', minusplus: '∓' } as const;

/** The structure of an expression in one short text: `(* 2 (^ x 2))`. */
export function outlineOf(expr: Expr): string {
  switch (expr.kind) {
    case 'number': {
      const value = expr.denominator === 1n ? `${expr.numerator}` : `${expr.numerator}/${expr.denominator}`;
      return expr.written === 'integer' ? value : `${value}:${expr.written}`;
    }
    case 'letter':
      return expr.name;
    case 'constant':
      return `#${expr.name}`;
    case 'sum':
      return `(${expr.terms.map((term) => SIGNS[term.sign] + outlineOf(term.expr)).join(' ')})`;
    case 'product':
      return `(* ${expr.factors.map(outlineOf).join(' ')})`;
    case 'quotient':
      return `(/${expr.written === 'fraction' ? '' : expr.written} ${outlineOf(expr.numerator)} ${outlineOf(expr.denominator)})`;
    case 'power':
      return `(^ ${outlineOf(expr.base)} ${outlineOf(expr.exponent)})`;
    default:
      return outlineOfData(expr);
  }
}

/** Any part of a reading: its kind and its fields in order, spans left out. */
function outlineOfData(value: unknown): string {
  if (value === null || value === undefined) return '_';
  if (Array.isArray(value)) return `[${value.map(outlineOfData).join(' ')}]`;
  if (typeof value !== 'object') return String(value);
  if (isExpr(value) && SHORT.has(value.kind)) return outlineOf(value);
  const fields = Object.entries(value).filter(([key]) => key !== 'span' && key !== 'bracketed');
  return `(${fields.map(([, field]) => outlineOfData(field)).join(' ')})`;
}

const SHORT = new Set(['number', 'letter', 'constant', 'sum', 'product', 'quotient', 'power']);

function isExpr(value: object): value is Expr {
  return 'kind' in value && typeof value.kind === 'string';
}

export function outlineOfLine(line: Line): string {
  return line.kind === 'expression' ? outlineOf(line.expr) : outlineOfData(line);
}

/** What reading a text gives, with flags after `!` and the other ways to read it after `?`. */
export function outlineOfReading(tex: string, settings: Partial<ReadSettings> = {}): string {
  const reading = readLine(tex, { ...DEFAULT_READ_SETTINGS, ...settings });
  if (!reading.ok) {
    const { code, span, expected } = explainRefusal(reading.refusal);
    return [`${code} ${span.start}-${span.end}`, ...expected].join(' ');
  }
  const flags = reading.flags.map((flag) => ` !${flag}`).join('');
  return (
    outlineOfLine(reading.line) +
    flags +
    reading.alternatives.map((other) => ` ? ${printLine(other, settings.decimal)}`).join('')
  );
}
