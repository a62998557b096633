import type { Expr, NumberExpr, Span } from './expression.ts';
import { flag, numberOf, span, take } from './reader.ts';
import type { Token } from './tokens.ts';

/** A number token with the percent sign after it, if any. */
export const readNumberAtom = (token: Token): Expr => {
  const isPercent = take('%');
  const number = numberFrom(token, span(token.start));
  if (!isPercent) return number;
  flag('percent');
  return numberIn(number.numerator, number.denominator * 100n, 'percent', number.span);
};

/** The value of the digits: `12`, `3.5`, `0.1(6)`. */
export const numberFrom = ({ text }: Pick<Token, 'text'>, place: Span): NumberExpr => {
  if (!text.includes('.')) return numberOf(place, BigInt(text));
  const [whole = '', fixed = '', period] = text.split(/[.()]/);
  const top = BigInt(whole + fixed);
  const bottom = powerOfTen(fixed);
  if (!period) return numberIn(top, bottom, 'decimal', place, fixed.length);
  const nines = powerOfTen(period) - 1n;
  return numberIn(top * nines + BigInt(period), bottom * nines, 'repeating', place);
};

const powerOfTen = (digits: string): bigint => 10n ** BigInt(digits.length);

const numberIn = (
  top: bigint,
  bottom: bigint,
  written: NumberExpr['written'],
  place: Span,
  decimals = 0,
): NumberExpr => {
  let [a, b] = [top, bottom];
  while (b > 0n) [a, b] = [b, a % b];
  return { kind: 'number', numerator: top / a, denominator: bottom / a, written, decimals, span: place };
};

/** A number of digits alone, without brackets. */
const isWhole = (expr: Expr): expr is NumberExpr =>
  expr.kind === 'number' && expr.written === 'integer' && !expr.bracketed;

/** `2\frac12`: a whole number directly followed by a fraction of digits is their sum. */
export const mixedNumber = (whole: Expr, part: Expr): Expr | null => {
  if (!isWhole(whole) || part.kind !== 'quotient' || part.written !== 'fraction' || part.bracketed) return null;
  const { numerator: top, denominator: bottom } = part;
  if (!isWhole(top) || !isWhole(bottom) || bottom.numerator === 0n) return null;
  flag('mixed-number');
  const above = whole.numerator * bottom.numerator + top.numerator;
  return numberIn(above, bottom.numerator, 'mixed', span(whole.span.start));
};
