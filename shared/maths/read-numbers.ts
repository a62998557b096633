import type { Expr, NumberExpr } from './expression.ts';
import { numberOf, type Reader } from './reader.ts';
import type { Token } from './scanner.ts';

/** A number token with the percent sign after it, if any. */
export function readNumberAtom(reader: Reader): Expr {
  const token = reader.next();
  const number = numberFrom(token);
  if (!reader.take('%')) return { ...number, span: reader.span(token.start) };
  reader.flags.add('percent');
  return numberIn(number.numerator, number.denominator * 100n, 'percent', reader.span(token.start));
}

/** The value of the digits: `12`, `3.5`, `0.1(6)`. */
export function numberFrom({ text, start, end }: Pick<Token, 'text' | 'start' | 'end'>): NumberExpr {
  if (!text.includes('.')) return numberOf({ start, end }, BigInt(text));
  const span = { start, end };
  const [, whole = '', decimals = '', period] = /^(\d+)\.(\d*)(?:\((\d+)\))?$/.exec(text)!;
  const fixed = BigInt(whole + decimals);
  const scale = 10n ** BigInt(decimals.length);
  if (period) {
    const nines = 10n ** BigInt(period.length) - 1n;
    return numberIn(fixed * nines + BigInt(period), scale * nines, 'repeating', span);
  }
  return numberIn(fixed, scale, 'decimal', span, decimals.length);
}

function numberIn(
  top: bigint,
  bottom: bigint,
  written: NumberExpr['written'],
  span: NumberExpr['span'],
  decimals = 0,
): NumberExpr {
  let [a, b] = [top, bottom];
  while (b > 0n) [a, b] = [b, a % b];
  return { kind: 'number', numerator: top / a, denominator: bottom / a, written, decimals, span };
}

/** A number of digits alone, without brackets. */
function isWhole(expr: Expr): expr is NumberExpr {
  return expr.kind === 'number' && expr.written === 'integer' && !expr.bracketed;
}

/** `2\frac12`: a whole number directly followed by a fraction of digits is their sum. */
export function mixedNumber(reader: Reader, whole: Expr, part: Expr): Expr | null {
  if (!isWhole(whole) || part.kind !== 'quotient' || part.written !== 'fraction' || part.bracketed) return null;
  const { numerator: top, denominator: bottom } = part;
  if (!isWhole(top) || !isWhole(bottom) || bottom.numerator === 0n) return null;
  reader.flags.add('mixed-number');
  const above = whole.numerator * bottom.numerator + top.numerator;
  return numberIn(above, bottom.numerator, 'mixed', reader.span(whole.span.start));
}
